namespace InterfaceFE.Model;

/// <summary>How the value of a held unknown is meant.</summary>
public enum TargetKind
{
    /// <summary>Stays where it stands when the stage starts.</summary>
    Stay,

    /// <summary>Moves to a value, counted from the stress-free state.</summary>
    MoveTo,

    /// <summary>Moves by a value from where it stands when the stage starts.</summary>
    MoveBy,
}

/// <summary>A held unknown and where it goes in a stage.</summary>
/// <param name="Unknown">Root unknown.</param>
/// <param name="Kind">How the value is meant.</param>
/// <param name="Value">Value [mm or rad]; 0 for <see cref="TargetKind.Stay"/>.</param>
public readonly record struct HeldTarget(int Unknown, TargetKind Kind, double Value);

/// <summary>An external force on a root unknown that is not held: it goes linearly from its value at the start of the stage to this value.</summary>
/// <param name="Unknown">Root unknown.</param>
/// <param name="Value">Force at the end [N] or moment [N·mm].</param>
public readonly record struct ForceTarget(int Unknown, double Value);

/// <summary>One stage as the march sees it. Unknowns that were held before and are neither held nor loaded here are let go: their reaction fades to 0 over the stage.</summary>
public sealed class LoadStage
{
    /// <summary>Number in the deck's sequence, from 1.</summary>
    public required int Number { get; init; }

    /// <summary>The stage in words.</summary>
    public required string Words { get; init; }

    /// <summary>All unknowns held in this stage.</summary>
    public required IReadOnlyList<HeldTarget> Held { get; init; }

    /// <summary>Force targets of unknowns that are not held.</summary>
    public required IReadOnlyList<ForceTarget> Forces { get; init; }

    /// <summary>Weight at the end, on any unknown; it goes linearly from that of the stage before.</summary>
    public IReadOnlyList<ForceTarget> Weights { get; init; } = [];

    /// <summary>Temperature at the end [K]; null: unchanged.</summary>
    public required double? Temperature { get; init; }

    /// <summary>Duration [s].</summary>
    public required double Duration { get; init; }

    /// <summary>Whether anything changes over the stage; a stage that only fixes needs no march.</summary>
    public required bool Marches { get; init; }
}
