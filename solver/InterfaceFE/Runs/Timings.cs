using InterfaceFE.Marching;
using InterfaceFE.Results;

namespace InterfaceFE.Runs;

/// <summary>Puts the time by phase into a summary.</summary>
internal static class Timings
{
    private static readonly (Phase Phase, string Words)[] Names =
    [
        (Phase.Reading, "reading"), (Phase.Meshing, "meshing"), (Phase.Plan, "plan"), (Phase.Elements, "elements"), (Phase.Factorisation, "factorisation"), (Phase.Solves, "solves"),
        (Phase.March, "march"), (Phase.Recording, "recording"), (Phase.Writing, "writing"), (Phase.Figures, "figures"),
    ];

    /// <summary>Fills the timings: each phase, and their sum, which is all the time since the clock was made.</summary>
    public static void Fill(RunSummary summary, PhaseClock clock)
    {
        double total = 0;
        foreach ((Phase phase, string words) in Names)
            total += summary.WallSeconds[words] = clock.Seconds(phase);
        summary.WallSeconds["total"] = total;
    }
}
