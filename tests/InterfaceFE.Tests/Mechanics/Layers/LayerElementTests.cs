using InterfaceFE.Mechanics.Layers;
using MathNet.Numerics.Integration;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

public sealed class LayerElementTests
{
    /// <summary>The same tractions whatever the separation.</summary>
    private sealed class Constant(double peel, double shear) : ILayerLaw
    {
        public int StateSize => 0;

        public bool HasSymmetricTangent => true;

        public LayerStiffness Stiffness => new(1, 1, 1);

        public double PeelToughness => 1;

        public double ShearToughness => 1;

        public double FinalOpening => 1;

        public double FinalSliding => 1;

        public LayerResponse Update(in Separation separation, in LawPoint at, ReadOnlySpan<double> accepted, Span<double> tentative) => new() { Peel = peel, Shear = shear };
    }

    private static readonly double[] Straight3 = Shape([(0, 0), (2, 0), (4, 0)]), Straight2 = Shape([(0, 0), (4, 0)]);
    private static readonly double[] Inclined3 = Shape([(1, 1), (2.5, 3), (4, 5)]), Inclined2 = Shape([(4, 5), (1, 1)]), Curved = Shape([(0, 0), (2.1, 0.9), (4, 0.4)]);

    private static IEnumerable<(double[] Coordinates, LayerRule Rule)> Cases()
    {
        foreach (double[] three in new[] { Straight3, Inclined3, Curved })
            foreach (LayerRule rule in new[] { LayerRule.SubIntervals(3), LayerRule.Gauss(3), LayerRule.Lobatto(3), LayerRule.SubIntervals(3, 1) })
                yield return (three, rule);
        foreach (double[] two in new[] { Straight2, Inclined2 })
            foreach (LayerRule rule in new[] { LayerRule.SubIntervals(2), LayerRule.Gauss(2), LayerRule.Lobatto(2) })
                yield return (two, rule);
    }

    private static double[] Shape((double X, double Y)[] face)
    {
        double[] one = [.. face.SelectMany(p => new[] { p.X, p.Y })];
        return [.. one, .. one];
    }

    private static double[] Random(Random random, int length, double size) => [.. Enumerable.Range(0, length).Select(_ => size * (2 * random.NextDouble() - 1))];

    private static (double[] Force, LayerElementSums Sums) Force(double[] x, LayerRule rule, double[] u, ILayerLaw law, double width = 3, double free = 0)
    {
        double[] force = new double[x.Length];
        LayerElementSums sums = LayerElement.Evaluate(rule, x, u, width, free, law, default, new double[rule.Count * law.StateSize], new double[rule.Count * law.StateSize], force, [], [], []);
        return (force, sums);
    }

    [Fact]
    public void Weights_sum_to_two_and_shapes_to_one()
    {
        foreach ((_, LayerRule rule) in Cases())
        {
            Close.To(2, rule.Weights.ToArray().Sum(), 1e-14);
            for (int p = 0; p < rule.Count; p++)
            {
                Close.To(1, rule.Shapes(p).ToArray().Sum(), 1e-14);
                Close.To(0, rule.Slopes(p).ToArray().Sum(), 0, 1e-14);
                Assert.True(p == 0 || rule.Positions[p] > rule.Positions[p - 1]);
            }
        }
        Assert.Equal(20, LayerRule.SubIntervals(3).Count);
    }

    [Fact]
    public void Constant_tractions_give_their_exact_resultant_and_moment_with_every_rule()
    {
        foreach ((double[] x, LayerRule rule) in Cases())
        {
            int half = x.Length / 2;
            double dx = x[half - 2] - x[0], dy = x[half - 1] - x[1];
            (double[] force, _) = Force(x, rule, new double[x.Length], new Constant(0.7, 0.2));
            double fx = 0, fy = 0, moment = 0;
            for (int i = half; i < x.Length; i += 2)
            {
                (fx, fy) = (fx + force[i], fy + force[i + 1]);
                moment += x[i] * force[i + 1] - x[i + 1] * force[i];
                Close.To(-force[i], force[i - half], 1e-15);
            }
            Close.To(3 * (0.2 * dx - 0.7 * dy), fx, 1e-13, 1e-13);
            Close.To(3 * (0.2 * dy + 0.7 * dx), fy, 1e-13, 1e-13);
            // Moment of a uniform pressure about the origin: ½·(|end|² - |start|²), of a uniform shear: twice the swept area, by fine quadrature.
            double ends = 0.5 * (x[half - 2] * x[half - 2] + x[half - 1] * x[half - 1] - x[0] * x[0] - x[1] * x[1]);
            double swept = GaussLegendreRule.Integrate(
                xi =>
                {
                    PointFrame f = LayerElement.FrameAt(rule.NodesPerFace, x, xi);
                    return (f.X * f.TangentY - f.Y * f.TangentX) * f.Stretch;
                },
                -1,
                1,
                10);
            Close.To(3 * (0.7 * ends + 0.2 * swept), moment, 1e-12, 1e-12);
        }
    }

    [Fact]
    public void Uniform_opening_gives_uniform_traction_and_consistent_nodal_forces_on_straight_and_inclined_elements()
    {
        IndependentModesLaw law = new(Laws.PeelLine, Laws.ShearLine, 30);
        foreach ((double[] x, LayerRule rule) in Cases().Where(c => c.Coordinates != Curved))
        {
            foreach (double opening in new[] { 0.01, 0.3, -0.02 })
            {
                int half = x.Length / 2;
                PointFrame frame = LayerElement.FrameAt(rule.NodesPerFace, x, 0);
                double length = 2 * frame.Stretch, traction = opening < 0 ? 30 * opening : Laws.PeelLine.Traction(opening);
                double[] u = new double[x.Length];
                for (int i = half; i < x.Length; i += 2)
                    (u[i], u[i + 1]) = (opening * frame.NormalX, opening * frame.NormalY);
                (double[] force, LayerElementSums sums) = Force(x, rule, u, law);
                double[] shares = rule.NodesPerFace == 3 ? [1.0 / 6, 4.0 / 6, 1.0 / 6] : [0.5, 0.5];
                for (int a = 0; a < shares.Length; a++)
                {
                    Close.To(shares[a] * 3 * length * traction * frame.NormalX, force[half + 2 * a], 1e-12, 1e-14);
                    Close.To(shares[a] * 3 * length * traction * frame.NormalY, force[half + 2 * a + 1], 1e-12, 1e-14);
                }
                double energy = opening < 0 ? 15 * opening * opening : Laws.PeelLine.Area(opening);
                Close.To(3 * length * energy, sums.Stored + sums.Dissipated, 1e-12);
                Assert.Equal(opening is 0.3, sums.Growing);
                Assert.Equal(opening is not 0.01, sums.Changed);
                Assert.Equal(opening < 0, (sums.Branches & LayerBranches.Pressed) != 0);
            }
        }
    }

    [Fact]
    public void Uniform_jump_of_a_curved_element_gives_forces_by_the_length_of_its_line()
    {
        // Equal stiffness every way: traction is k·jump, so nodal forces are k·jump·∫N dl.
        IndependentModesLaw law = new(new BilinearCurve(20, 2, 1), new BilinearCurve(20, 2, 1), 20);
        double[] u = new double[12];
        for (int i = 6; i < 12; i += 2)
            (u[i], u[i + 1]) = (-0.02, 0.05);
        (double[] force, _) = Force(Curved, LayerRule.SubIntervals(3), u, law);
        for (int a = 0; a < 3; a++)
        {
            double part = GaussLegendreRule.Integrate(xi => LayerElement.FrameAt(3, Curved, xi).Stretch * (a == 1 ? 1 - xi * xi : 0.5 * xi * (xi + a - 1)), -1, 1, 40);
            // dl/dξ is no polynomial on a curved line: the default rule integrates it to 3e-6 here.
            Close.To(3 * 20 * -0.02 * part, force[6 + 2 * a], 1e-5);
            Close.To(3 * 20 * 0.05 * part, force[7 + 2 * a], 1e-5);
        }
    }

    [Fact]
    public void Rigid_motion_gives_no_separation_and_no_force()
    {
        IndependentModesLaw law = new(Laws.PeelLine, Laws.ShearLine, 30);
        foreach ((double[] x, LayerRule rule) in Cases())
        {
            double[] u = new double[x.Length];
            for (int i = 0; i < x.Length; i += 2)
                (u[i], u[i + 1]) = (0.7 - 0.01 * x[i + 1], -1.3 + 0.01 * x[i]);
            (double[] force, LayerElementSums sums) = Force(x, rule, u, law);
            foreach (double f in force)
                Close.To(0, f, 0, 1e-13);
            Close.To(0, sums.Stored, 0, 1e-25);
            Separation s = LayerElement.SeparationAt(rule.NodesPerFace, x, u, 0, 0.3);
            Close.To(0, Math.Abs(s.Opening) + Math.Abs(s.Sliding), 0, 1e-14);
        }
    }

    [Fact]
    public void Sides_and_sense_are_lower_to_upper_and_start_to_end()
    {
        double[] u = new double[12];
        for (int i = 6; i < 12; i += 2)
            (u[i], u[i + 1]) = (0.2, 0.5);
        Separation s = LayerElement.SeparationAt(3, Straight3, u, 0.1, -0.4);
        Close.To(0.4, s.Opening, 1e-15);
        Close.To(0.2, s.Sliding, 1e-15);
        PointFrame frame = LayerElement.FrameAt(3, Straight3, -0.4);
        Close.To(1.2, frame.X, 1e-15);
        Close.To(1, frame.NormalY);
    }

    [Fact]
    public void Tangent_gradients_and_load_rate_are_derivatives_of_force_and_energies()
    {
        Random random = new(9);
        int growing = 0;
        foreach (ILayerLaw law in Laws.All)
        {
            foreach ((double[] x, LayerRule rule) in Cases())
            {
                int n = x.Length, states = rule.Count * law.StateSize;
                double[] accepted = new double[states], tentative = new double[states], first = Random(random, n, 0.15 * law.FinalOpening);
                double[] force = new double[n], tangent = new double[n * n], gradient = new double[n], rate = new double[n];
                for (int i = n / 2; i < n; i++)
                    first[i] += 0.25 * law.FinalOpening;
                LayerElement.Evaluate(rule, x, first, 3, 0.01, law, default, accepted, tentative, [], [], [], []);
                tentative.CopyTo(accepted, 0);
                double[] u = [.. first.Zip(Random(random, n, 0.1 * law.FinalOpening), (a, b) => a + b)];
                LayerElementSums sums = LayerElement.Evaluate(rule, x, u, 3, 0.01, law, default, accepted, tentative, force, tangent, gradient, rate);
                growing += sums.Growing ? 1 : 0;
                // Differences across a kink at one of the points are allowed for by a share of the stiffness; most have none.
                double h = 1e-7 * law.FinalOpening, stiff = 3 * 6 * Math.Max(law.Stiffness.Peel, law.Stiffness.Shear), allowed = 1e-5 * stiff;
                for (int j = 0; j < n; j++)
                {
                    (double[] plus, LayerElementSums sp) = At(j, h, 0);
                    (double[] minus, LayerElementSums sm) = At(j, -h, 0);
                    for (int i = 0; i < n; i++)
                        Close.To((plus[i] - minus[i]) / (2 * h), tangent[i * n + j], 1e-5, allowed, $"{law.GetType().Name} {rule.Name} {i},{j}");
                    Close.To((sp.Dissipated - sm.Dissipated) / (2 * h), gradient[j], 1e-5, allowed * law.FinalOpening, "gradient");
                }
                (double[] wider, LayerElementSums sw) = At(0, 0, h);
                (double[] closer, LayerElementSums sc) = At(0, 0, -h);
                for (int i = 0; i < n; i++)
                    Close.To((wider[i] - closer[i]) / (2 * h), rate[i], 1e-5, allowed, "load rate");
                Close.To((sw.Dissipated - sc.Dissipated) / (2 * h), sums.DissipatedByFreeOpening, 1e-5, allowed * law.FinalOpening, "by free opening");

                (double[] Force, LayerElementSums Sums) At(int unknown, double move, double free)
                {
                    double[] moved = [.. u], f = new double[n];
                    moved[unknown] += move;
                    return (f, LayerElement.Evaluate(rule, x, moved, 3, 0.01 + free, law, default, accepted, new double[states], f, [], [], []));
                }
            }
        }
        Assert.True(growing > 50);
    }

    [Fact]
    public void Full_opening_dissipates_toughness_times_area_on_a_curved_element_too()
    {
        foreach (ILayerLaw law in Laws.All)
        {
            foreach ((double[] x, LayerRule rule) in Cases().Where(c => c.Rule.Count != 2 || c.Coordinates.Length == 8))
            {
                double[] u = new double[x.Length];
                for (int a = 0; a < rule.NodesPerFace; a++)
                {
                    PointFrame at = LayerElement.FrameAt(rule.NodesPerFace, x, rule.NodesPerFace == 3 ? a - 1 : 2 * a - 1);
                    (u[x.Length / 2 + 2 * a], u[x.Length / 2 + 2 * a + 1]) = (3 * law.FinalOpening * at.NormalX, 3 * law.FinalOpening * at.NormalY);
                }
                (double[] force, LayerElementSums sums) = Force(x, rule, u, law);
                double length = GaussLegendreRule.Integrate(xi => LayerElement.FrameAt(rule.NodesPerFace, x, xi).Stretch, -1, 1, 40);
                if (x != Curved)
                    Close.To(law.PeelToughness * 3 * length, sums.Dissipated, 1e-12);
                else
                    Assert.InRange(sums.Dissipated, 0.99 * Math.Min(law.PeelToughness, law.ShearToughness) * 3 * length, 1.01 * Math.Max(law.PeelToughness, law.ShearToughness) * 3 * length);
                Close.To(1, sums.LargestDamage);
                Assert.Equal(LayerBranches.Separated, sums.Branches);
                foreach (double f in force)
                    Close.To(0, f, 0, 0);
            }
        }
    }

    [Fact]
    public void Evaluating_allocates_nothing()
    {
        foreach (ILayerLaw law in Laws.All)
        {
            LayerRule rule = LayerRule.SubIntervals(3);
            double[] accepted = new double[20 * law.StateSize], tentative = new double[20 * law.StateSize], force = new double[12], tangent = new double[144], u = new double[12];
            for (int i = 6; i < 12; i++)
                u[i] = 0.5 * law.FinalOpening;
            Run();
            long before = GC.GetAllocatedBytesForCurrentThread();
            Run();
            Assert.Equal(before, GC.GetAllocatedBytesForCurrentThread());

            void Run() => LayerElement.Evaluate(rule, Curved, u, 3, 0, law, default, accepted, tentative, force, tangent, [], []);
        }
    }

    [Fact]
    public void Arrays_that_do_not_fit_are_refused_with_both_lengths()
    {
        IndependentModesLaw law = new(Laws.PeelLine, Laws.ShearLine, 30);
        LayerRule rule = LayerRule.SubIntervals(3);
        Assert.Contains("length 8, needed is 12", Assert.Throws<ArgumentException>(() => Force(Straight2, rule, new double[8], law)).Message, StringComparison.Ordinal);
        Assert.ThrowsAny<ArgumentException>(() => LayerRule.SubIntervals(4));
        Assert.ThrowsAny<ArgumentException>(() => LayerRule.Lobatto(1));
        Assert.ThrowsAny<ArgumentException>(() => LayerRule.SubIntervals(3, 0));
    }
}
