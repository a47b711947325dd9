namespace InterfaceFE.Sparse;

/// <summary>Counts of eigenvalue signs of the factored matrix.</summary>
/// <param name="Positive">Positive ones.</param>
/// <param name="Negative">Negative ones.</param>
/// <param name="Zero">Pivots that were numerically zero.</param>
public readonly record struct Inertia(int Positive, int Negative, int Zero);

/// <summary>How a factorisation went.</summary>
public enum FactorStatus
{
    /// <summary>Every pivot is sound.</summary>
    Done,

    /// <summary>At least one pivot was numerically zero; it was lifted to a small value of the same sign so that solves stay finite.</summary>
    ZeroPivot,

    /// <summary>A matrix entry was not finite.</summary>
    NotFinite,
}

/// <summary>Outcome of a factorisation.</summary>
/// <param name="Status">How it went.</param>
/// <param name="Unknown">The unknown of the first zero pivot, or of the first entry that is not finite; -1 when sound.</param>
/// <param name="Slot">The slot with an entry that is not finite; -1 otherwise.</param>
/// <param name="SmallestPivotRatio">Smallest ratio of a pivot's magnitude to the original diagonal of its unknown.</param>
public readonly record struct FactorOutcome(FactorStatus Status, int Unknown, int Slot, double SmallestPivotRatio);

/// <summary>
/// A factor of a sparse matrix that is the sum of small element matrices in slots. Root unknowns are eliminated last, in a dense block, so that each may be held
/// (its value given) or free from one solve to the next without a new factorisation of the rest. Not safe for use by several threads.
/// </summary>
public interface IWorkingFactor
{
    /// <summary>Number of unknowns.</summary>
    int Size { get; }

    /// <summary>Replaces the matrix of a slot. Nothing is factored until <see cref="Factor"/>.</summary>
    /// <param name="slot">Slot index.</param>
    /// <param name="elementMatrix">Row-major, m×m for the m unknowns of the slot; symmetric unless the factor is a general one.</param>
    void Replace(int slot, ReadOnlySpan<double> elementMatrix);

    /// <summary>Factors the whole matrix with the matrices now in the slots (interior once, root block ready for any held choice).</summary>
    FactorOutcome Factor();

    /// <summary>
    /// Solves K x = b for the unknowns that are not held. On entry <paramref name="x"/> has the values of held root unknowns; on return it has all values.
    /// </summary>
    /// <param name="b">Right side, length <see cref="Size"/>; entries of held unknowns are ignored.</param>
    /// <param name="x">Solution, length <see cref="Size"/>; may not alias <paramref name="b"/>.</param>
    /// <param name="heldRootUnknowns">Indices (unknown numbers) of root unknowns that are held.</param>
    void Solve(ReadOnlySpan<double> b, Span<double> x, ReadOnlySpan<int> heldRootUnknowns);

    /// <summary>Signs of the eigenvalues of the matrix without the held root unknowns (Sylvester); for a general factor, signs of the pivots' product only are meaningful.</summary>
    Inertia Inertia(ReadOnlySpan<int> heldRootUnknowns);

    /// <summary>Product K x with the matrices now in the slots; for residuals and refinement.</summary>
    void Multiply(ReadOnlySpan<double> x, Span<double> product);
}
