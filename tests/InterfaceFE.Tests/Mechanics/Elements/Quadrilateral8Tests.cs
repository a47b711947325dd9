using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Elements;

public sealed class Quadrilateral8Tests
{
    [Theory]
    [InlineData(0.5, true)]
    [InlineData(0.70, true)]
    [InlineData(0.80, false)]
    public void A_middle_node_beyond_the_quarter_point_folds_the_element(double position, bool valid)
    {
        // Source: the map along a side is quadratic; its slope at the end vanishes with the middle node at a quarter of the side.
        double[] coordinates = Samples.FromCorners<Quadrilateral8>([0, 0, 1, 0, 1, 1, 0, 1]);
        coordinates[8] = position;
        Assert.Equal(valid, Quadrilateral8.Shape(coordinates).IsValid);
    }

    [Theory]
    [InlineData(OutOfPlaneState.Held)]
    [InlineData(OutOfPlaneState.Free)]
    public void Answer_to_an_elastic_law_is_that_of_the_elastic_kernels(OutOfPlaneState state)
    {
        double[] coordinates = Samples.Distorted<Quadrilateral8>(31, curved: true), u = Samples.Displacements<Quadrilateral8>(31);
        double[] force = new double[16], expectedForce = new double[16], tangent = new double[256], expectedTangent = new double[256];
        PlaneElasticity material = Samples.Laminate(state);
        PlaneEnergy energy = Quadrilateral8.Respond(coordinates, material, 3, u, -20, [], [], force, tangent);
        Quadrilateral8.InternalForce(coordinates, material, 3, u, -20, expectedForce);
        Quadrilateral8.Stiffness(coordinates, material, 3, expectedTangent);
        Assert.Equal(expectedForce, force);
        Assert.Equal(expectedTangent, tangent);
        Close.To(Quadrilateral8.StrainEnergy(coordinates, material, 3, u, -20), energy.Stored, 1e-14);
        Assert.Equal(0, energy.Dissipated);
    }

    [Fact]
    public void Tangent_of_a_nonlinear_law_is_the_derivative_of_the_force_and_state_stays_with_its_point()
    {
        double[] coordinates = Samples.Distorted<Quadrilateral8>(32, curved: true), u = Samples.Displacements<Quadrilateral8>(32);
        double[] accepted = [0, 1e9, 0, 1e9], tentative = new double[4], force = new double[16], tangent = new double[256];
        double[] up = new double[16], down = new double[16], unused = new double[256];
        StiffeningLaw law = new(Samples.Laminate(OutOfPlaneState.Free));
        PlaneEnergy energy = Quadrilateral8.Respond(coordinates, law, 3, u, 0, accepted, tentative, force, tangent);
        Assert.Equal(1e9, tentative[1]);
        Assert.Equal(1e9, tentative[3]);
        Assert.True(tentative[0] > 0 && tentative[2] > 0 && tentative[0] != tentative[2]);
        // Dissipated: the law reports its state times a millionth; areas weigh the points.
        double[] byX = new double[32], byY = new double[32], areas = new double[4];
        Quadrilateral8.ShapeGradients(coordinates, byX, byY, areas);
        Close.To(3e-6 * tentative.Zip(areas, (a, b) => a * b).Sum(), energy.Dissipated, 1e-13);

        double size = force.Max(Math.Abs);
        const double step = 1e-5;
        for (int j = 0; j < 16; j++)
        {
            double kept = u[j];
            u[j] = kept + step;
            double above = Quadrilateral8.Respond(coordinates, law, 3, u, 0, accepted, tentative, up, unused).Stored;
            u[j] = kept - step;
            double below = Quadrilateral8.Respond(coordinates, law, 3, u, 0, accepted, tentative, down, unused).Stored;
            u[j] = kept;
            // Truncation of a central difference over a cubic law, relative step about 1e-3.
            Close.To(force[j], (above - below) / (2 * step), 0, 1e-5 * size, $"force {j}");
            for (int i = 0; i < 16; i++)
                Close.To(tangent[16 * i + j], (up[i] - down[i]) / (2 * step), 0, 1e-5 * tangent.Max(Math.Abs), $"tangent {i}, {j}");
        }
    }

    /// <summary>Invented law with the energy q/2 + c·q²/4, q twice the elastic energy; its state is the largest q so far and changes nothing.</summary>
    private sealed class StiffeningLaw(PlaneElasticity elasticity) : IPlaneLaw
    {
        private const double Growth = 1.0;

        public int StateSize => 1;

        public PlaneEnergy Update(
            ReadOnlySpan<double> strain, double temperatureChange, ReadOnlySpan<double> accepted, Span<double> tentative, Span<double> stress, Span<double> tangent,
            Span<double> byTemperature = default)
        {
            double q = 2 * elasticity.Update(strain, temperatureChange, [], [], stress, tangent).Stored;
            double[] linear = [stress[0], stress[1], stress[3]];
            for (int i = 0; i < 9; i++)
                tangent[i] = (1 + Growth * q) * tangent[i] + 2 * Growth * linear[i / 3] * linear[i % 3];
            for (int i = 0; i < 4; i++)
                stress[i] *= 1 + Growth * q;
            tentative[0] = Math.Max(accepted[0], q);
            return new PlaneEnergy(q / 2 + Growth * q * q / 4, 1e-6 * tentative[0]);
        }
    }
}
