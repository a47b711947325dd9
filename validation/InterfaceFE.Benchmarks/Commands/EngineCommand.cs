using InterfaceFE.Benchmarks.Engine;
using InterfaceFE.Benchmarks.Models;
using InterfaceFE.Benchmarks.Reporting;
using InterfaceFE.Benchmarks.Rivals;

namespace InterfaceFE.Benchmarks.Commands;

/// <summary>The command `engine`: the engine against other solvers and against itself; prints the figures and writes the table.</summary>
/// <param name="output">Where the figures go.</param>
/// <param name="progress">Where progress goes.</param>
public sealed class EngineCommand(TextWriter output, TextWriter progress)
{
    /// <summary>Measures, prints and writes.</summary>
    /// <param name="validationFolder">Folder of the table.</param>
    /// <param name="isQuick">Whether to take the smaller strips and few repeats; the table then has another name.</param>
    public int Run(string validationFolder, bool isQuick)
    {
        using TemporaryFolder folder = new();
        string? skipped = null;
        CholmodProgram? program = null;
        try
        {
            program = CholmodProgram.Compile(folder);
        }
        catch (RivalException missing)
        {
            skipped = missing.Message;
            output.WriteLine($"skipped CHOLMOD: {skipped}");
        }
        progress.WriteLine("compiling the engine's loops");
        WarmUp.Run();
        MachineRates rates = MachineMeter.Measure();
        ModelBenchmark benchmark = new(program, folder, isQuick, output);
        List<ModelOutcome> outcomes = [];
        List<IterativeTry> tries = [];
        foreach (CatalogueEntry entry in MeshCatalogue.All.Where(entry => entry.IsQuick || !isQuick))
        {
            progress.WriteLine($"measuring {entry.Name}: {entry.Description}");
            outcomes.Add(benchmark.Measure(entry));
            foreach (Ratio ratio in outcomes[^1].Ratios())
                output.WriteLine(ratio);
        }
        progress.WriteLine($"trying the iterative solvers on {outcomes[0].Times.Model}");
        foreach (IterativeTry one in IterateCommand.TryAll(outcomes[0].Times.Model, outcomes[0].Times.TotalMs, isQuick))
        {
            tries.Add(one);
            output.WriteLine(one.Ratio is { } ratio ? ratio.ToString() : $"MathNet {one.Solver}: {one.Words}");
        }
        EngineReport report = new(outcomes, tries, rates, benchmark.NarrowRates, benchmark.CholmodVersions, skipped, isQuick);
        foreach (string file in report.Write(validationFolder))
            progress.WriteLine("written: " + Path.Combine("validation", file));
        return 0;
    }
}
