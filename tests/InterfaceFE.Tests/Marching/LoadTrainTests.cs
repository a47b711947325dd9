using InterfaceFE.Marching;
using InterfaceFE.Model;
using InterfaceFE.Results;
using InterfaceFE.Tests.Model;
using Xunit;

namespace InterfaceFE.Tests.Marching;

/// <summary>A short bar across a layer behind a load train: springs in series by hand, travel of the crosshead u = w + 2·H·σ/E + σ·A/k.</summary>
public class LoadTrainTests
{
    private const double Height = 5, Area = BarDeck.Length * BarDeck.Width;

    [Theory]
    [InlineData(4000, true)]
    [InlineData(1000, false)]
    public void Growth_is_stable_where_the_slope_of_softening_allows_the_compliance_in_series(double stiffness, bool stable)
    {
        double softening = BarDeck.Strength / (2 * BarDeck.Toughness / BarDeck.Strength - BarDeck.Strength / BarDeck.Stiffness);
        Assert.Equal(stable, softening * (2 * Height / BarDeck.Young + Area / stiffness) < 1);
        Recording run = Recording.Of(BarDeck.Make(0.2, Height, loadTrain: stiffness));
        Assert.True(run.Outcome.Status == MarchStatus.Severed, run.Outcome + string.Join("\n", run.Lines));
        UnknownMap map = run.Equilibrium.Model.Unknowns;
        int head = map.OfBody(1) + 1, crosshead = map.OfCrosshead(map.LoadTrains[0]), softeningPoints = 0;
        for (int i = 0; i < run.Points.Count; i++)
        {
            double force = run.Forces[i][crosshead], opening = run.Displacements[i][head] - 2 * Height * force / Area / BarDeck.Young;
            Close.To(run.Displacements[i][head] + force / stiffness, run.Displacements[i][crosshead], 1e-9, 1e-11, $"crosshead at point {i}");
            Close.To(0.5 * force * force / stiffness, run.Points[i].Energy.State.StoredInLoadTrains, 1e-8, 1e-9, $"energy at point {i}");
            // Points at the ends of the softening branch are left out: a kink has two slopes.
            if (opening < 0.006 || opening > 0.079)
                continue;
            softeningPoints++;
            Assert.Equal(stable, run.Points[i].Stable);
        }
        Assert.True(softeningPoints > 5, $"{softeningPoints} points on the softening branch");
        Assert.True(run.Points.Max(p => p.Energy.Balance) < 1e-9);
        Assert.True(run.Points.Max(p => p.Energy.PathError) < 1e-3);
    }

    [Fact]
    public void A_load_train_changes_neither_a_run_by_force_nor_the_grips_own_curve()
    {
        const string Sequence = "  - fix: {base: [x, y, rotation]}\n  - pull: {grip: head, along: +y, force: 2 N}\n    over: 2 min\n  - fix: {head: [y]}\n  - heat to: 30 °C\n  - let go: [head]";
        string text = DeckOf.Blocks(Sequence);
        RunResultOf(text, out PointRow[] bare);
        RunResultOf(text.Replace("head: {on: top of upper}", "head: {on: top of upper, load train: {stiffness: 0.5 kN/mm}}", StringComparison.Ordinal), out PointRow[] behind);
        PointRow last = behind.Last(p => p.Stage == 2), same = bare.Last(p => p.Stage == 2);
        Close.To(same.Grips[1].Displacement, last.Grips[1].Displacement, 1e-9);
        Close.To(2, last.Grips[1].Force, 1e-9);
        Close.To(last.Grips[1].Displacement + 2.0 / 500, last.Grips[1].Crosshead!.Value, 1e-9);
        Close.To(120, last.Time, 1e-12);
        Assert.Null(same.Grips[1].Crosshead);
        // The crosshead is what is fixed: heating moves the grip, against the spring.
        PointRow heated = behind.Last(p => p.Stage == 4);
        Close.To(last.Grips[1].Crosshead!.Value, heated.Grips[1].Crosshead!.Value, 1e-12);
        Close.To(heated.Grips[1].Displacement + heated.Grips[1].Force / 500, heated.Grips[1].Crosshead!.Value, 1e-9);
        Assert.True(heated.Grips[1].Force < 1.9, $"{heated.Grips[1].Force}");
        Close.To(0, behind[^1].Grips[1].Force, 0, 1e-9);
    }

    private static void RunResultOf(string text, out PointRow[] points) => points = [.. DeckOf.Run(DeckOf.Yaml(text)).History.Points];
}
