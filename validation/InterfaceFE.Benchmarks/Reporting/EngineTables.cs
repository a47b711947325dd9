using InterfaceFE.Benchmarks.Engine;
using InterfaceFE.Benchmarks.Rivals;

namespace InterfaceFE.Benchmarks.Reporting;

/// <summary>The tables of a run, one method each.</summary>
/// <param name="models">Outcomes, model by model.</param>
/// <param name="rates">Best rates of the machine.</param>
/// <param name="narrowRates">Those of a process with 256-bit kernels; null where there was none.</param>
public sealed class EngineTables(IReadOnlyList<ModelOutcome> models, MachineRates rates, MachineRates? narrowRates)
{
    /// <summary>Whole factorisation and solve.</summary>
    public MarkdownTable Whole()
    {
        MarkdownTable table = new(
            "model", "unknowns", "CHOLMOD", "its factor + solve [ms]", "factor + solve [ms]", "ratio", "narrow [ms]", "narrow ratio", "difference", "errors", "negative", "memory [byte]");
        foreach (ModelOutcome model in models)
        {
            EngineTimes times = model.Times;
            CholmodOutcome? other = model.Cholmod;
            table.Add(
                times.Model,
                Digits.Whole(times.Unknowns),
                other?.Best.Name ?? "skipped",
                other is null ? "–" : Sum(other.Best.Factor.Median, other.Best.Solve.Median),
                Sum(times.FactorMs, times.SolveMs),
                Over(other?.Best.TotalMs, times.TotalMs),
                model.Narrow is null ? "–" : Sum(model.Narrow.FactorMs, model.Narrow.SolveMs),
                Over(other?.Best.TotalMs, model.Narrow?.TotalMs),
                other is null ? "–" : Digits.Three(other.Difference),
                other is null ? "–" : $"{Digits.Three(other.BackwardError)}, {Digits.Three(other.OwnBackwardError)}",
                times.Negatives + (times.Refined ? ", refined" : ""),
                Digits.Whole(times.AllocatedBytes));
        }
        return table;
    }

    /// <summary>All configurations of CHOLMOD.</summary>
    public MarkdownTable Configurations()
    {
        MarkdownTable table = new("model", "configuration", "analysis [ms]", "factor [ms]", "solve [ms]", "Gflop", "Gflop/s", "million entries");
        foreach (ModelOutcome model in models)
            foreach (CholmodConfiguration c in model.Cholmod?.Configurations ?? [])
                table.Add(
                    model.Times.Model,
                    c.Name,
                    Digits.Three(c.AnalysisMs),
                    Digits.Three(c.Factor.Median),
                    Digits.Three(c.Solve.Median),
                    Digits.Three(c.Flops / 1e9),
                    Digits.Three(c.Flops / 1e6 / c.Factor.Median),
                    Digits.Three(c.FactorNonZeros / 1e6));
        return table;
    }

    /// <summary>Changed layer elements.</summary>
    public MarkdownTable Layers()
    {
        MarkdownTable table = new(
            "model", "elements", "replace + factor + solve [ms]", "slowest place [ms]", "CHOLMOD /", "own whole /", "narrow [ms]", "CHOLMOD / narrow", "bits", "memory [byte]");
        foreach (ModelOutcome model in models)
            for (int i = 0; i < model.Times.Layers.Count; i++)
            {
                ChangeTimes change = model.Times.Layers[i];
                ChangeTimes? narrow = model.Narrow?.Layers[i];
                table.Add(
                    model.Times.Model,
                    Digits.Whole(change.Size),
                    Sum(change),
                    Digits.Three(change.SlowestPlaceMs),
                    Over(model.Cholmod?.Best.TotalMs, change.TotalMs),
                    Over(model.Times.TotalMs, change.TotalMs),
                    narrow is null ? "–" : Sum(narrow),
                    Over(model.Cholmod?.Best.TotalMs, narrow?.TotalMs),
                    change.PartialIsWhole && narrow?.PartialIsWhole != false ? "same" : "DIFFER",
                    Digits.Whole(change.AllocatedBytes));
            }
        return table;
    }

    /// <summary>Yielding patches.</summary>
    public MarkdownTable Patches()
    {
        MarkdownTable table = new(
            "model", "width [mm]", "elements", "replace + factor + solve [ms]", "CHOLMOD /", "own whole /", "narrow [ms]", "bits", "memory [byte]");
        foreach (ModelOutcome model in models)
            for (int i = 0; i < model.Times.Patches.Count; i++)
            {
                ChangeTimes patch = model.Times.Patches[i];
                ChangeTimes? narrow = model.Narrow?.Patches[i];
                table.Add(
                    model.Times.Model,
                    Digits.Three(patch.Size),
                    Digits.Whole(patch.Elements),
                    Sum(patch),
                    Over(model.Cholmod?.Best.TotalMs, patch.TotalMs),
                    Over(model.Times.TotalMs, patch.TotalMs),
                    narrow is null ? "–" : Sum(narrow),
                    patch.PartialIsWhole && narrow?.PartialIsWhole != false ? "same" : "DIFFER",
                    Digits.Whole(patch.AllocatedBytes));
            }
        return table;
    }

    /// <summary>One thread against two.</summary>
    public MarkdownTable Threads()
    {
        MarkdownTable table = new("model", "one thread [ms]", "two threads [ms]", "ratio", "solutions");
        foreach (ModelOutcome model in models)
        {
            ThreadTimes threads = model.Times.Threads;
            table.Add(model.Times.Model, Digits.Three(threads.OneMs), Digits.Three(threads.TwoMs), Over(threads.OneMs, threads.TwoMs), threads.SameBits ? "same bits" : "DIFFER");
        }
        return table;
    }

    /// <summary>Arithmetic under the engine's order and others.</summary>
    public MarkdownTable Orders()
    {
        MarkdownTable table = new("model", "own [Gflop]", "METIS [Gflop]", "AMD [Gflop]", "own / METIS", "with merged fronts [Gflop]");
        foreach (ModelOutcome model in models.Where(model => model.Cholmod is not null))
        {
            double own = model.Cholmod!.OwnOrderFlops, metis = model.FlopsWith("METIS"), amd = model.FlopsWith("AMD");
            table.Add(model.Times.Model, Digits.Three(own / 1e9), Digits.Three(metis / 1e9), Digits.Three(amd / 1e9), Over(own, metis), Digits.Three(model.Times.Flops / 1e9));
        }
        return table;
    }

    /// <summary>Arithmetic, bytes and shares.</summary>
    public MarkdownTable Bounds()
    {
        MarkdownTable table = new("model", "what", "Mflop", "MB", "ms", "Gflop/s", "share of peak", "share of memory", "rest", "largest share");
        foreach (ModelOutcome model in models)
        {
            Add(table, model.Times, rates, "");
            if (model.Narrow is not null && narrowRates is not null)
                Add(table, model.Narrow, narrowRates, ", narrow");
        }
        return table;
    }

    /// <summary>What bounds the time behind a missed figure, in words.</summary>
    /// <param name="figure">Name of the figure.</param>
    public string Reason(string figure)
    {
        ArgumentNullException.ThrowIfNull(figure);
        ModelOutcome model = models.First(m => figure.StartsWith(m.Times.Model + ".", StringComparison.Ordinal));
        if (figure.Contains(".order-", StringComparison.Ordinal))
            return "the order's separators";
        bool isNarrow = figure.EndsWith(".vector256", StringComparison.Ordinal) && model.Narrow is not null && narrowRates is not null;
        EngineTimes times = isNarrow ? model.Narrow! : model.Times;
        ChangeTimes? change = times.Layers.FirstOrDefault(c => figure.Contains(FormattableString.Invariant($".changed-{c.Size}."), StringComparison.Ordinal));
        (double ms, double flops, double bytes) = change is null ? (times.FactorMs, times.Flops, times.Bytes) : (change.FactorMs, change.Flops, change.Bytes);
        Bound bound = Bound.Of(ms, flops, bytes, isNarrow ? narrowRates! : rates);
        return FormattableString.Invariant($"{bound.Name}; factorisation {flops / 1e6:0.#} Mflop, {bytes / 1e6:0.#} MB, {Digits.Percent(bound.Arithmetic)} of peak");
    }

    private static void Add(MarkdownTable table, EngineTimes times, MachineRates rates, string suffix)
    {
        Add(table, times.Model + suffix, "whole factorisation", times.FactorMs, times.Flops, times.Bytes, rates);
        foreach (ChangeTimes change in times.Layers)
            Add(table, times.Model + suffix, $"layer elements: {change.Size:0}", change.FactorMs, change.Flops, change.Bytes, rates);
        foreach (ChangeTimes patch in times.Patches)
            Add(table, times.Model + suffix, FormattableString.Invariant($"patch of {patch.Size} mm"), patch.FactorMs, patch.Flops, patch.Bytes, rates);
    }

    private static void Add(MarkdownTable table, string model, string what, double milliseconds, double flops, double bytes, MachineRates rates)
    {
        Bound bound = Bound.Of(milliseconds, flops, bytes, rates);
        table.Add(
            model,
            what,
            Digits.Three(flops / 1e6),
            Digits.Three(bytes / 1e6),
            Digits.Three(milliseconds),
            Digits.Three(flops / 1e6 / milliseconds),
            Digits.Percent(bound.Arithmetic),
            Digits.Percent(bound.Memory),
            Digits.Percent(bound.Rest),
            bound.Name);
    }

    private static string Sum(double factor, double solve) => $"{Digits.Three(factor)} + {Digits.Three(solve)}";

    private static string Sum(ChangeTimes change) => $"{Digits.Three(change.ReplaceMs)} + {Digits.Three(change.FactorMs)} + {Digits.Three(change.SolveMs)}";

    private static string Over(double? one, double? other) => one is { } a && other is { } b ? Digits.Three(a / b) : "–";
}
