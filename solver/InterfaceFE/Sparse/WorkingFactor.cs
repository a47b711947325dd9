namespace InterfaceFE.Sparse;

/// <summary>
/// Factor K = L D Lᵀ of a symmetric matrix, definite or not, by fronts with 1×1 pivots in fixed order; the free part of the root by Bunch and Kaufman's pivoting. The
/// inertia follows from the pivots (Sylvester). Solves are refined with the true matrix where a pivot had to be lifted or round-off grew.
/// </summary>
public sealed class WorkingFactor : MultifrontalFactor
{
    /// <summary>Makes room for the factor of matrices with the plan's pattern; all slots are zero at first.</summary>
    /// <param name="plan">The plan; may be shared with other factors and threads.</param>
    public WorkingFactor(SparsePlan plan)
        : base(plan, isSymmetric: true)
    {
    }

    /// <summary>
    /// Estimate of the condition number of the matrix without the held root unknowns, rows and columns scaled to a unit diagonal: about as many digits of a solution are lost as it
    /// has. Costs some eight solves and allocates.
    /// </summary>
    /// <param name="heldRootUnknowns">Root unknowns that are held.</param>
    /// <exception cref="InvalidOperationException">There is no sound factor.</exception>
    public double Condition(ReadOnlySpan<int> heldRootUnknowns) => new ConditionEstimate(this, heldRootUnknowns).Run();

    private protected override DenseRoot NewRoot(int size) => new SymmetricRoot(size);
}
