using InterfaceFE.Decks;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// End-notched flexure of AS4/PEEK at rising shear strength on the default mesh: the process zone shortens and the peak goes to that of linear-elastic fracture mechanics. The peel strength
/// stays at the paper's 80 MPa; it plays no part in pure sliding.
/// </summary>
public sealed class FlexureExtrapolationCase : ICase
{
    /// <summary>Where the exact peak is from.</summary>
    public const string Exact = "computed from the cited formula: G = 9P²(a + Yh)²/(16E'b²h³), Y of Bao, Ho, Suo and Fan, Int. J. Solids Struct. 29 (1992) 1105-1116";

    private static readonly double[] Strengths = [100, 200, 400, 800];

    /// <inheritdoc/>
    public string Name => "flexure-extrapolation";

    /// <inheritdoc/>
    public string Group => "Flexure";

    /// <inheritdoc/>
    public bool Quick => false;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        FlexureSpecimen specimen = FlexureSpecimen.As4Peek;
        var curves = new List<CaseCurve>();
        // A crack of 30 mm is shorter than 0.69 of the half-span: its path snaps back after the peak and is left there.
        foreach ((double crack, double exact, double travel, int mostPoints) in ((double, double, double, int)[])[(39.3, 754.6, 3.78, 60), (30, specimen.CriticalLoad(30), 4, 60)])
        {
            double[] peaks = new double[Strengths.Length];
            for (int i = 0; i < Strengths.Length; i++)
            {
                peaks[i] = FlexureRun.Of(context, specimen, crack, Strengths[i], Mixing.BenzeggaghKenane, travel, mostPoints).Peak;
                yield return CaseLine.Reported($"crack {crack} mm, {Strengths[i]} MPa: peak force, beside linear-elastic fracture mechanics", peaks[i], "N", Exact, exact);
            }
            yield return new CaseLine($"crack {crack} mm: peak force, carried on in 1/strength from 400 and 800 MPa", exact, 2 * peaks[3] - peaks[2], 0.01, "N", Exact + "; " + FlexureCase.Data);
            curves.Add(new CaseCurve($"crack {crack} mm", [.. Strengths.Select(s => 100 / s)], [.. peaks.Select(p => p / exact)], true));
        }
        context.Draw(new CaseFigure("flexure-extrapolation", "Peak force over that of linear-elastic fracture mechanics", "end-notched flexure, AS4/PEEK", "100 MPa over strength", "peak over exact peak", curves));
    }
}
