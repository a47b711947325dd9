using InterfaceFE.Decks;
using InterfaceFE.Marching;
using Xunit;

namespace InterfaceFE.Tests.Marching;

/// <summary>Bar with a softening layer; exact path u = w + 2·H·σ/E derived by hand (springs in series).</summary>
public class SnapBackBarTests
{
    [Theory]
    [InlineData(ControlSetting.Automatic)]
    [InlineData(ControlSetting.ArcLength)]
    public void Every_point_lies_on_the_exact_path_through_the_snap_back(ControlSetting control)
    {
        Recording run = Recording.Of(BarDeck.Make(0.6, control: control));
        Assert.True(run.Outcome.Status == MarchStatus.Severed, run.Outcome + string.Join("\n", run.Lines));
        int head = run.Equilibrium.Model.Unknowns.OfBody(1) + 1;
        double peakTravel = 0, lowest = double.PositiveInfinity;
        for (int i = 0; i < run.Points.Count; i++)
        {
            double travel = run.Displacements[i][head], traction = run.Forces[i][head] / (BarDeck.Length * BarDeck.Width);
            double opening = travel - 2 * BarDeck.Height * traction / BarDeck.Young;
            Close.To(Law(opening), traction, 1e-8, 1e-8 * BarDeck.Strength, $"point {i}, opening {opening}");
            peakTravel = Math.Max(peakTravel, travel);
            if (peakTravel > travel + 1e-6)
                lowest = Math.Min(lowest, travel);
        }
        Assert.True(lowest < 0.5 * peakTravel, $"the travel must come back: highest {peakTravel}, lowest after {lowest}");
        Close.To(BarDeck.Toughness * BarDeck.Length * BarDeck.Width, run.Points[^1].Energy.State.SpentInLayers, 1e-9, 0, "dissipation");
        Assert.True(run.Points.Max(p => p.Energy.Balance) < 1e-9);
        Assert.True(run.Points.Max(p => p.Energy.PathError) < 1e-3);
    }

    private static double Law(double opening)
    {
        double limit = BarDeck.Strength / BarDeck.Stiffness, final = 2 * BarDeck.Toughness / BarDeck.Strength;
        return opening <= limit ? BarDeck.Stiffness * opening : opening >= final ? 0 : BarDeck.Strength * (final - opening) / (final - limit);
    }
}
