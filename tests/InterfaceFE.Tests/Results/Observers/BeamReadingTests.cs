using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Model;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Tests.Model;
using Xunit;

namespace InterfaceFE.Tests.Results.Observers;

/// <summary>Gauges, grips, sections and stresses on a plain beam against closed forms.</summary>
public class BeamReadingTests
{
    private const double Length = 60, Height = 4, Width = 3, Young = 70e3, Inertia = Width * Height * Height * Height / 12;

    [Theory]
    [InlineData("eight-node")]
    [InlineData("four-node")]
    public void Gauges_read_pure_bending(string elements)
    {
        // Source: beam under a couple M at its end: strain ∓κ·h/2 above and below, slope κ·x, distance of the ends' corners by the rotation of the end; κ = M/(EI).
        double moment = 500, curvature = moment / (Young * Inertia);
        RunResult run = Beam("  - turn: {grips: {tip: 1}, moment: 500 N*mm}", elements);
        IReadOnlyList<double> gauges = run.History.Points[^1].Gauges;
        Close.To(-curvature * Height / 2, gauges[0], 1e-6, 0, "strain above");
        Close.To(curvature * Height / 2, gauges[1], 1e-6, 0, "strain below");
        Close.To(curvature * 40, gauges[2], 1e-6, 0, "slope of the top at 40 mm");
        Close.To(curvature * Length, gauges[3], 1e-6, 0, "slope of the upright end");
        // From (20, 0) to the middle of the end (60, 2), along the line between them.
        double stretch = (40 * -40 + 2 * 1600) * curvature / Math.Sqrt(1604);
        Close.To(stretch, gauges[4], 1e-5, 0, "clip gauge");
        Assert.Equal(["-", "-", "rad", "rad", "mm"], run.History.Gauges.Select(g => g.Unit));
    }

    [Fact]
    public void Signs_of_grips_follow_the_pull()
    {
        RunResult up = Beam("  - pull: {grip: tip, along: +y, travel: 0.1 mm}"), down = Beam("  - push: {grip: tip, along: -y, travel: 0.1 mm}");
        GripReading tipUp = up.History.Points[^1].Grips[1], tipDown = down.History.Points[^1].Grips[1];
        Close.To(0.1, tipUp.Displacement, 1e-12);
        Close.To(0.1, tipDown.Displacement, 1e-12);
        Assert.True(tipUp.Force > 0 && tipDown.Force > 0 && tipUp.ForceY > 0 && tipDown.ForceY < 0);
        Close.To(tipUp.Force, tipDown.Force, 1e-9);
        Assert.True(tipUp.Rotation > 0 && tipDown.Rotation < 0);
        GripReading clamp = up.History.Points[^1].Grips[0];
        Close.To(-tipUp.ForceY, clamp.ForceY, 1e-8);
        // Moment about the clamp: the tip's force turns counter-clockwise, the clamp holds against it.
        Close.To(-tipUp.ForceY * Length, clamp.Moment!.Value, 1e-8);
        Assert.Equal(tipUp.Force, up.Summary.Grips[1].PeakForce);
        Assert.Equal(0.1, up.Summary.Grips[1].FinalDisplacement!.Value, 1e-12);
        Assert.Null(up.Summary.Grips[0].PeakForce);
    }

    [Theory]
    [InlineData("held")]
    [InlineData("free")]
    public void Section_integral_of_a_bent_beam_is_its_bending_energy(string outOfPlane)
    {
        // Source: M²/(2·b·E'I), E' = E/(1 - ν²) held out of plane; the same at every section.
        FullSample sample = Sample("  - turn: {grips: {tip: 1}, moment: 500 N*mm}", outOfPlane, 0.3);
        double young = outOfPlane == "held" ? Young / (1 - 0.09) : Young;
        double expected = 500 * 500 / (2 * Width * young * Inertia);
        foreach ((double from, double to) in (ReadOnlySpan<(double, double)>)[(20, 30), (35, 40), (18, 45)])
            Close.To(expected, sample.Section(from, to)!.Value, 1e-4, 0, $"{from} to {to}");
        Assert.Null(sample.Section(100, 110));
    }

    [Fact]
    public void Section_integral_of_a_shorn_beam_grows_with_the_square_of_the_moment()
    {
        // Source: M²/(2·b·EI), plus the shear's part F·γ - F²·1.2/(2GA) = 0.6·F²/(G·A) and F·slope, per width: the virtual work of the section's rotation by the shear force.
        FullSample sample = Sample("  - pull: {grip: tip, along: +y, force: 10 N}", "free", 0);
        double from = 20, to = 40, step = 0.01, sum = 0;
        int count = 0;
        for (double x = from + step / 2; x < to; x += step, count++)
        {
            double moment = 10 * (Length - x), slope = 10 * (Length * x - x * x / 2) / (Young * Inertia);
            sum += moment * moment / (2 * Young * Inertia) + 10 * slope + 10 * 10 * 0.6 / (Young / 2 * Width * Height);
        }
        Close.To(sum / count / Width, sample.Section(from, to)!.Value, 2e-3);
    }

    [Theory]
    [InlineData("held")]
    [InlineData("free")]
    public void Section_integral_of_rigid_motion_and_of_free_expansion_is_that_of_no_stress_in_the_plane(string outOfPlane)
    {
        // Source: W is the mechanical energy: free, it is 0; held, the blocked expansion stores ½·E·(α·ΔT)² per volume, which stays the same along the beam.
        FullSample sample = Sample("  - heat to: 70 °C", outOfPlane, 0.3, clamp: "left end of beam, at: middle", components: "[x, y]", more: "  - fix: {foot: [x]}\n");
        double[] ux = [.. sample.Ux], uy = [.. sample.Uy];
        double before = sample.Section(20, 30)!.Value;
        double blocked = outOfPlane == "held" ? 0.5 * Young * Math.Pow(20e-6 * 50, 2) * Height : 0;
        Close.To(-blocked, before, 1e-6, 1e-9);
        Mesh mesh = sample.Solid.Adherend.FirstNode == 0 ? sample.Mesh : throw new InvalidOperationException();
        for (int node = 0; node < ux.Length; node++)
        {
            sample.Ux[node] = ux[node] + 0.7 - 0.01 * mesh.Y[node];
            sample.Uy[node] = uy[node] - 0.3 + 0.01 * mesh.X[node];
        }
        Close.To(before, sample.Section(20, 30)!.Value, 1e-6, 1e-9);
    }

    [Fact]
    public void Stresses_of_uniform_tension_are_the_same_everywhere()
    {
        RunResult run = Beam("  - pull: {grip: tip, along: +x, force: 120 N}", poisson: 0);
        FieldSnapshot end = run.History.Snapshots[^1];
        for (int node = 0; node < run.History.Mesh.NodeCount; node++)
        {
            Close.To(10, end.StressXx[node], 1e-8);
            Close.To(0, end.StressYy[node], 0, 1e-7);
            Close.To(0, end.StressZz[node], 0, 1e-7);
            Close.To(0, end.StressXy[node], 0, 1e-7);
            Close.To(10, end.EquivalentStress[node], 1e-8);
            Assert.Equal(0, end.PlasticStrain[node]);
        }
        Close.To(10, run.Summary.Adherends[0].LargestEquivalentStress, 1e-8);
    }

    [Fact]
    public void Largest_rotation_and_stress_of_a_bent_beam_are_those_of_beam_theory()
    {
        RunResult run = Beam("  - turn: {grips: {tip: 1}, moment: 500 N*mm}");
        double curvature = 500 / (Young * Inertia);
        // The outermost Gauss point lies a little inside the end.
        Close.To(curvature * Length * 180 / Math.PI, run.Summary.SelfCheck.LargestRotationDegrees, 0.02);
        Close.To(500 * Height / 2 / Inertia, run.Summary.Adherends[0].LargestEquivalentStress, 1e-6);
        Assert.Equal(run.History.Points.Count, run.History.Energies.Count);
        Close.To(0.5 * 500 * curvature * Length, run.History.Energies[^1].PutIn, 1e-6);
    }

    [Fact]
    public void A_gauge_between_one_and_the_same_point_is_refused()
    {
        Deck deck = DeckOf.Yaml(Text("  - turn: {grips: {tip: 1}, moment: 500 N*mm}").Replace("on: bottom of beam, at: 20 mm, to: right end of beam, to at: middle", "on: bottom of beam, at: end, to: right end of beam, to at: start", StringComparison.Ordinal));
        Assert.Contains("keep.gauges.diagonal", Assert.Throws<DeckException>(() => new GaugeReader(deck, Mesher.Build(deck).Mesh)).Message, StringComparison.Ordinal);
    }

    private static RunResult Beam(string stage, string elements = "eight-node", double poisson = 0) => DeckOf.Run(DeckOf.Yaml(Text(stage, elements, "free", poisson)));

    private static string Text(string stage, string elements = "eight-node", string outOfPlane = "free", double poisson = 0, string clamp = "left end of beam", string components = "[x, y, rotation]", string more = "") => FormattableString.Invariant($$$"""
        title: Beam
        model: {width: 3 mm, out of plane: {{{outOfPlane}}}, rotation: small, elements: {{{elements}}}}
        materials:
          stuff: {young: 70 GPa, poisson: {{{poisson}}}, expansion: 20e-6 1/K}
        adherends:
          beam: {of: stuff, rectangle: {corner: [0 mm, 0 mm], size: [60 mm, 4 mm]}, elements: {along: 60, through: 4}}
        grips:
          clamp: {on: {{{clamp}}}}
          tip: {on: right end of beam}
          foot: {on: bottom of beam, at: 10 mm}
        sequence:
          - fix: {clamp: {{{components}}}}
        {{{(more.Length == 0 ? "" : more)}}}{{{stage}}}
        keep:
          fields: every 1000 points
          gauges:
            above: {kind: strain gauge, on: top of beam, at: 30 mm}
            below: {kind: strain gauge, on: bottom of beam, at: 30 mm}
            slope: {kind: inclinometer, on: top of beam, at: 40 mm}
            end slope: {kind: inclinometer, on: right end of beam, at: middle}
            diagonal: {kind: clip gauge, on: bottom of beam, at: 20 mm, to: right end of beam, to at: middle}
        """);

    private static FullSample Sample(string stage, string outOfPlane, double poisson, string clamp = "left end of beam", string components = "[x, y, rotation]", string more = "")
    {
        string text = Text(stage, "eight-node", outOfPlane, poisson, clamp, components, more);
        if (more.Length > 0)
            text = text.Replace("  tip: {on: right end of beam}\n", "  tip: {on: right end of beam, at: middle}\n", StringComparison.Ordinal);
        RunResult run = DeckOf.Run(DeckOf.Yaml(text));
        Assert.True(run.Summary.Status == RunStatus.Finished, run.Summary.Cause);
        FieldSnapshot end = run.History.Snapshots[^1];
        return new FullSample(run.Equilibrium.Model.Solids[0], run.History.Mesh, [.. end.DisplacementX], [.. end.DisplacementY], end.Temperature);
    }

    private sealed record FullSample(SolidBlock Solid, Mesh Mesh, double[] Ux, double[] Uy, double Temperature)
    {
        public double? Section(double from, double to) => SectionIntegral.Mean(Solid, from, to, Ux, Uy, Temperature);
    }
}
