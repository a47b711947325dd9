using InterfaceFE.Benchmarks.Engine;
using InterfaceFE.Benchmarks.Models;
using InterfaceFE.Benchmarks.Reporting;
using InterfaceFE.Benchmarks.Rivals;

namespace InterfaceFE.Benchmarks.Commands;

/// <summary>Measures one model: engine and CHOLMOD in alternating rounds, so that what else the machine does hits both; then the engine with narrower kernels.</summary>
/// <param name="cholmod">The program around CHOLMOD; null: left out.</param>
/// <param name="folder">Folder for files in between.</param>
/// <param name="isQuick">Whether to repeat little.</param>
/// <param name="output">Where it is said that CHOLMOD broke off.</param>
public sealed class ModelBenchmark(CholmodProgram? cholmod, TemporaryFolder folder, bool isQuick, TextWriter output)
{
    /// <summary>Versions of CHOLMOD and its libraries; null before it ran.</summary>
    public string? CholmodVersions { get; private set; }

    /// <summary>Rates of a process with 256-bit kernels; null where there was none.</summary>
    public MachineRates? NarrowRates { get; private set; }

    /// <summary>Measures a model; without CHOLMOD, and saying so, where it breaks off.</summary>
    /// <exception cref="InvalidOperationException">The engine met a pivot that is zero or not finite.</exception>
    public ModelOutcome Measure(CatalogueEntry entry)
    {
        ArgumentNullException.ThrowIfNull(entry);
        BenchmarkModel model = new(entry.Build());
        (EngineTimes times, CholmodOutcome? outcome) = MeasureWithin(model);
        TimesAnswer? narrow = EngineUnderTest.KernelWidth > 256 ? TimesCommand.RunNarrow(entry.Name, isQuick) : null;
        NarrowRates ??= narrow?.Rates;
        return new ModelOutcome(entry.Description, times, narrow?.Times, outcome);
    }

    private (EngineTimes Times, CholmodOutcome? Cholmod) MeasureWithin(BenchmarkModel model)
    {
        try
        {
            return MeasureSideBySide(model, cholmod);
        }
        catch (RivalException brokenOff)
        {
            output.WriteLine($"skipped CHOLMOD on {model.Mesh.Name}: {brokenOff.Message}");
            return MeasureSideBySide(model, null);
        }
    }

    private (EngineTimes Times, CholmodOutcome? Cholmod) MeasureSideBySide(BenchmarkModel model, CholmodProgram? program)
    {
        EngineRun run = new(model, isQuick);
        AssembledMatrix matrix = AssembledMatrix.From(model);
        double[] b = matrix.Restrict(model.RightSide());
        using CholmodSession? session = program is null ? null : new CholmodSession(program, folder, matrix, b);
        CholmodVersions ??= session?.Versions;
        session?.Analyze();
        for (int round = 0; round < TimesCommand.Rounds(isQuick); round++)
        {
            run.Round();
            session?.Round();
        }
        return (run.Times(), session is null ? null : Compare(run, session, matrix, b));
    }

    private static CholmodOutcome Compare(EngineRun run, CholmodSession session, AssembledMatrix matrix, double[] b)
    {
        (_, double ownFlops) = session.CountOrder(EngineUnderTest.OrderOf(run.Engine.Plan, matrix));
        double[] own = matrix.Restrict(run.Solution()), other = session.Solution();
        double difference = own.Zip(other, (x, y) => Math.Abs(x - y)).Max() / other.Max(Math.Abs);
        return new CholmodOutcome(session.Configurations, session.Best, ownFlops, difference, matrix.BackwardError(b, other), matrix.BackwardError(b, own));
    }
}
