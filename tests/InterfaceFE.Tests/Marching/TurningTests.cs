using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using InterfaceFE.Marching;
using InterfaceFE.Model;
using InterfaceFE.Results;
using Xunit;

namespace InterfaceFE.Tests.Marching;

/// <summary>Slender parts through large rotations against elastica solutions (tables computed by elliptic integrals and shooting, sources beside them).</summary>
public class TurningTests
{
    /// <summary>Bisshopp and Drucker, Q. Appl. Math. 3 (1945) 272-275; Mattiasson, Int. J. Numer. Meth. Eng. 17 (1981) 145-153.</summary>
    [Theory]
    [InlineData(1, 0.301721, 0.056433, 26.4335)]
    [InlineData(10, 0.810609, 0.554996, 81.9493)]
    public void A_cantilever_bends_as_the_elastica(double load, double across, double along, double degrees)
    {
        Recording run = Recording.Of(TurningDecks.Cantilever(load * TurningDecks.Bending / (TurningDecks.Length * TurningDecks.Length)));
        (double x, double y, double angle) = Tip(run);
        Close.To(across * TurningDecks.Length, y, 3e-3, 0, "across");
        Close.To(-along * TurningDecks.Length, x, 3e-3, 0, "along");
        Close.To(degrees * Math.PI / 180, angle, 3e-3, 0, "rotation");
    }

    [Theory]
    [InlineData(0.25)]
    [InlineData(1)]
    public void An_end_moment_rolls_a_strip_to_a_circle(double turns)
    {
        double angle = 2 * Math.PI * turns;
        Recording run = Recording.Of(TurningDecks.Cantilever(0, angle * TurningDecks.Bending / TurningDecks.Length));
        (double x, double y, double rotation) = Tip(run);
        Close.To(TurningDecks.Length * (Math.Sin(angle) / angle - 1), x, 0, 1e-3 * TurningDecks.Length, "x");
        Close.To(TurningDecks.Length * (1 - Math.Cos(angle)) / angle, y, 0, 1e-3 * TurningDecks.Length, "y");
        Close.To(angle, rotation, 3e-3, 0, "rotation");
    }

    private static (double X, double Y, double Angle) Tip(Recording run)
    {
        Assert.True(run.Outcome.Status == MarchStatus.Finished, run.Outcome + string.Join("\n", run.Lines));
        UnknownMap map = run.Equilibrium.Model.Unknowns;
        int tip = map.OfBody(1);
        ReadOnlySpan<double> u = run.Equilibrium.AcceptedDisplacement;
        return (u[tip], u[tip + 1], u[tip + 2]);
    }

    /// <summary>Williams, Q. J. Mech. Appl. Math. 17 (1964) 451-469: limits of the extensible elastica by shooting.</summary>
    [Fact]
    public void The_toggle_snaps_at_the_loads_of_its_elastica()
    {
        const double Half = 40;
        List<(double Load, double Travel)> path = Path(Recording.Of(TurningDecks.Toggle(0.386, Half)), 2 * Half, 1);
        Close.To(33.861, Limit(path, 0, 0.3, 1).Value, 1e-2, 0, "upper limit");
        Close.To(31.263, -Limit(path, 0.3, 0.5, -1).Value, 1e-2, 0, "lower limit");
    }

    /// <summary>Lee, Manuel and Rossow, J. Eng. Mech. Div. 94 (1968) 521-547: limits and turning points of the extensible elastica by shooting and arc length.</summary>
    [Fact]
    public void The_frame_goes_through_snap_through_and_snap_back()
    {
        const double Force = 2.5;
        List<(double Load, double Travel)> path = Path(Recording.Of(TurningDecks.Frame(Force)), Force, 2);
        Close.To(1.8557, Limit(path, 0, 55, 1).Value, 1e-2, 0, "upper limit");
        Close.To(-0.9414, -Limit(path, 0, 100, -1).Value, 1e-2, 0, "lower limit");
        int back = path.FindIndex(p => p.Travel > 60.5);
        Close.To(61.00, path.Take(back + 20).Max(p => p.Travel), 1e-2, 0, "travel turns back");
        Close.To(50.75, path.Skip(back).Min(p => p.Travel), 1e-2, 0, "travel turns on again");
    }

    [Fact]
    public void Tangents_of_elements_at_turned_rigid_grips_are_the_derivatives_of_their_forces()
    {
        SpecimenModel model = ModelBuilder.Build(TurningDecks.Cantilever(1, along: 2), Mesher.Build(TurningDecks.Cantilever(1, along: 2)).Mesh);
        var table = new ElementTable(model);
        var random = new Random(3);
        double[] u = [.. Enumerable.Range(0, model.Unknowns.Count).Select(_ => 0.1 * (random.NextDouble() - 0.5))];
        u[model.Unknowns.OfBody(0) + 2] = 1.3;
        u[model.Unknowns.OfBody(1) + 2] = -0.8;
        for (int slot = 0; slot < table.SlotCount; slot++)
        {
            int[] ids = table.Pattern.Unknowns(slot).ToArray();
            int k = ids.Length;
            double[] tangent = new double[256], native = new double[16], transformed = new double[k * k], up = new double[u.Length], down = new double[u.Length];
            double[] force = Force(table, slot, u, new double[u.Length], native, tangent);
            table.Turn(u);
            table.TransformTangent(slot, tangent, native, new double[16 * k], transformed);
            const double Step = 1e-6;
            for (int j = 0; j < k; j++)
            {
                double kept = u[ids[j]];
                u[ids[j]] = kept + Step;
                Force(table, slot, u, up, native, new double[256]);
                u[ids[j]] = kept - Step;
                Force(table, slot, u, down, native, new double[256]);
                u[ids[j]] = kept;
                for (int i = 0; i < k; i++)
                    Close.To((up[ids[i]] - down[ids[i]]) / (2 * Step), transformed[i * k + j], 0, 1e-6 * transformed.Max(Math.Abs), $"slot {slot}: {i}, {j}");
            }
            Assert.Contains(force, f => Math.Abs(f) > 1);
        }
    }

    private static double[] Force(ElementTable table, int slot, double[] u, double[] sum, double[] native, double[] tangent)
    {
        double[] moved = new double[16], unused = new double[16];
        table.Turn(u);
        table.Gather(slot, u, moved);
        table.Blocks[0].Evaluate(slot, default(PathPoint) with { Temperature = 293.15 }, moved, [], [], Wanted.Force | Wanted.Tangent,
            new ElementBuffers { Force = native, Tangent = tangent, LoadRate = unused, Dissipation = unused });
        Array.Clear(sum);
        table.Scatter(slot, native, sum, []);
        return sum;
    }

    /// <summary>Load and travel downwards of a grip at all points.</summary>
    private static List<(double Load, double Travel)> Path(Recording run, double load, int grip)
    {
        Assert.True(run.Outcome.Status == MarchStatus.Finished, run.Outcome + string.Join("\n", run.Lines));
        UnknownMap map = run.Equilibrium.Model.Unknowns;
        int across = 1 + (map.Bodies[grip].Rigid ? map.OfBody(grip) : map.OfNode(map.Bodies[grip].Nodes[0]));
        return [.. run.Points.Select((point, i) => (load * point.Progress, -run.Displacements[i][across]))];
    }

    private static Peak Limit(List<(double Load, double Travel)> path, double from, double to, int sense)
    {
        List<(double Load, double Travel)> part = [.. path.Where(p => p.Travel >= from && p.Travel <= to)];
        return Peak.Of([.. part.Select(p => p.Travel)], [.. part.Select(p => sense * p.Load)])!;
    }

    /// <summary>Rivlin, Paint Technology 9 (1944) 215; Kendall, J. Phys. D 8 (1975) 1449-1452 (from memory): P·(1 - cos φ) + P²/(2·E·t) = toughness per width, φ from the strip to the force.</summary>
    [Theory]
    [InlineData(2000, 0, 25, DrawnThickness.Zero, FrameLine.MidLine)]
    [InlineData(200, -30, 11, DrawnThickness.Zero, FrameLine.MidLine)]
    [InlineData(2000, 0, 25, DrawnThickness.True, FrameLine.LowerFace)]
    public void A_peeled_strip_takes_the_force_of_the_energy_balance(double young, double alongX, double travel, DrawnThickness drawn, FrameLine frame)
    {
        const double Thickness = 0.5;
        Recording run = Recording.Of(TurningDecks.Peel(young, Thickness, alongX, travel, drawn: drawn, frame: frame));
        Assert.True(run.Outcome.Status == MarchStatus.Finished, run.Outcome + string.Join("\n", run.Lines));
        int end = run.Equilibrium.Model.Unknowns.OfBody(1);
        double x = alongX / TurningDecks.PeelWidth, force = double.Hypot(x, run.Forces[^1][end + 1] / TurningDecks.PeelWidth);
        Close.To(TurningDecks.PeelToughness, force + x + force * force / (2 * young * Thickness), 1e-2, 0, "energy per area");
        Assert.True(run.Points.Max(p => p.Energy.Balance) < 1e-9);
        Assert.True(run.Points.Max(p => p.Energy.PathError) < 1e-3);
    }

    [Theory]
    [InlineData(DrawnThickness.Zero)]
    [InlineData(DrawnThickness.True)]
    public void Spinning_a_loaded_damaged_joint_by_90_degrees_changes_nothing(DrawnThickness drawn)
    {
        Recording run = Recording.Of(TurningDecks.Peel(2000, 0.5, 0, 12, drawn: drawn));
        FullEquilibrium equilibrium = run.Equilibrium;
        UnknownMap map = equilibrium.Model.Unknowns;
        Mesh mesh = equilibrium.Model.Mesh;
        double[] before = equilibrium.AcceptedDisplacement.ToArray(), forces = equilibrium.InternalForce.ToArray(), way = new double[before.Length];
        EnergyState energy = equilibrium.Energy;
        Assert.True(energy.SpentInLayers > 1, "the joint must be damaged");
        for (int node = 0; node < mesh.NodeCount; node++)
            if (map.BodyOfNode(node) < 0)
                Spin(map.OfNode(node), mesh.X[node], mesh.Y[node]);
        for (int b = 0; b < map.Bodies.Count; b++)
        {
            Spin(map.OfBody(b), map.Bodies[b].PinX, map.Bodies[b].PinY);
            way[map.OfBody(b) + 2] = Math.PI / 2;
        }
        equilibrium.Guess(way, 0, 1);
        equilibrium.Evaluate(Wanted.Force);
        double largest = forces.Max(Math.Abs);
        ReadOnlySpan<double> spun = equilibrium.InternalForce;
        Close.To(energy.StoredInAdherends, equilibrium.Energy.StoredInAdherends, 1e-9, 0, "adherends");
        Close.To(energy.StoredInLayers, equilibrium.Energy.StoredInLayers, 1e-9, 0, "layers");
        Close.To(energy.SpentInLayers, equilibrium.Energy.SpentInLayers, 1e-9, 0, "spent");
        for (int node = 0; node < mesh.NodeCount; node++)
        {
            if (map.BodyOfNode(node) >= 0)
                continue;
            int i = map.OfNode(node);
            Close.To(-forces[i + 1], spun[i], 0, 1e-9 * largest, "x");
            Close.To(forces[i], spun[i + 1], 0, 1e-9 * largest, "y");
        }
        for (int b = 0; b < map.Bodies.Count; b++)
            Close.To(forces[map.OfBody(b) + 2], spun[map.OfBody(b) + 2], 0, 1e-9 * largest * 60, "moment");

        void Spin(int i, double x, double y)
        {
            double atX = x + before[i] - 30, atY = y + before[i + 1];
            way[i] = 30 - atY - x - before[i];
            way[i + 1] = atX - y - before[i + 1];
        }
    }
}
