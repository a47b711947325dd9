using System.Globalization;
using InterfaceFE.Decks;

namespace InterfaceFE.Model;

/// <summary>
/// Turns the sequence of a deck into stages over the root unknowns. What a stage fixes or drives stays held in later stages, where it stands, until it is let go or loaded by force;
/// a force or moment stays on until another stage changes it.
/// </summary>
public sealed class SequencePlanner
{
    private const double DefaultPullSpeed = 1.0 / 60;
    private const double DefaultTurnSpeed = Math.PI / 180 / 60;
    private const double DefaultDuration = 60;

    private readonly Deck _deck;
    private readonly UnknownMap _unknowns;
    private readonly IReadOnlyList<Grip> _grips;
    private readonly IReadOnlyList<ForceTarget> _weights;
    private readonly SortedSet<int> _held = [];
    private readonly SortedDictionary<int, double> _forces = [];
    private bool _hasMarched;

    private SequencePlanner(Deck deck, UnknownMap unknowns, IReadOnlyList<Grip> grips, IReadOnlyList<ForceTarget> weights)
    {
        _weights = weights;
        _deck = deck;
        _unknowns = unknowns;
        _grips = grips;
    }

    /// <summary>Plans the stages.</summary>
    /// <param name="deck">The deck.</param>
    /// <param name="unknowns">Unknowns.</param>
    /// <param name="grips">Grips.</param>
    /// <param name="weights">Weight, which comes on over the first stage that marches.</param>
    /// <exception cref="DeckException">A stage asks of a grip what it cannot do.</exception>
    public static IReadOnlyList<LoadStage> Plan(Deck deck, UnknownMap unknowns, IReadOnlyList<Grip> grips, IReadOnlyList<ForceTarget> weights)
    {
        var planner = new SequencePlanner(deck, unknowns, grips, weights);
        planner.HoldGivenStrain();
        return [.. deck.Sequence.Select((stage, i) => planner.Stage(stage, i + 1))];
    }

    /// <summary>
    /// Unknowns of a component of a grip that the sequence acts on: one for a pin or a rigid body, one per node for each point; none for the rotation of points; the crosshead's along the axis of a
    /// load train.
    /// </summary>
    public static IReadOnlyList<int> Unknowns(UnknownMap map, Grip grip, GripComponent component)
    {
        foreach (LoadTrain train in grip.LoadTrains)
            if (train.Component == component)
                return [map.OfCrosshead(train)];
        var list = new List<int>();
        foreach (int body in grip.Bodies)
        {
            if (map.Bodies[body].Rigid)
                list.Add(map.OfBody(body) + (int)component);
            else if (component != GripComponent.Rotation)
                list.AddRange(map.Bodies[body].Nodes.Select(node => map.OfNode(node) + (int)component));
        }
        return list;
    }

    /// <summary>Component and sense of a direction of pull.</summary>
    public static (GripComponent Component, int Sense) Of(PullDirection direction) => direction switch
    {
        PullDirection.PlusX => (GripComponent.X, 1),
        PullDirection.MinusX => (GripComponent.X, -1),
        PullDirection.PlusY => (GripComponent.Y, 1),
        _ => (GripComponent.Y, -1),
    };

    private void HoldGivenStrain()
    {
        for (int group = 0; _unknowns.OutOfPlane is { Given: not null } groups && group < groups.Count; group++)
            _held.Add(_unknowns.FirstOutOfPlane + group);
    }

    /// <summary>A given strain out of plane is reached over the first stage that marches.</summary>
    private void ReachGivenStrain(Dictionary<int, HeldTarget> targets)
    {
        for (int group = 0; _unknowns.OutOfPlane is { Given: { } strain } groups && group < groups.Count; group++)
            targets[_unknowns.FirstOutOfPlane + group] = new HeldTarget(_unknowns.FirstOutOfPlane + group, TargetKind.MoveTo, strain * groups.Length);
    }

    private LoadStage Stage(StageDeck stage, int number)
    {
        string path = string.Create(CultureInfo.InvariantCulture, $"sequence.{number}");
        var targets = new Dictionary<int, HeldTarget>();
        double? temperature = null;
        double duration = stage.Over ?? DefaultDuration;
        bool marches = true;
        string words;
        if (stage.Fix is { } fix)
        {
            foreach ((string name, IReadOnlyList<GripComponent> components) in fix)
                foreach (GripComponent component in components)
                    foreach (int unknown in Require(name, component, $"{path}.fix.{name}"))
                        Hold(unknown);
            marches = false;
            words = "fix " + string.Join(", ", fix.Select(f => $"{f.Key} ({string.Join(", ", f.Value.Select(Word))})"));
        }
        else if (stage.LetGo is { } letGo)
        {
            foreach (string name in letGo)
                foreach (GripComponent component in Enum.GetValues<GripComponent>())
                    foreach (int unknown in Unknowns(_unknowns, Find(name), component))
                        LetGo(unknown);
            words = "let go " + string.Join(", ", letGo);
        }
        else if ((stage.Pull ?? stage.Push) is { } pull)
            words = Pull(pull, stage.Pull is null ? "push" : "pull", path, targets, stage.Over, ref duration);
        else if (stage.Turn is { } turn)
            words = Turn(turn, path, targets, stage.Over, ref duration);
        else if (stage.Press is { } press)
            words = string.Create(CultureInfo.InvariantCulture, $"press {string.Join(", ", press.On)} with {press.Pressure:G6} MPa");
        else if ((stage.CoolTo ?? stage.HeatTo) is { } target)
        {
            temperature = target;
            words = string.Create(CultureInfo.InvariantCulture, $"{(stage.CoolTo is null ? "heat" : "cool")} to {target - 273.15:0.###} °C");
        }
        else
        {
            duration = stage.Wait ?? 0;
            words = string.Create(CultureInfo.InvariantCulture, $"wait {duration:G6} s");
        }
        if (marches && !_hasMarched)
            ReachGivenStrain(targets);
        _hasMarched |= marches;
        return new LoadStage
        {
            Number = number,
            Words = words,
            Held = [.. _held.Select(u => targets.TryGetValue(u, out HeldTarget t) ? t : new HeldTarget(u, TargetKind.Stay, 0))],
            Forces = [.. _forces.Select(f => new ForceTarget(f.Key, f.Value))],
            Weights = _hasMarched ? _weights : [],
            Temperature = temperature,
            Duration = duration,
            Marches = marches,
        };
    }

    private string Pull(PullDeck pull, string verb, string path, Dictionary<int, HeldTarget> targets, double? over, ref double duration)
    {
        (GripComponent component, int sense) = Of(pull.Along);
        IReadOnlyList<int> unknowns = Require(pull.Grip, component, $"{path}.{verb}.grip");
        if (unknowns.Count != 1)
            throw new DeckException($"{path}.{verb}.grip", $"'{pull.Grip}' is held at several points or edges and can only be fixed; pull a pin (`at`), a block or a rigid edge");
        string direction = (sense > 0 ? "+" : "-") + Word(component);
        if (pull.Force is { } force)
        {
            LetGo(unknowns[0]);
            _forces[unknowns[0]] = sense * force;
            return string.Create(CultureInfo.InvariantCulture, $"{verb} {pull.Grip} along {direction} with {force:G6} N");
        }
        double travel = pull.Travel ?? 0;
        Hold(unknowns[0]);
        targets[unknowns[0]] = new HeldTarget(unknowns[0], pull.CountedFrom == CountedFrom.StressFreeState ? TargetKind.MoveTo : TargetKind.MoveBy, sense * travel);
        duration = over ?? travel / (pull.Speed ?? DefaultPullSpeed);
        return string.Create(CultureInfo.InvariantCulture, $"{verb} {pull.Grip} along {direction} by {travel:G6} mm");
    }

    private string Turn(TurnDeck turn, string path, Dictionary<int, HeldTarget> targets, double? over, ref double duration)
    {
        foreach ((string name, double share) in turn.Grips)
        {
            foreach (int unknown in Require(name, GripComponent.Rotation, $"{path}.turn.grips.{name}"))
            {
                if (turn.Moment is { } moment)
                {
                    LetGo(unknown);
                    _forces[unknown] = share * moment;
                    continue;
                }
                Hold(unknown);
                targets[unknown] = new HeldTarget(unknown, TargetKind.MoveBy, share * (turn.Angle ?? 0));
            }
        }
        string grips = string.Join(", ", turn.Grips.Keys);
        if (turn.Moment is { } all)
            return string.Create(CultureInfo.InvariantCulture, $"turn {grips} with {all:G6} N mm");
        duration = over ?? Math.Abs(turn.Angle ?? 0) / (turn.Speed ?? DefaultTurnSpeed);
        return string.Create(CultureInfo.InvariantCulture, $"turn {grips} by {(turn.Angle ?? 0) * 180 / Math.PI:G6} deg");
    }

    private IReadOnlyList<int> Require(string name, GripComponent component, string path)
    {
        IReadOnlyList<int> unknowns = Unknowns(_unknowns, Find(name), component);
        return unknowns.Count > 0 ? unknowns : throw new DeckException(path, $"'{name}' is a pin or held point by point and has no rotation; grip a stretch of an edge (`from`, `to`) or a whole edge with `hold: rigid`");
    }

    private void Hold(int unknown)
    {
        _held.Add(unknown);
        _forces.Remove(unknown);
    }

    private void LetGo(int unknown)
    {
        _held.Remove(unknown);
        if (_forces.ContainsKey(unknown))
            _forces[unknown] = 0;
    }

    private Grip Find(string name) => _grips.First(g => g.Name == name);

    private static string Word(GripComponent component) => component switch { GripComponent.X => "x", GripComponent.Y => "y", _ => "rotation" };
}
