using InterfaceFE.Benchmarks.Engine;
using InterfaceFE.Benchmarks.Models;
using InterfaceFE.Benchmarks.Reporting;
using InterfaceFE.Benchmarks.Rivals;

namespace InterfaceFE.Benchmarks.Commands;

/// <summary>Measures one model: engine and CHOLMOD in alternating rounds, so that what else the machine does hits both; then the engine with narrower kernels.</summary>
/// <param name="cholmod">The program around CHOLMOD; null: left out.</param>
/// <param name="folder">Folder for files in between.</param>
/// <param name="isQuick">Whether to repeat little.</param>
public sealed class ModelBenchmark(CholmodProgram? cholmod, TemporaryFolder folder, bool isQuick)
{
    /// <summary>Versions of CHOLMOD and its libraries; null before it ran.</summary>
    public string? CholmodVersions { get; private set; }

    /// <summary>Rates of a process with 256-bit kernels; null where there was none.</summary>
    public MachineRates? NarrowRates { get; private set; }

    /// <summary>Measures a model.</summary>
    /// <exception cref="RivalException">CHOLMOD broke off.</exception>
    public ModelOutcome Measure(CatalogueEntry entry)
    {
        ArgumentNullException.ThrowIfNull(entry);
        BenchmarkModel model = new(entry.Build());
        (EngineTimes times, CholmodOutcome? outcome) = MeasureSideBySide(model);
        TimesAnswer? narrow = EngineUnderTest.KernelWidth > 256 ? TimesCommand.RunNarrow(entry.Name, isQuick) : null;
        NarrowRates ??= narrow?.Rates;
        return new ModelOutcome(entry.Description, times, narrow?.Times, outcome);
    }

    private (EngineTimes Times, CholmodOutcome? Cholmod) MeasureSideBySide(BenchmarkModel model)
    {
        EngineRun run = new(model, isQuick);
        AssembledMatrix matrix = AssembledMatrix.From(model);
        double[] b = matrix.Restrict(model.RightSide());
        using CholmodSession? session = cholmod is null ? null : new CholmodSession(cholmod, folder, matrix, b);
        CholmodVersions ??= session?.Versions;
        session?.Analyze();
        for (int round = 0; round < TimesCommand.Rounds(isQuick); round++)
        {
            run.Round();
            session?.Round();
        }
        EngineTimes times = run.Times();
        if (session is null)
            return (times, null);
        (double ownNonZeros, double ownFlops) = session.CountOrder(EngineUnderTest.OrderOf(run.Engine.Plan, matrix));
        double[] own = matrix.Restrict(run.Solution()), other = session.Solution();
        double difference = own.Zip(other, (x, y) => Math.Abs(x - y)).Max() / other.Max(Math.Abs);
        return (times, new CholmodOutcome(session.Configurations, session.Best, ownFlops, ownNonZeros, difference, matrix.BackwardError(b, other), matrix.BackwardError(b, own)));
    }
}
