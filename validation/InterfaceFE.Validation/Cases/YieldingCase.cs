using System.Globalization;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Tests.Mechanics.Elements;
using InterfaceFE.Tests.Model;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>Metal that yields: thick cylinder under pressure, bars bent beyond yield and let go, a strip between walls through cycles of temperature.</summary>
public sealed class YieldingCase : ICase
{
    private const string Hill = "computed from the cited formula: Hill, The Mathematical Theory of Plasticity (1950)";
    private const string Bending = "computed: perfectly plastic bar, M_p = Yh²/4, M = M_p[1 - (κ_e/κ)²/3], springback M/E'I";
    private const double Tolerance = 0.005;

    /// <inheritdoc/>
    public string Name => "yielding";

    /// <inheritdoc/>
    public string Group => "Yielding";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context) => Cylinder().Concat(Moments(context)).Concat(Cycles(context));

    private static IEnumerable<CaseLine> Cylinder()
    {
        foreach (double poisson in (double[])[0.4999, 0.3])
        {
            foreach (double radius in (double[])[120, 140, 160, 180])
            {
                PressedCylinder cylinder = new(8, 16, poisson, PressedCylinder.Pressure(radius));
                string what = string.Create(CultureInfo.InvariantCulture, $"thick cylinder, Poisson's ratio {poisson}, yielded to {radius} mm by the formula: movement of the outer face");
                double formula = PressedCylinder.Movement(radius, poisson);
                yield return poisson > 0.4 || radius < 150
                    ? new CaseLine(what, formula, cylinder.OuterMovement, Tolerance, "mm", Hill)
                    : CaseLine.Reported(what, cylinder.OuterMovement, "mm", Hill + "; exact for Poisson's ratio 1/2, it drifts for others once most of the wall yields", formula);
            }
            double limit = PressedCylinder.Pressure(PressedCylinder.Outer);
            PressedCylinder pressed = new(6, 12, poisson, 1.02 * limit);
            yield return new CaseLine(string.Create(CultureInfo.InvariantCulture, $"thick cylinder, Poisson's ratio {poisson}: limit pressure, where no equilibrium is found beyond"), limit, 1.02 * limit * pressed.Reached, 0.003, "MPa", Hill);
        }
        const double nu = 0.3, inner = PressedCylinder.Inner, outer = PressedCylinder.Outer;
        PressedCylinder elastic = new(8, 16, nu, 100);
        double lame = 2 * (1 - nu * nu) * 100 * inner * inner * outer / (PressedCylinder.Young * (outer * outer - inner * inner));
        yield return new CaseLine("thick cylinder before it yields: movement of the outer face", lame, elastic.OuterMovement, Tolerance, "mm", "computed from Lamé, u(b) = 2(1-ν²)pa²b/(E(b²-a²))");
    }

    private static IEnumerable<CaseLine> Moments(CaseContext context)
    {
        foreach (double share in (double[])[0.95, 0.98])
        {
            double moment = share * BentBar.PlasticMoment;
            string turn = string.Create(CultureInfo.InvariantCulture, $"moment: {moment:R} N*mm"), name = string.Create(CultureInfo.InvariantCulture, $"bar under {share} of its plastic moment, free");
            RunResult run = context.Run(name, BentBar.Deck("free", turn, "moment: 0 N*mm"));
            double springback = 12 * moment / (BentBar.Young * Math.Pow(BentBar.Height, 3));
            yield return new CaseLine(name + ": curvature", BentBar.Curvature(moment), CurvatureAfter(run, 2), Tolerance, "1/mm", Bending);
            yield return new CaseLine(name + ": curvature left when let go", BentBar.Curvature(moment) - springback, CurvatureAfter(run, 3), Tolerance, "1/mm", Bending);
            yield return CaseLine.AtMost(name + ": balance of energy", 1e-9, run.Summary.SelfCheck.Balance, "", "the project's own gate");
            yield return CaseLine.AtMost(name + ": path error of energy", 1e-3, run.Summary.SelfCheck.PathError, "", "the project's own gate");
        }
        foreach ((string state, double factor, double modulus) in ((string, double, double)[])[("free", 1, BentBar.Young), ("held", 2 / Math.Sqrt(3), BentBar.Young / (1 - BentBar.Poisson * BentBar.Poisson))])
        {
            string name = $"bar turned far beyond yield, {state}";
            RunResult run = context.Run(name, BentBar.Deck(state, "angle: 0.6 rad", "moment: 0 N*mm"));
            double moment = run.History.Points.Last(p => p.Stage == 2).Grips[1].Moment ?? double.NaN, springback = CurvatureAfter(run, 2) - CurvatureAfter(run, 3);
            yield return new CaseLine(name + ": moment", factor * BentBar.PlasticMoment, moment, Tolerance, "N·mm", Bending + (state == "held" ? "; 2/√3 of yield for held" : ""));
            yield return new CaseLine(name + ": springback of the curvature", 12 * moment / (modulus * Math.Pow(BentBar.Height, 3)), springback, Tolerance, "1/mm", Bending);
        }
    }

    /// <summary>Blocked length, so that temperature drives the stress through whole cycles: width of the loop of stress from the reversal of the plastic strain.</summary>
    private static IEnumerable<CaseLine> Cycles(CaseContext context)
    {
        const double young = 70000, expansion = 20e-6, yield = 60, slope = 2000, swing = 200;
        const string Source = "computed: straight loop of linear kinematic hardening, plastic swing = (E·α·ΔT - 2Y)/(E + H)";
        RunResult run = context.Run("strip between walls, cycles of temperature", """
            title: Strip between two walls, cooled and heated
            model: {width: 2 mm, out of plane: free, rotation: small}
            materials:
              metal: {young: 70 GPa, poisson: 0.33, expansion: 20e-6 1/K, yield curve: {plastic strain: [0], stress: [60 MPa], kinematic hardening: 2 GPa}}
            adherends:
              strip: {of: metal, rectangle: {corner: [0 mm, 0 mm], size: [20 mm, 4 mm]}, elements: {along: 5, through: 2}}
            grips:
              left: {on: left end of strip, hold: each point}
              right: {on: right end of strip, hold: each point}
              foot: {on: left end of strip, at: start}
            sequence:
              - fix: {left: [x], right: [x], foot: [y]}
              - cool to: -80 °C
              - heat to: 120 °C
              - cool to: -80 °C
            """);
        double plastic = (young * expansion * swing - 2 * yield) / (young + slope);
        double Stress(int stage) => -run.History.Points.Last(p => p.Stage == stage).Grips[0].ForceX / 8;
        double Spent(int stage) => run.History.Energies.Last(e => e.Stage == stage).SpentInYielding / 160;
        yield return new CaseLine("strip between walls, kinematic hardening: swing of stress from cold to hot", 2 * yield + slope * plastic, Stress(2) - Stress(3), Tolerance, "MPa", Source);
        yield return new CaseLine("strip between walls, kinematic hardening: stress cold, second time", Stress(2), Stress(4), 1e-9, "MPa", "the loop closes");
        yield return new CaseLine("strip between walls, kinematic hardening: energy spent per volume, cold to hot", yield * plastic, Spent(3) - Spent(2), Tolerance, "MPa", Source);
        yield return CaseLine.AtMost("strip between walls, kinematic hardening: path error of energy", 1e-3, run.Summary.SelfCheck.PathError, "", "the project's own gate");
    }

    private static double CurvatureAfter(RunResult run, int stage) => BentBar.Curvature(run.History.Mesh, run.History.Snapshots.Last(s => s.Stage == stage));
}
