using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>Lines that every run is held to.</summary>
internal static class SelfCheck
{
    /// <summary>Balance, path error and end of a run.</summary>
    public static IEnumerable<CaseLine> Lines(string name, RunResult run) => [Balance(name, run), PathError(name, run), Ended(name, run)];

    /// <summary>Worst balance of virtual work of a run.</summary>
    public static CaseLine Balance(string name, RunResult run) =>
        CaseLine.AtMost(name + ": energy balance, worst point", 1e-9, Worst(run, e => e.Balance), "", "virtual work of both sides with the same quadrature; the project's own limit");

    /// <summary>Worst path error of a run.</summary>
    public static CaseLine PathError(string name, RunResult run) =>
        CaseLine.AtMost(name + ": energy path error, worst point", 1e-3, Worst(run, e => e.PathError), "", "work put in against the laws' own energies; the project's own limit");

    /// <summary>A line that holds when the run finished or the specimen came apart.</summary>
    public static CaseLine Ended(string name, RunResult run) =>
        CaseLine.AtMost($"{name}: {Words(run.Summary)}", 0, run.Summary.Status is RunStatus.Finished or RunStatus.Severed ? 0 : 1, "", "0 for finished or severed");

    /// <summary>How a run ended, in words.</summary>
    public static string Words(RunSummary summary) => summary.Status switch
    {
        RunStatus.Finished => "finished",
        RunStatus.Severed => "severed",
        _ => "stopped early, " + summary.Cause,
    };

    private static double Worst(RunResult run, Func<EnergyRow, double> value) =>
        run.History.Energies.Count > 0 ? run.History.Energies.Max(e => Math.Abs(value(e))) : double.NaN;
}
