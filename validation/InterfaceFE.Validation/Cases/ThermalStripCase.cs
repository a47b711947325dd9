using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>Strips of two and three layers with free ends, heated: curvature and end sliding against closed forms in the matching out-of-plane state.</summary>
public sealed class ThermalStripCase : ICase
{
    private const double Tolerance = 0.02;

    /// <inheritdoc/>
    public string Name => "thermal-strip";

    /// <inheritdoc/>
    public string Group => "Thermal";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        foreach (string state in (string[])["free", "held", "uniform strain"])
        {
            foreach (CaseLine line in Stiff(context, state).Concat(Soft(context, state)).Concat(Three(context, state)))
                yield return line;
        }
    }

    private static IEnumerable<CaseLine> Stiff(CaseContext context, string state)
    {
        var strip = new ThermalStrip(state, 30, 1e5, 1e5);
        RunResult run = context.Run($"two layers, stiff layer, {state}", strip.TwoLayers());
        // The numbers are the worked example's; the record's own formula must give them too.
        double expected = state switch { "free" => 7.6154e-4, "held" => 1.04109e-3, _ => strip.Timoshenko };
        string form = Form(state);
        yield return new CaseLine($"two layers, stiff layer, {state}: curvature at mid-length", expected, Math.Abs(strip.Curvature(run, "steel strip")), Tolerance, "1/mm",
            $"computed from the cited formula: Timoshenko, J. Opt. Soc. Am. 11 (1925) 233-255{form}");
    }

    /// <summary>
    /// Finite shear stiffness k, derived: the strips share their curvature κ, so that with the normal force N = ∫τ and the slip s of their facing faces
    /// (D₁ + D₂)·κ = N(t₁ + t₂)/2, s' = mismatch - λ·N, N' = k·s (x from the middle, signs aside), that is s'' = ω²·s with ω² = k·λ and s' = mismatch at the free ends:
    /// s = (mismatch/ω)·sinh ωx/cosh ωL. At the end s = (mismatch/ω)·tanh ωL; in the middle κ = Timoshenko's times 1 - 1/cosh ωL; from end to end the strip turns by
    /// 2L·κ_T·(1 - tanh ωL/(ωL)).
    /// </summary>
    private static IEnumerable<CaseLine> Soft(CaseContext context, string state)
    {
        const string Source = "derived: shear lag with shared curvature, ω² = k[1/E₁t₁ + 1/E₂t₂ + (t₁+t₂)²/(4(D₁+D₂))]";
        foreach (double half in (double[])[100, 200])
        {
            var strip = new ThermalStrip(state, half, 0.9, 2.5);
            RunResult run = context.Run($"two layers, tape, {half} mm each side, {state}", strip.TwoLayers());
            double omega = Math.Sqrt(strip.ShearStiffness * strip.BendingCompliance), reach = omega * half;
            string what = $"two layers, tape, {half} mm each side, {state}: ";
            yield return new CaseLine(what + "curvature at mid-length", strip.Timoshenko * (1 - 1 / Math.Cosh(reach)), Math.Abs(strip.Curvature(run, "steel strip")), Tolerance, "1/mm", $"{Source}, κ = κ_T(1 - 1/cosh ωL), ωL = {reach:0.00}{Form(state)}");
            if (state == "uniform strain")
                yield return new CaseLine(what + "strain out of plane", strip.StrainOutOfPlane(strip.BendingCompliance), run.History.Points[^1].Gauges[^1], 0.005, "", "derived: no force out of plane, normal forces by shear lag");
            yield return new CaseLine(what + "sliding at the end", strip.Mismatch(strip.BendingCompliance) / omega * Math.Tanh(reach), Math.Abs(ThermalStrip.EndSliding(run, 0)), Tolerance, "mm", $"{Source}, mismatch·tanh ωL/ω{Form(state)}");
        }
    }

    private static string Form(string state) => state switch
    {
        "free" => "",
        "held" => "; E/(1-ν²) and (1+ν)α for held",
        _ => "; E/(1-ν²) and (1+ν)α - ν·e, with the e that leaves no force out of plane (derived)",
    };

    private static IEnumerable<CaseLine> Three(CaseContext context, string state)
    {
        string form = Form(state);
        foreach (double stiffness in (double[])[5000, 500])
        {
            var strip = new ThermalStrip(state, 25, stiffness, 1e6);
            double beta = Math.Sqrt(stiffness * strip.StretchCompliance);
            // The number is the worked example's where there is one.
            double traction = state == "free" && stiffness == 5000 ? 17.822 : strip.Mismatch(strip.StretchCompliance) * stiffness / beta * Math.Tanh(beta * strip.HalfLength);
            string source = $"computed from the cited formula: Chen and Nelson, IBM J. Res. Dev. 23 (1979) 179-188, τ = mismatch·K·tanh(βl)/β = {traction:0.000} MPa over K = {stiffness} MPa/mm{form}";
            string what = $"three layers, K = {stiffness} MPa/mm, {state}: ";
            RunResult ideal = context.Run(what + "strips that only stretch", strip.ThreeLayers(onlyStretch: true)), real = context.Run(what + "metals", strip.ThreeLayers(onlyStretch: false));
            double sliding = Math.Abs(ThermalStrip.EndSliding(ideal, 0)), metal = Math.Abs(ThermalStrip.EndSliding(real, 0));
            yield return new CaseLine(what + "sliding at the end, strips that only stretch, as the formula has it", traction / stiffness, sliding, Tolerance, "mm", source);
            yield return new CaseLine(what + "both joints alike", sliding, Math.Abs(ThermalStrip.EndSliding(ideal, 1)), 1e-6, "mm", "symmetry");
            // Shear of the metals and bending of the outer ones next to the end take K·t/(3G) and more of the sliding: 2 % are met with the softer layer only.
            yield return stiffness == 500
                ? new CaseLine(what + "sliding at the end, steel and aluminium as they are", traction / stiffness, metal, Tolerance, "mm", source)
                : CaseLine.Reported(what + "sliding at the end, steel and aluminium as they are", metal, "mm", source, traction / stiffness);
        }
    }
}
