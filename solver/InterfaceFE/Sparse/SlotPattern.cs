namespace InterfaceFE.Sparse;

/// <summary>
/// What the factorisation must know of a model before any number is there: unknowns grouped in vertices (a coincident pair of nodes is one vertex), the unknowns of each
/// element slot, coordinates for the ordering, and which vertices go last.
/// </summary>
public sealed class SlotPattern
{
    /// <summary>Number of unknowns.</summary>
    public required int UnknownCount { get; init; }

    /// <summary>Vertex of each unknown; unknowns of one vertex are numbered without gap.</summary>
    public required int[] VertexOfUnknown { get; init; }

    /// <summary>x of each vertex [mm].</summary>
    public required double[] VertexX { get; init; }

    /// <summary>y of each vertex [mm].</summary>
    public required double[] VertexY { get; init; }

    /// <summary>Whether a vertex belongs to the root: ordered last, dense, its unknowns may be held.</summary>
    public required bool[] IsRoot { get; init; }

    /// <summary>Whether element matrices at a vertex are expected to change (layers): ordered late within the leaves.</summary>
    public required bool[] IsChangeable { get; init; }

    /// <summary>Start of each slot's unknowns in <see cref="SlotUnknowns"/>; one more entry than slots.</summary>
    public required int[] SlotStart { get; init; }

    /// <summary>Unknowns of all slots, slot after slot.</summary>
    public required int[] SlotUnknowns { get; init; }

    /// <summary>Number of slots.</summary>
    public int SlotCount => SlotStart.Length - 1;

    /// <summary>Unknowns of a slot.</summary>
    public ReadOnlySpan<int> Unknowns(int slot) => SlotUnknowns.AsSpan(SlotStart[slot], SlotStart[slot + 1] - SlotStart[slot]);
}
