namespace InterfaceFE.Sparse;

/// <summary>
/// A division of a part of the graph into two pieces without a common edge and the separator between them. Pieces are measured in load, a count of unknowns in which those
/// that change weigh more, so that balanced pieces give short paths from what changes to the root.
/// </summary>
/// <param name="Left">Load of the left piece.</param>
/// <param name="Right">Load of the right piece.</param>
/// <param name="Separator">Unknowns of the separator.</param>
/// <param name="Total">Load of the whole part, separator included.</param>
internal readonly record struct Separation(long Left, long Right, long Separator, long Total)
{
    /// <summary>Largest <see cref="Imbalance"/> that a division may have where it can be avoided.</summary>
    public const double LargestImbalance = 0.4;

    /// <summary>Difference of the pieces as a share of the part.</summary>
    public double Imbalance => (double)Math.Abs(Left - Right) / Total;

    /// <summary>What the division costs: the separator, more where the pieces differ; of equal ones the more balanced is the cheaper.</summary>
    public double Cost
    {
        get
        {
            double imbalance = Imbalance;
            return Separator * (1 + imbalance * imbalance) + 1e-3 * imbalance;
        }
    }
}
