using InterfaceFE.Decks;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Tests.Marching;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>Bar across a softening layer whose path is known in closed form (springs in series): travel u = w + 2·H·σ(w)/E. Followed through its snap-back.</summary>
public sealed class SnapBackBarCase : ICase
{
    private const string Source = "derived: springs in series, u = w + 2Hσ(w)/E";

    /// <inheritdoc/>
    public string Name => "snap-back-bar";

    /// <inheritdoc/>
    public string Group => "March";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        foreach (ControlSetting control in (ControlSetting[])[ControlSetting.Automatic, ControlSetting.ArcLength])
        {
            foreach (ElementKind elements in (ElementKind[])[ElementKind.EightNode, ElementKind.FourNode])
            {
                string what = $"{(control == ControlSetting.Automatic ? "automatic control" : "arc length")}, {(elements == ElementKind.EightNode ? "eight" : "four")}-node: ";
                RunResult run = context.Run(what.Trim(' ', ':'), BarDeck.Make(0.6, control: control, elements: elements));
                int head = run.History.Grips.ToList().FindIndex(g => g.Name == "head");
                double worst = 0, highest = 0, lowestAfter = double.PositiveInfinity;
                foreach (PointRow point in run.History.Points)
                {
                    double travel = point.Grips[head].Displacement, traction = point.Grips[head].Force / (BarDeck.Length * BarDeck.Width);
                    worst = Math.Max(worst, Math.Abs(traction - Law(travel - 2 * BarDeck.Height * traction / BarDeck.Young)) / BarDeck.Strength);
                    if (travel > highest)
                        (highest, lowestAfter) = (travel, travel);
                    lowestAfter = Math.Min(lowestAfter, travel);
                }
                yield return CaseLine.AtMost(what + "largest distance of a point from the path, share of the strength", 1e-8, worst, "", Source);
                yield return CaseLine.Reported(what + "travel at the peak", highest, "mm", Source, BarDeck.Strength / BarDeck.Stiffness + 2 * BarDeck.Height * BarDeck.Strength / BarDeck.Young);
                yield return CaseLine.Reported(what + "least travel after it", lowestAfter, "mm", Source, 2 * BarDeck.Toughness / BarDeck.Strength);
                yield return new CaseLine(what + "energy spent in the layer", BarDeck.Toughness * BarDeck.Length * BarDeck.Width, run.History.Energies[^1].SpentInLayers, 1e-8, "mJ", "toughness times bonded area");
            }
        }
    }

    private static double Law(double opening)
    {
        double limit = BarDeck.Strength / BarDeck.Stiffness, final = 2 * BarDeck.Toughness / BarDeck.Strength;
        return opening <= limit ? BarDeck.Stiffness * opening : opening >= final ? 0 : BarDeck.Strength * (final - opening) / (final - limit);
    }
}
