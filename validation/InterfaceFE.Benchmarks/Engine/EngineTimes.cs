namespace InterfaceFE.Benchmarks.Engine;

/// <summary>What the processor can do at best, measured in the same run.</summary>
/// <param name="KernelWidth">Width of the kernels' vectors [bits].</param>
/// <param name="PeakFlopsPerMs">Arithmetic of the innermost loop with its numbers in cache [flop/ms].</param>
/// <param name="CacheBytesPerMs">Reading of an array that the larger caches hold [byte/ms].</param>
/// <param name="MemoryBytesPerMs">Reading of an array that no cache holds [byte/ms].</param>
public sealed record MachineRates(int KernelWidth, double PeakFlopsPerMs, double CacheBytesPerMs, double MemoryBytesPerMs);

/// <summary>Times of one kind of change, over several places.</summary>
/// <param name="Size">Number of layer elements, or width of a yielding patch [mm].</param>
/// <param name="Elements">Elements that change at a place.</param>
/// <param name="ReplaceMs">Median of handing over the new matrices [ms].</param>
/// <param name="FactorMs">Median of the factorisation along the paths [ms].</param>
/// <param name="SolveMs">Median of the solve along the paths [ms].</param>
/// <param name="SlowestPlaceMs">Sum of the three at the slowest place, by medians [ms].</param>
/// <param name="Flops">Arithmetic of a factorisation, mean over places [flop].</param>
/// <param name="Bytes">Bytes it must move at least, mean over places.</param>
/// <param name="AllocatedBytes">Most managed memory taken by an iteration [byte].</param>
/// <param name="PartialIsWhole">Whether the solution along the path equals that of a whole factorisation and solve to the last bit, at each place.</param>
public sealed record ChangeTimes(
    double Size,
    int Elements,
    double ReplaceMs,
    double FactorMs,
    double SolveMs,
    double SlowestPlaceMs,
    double Flops,
    double Bytes,
    long AllocatedBytes,
    bool PartialIsWhole)
{
    /// <summary>One iteration: new matrices, factorisation, solve [ms].</summary>
    public double TotalMs => ReplaceMs + FactorMs + SolveMs;
}

/// <summary>One thread against two.</summary>
/// <param name="OneMs">Wall-clock median of a whole factorisation with one thread [ms].</param>
/// <param name="TwoMs">With two [ms].</param>
/// <param name="SameBits">Whether the solutions agree to the last bit.</param>
public sealed record ThreadTimes(double OneMs, double TwoMs, bool SameBits);

/// <summary>Times of the engine on one model.</summary>
/// <param name="Model">Short name.</param>
/// <param name="Unknowns">Number of unknowns.</param>
/// <param name="KernelWidth">Width of the kernels' vectors [bits].</param>
/// <param name="AnalysisMs">Analysis [ms].</param>
/// <param name="FactorMs">Median of a whole factorisation [ms].</param>
/// <param name="SolveMs">Median of a whole solve [ms].</param>
/// <param name="Flops">Arithmetic of a whole factorisation [flop].</param>
/// <param name="Bytes">Bytes it must move at least.</param>
/// <param name="FactorNonZeros">Entries of the factor, explicit zeros included.</param>
/// <param name="LargestFront">Unknowns of the largest front.</param>
/// <param name="Negatives">Negative eigenvalues with the grips held.</param>
/// <param name="Refined">Whether solves were refined.</param>
/// <param name="AllocatedBytes">Most managed memory taken by a whole factorisation with solve [byte].</param>
/// <param name="Layers">Changed layer elements.</param>
/// <param name="Patches">Yielding patches; strips only.</param>
/// <param name="Threads">One thread against two.</param>
public sealed record EngineTimes(
    string Model,
    int Unknowns,
    int KernelWidth,
    double AnalysisMs,
    double FactorMs,
    double SolveMs,
    double Flops,
    double Bytes,
    long FactorNonZeros,
    int LargestFront,
    int Negatives,
    bool Refined,
    long AllocatedBytes,
    IReadOnlyList<ChangeTimes> Layers,
    IReadOnlyList<ChangeTimes> Patches,
    ThreadTimes Threads)
{
    /// <summary>Whole factorisation and solve [ms].</summary>
    public double TotalMs => FactorMs + SolveMs;
}
