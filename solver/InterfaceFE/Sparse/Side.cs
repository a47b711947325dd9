namespace InterfaceFE.Sparse;

/// <summary>Where a vertex lies when a part of the graph is divided.</summary>
internal enum Side : byte
{
    /// <summary>Not in the part.</summary>
    Outside,

    /// <summary>In the piece that is eliminated first.</summary>
    Left,

    /// <summary>In the other piece.</summary>
    Right,

    /// <summary>Between the pieces, eliminated after both.</summary>
    Separator,
}
