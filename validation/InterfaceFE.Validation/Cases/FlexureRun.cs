using InterfaceFE.Decks;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>A run of a flexure specimen and what the cases read from it.</summary>
/// <param name="Result">The run.</param>
public sealed record FlexureRun(RunResult Result)
{
    /// <summary>Why the mode mix is 90 degrees, and nearly so here.</summary>
    public const string PureSliding = "symmetry of two equal arms whose faces lie on each other without friction; the pins press on one face, which leaves a share of mode I below 1e-4 (0.5 deg)";

    /// <summary>Runs a specimen.</summary>
    public static FlexureRun Of(CaseContext context, FlexureSpecimen specimen, double crack, double strength, Mixing mixing, double travel, int mostPoints = 2000, double? elementLength = null)
    {
        ArgumentNullException.ThrowIfNull(context);
        ArgumentNullException.ThrowIfNull(specimen);
        string law = mixing == Mixing.BenzeggaghKenane ? "Benzeggagh-Kenane" : "independent modes";
        string elements = elementLength is null ? "" : $", elements of {elementLength} mm";
        return new FlexureRun(context.Run($"{specimen.Name}, crack {crack} mm, {strength} MPa, {law}{elements}", specimen.Deck(crack, strength, mixing, travel, mostPoints, elementLength)));
    }

    /// <summary>Peak force [N]; NaN where the run ended at its highest force, so that there is no peak.</summary>
    public double Peak
    {
        get
        {
            MeshCurve curve = Curve;
            return curve.Force.Length > 0 && curve.Force[^1] < curve.Force.Max() ? Result.Summary.Grips.First(g => g.Name == "pin").PeakForce!.Value : double.NaN;
        }
    }

    /// <summary>Force of the pin against its travel.</summary>
    public MeshCurve Curve => MeshCurve.Of(Result, "pin");

    /// <summary>Smallest mode mix of that front at any point [deg].</summary>
    public double LeastMixDegrees => Fronts.Min(f => f.ModeMixDegrees ?? 90);

    /// <summary>Rows of the front that starts at the starter crack.</summary>
    public IEnumerable<FrontRow> Fronts => Result.History.Fronts.Where(f => f.Front == 1);

    /// <summary>Rows of that front while the crack grows.</summary>
    public IEnumerable<FrontRow> Growth
    {
        get
        {
            double starter = Fronts.First().CrackTip!.Value;
            return Fronts.Where(f => f.CrackTip > starter);
        }
    }
}
