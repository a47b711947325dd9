using InterfaceFE.Benchmarks.Engine;
using InterfaceFE.Benchmarks.Rivals;

namespace InterfaceFE.Benchmarks.Reporting;

/// <summary>CHOLMOD on a model, in rounds that alternated with the engine's.</summary>
/// <param name="Configurations">Its configurations.</param>
/// <param name="Best">The fastest.</param>
/// <param name="OwnOrderFlops">Flops of the engine's order, counted by CHOLMOD's rule, without explicit zeros.</param>
/// <param name="Difference">Largest difference of the two solutions over the largest value.</param>
/// <param name="BackwardError">Backward error of CHOLMOD's solution.</param>
/// <param name="OwnBackwardError">Backward error of the engine's.</param>
public sealed record CholmodOutcome(
    IReadOnlyList<CholmodConfiguration> Configurations,
    CholmodConfiguration Best,
    double OwnOrderFlops,
    double Difference,
    double BackwardError,
    double OwnBackwardError);

/// <summary>Everything measured on one model.</summary>
/// <param name="Description">What the model is.</param>
/// <param name="Times">Engine with the kernels of this process.</param>
/// <param name="Narrow">Engine with the 256-bit kernels; null where they are the only ones or could not be chosen.</param>
/// <param name="Cholmod">CHOLMOD; null where it was skipped.</param>
public sealed record ModelOutcome(string Description, EngineTimes Times, EngineTimes? Narrow, CholmodOutcome? Cholmod)
{
    private const string NarrowSuffix = ".vector256";

    /// <summary>All figures.</summary>
    public IEnumerable<Ratio> Ratios()
    {
        string name = Times.Model;
        foreach (Ratio ratio in Of(Times, ""))
            yield return ratio;
        yield return new(name + ".two-threads", Times.Threads.OneMs / Times.Threads.TwoMs);
        foreach (Ratio ratio in Narrow is null ? [] : Of(Narrow, NarrowSuffix))
            yield return ratio;
        if (Cholmod is null)
            yield break;
        foreach (string order in (string[])["METIS", "AMD"])
            yield return new($"{name}.order-flops.{order.ToLowerInvariant()}", Cholmod.OwnOrderFlops / FlopsWith(order));
    }

    /// <summary>Flops of one of CHOLMOD's orders; NaN where CHOLMOD was skipped.</summary>
    public double FlopsWith(string order) => Cholmod?.Configurations.First(c => c.Name.EndsWith(order, StringComparison.Ordinal)).Flops ?? double.NaN;

    private IEnumerable<Ratio> Of(EngineTimes times, string suffix)
    {
        string name = times.Model;
        double? cholmod = Cholmod?.Best.TotalMs;
        if (cholmod is { } whole)
            yield return new($"{name}.full.cholmod{suffix}", whole / times.TotalMs);
        foreach (ChangeTimes change in times.Layers)
        {
            if (cholmod is { } other)
                yield return new($"{name}.changed-{change.Size:0}.cholmod{suffix}", other / change.TotalMs);
            yield return new($"{name}.changed-{change.Size:0}.own-full{suffix}", times.TotalMs / change.TotalMs);
        }
        foreach (ChangeTimes patch in times.Patches)
        {
            if (cholmod is { } other)
                yield return new(FormattableString.Invariant($"{name}.patch-{patch.Size}mm.cholmod{suffix}"), other / patch.TotalMs);
            yield return new(FormattableString.Invariant($"{name}.patch-{patch.Size}mm.own-full{suffix}"), times.TotalMs / patch.TotalMs);
        }
    }
}

/// <summary>A try of one of MathNet's solvers.</summary>
/// <param name="Model">Model.</param>
/// <param name="Solver">Solver and preconditioner.</param>
/// <param name="LimitSeconds">Limit of processor time [s].</param>
/// <param name="Outcome">Outcome; null where it broke off or was ended.</param>
/// <param name="EngineMs">Whole factorisation and solve of the engine [ms].</param>
public sealed record IterativeTry(string Model, string Solver, double LimitSeconds, IterativeOutcome? Outcome, double EngineMs)
{
    /// <summary>The figure; null without an answer.</summary>
    public Ratio? Ratio => Outcome is { Converged: true } ? new Ratio($"{Model}.full.mathnet-{Solver}", Outcome.Milliseconds / EngineMs) : null;

    /// <summary>How it went, in words.</summary>
    public string Words => Outcome switch
    {
        { Converged: true } => $"{Digits.Three(Outcome.Milliseconds)} ms, {Reached}",
        not null => FormattableString.Invariant($"did not finish in {LimitSeconds} s of processor time: {Reached}"),
        null => FormattableString.Invariant($"broke off, or did not finish in {LimitSeconds} s of processor time"),
    };

    private string Reached => FormattableString.Invariant($"{Outcome?.Iterations} iterations, relative residual {Outcome?.RelativeResidual:0.0E+0}");
}
