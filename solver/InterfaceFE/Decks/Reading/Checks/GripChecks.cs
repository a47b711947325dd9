namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>Grips: their edges, and which ways of describing a place go together.</summary>
internal static class GripChecks
{
    /// <summary>Checks a grip.</summary>
    public static void Run(Deck deck, GripDeck grip, string path, ReadContext context)
    {
        if (grip.On is { } edges)
            for (int i = 0; i < edges.Count; i++)
            {
                // A single edge is written without a list; then the key itself is the place.
                string entry = ReadContext.Join(path + ".on", i + 1);
                DeckChecks.Edge(edges[i], deck, entry, context);
            }
        bool from = context.IsGiven(path + ".from");
        bool to = context.IsGiven(path + ".to");
        if (context.IsGiven(path + ".at"))
            RefuseWith("with `at` the grip is a pin at a point", ["from", "to", "pin", "hold"], path, context);
        else if (from != to)
            context.FailAt(context.Find(path, out _).Key, path + (from ? ".to" : ".from"), "is missing; a gripped stretch has both `from` and `to`");
        DeckChecks.Rises(grip.From, grip.To, path, context);
        if (grip.On is { Count: > 1 })
            RefuseWith("with several edges each is held whole and by itself; make a grip for each edge", ["at", "from", "to", "pin"], path, context);
        if (grip.Hold == GripHold.EachPoint)
            RefuseWith("with each point by itself there is no block to be pulled or turned", ["pin"], path, context);
        if (grip.LoadTrain is not null && WhyOnlyFixed(grip) is { } why)
            context.Fail(path + ".load train", why);
        else if (grip.LoadTrain is not null && !IsPulled(deck, grip))
            context.FailAt(context.Find(path + ".load train", out _).Key, path + ".load train", "has nothing to do: no stage pulls or pushes this grip; it acts along the pull");
    }

    private static bool IsPulled(Deck deck, GripDeck grip) =>
        deck.Sequence is null || deck.Sequence.Any(s => (s?.Pull ?? s?.Push)?.Grip is { } name && deck.Grips.TryGetValue(name, out GripDeck? pulled) && ReferenceEquals(pulled, grip));

    private static void RefuseWith(string reason, string[] keys, string path, ReadContext context)
    {
        foreach (string key in keys)
            if (context.IsGiven(ReadContext.Join(path, key)))
                context.Fail(ReadContext.Join(path, key), $"does not apply: {reason}");
    }

    /// <summary>Whether a grip is a point.</summary>
    public static bool IsPin(GripDeck grip) => grip.At is not null;

    /// <summary>Why a grip cannot be pulled or turned; null when it can.</summary>
    public static string? WhyOnlyFixed(GripDeck grip) => grip switch
    {
        { On.Count: > 1 } => "has several edges and can only be fixed; make a grip of one edge to pull or turn it",
        { Hold: GripHold.EachPoint } => "is held point by point and can only be fixed; `hold: rigid` makes it one body",
        _ => null,
    };
}
