using InterfaceFE.Decks;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Tests.Marching;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>Elastic strips peeled off a stiff base: steady force against the energy balance of peeling, for several angles, frames of the layer and ways of drawing it.</summary>
public sealed class ElasticPeelCase : ICase
{
    private const double Thickness = 0.5;

    /// <inheritdoc/>
    public string Name => "elastic-peel";

    /// <inheritdoc/>
    public string Group => "Large rotation";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        const string Source = "computed from the cited formulas: Rivlin, Paint Technology 9 (1944) 215-216; Kendall, J. Phys. D 8 (1975) 1449-1452: P·(1 - cos φ) + P²/(2·E·t) = toughness, per width (from memory)";
        foreach ((double young, double alongX, double travel, DrawnThickness drawn, FrameLine frame) in ((double, double, double, DrawnThickness, FrameLine)[])
        [
            (2000, 0, 35, DrawnThickness.Zero, FrameLine.MidLine),
            (2000, 0, 35, DrawnThickness.Zero, FrameLine.LowerFace),
            (2000, 0, 35, DrawnThickness.True, FrameLine.MidLine),
            (200, 0, 35, DrawnThickness.Zero, FrameLine.MidLine),
            (200, -10, 25, DrawnThickness.Zero, FrameLine.MidLine),
            (200, -30, 15, DrawnThickness.Zero, FrameLine.MidLine),
        ])
        {
            string what = $"E = {young} MPa, pull along the strip {Math.Abs(alongX)} N, {(drawn == DrawnThickness.True ? "true thickness" : "zero thickness")}, frame by {(frame == FrameLine.MidLine ? "mid-line" : "lower face")}: ";
            RunResult run = context.Run(what.Trim(' ', ':'), TurningDecks.Peel(young, Thickness, alongX, travel, drawn: drawn, frame: frame));
            int end = run.History.Grips.ToList().FindIndex(g => g.Name == "end");
            GripReading last = run.History.Points[^1].Grips[end];
            // P + Fx + P²/(2Et) = toughness, with Fx along the strip towards its free end negative: solved for the vertical force.
            double x = alongX / TurningDecks.PeelWidth, soft = young * Thickness, force = soft * (Math.Sqrt(1 + 2 * (TurningDecks.PeelToughness - x) / soft) - 1);
            double vertical = Math.Sqrt(force * force - x * x), got = last.ForceY / TurningDecks.PeelWidth;
            yield return new CaseLine(what + "vertical force per width", vertical, got, 1e-2, "N/mm", Source);
            yield return CaseLine.Reported(what + "angle of peel", Math.Atan2(got, -x) * 180 / Math.PI, "deg", "direction of the force");
            yield return CaseLine.AtMost(what + "energy balance", 1e-9, run.History.Energies.Max(e => e.Balance), "", "virtual work of external and internal forces");
            FrontRow front = run.History.Fronts.Last(f => f.Front == 1);
            yield return CaseLine.Reported(what + "mode mix at the front", front.ModeMixDegrees ?? double.NaN, "deg", "depends on the frame");
        }
    }
}
