namespace InterfaceFE.Marching;

/// <summary>Which control takes over at limit points.</summary>
public enum PathControl
{
    /// <summary>Layer work.</summary>
    LayerWork,

    /// <summary>Arc length over watched unknowns.</summary>
    ArcLength,

    /// <summary>None: the march stops at a limit point.</summary>
    None,
}

/// <summary>Settings of a march.</summary>
public sealed record MarchSettings
{
    /// <summary>Force tolerance, relative to the largest summed element force.</summary>
    public double Tolerance { get; init; } = 1e-10;

    /// <summary>First stride of a stage [share of the stage].</summary>
    public double FirstStride { get; init; } = 0.02;

    /// <summary>Largest stride [share of the stage].</summary>
    public double LargestStride { get; init; } = 0.1;

    /// <summary>Energy error that strides aim for, relative to the stride's turnover.</summary>
    public double PathError { get; init; } = 3e-4;

    /// <summary>Points of a stage before the march stops.</summary>
    public int MostPoints { get; init; } = 2000;

    /// <summary>Control at limit points.</summary>
    public PathControl Path { get; init; } = PathControl.LayerWork;

    /// <summary>Largest growth of layer work of a stride [mJ]: half a process zone of fresh crack; infinite without layers.</summary>
    public double LargestLayerWork { get; init; } = double.PositiveInfinity;
}

/// <summary>How a march ended.</summary>
public enum MarchStatus
{
    /// <summary>All stages done.</summary>
    Finished,

    /// <summary>Stopped before the end.</summary>
    StoppedEarly,

    /// <summary>The specimen came apart.</summary>
    Severed,

    /// <summary>Interrupted from outside.</summary>
    Interrupted,
}

/// <summary>Outcome of a march.</summary>
/// <param name="Status">How it ended.</param>
/// <param name="Cause">Cause in words; empty when finished.</param>
public readonly record struct MarchOutcome(MarchStatus Status, string Cause);
