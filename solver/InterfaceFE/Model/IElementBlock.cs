namespace InterfaceFE.Model;

/// <summary>Where on the path an evaluation takes place.</summary>
/// <param name="Progress">Share of the stage's target.</param>
/// <param name="Temperature">Temperature [K].</param>
/// <param name="TimeStride">Time since the accepted point [s].</param>
/// <param name="Stage">Stage, from 1.</param>
public readonly record struct PathPoint(double Progress, double Temperature, double TimeStride, int Stage);

/// <summary>What is known of the tangents of a block.</summary>
public enum TangentKind
{
    /// <summary>One tangent for the whole run.</summary>
    Constant,

    /// <summary>Changing, always symmetric.</summary>
    Symmetric,

    /// <summary>Changing, skew on some branches.</summary>
    Unsymmetric,
}

/// <summary>What an evaluation is asked for.</summary>
[Flags]
public enum Wanted
{
    /// <summary>Internal force.</summary>
    Force = 1,

    /// <summary>Tangent.</summary>
    Tangent = 2,

    /// <summary>Stored and dissipated energy.</summary>
    Energy = 4,

    /// <summary>Change of internal force with temperature at fixed displacement.</summary>
    LoadRate = 8,

    /// <summary>Change of dissipated energy with displacement in the tentative stride.</summary>
    Dissipation = 16,
}

/// <summary>Where an element writes; spans of the element's own size n (tangent n×n, row-major), each overwritten when wanted.</summary>
public readonly ref struct ElementBuffers
{
    /// <summary>Internal force [N], length n.</summary>
    public required Span<double> Force { get; init; }

    /// <summary>Tangent [N/mm], length n², row-major.</summary>
    public required Span<double> Tangent { get; init; }

    /// <summary>d force / d temperature [N/K], length n.</summary>
    public required Span<double> LoadRate { get; init; }

    /// <summary>d dissipated / d displacement in the tentative stride [N], length n.</summary>
    public required Span<double> Dissipation { get; init; }
}

/// <summary>Numbers that an element reports with an evaluation.</summary>
/// <param name="Stored">Elastic energy [mJ].</param>
/// <param name="Dissipated">Dissipated energy since the start [mJ].</param>
/// <param name="StoredByTemperature">d stored / d temperature at fixed displacement [mJ/K].</param>
/// <param name="DissipatedByTemperature">d dissipated / d temperature at fixed displacement in the tentative stride [mJ/K].</param>
/// <param name="LargestDamage">Largest damage of its points; 0 for a solid.</param>
/// <param name="LeastDamage">Least damage of its points; 0 for a solid.</param>
/// <param name="Growing">Whether damage grows at any of its points.</param>
public readonly record struct ElementAnswer(double Stored, double Dissipated, double StoredByTemperature, double DissipatedByTemperature, double LargestDamage, double LeastDamage, bool Growing)
{
    /// <summary>Energy spent in friction since the start [mJ], not part of <see cref="Dissipated"/>.</summary>
    public double SpentInFriction { get; init; }
}

/// <summary>
/// Elements of one kind and one material. An element has two native unknowns (ux, uy) per node, in the order of <see cref="Nodes"/>, and where its group strains out of plane one more. Pure functions of the
/// arguments: evaluating twice gives the same bytes. Safe for use by several threads on different elements.
/// </summary>
public interface IElementBlock
{
    /// <summary>Name for messages: the adherend or joint.</summary>
    string Name { get; }

    /// <summary>Number of elements.</summary>
    int Count { get; }

    /// <summary>Nodes per element.</summary>
    int NodesPerElement { get; }

    /// <summary>Native unknowns of an element: two per node, and one more, last, where the element strains with its group out of plane.</summary>
    int NativeCount => 2 * NodesPerElement;

    /// <summary>Unknown of the group out of plane, the last native unknown of every element [mm]; -1 when the block has none.</summary>
    int OutOfPlaneUnknown => -1;

    /// <summary>Doubles of state per element.</summary>
    int StateSize { get; }

    /// <summary>What is known of the tangents.</summary>
    TangentKind Kind { get; }

    /// <summary>Nodes of an element.</summary>
    ReadOnlySpan<int> Nodes(int element);

    /// <summary>Unknowns of an element that acts on unknowns of the model themselves, in native order; empty for elements whose native unknowns are those of their nodes.</summary>
    ReadOnlySpan<int> OwnUnknowns(int element) => default;

    /// <summary>Evaluates an element.</summary>
    /// <param name="element">Element index.</param>
    /// <param name="at">Place on the path.</param>
    /// <param name="displacement">Native displacements [mm], <see cref="NativeCount"/> numbers.</param>
    /// <param name="accepted">State at the accepted point.</param>
    /// <param name="tentative">State that goes with the displacement; overwritten.</param>
    /// <param name="wanted">What to compute.</param>
    /// <param name="into">Where to write.</param>
    ElementAnswer Evaluate(int element, in PathPoint at, ReadOnlySpan<double> displacement, ReadOnlySpan<double> accepted, Span<double> tentative, Wanted wanted, in ElementBuffers into);
}
