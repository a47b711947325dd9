using System.Globalization;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// A Maxwell layer between two blocks, pulled at constant speed and then held. Blocks that cannot contract sideways carry the layer's traction evenly, so that block and layer are springs in
/// series and the force is known in closed form; a second run holds at another temperature under a shift.
/// </summary>
public sealed class RelaxingLayerCase : ICase
{
    private const double Height = 50, Young = 1000, Side = 4, Width = 2.5, Stiffness = 100, Travel = 0.02, Ramp = 60, Hold = 300, Time = 100;

    /// <inheritdoc/>
    public string Name => "relaxing-layer";

    /// <inheritdoc/>
    public string Group => "Layer laws";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        const string Source = "computed: Maxwell element in series with a spring, ramp and hold (textbook, from memory)";
        List<CaseCurve> curves = [];
        foreach (double share in (double[])[1, 0.6])
        {
            string name = string.Create(CultureInfo.InvariantCulture, $"{100 * share:0} % fades");
            RunResult run = context.Run("relaxing layer, " + name, Deck(share, "", 20));
            (double[] times, double[] forces) = Record(run.History);
            int peak = Array.FindIndex(times, t => Math.Abs(t - Ramp) < 1e-6 * Ramp);
            if (peak < 0)
            {
                yield return CaseLine.Broken(name + ": no point at the end of the ramp", $"{run.Summary.Status}: {run.Summary.Cause}");
                continue;
            }
            yield return new CaseLine(name + ": force at the end of the ramp", Force(share, Ramp, Time), forces[peak], 2e-3, "N", Source);
            yield return new CaseLine(name + ": force at the end of the hold", Force(share, Ramp + Hold, Time), forces[^1], 5e-3, "N", Source);
            curves.Add(new CaseCurve(name, times, forces, Points: true));
            double[] exact = [.. Enumerable.Range(0, 200).Select(i => (Ramp + Hold) * i / 199)];
            curves.Add(new CaseCurve(name + ", closed form", exact, [.. exact.Select(t => Force(share, t, Time))]));
            foreach (CaseLine line in SelfCheck.Lines(name, run))
                yield return line;
        }
        const double Warmer = 10;
        RunResult warm = context.Run("relaxing layer, 10 K warmer", Deck(0.6, ", shift: wlf, reference: 20 °C, c1: 17.4, c2: 51.6 K", 20 + Warmer));
        double shifted = Time * Math.Pow(10, -17.4 * Warmer / (51.6 + Warmer));
        yield return new CaseLine("10 K above the reference of a WLF shift: force at the end of the ramp", Force(0.6, Ramp, shifted), Record(warm.History).Forces[Array.FindIndex(Record(warm.History).Times, t => Math.Abs(t - Ramp) < 1e-6 * Ramp)], 2e-3, "N",
            Source + "; Williams, Landel and Ferry 1955");
        context.Draw(new CaseFigure("relaxing-layer", "Force of a Maxwell layer in ramp and hold", "two blocks and a layer in series; points: program, lines: closed form", "time (s)", "force (N)", curves));
    }

    /// <summary>
    /// Force at a time. Layer traction s = k·((1 - p)·w + p·q), dq/dt = dw/dt - q/τ, in series with the blocks: w + c·s = u(t), c = 2·H/E. So with K = k/(1 + c·k) the sum is again an
    /// elastic share and one Maxwell element: s(t) = K0·u + K1·q', time τ' = τ·(1 + c·k)/(1 + c·k·(1 - p)), K0 = k(1 - p)/(1 + c·k(1 - p)), K1 = K - K0.
    /// </summary>
    private static double Force(double share, double time, double tau)
    {
        double c = 2 * Height / Young, fast = Stiffness / (1 + c * Stiffness), slow = Stiffness * (1 - share) / (1 + c * Stiffness * (1 - share));
        double own = tau * (1 + c * Stiffness) / (1 + c * Stiffness * (1 - share)), rate = Travel / Ramp, ramp = Math.Min(time, Ramp);
        double q = rate * own * (1 - Math.Exp(-ramp / own)) * Math.Exp(-(time - ramp) / own);
        return Side * Width * (slow * rate * ramp + (fast - slow) * q);
    }

    private static (double[] Times, double[] Forces) Record(RunHistory history)
    {
        int head = history.Grips.ToList().FindIndex(g => g.Name == "head");
        return ([.. history.Points.Select(p => p.Time)], [.. history.Points.Select(p => p.Grips[head].ForceY)]);
    }

    private static string Deck(double share, string shift, double celsius) => string.Create(CultureInfo.InvariantCulture, $$"""
        title: Two blocks and a layer that relaxes
        stress-free temperature: {{celsius}} °C
        model: {width: {{Width}} mm, out of plane: free, rotation: small}
        materials:
          stuff: {young: {{Young}} MPa, poisson: 0}
        layers:
          glue:
            thickness: 0.2 mm
            peel: {law: bilinear, stiffness: {{Stiffness}} MPa/mm, strength: 5 MPa, toughness: 1 kJ/m^2}
            shear: {law: bilinear, stiffness: {{Stiffness}} MPa/mm, strength: 5 MPa, toughness: 1 kJ/m^2}
            mixing: independent modes
            relaxation: {share: [{{share}}], time: [{{Time}} s]{{shift}} }
        adherends:
          lower: {of: stuff, rectangle: {corner: [0 mm, 0 mm], size: [{{Side}} mm, {{Height}} mm]}, elements: {along: 2, through: 4} }
          upper: {of: stuff, rectangle: {corner: [0 mm, {{Height}} mm], size: [{{Side}} mm, {{Height}} mm]}, elements: {along: 2, through: 4} }
        joints:
          bond: {layer: glue, upper: bottom of upper, lower: top of lower, element length: 2 mm}
        grips:
          base: {on: bottom of lower}
          head: {on: top of upper}
        sequence:
          - fix: {base: [x, y, rotation], head: [x, rotation]}
          - pull: {grip: head, along: +y, travel: {{Travel}} mm, speed: {{Travel / Ramp}} mm/s}
          - wait: {{Hold}} s
        march: {largest stride: 0.02}
        keep: {fields: none}
        """);
}
