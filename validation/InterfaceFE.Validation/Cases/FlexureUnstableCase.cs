using InterfaceFE.Decks;
using InterfaceFE.Results;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// End-notched flexure of IM7/8552 with a crack of half the half-span on the default mesh: it grows unstably under given travel, and the path snaps back. The whole branch is followed at 200 MPa,
/// the peak is carried on from 200 and 400 MPa.
/// </summary>
public sealed class FlexureUnstableCase : ICase
{
    private const double Crack = 25.4;
    private const int PastPeak = 45;
    private const string Data = "data of Krueger, NASA/CR-2011-217305 (2011) (from memory)";

    /// <inheritdoc/>
    public string Name => "flexure-unstable";

    /// <inheritdoc/>
    public string Group => "Flexure";

    /// <inheritdoc/>
    public bool Quick => false;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        FlexureSpecimen specimen = FlexureSpecimen.Im7;
        FlexureRun run = FlexureRun.Of(context, specimen, Crack, 200, Mixing.BenzeggaghKenane, 1.8);
        FlexureRun stronger = FlexureRun.Of(context, specimen, Crack, 400, Mixing.BenzeggaghKenane, 1.8, PastPeak);
        FlexureRun finer = FlexureRun.Of(context, specimen, Crack, 200, Mixing.BenzeggaghKenane, 1.8, PastPeak, 0.075);
        FlexureRun finerStronger = FlexureRun.Of(context, specimen, Crack, 400, Mixing.BenzeggaghKenane, 1.8, PastPeak, 0.039);
        foreach ((string what, double peak) in ((string, double)[])
            [("200 MPa, default mesh", run.Peak), ("400 MPa, default mesh", stronger.Peak), ("200 MPa, elements half as long", finer.Peak), ("400 MPa, elements half as long", finerStronger.Peak)])
        {
            yield return CaseLine.Reported($"{what}: peak force, beside linear-elastic fracture mechanics", peak, "N", FlexureExtrapolationCase.Exact, 1497.5);
        }
        // Carrying on in 1/strength doubles what the mesh errs at 400 MPa, where the default one has two elements in the zone: so elements of half its length.
        yield return new CaseLine("peak force, carried on in 1/strength from 200 and 400 MPa, elements half as long as by default", 1497.5, 2 * finerStronger.Peak - finer.Peak, 0.01, "N", FlexureExtrapolationCase.Exact + "; " + Data);
        yield return CaseLine.Reported("the same on the default mesh", 2 * stronger.Peak - run.Peak, "N", FlexureExtrapolationCase.Exact, 1497.5);

        MeshCurve curve = run.Curve;
        int top = Array.IndexOf(curve.Force, curve.Force.Max());
        double back = curve.Displacement[top..].Min();
        yield return CaseLine.AtMost("least travel after the peak, over the travel at the peak", 1, back / curve.Displacement[top], "", "computed from the cited formula: the beam's branch snaps back for a < 0.693 L");
        double turn = specimen.HalfSpan / Math.Cbrt(3), dent = Dent(run, specimen);
        yield return CaseLine.Reported("least travel after the peak, beside the beam's at a = 0.693 L", back, "mm", "simple beams and P of linear-elastic fracture mechanics, with the dents measured before damage", specimen.BeamDeflection(specimen.CriticalLoad(turn), turn) + dent * specimen.CriticalLoad(turn));
        foreach (double crack in (double[])[30, 35, 40, 45])
        {
            if (Nearest(run, crack) is { } at)
                yield return CaseLine.Reported($"force on the branch, crack tip at {crack} mm", curve.Force[at.Point], "N", FlexureExtrapolationCase.Exact + ", at the tip's a; half of the process zone ahead of it counts like crack", specimen.CriticalLoad(at.CrackTip!.Value - FlexureSpecimen.Overhang));
        }
        yield return new CaseLine("mode mix on the branch, farthest from pure sliding", 90, run.LeastMixDegrees, 0.005, "deg", FlexureRun.PureSliding);
        double[] cracks = [.. Enumerable.Range(0, 52).Select(i => Crack + 0.5 * i).Where(a => a <= specimen.HalfSpan)];
        context.Draw(new CaseFigure("flexure-unstable", "End-notched flexure that snaps back", "IM7/8552, shear strength 200 MPa", "travel of the pin [mm]", "force [N]",
        [
            new CaseCurve("run", curve.Displacement, curve.Force),
            new CaseCurve("growth, linear-elastic beams with the run's dents", [.. cracks.Select(a => specimen.BeamDeflection(specimen.CriticalLoad(a), a) + dent * specimen.CriticalLoad(a))], [.. cracks.Select(specimen.CriticalLoad)]),
        ]));
    }

    /// <summary>Travel per force that simple beams leave out (shear, root, dents under the pins), from the first point of the run [mm/N].</summary>
    private static double Dent(FlexureRun run, FlexureSpecimen specimen) => run.Curve.Displacement[1] / run.Curve.Force[1] - specimen.BeamDeflection(1, Crack);

    private static FrontRow? Nearest(FlexureRun run, double crack)
    {
        FrontRow? nearest = run.Growth.MinBy(f => Math.Abs(f.CrackTip!.Value - FlexureSpecimen.Overhang - crack));
        return nearest is not null && Math.Abs(nearest.CrackTip!.Value - FlexureSpecimen.Overhang - crack) < 1 ? nearest : null;
    }
}
