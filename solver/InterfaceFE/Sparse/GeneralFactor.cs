namespace InterfaceFE.Sparse;

/// <summary>
/// Factor K = L D U of a matrix whose element matrices need not be symmetric, on the same plan as the symmetric one, with twice its cost and memory: pivots in fixed order,
/// small ones lifted, the free part of the root by partial pivoting, and each solve refined with the true matrix. <see cref="MultifrontalFactor.Inertia"/> counts the signs of
/// pivots; of these only the parity of the negative ones has a meaning: it is the sign of the determinant.
/// </summary>
public sealed class GeneralFactor : MultifrontalFactor
{
    /// <summary>Makes room for the factor of matrices with the plan's pattern; all slots are zero at first.</summary>
    /// <param name="plan">The plan; may be shared with other factors and threads.</param>
    public GeneralFactor(SparsePlan plan)
        : base(plan, isSymmetric: false)
    {
    }

    private protected override DenseRoot NewRoot(int size) => new GeneralRoot(size);
}
