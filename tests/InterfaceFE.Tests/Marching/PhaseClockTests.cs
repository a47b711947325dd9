using System.Diagnostics;
using InterfaceFE.Marching;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Tests.Model;
using Xunit;

namespace InterfaceFE.Tests.Marching;

public class PhaseClockTests
{
    [Fact]
    public void Phase_within_another_takes_over_and_the_phases_add_up_to_the_whole()
    {
        long start = Stopwatch.GetTimestamp();
        var clock = new PhaseClock();
        using (clock.In(Phase.Elements))
        {
            using (clock.In(Phase.Solves))
                Thread.Sleep(60);
            Thread.Sleep(20);
        }
        double sum = Enum.GetValues<Phase>().Sum(clock.Seconds), whole = Stopwatch.GetElapsedTime(start).TotalSeconds;
        Assert.True(clock.Seconds(Phase.Solves) >= 0.055 && clock.Seconds(Phase.Elements) >= 0.015, $"{clock.Seconds(Phase.Solves)} {clock.Seconds(Phase.Elements)}");
        Assert.Equal(0, clock.Seconds(Phase.Factorisation));
        Assert.InRange(sum, 0.075, whole);
    }

    [Fact]
    public void Clock_allocates_nothing_while_it_runs()
    {
        var clock = new PhaseClock();
        using (clock.In(Phase.Elements))
            _ = clock.Seconds(Phase.Elements);
        long before = GC.GetAllocatedBytesForCurrentThread();
        for (int i = 0; i < 1000; i++)
        {
            using PhaseClock.Stretch time = clock.In(Phase.Solves);
        }
        Assert.Equal(before, GC.GetAllocatedBytesForCurrentThread());
    }

    [Fact]
    public void Summary_has_every_phase_and_counts_that_belong_together()
    {
        RunSummary summary = DeckOf.Run(DeckOf.Yaml(DeckOf.Blocks("  - fix: {base: [x, y, rotation], head: [x, rotation]}\n  - pull: {grip: head, along: +y, travel: 0.03 mm}"))).Summary;
        Assert.Equal(["reading", "meshing", "plan", "elements", "factorisation", "solves", "march", "recording", "writing", "figures", "total"], summary.WallSeconds.Keys);
        Close.To(summary.WallSeconds["total"], summary.WallSeconds.Where(p => p.Key != "total").Sum(p => p.Value), 1e-9);
        foreach (string phase in (string[])["meshing", "plan", "elements", "factorisation", "solves", "recording"])
            Assert.True(summary.WallSeconds[phase] > 0, phase);
        Assert.True(summary.Counts["solves"] >= summary.Counts["iterations"], "each iteration solves once, a path control twice");
        Assert.True(summary.Counts["changed elements"] > 0 && summary.Counts["factorisations"] > 1);
    }
}
