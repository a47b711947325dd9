using System.Globalization;
using System.Runtime.InteropServices;
using System.Text;
using InterfaceFE.Benchmarks.Engine;
using InterfaceFE.Benchmarks.Rivals;
using InterfaceFE.Benchmarks.Timing;

namespace InterfaceFE.Benchmarks.Reporting;

/// <summary>The table of a run of `engine`: Markdown for people, and all figures as name and value in a CSV file.</summary>
/// <param name="models">Outcomes, model by model.</param>
/// <param name="tries">Tries of the iterative solvers.</param>
/// <param name="rates">Best rates of the machine.</param>
/// <param name="narrowRates">Those of a process with 256-bit kernels; null where there was none.</param>
/// <param name="cholmodVersions">Versions of CHOLMOD and its libraries.</param>
/// <param name="skipped">Why CHOLMOD was left out; null where it was not.</param>
/// <param name="isQuick">Whether it was a short run.</param>
public sealed class EngineReport(
    IReadOnlyList<ModelOutcome> models,
    IReadOnlyList<IterativeTry> tries,
    MachineRates rates,
    MachineRates? narrowRates,
    string? cholmodVersions,
    string? skipped,
    bool isQuick)
{
    private readonly EngineTables _tables = new(models, rates, narrowRates);

    /// <summary>Writes both files and gives their names.</summary>
    public IReadOnlyList<string> Write(string folder)
    {
        string name = isQuick ? "ENGINE-QUICK" : "ENGINE";
        File.WriteAllText(Path.Combine(folder, name + ".md"), Text());
        File.WriteAllText(Path.Combine(folder, name + ".csv"), Csv());
        return [name + ".md", name + ".csv"];
    }

    private IEnumerable<Ratio> AllRatios() => models.SelectMany(model => model.Ratios()).Concat(tries.Select(one => one.Ratio).OfType<Ratio>());

    private string Csv()
    {
        StringBuilder text = new("name,value\n");
        foreach (Ratio ratio in AllRatios())
            text.Append(CultureInfo.InvariantCulture, $"{ratio.Name},{ratio.Value:G6}\n");
        return text.ToString();
    }

    private string Text()
    {
        StringBuilder text = new();
        text.Append("# Sparse engine: speed\n\n");
        text.Append("Written by `dotnet run -c Release --project validation/InterfaceFE.Benchmarks -- engine").Append(isQuick ? " --quick" : "").Append("`.\n");
        text.Append("Compare ratios, not times: the machine was shared.\n\n");
        AppendMachine(text);
        text.Append('\n').Append("""
            Every time is a median, on one thread but for the table that says otherwise. Runs of the engine and of CHOLMOD alternate, so that what else the machine does hits both.
            "CHOLMOD" is the fastest of its four configurations on that model in that run: supernodal or simplicial, ordered by AMD or METIS; OpenBLAS and OpenMP limited to one
            thread; factorisation, with the analysis done before, and solve. Both sides solve the same matrix: aluminium arms on an adhesive layer, the starter crack open, a process
            zone softening ahead of it, the rest virgin; grips held.
            """.ReplaceLineEndings("\n")).Append('\n');
        Append(text, "Whole factorisation and solve", """
            Difference: largest difference of the two solutions over the largest value. Errors: backward errors of CHOLMOD and of the engine. Negative: eigenvalues below zero.
            Memory: managed bytes taken by a factorisation with solve.
            """, _tables.Whole());
        Append(text, "CHOLMOD's configurations", "A dash: the configuration refused the matrix.", _tables.Configurations());
        Append(text, "Changed layer elements", """
            Neighbouring layer elements take new softening tangents. Places are spread over the bonded stretches; times are medians over places and repeats, "slowest place" the
            median at the slowest one. The engine's time includes taking the new matrices; the other side's does not. Bits: values along the path equal those of a whole
            factorisation and solve to the last bit. Memory: managed bytes taken by an iteration.
            """, _tables.Layers());
        Append(text, "Yielding patches", """
            All solid and layer elements of full-height columns change, at two places. Contribution blocks beside what was not expected to change are made anew on the way.
            """, _tables.Patches());
        Append(text, "Two threads", "Wall clock of a whole factorisation. Two threads gain only while the second core is free.", _tables.Threads());
        Append(text, "Order", """
            Arithmetic under each order, counted by one rule (CHOLMOD's symbolic analysis) without explicit zeros, and what the engine does with the zeros of merged fronts.
            """, _tables.Orders());
        AppendTries(text);
        Append(text, "Arithmetic, bytes and what bounds the time", """
            Bytes: those that must be moved at least once. Shares: time that the arithmetic would take at the innermost loop's best rate, and that the bytes would take at the best
            rate of the memory (of the cache, where they are 8 MB or less), over the measured time. The rest is assembly, index lists and loops too short to reach either.
            """, _tables.Bounds());
        AppendTargets(text);
        return text.ToString();
    }

    private static void Append(StringBuilder text, string heading, string words, MarkdownTable table)
    {
        if (table.IsEmpty)
            return;
        text.Append("\n## ").Append(heading).Append("\n\n");
        if (words.Length > 0)
            text.Append(words.ReplaceLineEndings("\n").Trim()).Append("\n\n");
        text.Append(table);
    }

    private void AppendMachine(StringBuilder text)
    {
        string narrow = narrowRates is null ? "" : $"; narrow: {narrowRates.KernelWidth} bits, the same program with wider vectors switched off in the runtime";
        string narrowPeak = narrowRates is null ? "" : $" (narrow: {Digits.Three(narrowRates.PeakFlopsPerMs / 1e6)})";
        Item("Date", DateTime.Today.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture));
        Item("Processor", $"{Machine.ProcessorModel()}, {Environment.ProcessorCount} seen");
        Item("Kernel width", $"{rates.KernelWidth} bits{narrow}");
        Item("Best rate of the innermost loop", $"{Digits.Three(rates.PeakFlopsPerMs / 1e6)}{narrowPeak} Gflop/s");
        Item("Best rates of reading", $"from cache {Digits.Three(rates.CacheBytesPerMs / 1e6)} GB/s, from memory {Digits.Three(rates.MemoryBytesPerMs / 1e6)} GB/s");
        Item("Clock", ThreadClock.Description);
        Item("InterfaceFE", typeof(Sparse.SparsePlan).Assembly.GetName().Version?.ToString(3) ?? "");
        Item("Runtime", RuntimeInformation.FrameworkDescription);
        Item("MathNet.Numerics", IterativeSolvers.Version);
        Item("CHOLMOD", cholmodVersions ?? $"skipped: {skipped}");

        void Item(string name, string value) => text.Append("- ").Append(name).Append(": ").Append(value).Append('\n');
    }

    private void AppendTries(StringBuilder text)
    {
        MarkdownTable table = new("solver and preconditioner", "outcome", "time / engine's whole time");
        foreach (IterativeTry one in tries)
            table.Add(one.Solver, one.Words, one.Ratio is { } ratio ? Digits.Three(ratio.Value) : "–");
        string words = FormattableString.Invariant($"On {models[0].Times.Model}, to a relative residual of {IterativeSolvers.Tolerance:0E+0}.");
        Append(text, "MathNet's sparse solvers", words + " They are iterative; a sparse direct solver is not part of the package.", table);
    }

    private void AppendTargets(StringBuilder text)
    {
        Dictionary<string, double> values = AllRatios().ToDictionary(ratio => ratio.Name, ratio => ratio.Value);
        MarkdownTable table = new("figure", "target", "measured", "");
        foreach (Target target in Target.All.Where(target => values.ContainsKey(target.Name)))
        {
            double value = values[target.Name];
            string limit = (target.IsCeiling ? "at most " : "at least ") + target.Limit.ToString(CultureInfo.InvariantCulture);
            table.Add(target.Name, limit, Digits.Three(value), target.Holds(value) ? "held" : "missed: " + _tables.Reason(target.Name));
        }
        Append(text, "Targets", "", table);
    }
}
