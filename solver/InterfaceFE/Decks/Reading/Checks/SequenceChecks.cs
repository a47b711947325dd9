using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>The sequence: one verb a stage, what goes with it, names of grips, temperatures that really change, and grips that are held when they are let go.</summary>
internal sealed class SequenceChecks
{
    private static readonly string[] Verbs = ["fix", "let go", "pull", "push", "turn", "press", "cool to", "heat to", "wait"];
    private readonly Deck _deck;
    private readonly ReadContext _context;
    private readonly HashSet<string> _held = new(StringComparer.Ordinal);
    private double _temperature;

    private SequenceChecks(Deck deck, ReadContext context)
    {
        _deck = deck;
        _context = context;
        _temperature = deck.StressFreeTemperature;
    }

    /// <summary>Checks all stages in order.</summary>
    public static void Run(Deck deck, ReadContext context)
    {
        if (deck.Sequence is null)
            return;
        SequenceChecks checks = new(deck, context);
        for (int i = 0; i < deck.Sequence.Count; i++)
            if (deck.Sequence[i] is { } stage)
                checks.CheckStage(stage, ReadContext.Join("sequence", i + 1));
    }

    private void CheckStage(StageDeck stage, string path)
    {
        List<string> given = [.. Verbs.Where(v => _context.IsGiven(ReadContext.Join(path, v)))];
        if (given.Count == 0)
            _context.FailAt(_context.Find(path, out _).Key, path, $"has no verb; a stage has one of {string.Join(", ", Verbs)}");
        foreach (string second in given.Skip(1))
            _context.Fail(ReadContext.Join(path, second), $"a stage has one verb, and this one already has `{given[0]}`; start another stage with \"- {second}:\"");
        CheckFix(stage, path);
        CheckLetGo(stage, path);
        CheckPull(stage.Pull, path + ".pull");
        CheckPull(stage.Push, path + ".push");
        CheckTurn(stage.Turn, path + ".turn");
        CheckPress(stage.Press, path + ".press");
        CheckTemperature(stage, path);
        bool byTime = stage.CoolTo is not null || stage.HeatTo is not null || (stage.Pull ?? stage.Push)?.Force is not null || stage.Turn?.Moment is not null || stage.Press is not null;
        if (_context.IsGiven(path + ".over") && !byTime && given.Count > 0)
            _context.Fail(path + ".over", stage switch
            {
                { Wait: not null } => "does not apply: `wait` itself says how long",
                { Pull: not null } or { Push: not null } or { Turn: not null } => "does not apply to a movement; its `speed` says how long it takes",
                _ => $"does not apply to `{given[0]}`; it goes with cooling, heating, a force, a moment or a pressure",
            });
    }

    private void CheckFix(StageDeck stage, string path)
    {
        foreach ((string name, IReadOnlyList<GripComponent> components) in DeckChecks.Entries(stage.Fix))
        {
            string at = $"{path}.fix.{name}";
            if (!DeckChecks.NameExists(name, _deck.Grips, "grips", at, _context) || _deck.Grips[name] is not { } grip)
                continue;
            _held.Add(name);
            int rotation = components.ToList().IndexOf(GripComponent.Rotation);
            if (rotation < 0)
                continue;
            string entry = ReadContext.Join(at, rotation + 1);
            if (GripChecks.IsPin(grip))
                _context.Fail(entry, "a pin is a point and has no rotation to fix; grip a stretch (`from`, `to`) or the whole edge instead");
            else if (grip.Hold == GripHold.EachPoint)
                _context.Fail(entry, "a grip that is held point by point has no rotation of its own; fix x and y, or use `hold: rigid`");
        }
    }

    private void CheckLetGo(StageDeck stage, string path)
    {
        if (stage.LetGo is not { } names)
            return;
        for (int i = 0; i < names.Count; i++)
        {
            string at = ReadContext.Join(path + ".let go", i + 1);
            if (DeckChecks.NameExists(names[i], _deck.Grips, "grips", at, _context) && !_held.Remove(names[i]))
                _context.Fail(at, "is not held at this stage: no stage before it fixes, pulls or turns it");
        }
    }

    private void CheckPull(PullDeck? pull, string path)
    {
        if (pull is null)
            return;
        CheckEither(path, "travel", "force", "8 mm", "200 N");
        if (_context.IsGiven(path + ".force") && !_context.IsGiven(path + ".travel"))
            foreach (string key in (string[])["speed", "counted from"])
                if (_context.IsGiven(ReadContext.Join(path, key)))
                    _context.Fail(ReadContext.Join(path, key), key == "speed" ? "does not apply to a force; `over` of the stage says how long it takes" : "does not apply to a force; it goes with `travel`");
        CheckMovable(pull.Grip, path + ".grip");
    }

    private void CheckTurn(TurnDeck? turn, string path)
    {
        if (turn is null)
            return;
        CheckEither(path, "angle", "moment", "5 deg", "12 N*m");
        if (_context.IsGiven(path + ".speed") && _context.IsGiven(path + ".moment") && !_context.IsGiven(path + ".angle"))
            _context.Fail(path + ".speed", "does not apply to a moment; `over` of the stage says how long it takes");
        if (turn.Angle == 0)
            _context.Fail(path + ".angle", "must not be 0: a turn by 0 turns nothing");
        foreach ((string name, double share) in DeckChecks.Entries(turn.Grips))
        {
            string at = $"{path}.grips.{name}";
            if (CheckMovable(name, at) is { } grip && GripChecks.IsPin(grip))
                _context.Fail(at, "is a pin, which has no rotation; grip a stretch (`from`, `to`) or the whole edge to turn it");
            if (share == 0)
                _context.Fail(at, "a share of 0 turns nothing; leave the grip out");
        }
    }

    private void CheckPress(PressDeck? press, string path)
    {
        if (press?.On is not { } edges)
            return;
        for (int i = 0; i < edges.Count; i++)
            DeckChecks.Edge(edges[i], _deck, _context.IsGiven(ReadContext.Join(path + ".on", i + 1)) ? ReadContext.Join(path + ".on", i + 1) : path + ".on", _context);
    }

    /// <summary>The grip, when it exists and can be moved; it counts as held from then on.</summary>
    private GripDeck? CheckMovable(string? name, string path)
    {
        if (!DeckChecks.NameExists(name, _deck.Grips, "grips", path, _context) || _deck.Grips[name!] is not { } grip)
            return null;
        _held.Add(name!);
        if (GripChecks.WhyOnlyFixed(grip) is { } why)
            _context.Fail(path, why);
        return grip;
    }

    private void CheckEither(string path, string first, string second, string firstExample, string secondExample)
    {
        bool hasFirst = _context.IsGiven(ReadContext.Join(path, first));
        bool hasSecond = _context.IsGiven(ReadContext.Join(path, second));
        if (hasFirst && hasSecond)
            _context.Fail(ReadContext.Join(path, second), $"give `{first}` or `{second}`, not both");
        else if (!hasFirst && !hasSecond)
            _context.FailAt(_context.Find(path, out _).Key, path, $"says neither `{first}` nor `{second}`; give one, for example {first}: {firstExample} or {second}: {secondExample}");
    }

    private void CheckTemperature(StageDeck stage, string path)
    {
        if (stage.CoolTo is { } cool)
        {
            if (cool >= _temperature)
                _context.Fail(path + ".cool to", $"must be below the {QuantityText.Write(_temperature, Dimension.Temperature)} reached before" + (cool > _temperature ? "; to go up, write `heat to`" : ""));
            _temperature = cool;
        }
        if (stage.HeatTo is { } heat)
        {
            if (heat <= _temperature)
                _context.Fail(path + ".heat to", $"must be above the {QuantityText.Write(_temperature, Dimension.Temperature)} reached before" + (heat < _temperature ? "; to go down, write `cool to`" : ""));
            _temperature = heat;
        }
    }
}
