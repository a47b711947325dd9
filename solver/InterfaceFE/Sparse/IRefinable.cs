namespace InterfaceFE.Sparse;

/// <summary>A linear system with a factor that solves it nearly. Rows of held unknowns are no equations: their residuals and products are zero.</summary>
internal interface IRefinable
{
    /// <summary>Number of unknowns.</summary>
    int Count { get; }

    /// <summary>residual = b - K x and size = |b| + |K| |x|, entry by entry.</summary>
    void Residual(ReadOnlySpan<double> b, ReadOnlySpan<double> x, Span<double> residual, Span<double> size);

    /// <summary>product = K x.</summary>
    void Multiply(ReadOnlySpan<double> x, Span<double> product);

    /// <summary>Solves nearly for a correction: held unknowns stay put.</summary>
    void Correct(ReadOnlySpan<double> b, Span<double> x);
}
