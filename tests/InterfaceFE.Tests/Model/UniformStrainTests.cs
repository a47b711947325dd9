using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using InterfaceFE.Mechanics.Materials;
using InterfaceFE.Model;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using Xunit;

namespace InterfaceFE.Tests.Model;

/// <summary>The strain out of plane as an unknown of a group of adherends. Materials are invented.</summary>
public class UniformStrainTests
{
    private const string Glass = "{young: {x: 24 GPa, y: 9 GPa, z: 17 GPa}, poisson: {xz: 0.12, xy: 0.30, zy: 0.28}, shear modulus: {xy: 3.6 GPa}, expansion: {x: 14e-6 1/K, y: 30e-6 1/K, z: 11e-6 1/K} }";
    private const string Metal = "{young: 70 GPa, poisson: 0.33, expansion: 23e-6 1/K}";
    private const string Yielding = "{young: 70 GPa, poisson: 0.33, expansion: 23e-6 1/K, yield curve: {plastic strain: [0, 0.02], stress: [100 MPa, 180 MPa], kinematic hardening: 1 GPa, temperature: [-60 °C, 200 °C], share of stress: [1.1, 0.8]} }";

    [Theory]
    [InlineData(Glass, "four-node")]
    [InlineData(Glass, "eight-node")]
    [InlineData(Yielding, "eight-node")]
    public void Forces_belong_to_the_energy_and_tangents_to_the_forces(string material, string elements)
    {
        SpecimenModel model = DeckOf.Model(DeckOf.Yaml(Bar(material, elements, "  - heat to: 60 °C")));
        SolidBlock block = model.Solids[0];
        int n = block.NativeCount;
        Assert.Equal(2 * block.NodesPerElement + 1, n);
        var random = new Random(4);
        double[] state = new double[block.StateSize], tentative = new double[block.StateSize], u = [.. Enumerable.Range(0, n).Select(_ => 0.02 * (random.NextDouble() - 0.5))];
        double[] force = new double[n], tangent = new double[n * n], rate = new double[n], up = new double[n], down = new double[n];
        bool yields = block.StateSize > 0;
        ElementAnswer Ask(double temperature, double[] into, double[] tangentInto, double[] rateInto) => block.Evaluate(0, new PathPoint(0, temperature, 0, 1), u, state, tentative,
            Wanted.Force | Wanted.Tangent | Wanted.LoadRate | Wanted.Energy, new ElementBuffers { Force = into, Tangent = tangentInto, LoadRate = rateInto, Dissipation = new double[n] });
        ElementAnswer answer = Ask(330, force, tangent, rate);
        Assert.Equal(yields, answer.Dissipated > 0);
        double[] unused = new double[n * n], unusedRate = new double[n];
        double size = tangent.Max(Math.Abs), step = 1e-6;
        for (int j = 0; j < n; j++)
        {
            double kept = u[j];
            u[j] = kept + step;
            double above = Ask(330, up, unused, unusedRate).Stored;
            u[j] = kept - step;
            double below = Ask(330, down, unused, unusedRate).Stored;
            u[j] = kept;
            if (!yields)
                Close.To(force[j], (above - below) / (2 * step), 0, 1e-7 * force.Max(Math.Abs), $"force {j}");
            for (int i = 0; i < n; i++)
            {
                Close.To(tangent[i * n + j], (up[i] - down[i]) / (2 * step), 0, (yields ? 1e-5 : 1e-9) * size, $"tangent {i}, {j}");
                Close.To(tangent[i * n + j], tangent[j * n + i], 0, 1e-13 * size, "symmetry");
            }
        }
        double warm = Ask(330.01, up, unused, unusedRate).Stored, cold = Ask(329.99, down, unused, unusedRate).Stored;
        for (int i = 0; i < n; i++)
            Close.To(rate[i], (up[i] - down[i]) / 0.02, 0, 1e-6 * rate.Max(Math.Abs), $"temperature {i}");
        if (!yields)
            Close.To(answer.StoredByTemperature, (warm - cold) / 0.02, 1e-7);
    }

    [Theory]
    [InlineData(Metal, "four-node", 23e-6)]
    [InlineData(Metal, "eight-node", 23e-6)]
    [InlineData(Glass, "eight-node", 11e-6)]
    [InlineData(Yielding, "eight-node", 23e-6)]
    public void A_free_body_expands_out_of_plane_without_stress(string material, string elements, double expansion)
    {
        RunResult run = DeckOf.Run(DeckOf.Yaml(Bar(material, elements, "  - heat to: 120 °C")));
        Assert.Equal(RunStatus.Finished, run.Summary.Status);
        Assert.Equal("strain out of plane", run.History.Gauges[^1].Name);
        Close.To(100 * expansion, run.History.Points[^1].Gauges[^1], 1e-9);
        Assert.True(run.History.Snapshots[^1].EquivalentStress.Max() < 1e-5);
    }

    [Fact]
    public void A_pulled_bar_contracts_out_of_plane_as_a_free_one_and_its_tension_yields_at_the_uniaxial_stress()
    {
        // The right end is held along x alone and the bar cooled, so that it is in plain tension: stress E·alpha·dT, then the table; contraction nu·stress/E + kappa/2, and cooling.
        RunResult run = DeckOf.Run(DeckOf.Yaml(Bar("{young: 70 GPa, poisson: 0.33, expansion: 23e-6 1/K, yield curve: {plastic strain: [0, 0.02], stress: [100 MPa, 180 MPa]} }", "eight-node", "  - cool to: -60 °C", "  - fix: {right: [x]}\n")));
        Assert.Equal(RunStatus.Finished, run.Summary.Status);
        foreach (PointRow row in run.History.Points)
        {
            double change = row.Temperature - 293.15, stress = -row.Grips[0].ForceX / 8, kappa = Math.Max((-70000 * 23e-6 * change - 100) / (70000 + 4000), 0);
            Close.To(70000 * (-23e-6 * change - kappa), stress, 1e-8, 1e-8);
            Close.To(23e-6 * change - 0.33 * stress / 70000 - 0.5 * kappa, row.Gauges[^1], 1e-8, 1e-14);
        }
        Assert.True(run.Summary.SelfCheck.Balance < 1e-9 && run.Summary.SelfCheck.PathError < 1e-3);
        Assert.True(run.History.Energies[^1].SpentInYielding > 0);
    }

    [Fact]
    public void A_given_strain_is_reached_over_the_first_stage_and_kept()
    {
        string yaml = Bar(Metal, "eight-node", "  - wait: 1 h\n  - heat to: 60 °C").Replace("uniform strain,", "uniform strain, strain out of plane: 0.0005,", StringComparison.Ordinal);
        RunResult run = DeckOf.Run(DeckOf.Yaml(yaml));
        PointRow after = run.History.Points.Last(p => p.Stage == 2), end = run.History.Points[^1];
        Close.To(0.0005, after.Gauges[^1], 1e-12);
        Close.To(0.0005, end.Gauges[^1], 1e-12);
        FieldSnapshot first = run.History.Snapshots.Last(s => s.Stage == 2), last = run.History.Snapshots[^1];
        Close.To(70000 * 0.0005, first.StressZz[0], 1e-9);
        Close.To(70000 * (0.0005 - 40 * 23e-6), last.StressZz[0], 1e-9);
        Close.To(0, last.StressXx[0], 0, 1e-7);
    }

    [Fact]
    public void Joints_tie_adherends_to_one_strain_and_others_keep_their_own()
    {
        string yaml = DeckOf.Blocks("  - fix: {base: [x, y, rotation], post: [x, y, rotation]}\n  - heat to: 60 °C", moreGrips: "  post: {on: bottom of apart}")
            .Replace("out of plane: free", "out of plane: uniform strain", StringComparison.Ordinal)
            .Replace("joints:", "  apart: {of: other, rectangle: {corner: [20 mm, 0 mm], size: [6 mm, 2 mm]}, elements: {along: 3, through: 2}}\njoints:", StringComparison.Ordinal);
        SpecimenModel model = DeckOf.Model(DeckOf.Yaml(yaml));
        Assert.Equal(2, model.Unknowns.OutOfPlane!.Count);
        Assert.Equal(model.Solids[0].OutOfPlaneUnknown, model.Solids[1].OutOfPlaneUnknown);
        Assert.NotEqual(model.Solids[0].OutOfPlaneUnknown, model.Solids[2].OutOfPlaneUnknown);
        RunResult run = DeckOf.Run(DeckOf.Yaml(yaml));
        Assert.Equal(["strain out of plane with lower", "strain out of plane with apart"], run.History.Gauges.Select(g => g.Name).ToArray());
        Assert.True(run.Summary.SelfCheck.Balance < 1e-9);
    }

    [Fact]
    public void A_layer_of_the_same_expansion_opens_freely_by_its_own_thickness()
    {
        string layer = DeckOf.IndependentGlue.Replace("thickness: 0.2 mm,", "thickness: 0.2 mm, bulk: {young: 0.1 GPa, poisson: 0.4, expansion: 20e-6 1/K},", StringComparison.Ordinal);
        string yaml = DeckOf.Blocks("  - fix: {base: [x, y, rotation]}\n  - heat to: 60 °C", layer).Replace("out of plane: free", "out of plane: uniform strain", StringComparison.Ordinal)
            .Replace("of: other", "of: stuff", StringComparison.Ordinal).Replace("expansion: 50e-6", "expansion: 20e-6", StringComparison.Ordinal);
        SpecimenModel model = DeckOf.Model(DeckOf.Yaml(yaml));
        Close.To(0.2 * 20e-6 * 40, model.Layers[0].FreeOpening(333.15), 1e-12);
    }

    private static string Bar(string material, string elements, string stages, string fix = "") => $$"""
        title: Bar that strains out of plane
        model: {width: 2 mm, out of plane: uniform strain, rotation: small, elements: {{elements}} }
        materials:
          stuff: {{material}}
        adherends:
          bar: {of: stuff, rectangle: {corner: [0 mm, 0 mm], size: [20 mm, 4 mm]}, elements: {along: 5, through: 2} }
        grips:
          left: {on: left end of bar, hold: each point}
          right: {on: right end of bar, hold: each point}
          foot: {on: left end of bar, at: start}
        sequence:
          - fix: {left: [x], foot: [y]}
        {{fix + stages}}
        keep: {fields: every 1 points}
        """;
}
