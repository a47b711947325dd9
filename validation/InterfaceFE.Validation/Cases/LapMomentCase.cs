using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// Single lap with a thin stiff layer: the moment at the edge of the overlap falls as the joint turns under load. By statics it is the force times the distance of the sheet's mid-line
/// there from the line through the two pins, read from the deformed shape.
/// </summary>
public sealed class LapMomentCase : ICase
{
    private const double Free = 800, Half = 25, Thickness = 2, Young = 70000, Poisson = 0.3, Width = 25, LargestS = 0.31;

    /// <inheritdoc/>
    public string Name => "lap-moment";

    /// <inheritdoc/>
    public string Group => "Large rotation";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        const string Source = "Goland and Reissner, J. Appl. Mech. 11 (1944) A17-A27: k = 1/(1 + 2√2·tanh(√(3(1-ν²)/2)·S)), S = (c/t)·√(σ/E); of beams; an overlap of 12 thicknesses each side of its middle keeps what its ends shear small";
        double force = Young * Math.Pow(LargestS * Thickness / Half, 2) * Thickness * Width;
        RunResult run = context.Run("single lap, rising load", FormattableString.Invariant($$$"""
            title: Single lap
            model: {width: {{{Width}}} mm, out of plane: held, rotation: finite}
            materials: {metal: {young: {{{Young}}} MPa, poisson: {{{Poisson}}}}}
            layers:
              glue:
                thickness: 0.05 mm
                peel: {law: bilinear, stiffness: 50000 MPa/mm, strength: 2000 MPa, toughness: 100 kJ/m^2}
                shear: {law: bilinear, stiffness: 20000 MPa/mm, strength: 2000 MPa, toughness: 200 kJ/m^2}
                mixing: independent modes
            adherends:
              lower: {of: metal, rectangle: {corner: [0 mm, 0 mm], size: [{{{Free + 2 * Half}}} mm, {{{Thickness}}} mm]}, elements: {through: 2, length: 10 mm}}
              upper: {of: metal, rectangle: {corner: [{{{Free}}} mm, {{{Thickness}}} mm], size: [{{{Free + 2 * Half}}} mm, {{{Thickness}}} mm]}, elements: {through: 2, length: 10 mm}}
            joints: {overlap: {layer: glue, upper: bottom of upper, lower: top of lower, element length: 0.5 mm}}
            grips: {left: {on: left end of lower}, right: {on: right end of upper}}
            sequence:
              - fix: {left: [x, y], right: [y]}
              - pull: {grip: right, along: +x, force: {{{force}}} N}
            keep: {fields: every 1 points}
            march: {first stride: 0.002, largest stride: 0.05}
            """));
        List<(double S, double Factor)> curve = Curve(run);
        foreach (double s in (double[])[0.05, 0.1, 0.165, 0.2, 0.25, 0.295])
        {
            double expected = 1 / (1 + 2 * Math.Sqrt(2) * Math.Tanh(Math.Sqrt(1.5 * (1 - Poisson * Poisson)) * s));
            int next = curve.FindIndex(p => p.S >= s);
            ((double before, double factorBefore), (double after, double factorAfter)) = (curve[next - 1], curve[next]);
            yield return new CaseLine($"moment factor at S = {s}", expected, factorBefore + (factorAfter - factorBefore) * (s - before) / (after - before), 0.05, "", Source);
        }
    }

    /// <summary>S and moment factor at each kept point.</summary>
    private static List<(double S, double Factor)> Curve(RunResult run)
    {
        var mesh = run.Equilibrium.Model.Mesh;
        int edge = Near(Free, Thickness / 2), left = Near(0, Thickness / 2), right = Near(2 * Free + 2 * Half, 1.5 * Thickness);
        var curve = new List<(double, double)>();
        foreach (FieldSnapshot at in run.History.Snapshots.Where(s => s.Point > 0).OrderBy(s => s.Point))
        {
            double stress = run.History.Points.First(p => p.Point == at.Point).Grips[1].Force / (Thickness * Width);
            (double x0, double y0) = Place(left, at);
            (double x1, double y1) = Place(right, at);
            (double x, double y) = Place(edge, at);
            double length = double.Hypot(x1 - x0, y1 - y0), distance = ((x - x0) * (y1 - y0) - (y - y0) * (x1 - x0)) / length;
            curve.Add((Half / Thickness * Math.Sqrt(stress / Young), distance / (Thickness / 2)));
        }
        return curve;

        int Near(double x, double y) => Enumerable.Range(0, mesh.NodeCount).MinBy(i => double.Hypot(mesh.X[i] - x, mesh.Y[i] - y));

        (double X, double Y) Place(int node, FieldSnapshot at) => (mesh.X[node] + at.DisplacementX[node], mesh.Y[node] + at.DisplacementY[node]);
    }
}
