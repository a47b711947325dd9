using InterfaceFE.Decks;
using InterfaceFE.Results;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>End-notched flexure of AS4/PEEK at the strength of the paper on the default mesh, by both mixing laws.</summary>
public sealed class FlexureCase : ICase
{
    /// <summary>Where the specimen's data are from.</summary>
    public const string Data = "data of Camanho and Dávila, NASA/TM-2002-211737 (2002), dimensions, transverse moduli and penalty from memory";

    private const double Crack = 39.3, Strength = 100;

    /// <inheritdoc/>
    public string Name => "flexure";

    /// <inheritdoc/>
    public string Group => "Flexure";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        FlexureSpecimen specimen = FlexureSpecimen.As4Peek;
        var curves = new List<CaseCurve>();
        double other = double.NaN;
        foreach (Mixing mixing in (Mixing[])[Mixing.BenzeggaghKenane, Mixing.IndependentModes])
        {
            string law = mixing == Mixing.BenzeggaghKenane ? "Benzeggagh-Kenane: " : "independent modes: ";
            FlexureRun run = FlexureRun.Of(context, specimen, Crack, Strength, mixing, 4);
            yield return CaseLine.Reported(law + "peak force at 100 MPa, beside the published computation", run.Peak, "N", "697.1 N, test 748.0 N (both from memory); " + Data, 697.1);
            yield return CaseLine.Reported(law + "the same, beside linear-elastic fracture mechanics", run.Peak, "N", FlexureExtrapolationCase.Exact, specimen.CriticalLoad(Crack));
            yield return new CaseLine(law + "mode mix at the front, farthest from pure sliding", 90, run.LeastMixDegrees, 0.005, "deg", FlexureRun.PureSliding);
            FrontRow[] growth = [.. run.Growth];
            const string Sum = "toughness put in: the whole J equals it while the crack grows";
            // J path has a value only until the process zone comes near the section ahead, which the load pin keeps close here.
            double[] path = [.. growth.Where(f => f.JPath is not null).Select(f => f.JPath!.Value)];
            yield return path.Length > 0
                ? new CaseLine(law + "J path while the crack grows, farthest value", specimen.ShearToughness, path.MaxBy(j => Math.Abs(j - specimen.ShearToughness)), 0.01, "N/mm", Sum)
                : CaseLine.Skipped(law + "J path while the crack grows", "the process zone is near the section ahead from the first growth on");
            yield return new CaseLine(law + "J rotation while the crack grows, farthest value", specimen.ShearToughness, growth.Select(f => f.JRotation ?? double.NaN).MaxBy(j => Math.Abs(j - specimen.ShearToughness)), 0.01, "N/mm", Sum + "; J = (P/2b)|θL - 2θm + θR|");
            if (!double.IsNaN(other))
                yield return new CaseLine("peak force by the two laws", other, run.Peak, 0.005, "N", "in pure sliding both follow the same curve of shear");
            other = run.Peak;
            MeshCurve curve = run.Curve;
            curves.Add(new CaseCurve(law.TrimEnd(' ', ':'), curve.Displacement, curve.Force, true));
        }
        double[] cracks = [.. Enumerable.Range(0, 24).Select(i => Crack + 0.5 * i).Where(a => a <= specimen.HalfSpan)];
        curves.Add(new CaseCurve("growth, linear-elastic", [.. cracks.Select(a => specimen.BeamDeflection(specimen.CriticalLoad(a), a))], [.. cracks.Select(specimen.CriticalLoad)]));
        context.Draw(new CaseFigure("flexure", "End-notched flexure at a shear strength of 100 MPa", "AS4/PEEK; the beam's deflection leaves out shear and the dents under the pins", "travel of the pin [mm]", "force [N]", curves));
    }
}
