using InterfaceFE.Geometry;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>Beams of 200 mm × 4 mm under their own weight: a cantilever, and one with a prop at its end.</summary>
public sealed class WeightCase : ICase
{
    /// <inheritdoc/>
    public string Name => "weight";

    /// <inheritdoc/>
    public string Group => "Loads";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        const string source = "beam theory, computed: ", density = "2700 kg/m³, 9.80665 m/s² (ISO 80000-3)";
        double line = 2700e-12 * 9806.65 * 12, bending = 70000 * 3 * 64 / 12.0, shear = 5.0 / 6 * 35000 * 12;
        RunResult cantilever = context.Run("cantilever under its weight", Deck("clamp: {on: left end of bar}", "clamp: [x, y, rotation]"));
        MeshedEdge tip = cantilever.History.Mesh.Adherends[0].Edges["right end"];
        yield return new CaseLine("cantilever under its weight: sag of the tip", line * Math.Pow(200, 4) / (8 * bending) + line * 200 * 200 / (2 * shear),
            -cantilever.History.Snapshots[^1].DisplacementY[tip.Nodes[tip.Nodes.Length / 2]], 0.005, "mm", source + "qL⁴/8EI + qL²/2κGA; " + density);
        yield return new CaseLine("cantilever under its weight: moment of the clamp", line * 200 * 200 / 2, cantilever.History.Points[^1].Grips[0].Moment ?? double.NaN, 1e-6, "N·mm", source + "qL²/2; " + density);
        yield return CaseLine.AtMost("cantilever under its weight: balance of energy", 1e-9, cantilever.Summary.SelfCheck.Balance, "", "the project's own gate");
        RunResult propped = context.Run("propped beam under its weight", Deck("clamp: {on: left end of bar}\n  prop: {on: bottom of bar, at: end}", "clamp: [x, y, rotation], prop: [y]"));
        yield return new CaseLine("propped beam under its weight: force of the prop", 3 * line * 200 / 8, propped.History.Points[^1].Grips[1].ForceY, 0.005, "N", source + "3qL/8; " + density);
    }

    private static string Deck(string grips, string held) => $$"""
        title: Beam under its own weight
        model: {width: 3 mm, out of plane: free, rotation: small, gravity: -y}
        materials:
          stuff: {young: 70 GPa, poisson: 0, density: 2700 kg/m^3}
        adherends:
          bar: {of: stuff, rectangle: {corner: [0 mm, 0 mm], size: [200 mm, 4 mm]}, elements: {length: 2 mm} }
        grips:
          {{grips}}
        sequence:
          - fix: { {{held}} }
          - wait: 1 h
        keep: {fields: every 1 points}
        """;
}
