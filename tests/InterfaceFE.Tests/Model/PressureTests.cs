using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using InterfaceFE.Marching;
using InterfaceFE.Model;
using InterfaceFE.Tests.Marching;
using Xunit;

namespace InterfaceFE.Tests.Model;

/// <summary>Pressure on faces: load, follower tangent, work.</summary>
public class PressureTests
{
    private static readonly PathPoint Half = new(0.5, 293.15, 0, 2);

    private static (SpecimenModel Model, PressureBlock Block) Pressed(bool turns, params string[] edges)
    {
        Deck deck = TurningDecks.Bulge(0.4);
        deck = deck with
        {
            Model = deck.Model with { Rotation = turns ? RotationSetting.Finite : RotationSetting.Small },
            Sequence = [deck.Sequence[0], new StageDeck { Press = new PressDeck { On = edges, Pressure = 0.4 } }],
        };
        SpecimenModel model = ModelBuilder.Build(deck, Mesher.Build(deck).Mesh);
        return (model, model.Pressures[0]);
    }

    private static (double[] Force, double[] Tangent, double[] Rate) At(PressureBlock block, int element, double[] u, in PathPoint at)
    {
        double[] force = new double[6], tangent = new double[36], rate = new double[6], unused = new double[6];
        block.Evaluate(element, at, u, [], [], Wanted.Force | Wanted.Tangent | Wanted.LoadRate, new ElementBuffers { Force = force, Tangent = tangent, LoadRate = rate, Dissipation = unused });
        return (force, tangent, rate);
    }

    [Theory]
    [InlineData("bottom of beam", 0, -1)]
    [InlineData("top of beam", 0, 1)]
    [InlineData("left end of beam", -1, 0)]
    [InlineData("right end of beam", 1, 0)]
    public void It_pushes_on_the_body_from_every_side(string edge, int outwardX, int outwardY)
    {
        (_, PressureBlock block) = Pressed(true, edge);
        double length = outwardX == 0 ? TurningDecks.BulgeLength / 100 : TurningDecks.BulgeThickness;
        double[] force = At(block, 0, new double[6], Half).Force;
        // Of the sign of internal forces: against the load, that is outwards.
        Close.To(0.2 * TurningDecks.Width * length * outwardX, force[0] + force[2] + force[4], 1e-12, 1e-12, "x");
        Close.To(0.2 * TurningDecks.Width * length * outwardY, force[1] + force[3] + force[5], 1e-12, 1e-12, "y");
    }

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void Tangent_and_load_rate_are_derivatives_of_the_load(bool turns)
    {
        (_, PressureBlock block) = Pressed(turns, "bottom of beam");
        var random = new Random(2);
        double[] u = [.. Enumerable.Range(0, 6).Select(_ => random.NextDouble())];
        (double[] force, double[] tangent, double[] rate) = At(block, 3, u, Half);
        for (int j = 0; j < 6; j++)
        {
            double kept = u[j];
            u[j] = kept + 1e-3;
            double[] up = At(block, 3, u, Half).Force;
            u[j] = kept - 1e-3;
            double[] down = At(block, 3, u, Half).Force;
            u[j] = kept;
            for (int i = 0; i < 6; i++)
                Close.To((up[i] - down[i]) / 2e-3, tangent[6 * i + j], 0, 1e-10, $"{i}, {j}");
            // The load is linear in the pressure, and the pressure in the progress.
            Close.To(force[j] / 0.5, rate[j], 1e-12, 1e-15, $"rate {j}");
        }
    }

    [Fact]
    public void A_body_under_pressure_from_all_sides_is_in_balance_however_it_is_deformed()
    {
        (SpecimenModel model, _) = Pressed(true, "bottom of beam", "top of beam", "left end of beam", "right end of beam");
        var random = new Random(4);
        double[] x = [.. model.Mesh.X.Select(v => v + 0.3 * random.NextDouble())], y = [.. model.Mesh.Y.Select(v => v + 0.3 * random.NextDouble())];
        double sumX = 0, sumY = 0, moment = 0, largest = 0;
        foreach (PressureBlock block in model.Pressures)
        {
            for (int e = 0; e < block.Count; e++)
            {
                int[] nodes = block.Nodes(e).ToArray();
                double[] force = At(block, e, [.. nodes.SelectMany(n => new[] { x[n] - model.Mesh.X[n], y[n] - model.Mesh.Y[n] })], Half).Force;
                for (int i = 0; i < 3; i++)
                {
                    sumX += force[2 * i];
                    sumY += force[2 * i + 1];
                    moment += x[nodes[i]] * force[2 * i + 1] - y[nodes[i]] * force[2 * i];
                    largest = Math.Max(largest, Math.Abs(force[2 * i + 1]));
                }
            }
        }
        Assert.True(largest > 0.1);
        Close.To(0, sumX, 0, 1e-12 * 100 * largest, "x");
        Close.To(0, sumY, 0, 1e-12 * 100 * largest, "y");
        Close.To(0, moment, 0, 1e-12 * 100 * 200 * largest, "moment");
    }

    [Fact]
    public void A_thin_strip_bulges_to_the_arc_of_a_membrane()
    {
        const double Pressure = 0.02;
        Recording run = Recording.Of(TurningDecks.Bulge(Pressure));
        Assert.True(run.Outcome.Status == MarchStatus.Finished, run.Outcome + string.Join("\n", run.Lines));
        SpecimenModel model = run.Equilibrium.Model;
        int middle = Enumerable.Range(0, model.Mesh.NodeCount).MinBy(i => double.Hypot(model.Mesh.X[i] - 100, model.Mesh.Y[i]));
        Close.To(TurningDecks.BulgeRise(Pressure), model.Unknowns.Displacement(middle, run.Equilibrium.AcceptedDisplacement).Y, 3e-3, 0, "rise");
        Assert.True(run.Points.Max(p => p.Energy.Balance) < 1e-9);
        Assert.True(run.Points.Max(p => p.Energy.PathError) < 1e-3);
        // Pins take the pressure on the chord up: half each.
        int left = model.Unknowns.OfBody(0);
        Close.To(-0.5 * Pressure * TurningDecks.Width * TurningDecks.BulgeLength, run.Equilibrium.ExternalForce(left + 1), 1e-3, 0, "reaction");
    }
}
