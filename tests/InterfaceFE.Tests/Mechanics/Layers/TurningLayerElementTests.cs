using InterfaceFE.Mechanics.Layers;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

/// <summary>Layer elements whose frame turns with the joint, drawn at zero and at true thickness.</summary>
public sealed class TurningLayerElementTests
{
    private const double Width = 3;

    /// <summary>Invented elastic law with the energy p²·(1 + w²) + s²·(1 + w) per area, so that its tangent is full.</summary>
    private sealed class Coupled : ILayerLaw
    {
        public int StateSize => 0;

        public bool HasSymmetricTangent => true;

        public LayerStiffness Stiffness => new(1, 1, 1);

        public double PeelToughness => 1;

        public double ShearToughness => 1;

        public double FinalOpening => 1;

        public double FinalSliding => 1;

        public LayerResponse Update(in Separation separation, in LawPoint at, ReadOnlySpan<double> accepted, Span<double> tentative)
        {
            double w = separation.Opening, v = separation.Sliding;
            return new()
            {
                Stored = 5 * w * w + w * w * w + 3 * v * v * (1 + 0.4 * w),
                Peel = 10 * w + 3 * w * w + 1.2 * v * v,
                Shear = 6 * v * (1 + 0.4 * w),
                PeelByOpening = 10 + 6 * w,
                PeelBySliding = 2.4 * v,
                ShearByOpening = 2.4 * v,
                ShearBySliding = 6 * (1 + 0.4 * w),
            };
        }
    }

    /// <summary>Lower face, then the upper one a thickness above it, or lying on it.</summary>
    private static double[] Drawn(double thickness) => [1, 2, 3, 2.2, 5, 2, 1, 2 + thickness, 3.05, 2.2 + 1.1 * thickness, 5, 2 + 0.9 * thickness];

    public static TheoryData<LayerFrame, bool, double> Kinds()
    {
        var kinds = new TheoryData<LayerFrame, bool, double>();
        foreach (LayerFrame frame in Enum.GetValues<LayerFrame>())
            foreach (bool turns in new[] { false, true })
                foreach (double thickness in new[] { 0, 0.7 })
                    kinds.Add(frame, turns, thickness);
        return kinds;
    }

    private static (LayerElementSums Sums, double[] Force, double[] Tangent, double[] Rate) At(LayerFrame frame, bool turns, double[] x, double[] u, double free = 0.05)
    {
        double[] force = new double[12], tangent = new double[144], rate = new double[12];
        LayerElementSums sums = TurningLayerElement.Evaluate(new LayerKinematics(frame, turns), LayerRule.SubIntervals(3, 3), x, u, Width, free, new Coupled(), default, [], [], force, tangent, [], rate);
        return (sums, force, tangent, rate);
    }

    private static double[] Moved(double[] x, double size, double angle)
    {
        var random = new Random(5);
        return Turned(x, [.. x.Select(_ => size * (random.NextDouble() - 0.5))], angle);
    }

    private static double[] Turned(double[] x, double[] u, double angle)
    {
        (double s, double c) = Math.SinCos(angle);
        var turned = new double[12];
        for (int i = 0; i < 12; i += 2)
        {
            double atX = x[i] + u[i], atY = x[i + 1] + u[i + 1];
            turned[i] = 20 + c * atX - s * atY - x[i];
            turned[i + 1] = -7 + s * atX + c * atY - x[i + 1];
        }
        return turned;
    }

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Force_tangent_and_load_rate_are_derivatives_of_the_energy(LayerFrame frame, bool turns, double thickness)
    {
        double[] x = Drawn(thickness), u = Moved(x, 0.6, turns ? 1.1 : 0);
        if (!turns)
            u = [.. u.Select(value => 0.05 * value)];
        (_, double[] force, double[] tangent, double[] rate) = At(frame, turns, x, u);
        const double Step = 1e-6;
        double largest = force.Max(Math.Abs), stiffest = tangent.Max(Math.Abs);
        double[] freeUp = At(frame, turns, x, u, 0.05 + Step).Force, freeDown = At(frame, turns, x, u, 0.05 - Step).Force;
        for (int j = 0; j < 12; j++)
        {
            double kept = u[j];
            u[j] = kept + Step;
            var up = At(frame, turns, x, u);
            u[j] = kept - Step;
            var down = At(frame, turns, x, u);
            u[j] = kept;
            Close.To((up.Sums.Stored - down.Sums.Stored) / (2 * Step), force[j], 0, 1e-7 * largest, $"force {j}");
            Close.To((freeUp[j] - freeDown[j]) / (2 * Step), rate[j], 0, 1e-7 * stiffest, $"rate {j}");
            for (int i = 0; i < 12; i++)
                Close.To((up.Force[i] - down.Force[i]) / (2 * Step), tangent[12 * i + j], 0, 1e-7 * stiffest, $"tangent {i}, {j}");
        }
    }

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Forces_and_moments_of_the_two_faces_are_in_balance(LayerFrame frame, bool turns, double thickness)
    {
        double[] x = Drawn(thickness), u = Moved(x, 0.6, turns ? 1.1 : 0.01), force = At(frame, turns, x, u).Force;
        double sumX = 0, sumY = 0, moment = 0;
        for (int i = 0; i < 12; i += 2)
        {
            sumX += force[i];
            sumY += force[i + 1];
            // At small rotation forces act on the shape before deformation.
            moment += (x[i] + (turns ? u[i] : 0)) * force[i + 1] - (x[i + 1] + (turns ? u[i + 1] : 0)) * force[i];
        }
        double largest = force.Max(Math.Abs);
        Assert.True(largest > 0.1);
        Close.To(0, sumX, 0, 1e-12 * largest, "x");
        Close.To(0, sumY, 0, 1e-12 * largest, "y");
        Close.To(0, moment, 0, 1e-11 * largest, "moment");
    }

    [Theory]
    [InlineData(0, 1.5707963267948966)]
    [InlineData(0.7, 1.5707963267948966)]
    [InlineData(0.7, -2.8)]
    public void A_rigid_movement_separates_nothing_and_turns_the_forces(double thickness, double angle)
    {
        foreach (LayerFrame frame in Enum.GetValues<LayerFrame>())
        {
            double[] x = Drawn(thickness), u = Moved(x, 0.6, 0);
            (LayerElementSums sums, double[] force, _, _) = At(frame, true, x, u);
            (LayerElementSums sumsThere, double[] forceThere, _, _) = At(frame, true, x, Turned(x, u, angle));
            double[] rest = At(frame, true, x, Turned(x, new double[12], angle), 0).Force;
            (double s, double c) = Math.SinCos(angle);
            Close.To(sums.Stored, sumsThere.Stored, 1e-12, 0, "energy");
            for (int i = 0; i < 12; i += 2)
            {
                Close.To(0, rest[i], 0, 1e-12, "rest");
                Close.To(c * force[i] - s * force[i + 1], forceThere[i], 0, 1e-12 * force.Max(Math.Abs), "x");
                Close.To(s * force[i] + c * force[i + 1], forceThere[i + 1], 0, 1e-12 * force.Max(Math.Abs), "y");
            }
        }
    }

    [Fact]
    public void A_small_turn_of_a_thick_layer_slides_nothing_and_a_turn_of_its_faces_slides_it_by_its_thickness()
    {
        const double Thickness = 2, Angle = 1e-3;
        double[] x = [0, 0, 2, 0, 4, 0, 0, Thickness, 2, Thickness, 4, Thickness];
        var kinematics = new LayerKinematics(LayerFrame.MidLine, false);
        double[] turned = [.. x.Select((_, i) => i % 2 == 0 ? -Angle * x[i + 1] : Angle * x[i - 1])], slope = [.. x.Select((_, i) => i % 2 == 0 ? 0 : Angle * x[i - 1])];
        Separation whole = TurningLayerElement.At(kinematics, x, turned, 0, 0.3).Separation, faces = TurningLayerElement.At(kinematics, x, slope, 0, 0.3).Separation;
        Close.To(0, whole.Sliding, 0, 1e-17, "turn of the whole");
        Close.To(0, whole.Opening, 0, 1e-17, "opening");
        Close.To(Thickness * Angle, faces.Sliding, 1e-12, 0, "t·d(vm)/dx");
    }

    [Fact]
    public void At_zero_thickness_and_small_rotation_it_is_the_plain_layer_element()
    {
        double[] x = Drawn(0);
        x[8] = x[2];
        double[] u = Moved(x, 0.3, 0), plain = new double[12], plainTangent = new double[144];
        LayerElement.Evaluate(LayerRule.SubIntervals(3, 3), x, u, Width, 0.05, new Coupled(), default, [], [], plain, plainTangent, [], []);
        (_, double[] force, double[] tangent, _) = At(LayerFrame.MidLine, false, x, u);
        for (int i = 0; i < 12; i++)
            Close.To(plain[i], force[i], 0, 1e-12 * plain.Max(Math.Abs), $"force {i}");
        for (int i = 0; i < 144; i++)
            Close.To(plainTangent[i], tangent[i], 0, 1e-12 * plainTangent.Max(Math.Abs), $"tangent {i}");
    }
}
