using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Elements;

/// <summary>One distorted eight-node element of a turned laminate with finite rotation: force, tangent, stresses and energy from each other, and rigid movements.</summary>
public sealed class TurningElementTests
{
    private const double Width = 7;

    [Theory]
    [InlineData(1, OutOfPlaneState.Held, 0.02, 0)]
    [InlineData(2, OutOfPlaneState.Free, 0.6, -45)]
    [InlineData(3, OutOfPlaneState.Held, 0.6, 80)]
    [InlineData(4, OutOfPlaneState.Free, 1.2, 30)]
    public void Force_and_tangent_are_the_derivatives_of_the_energy(int seed, OutOfPlaneState state, double size, double change)
    {
        var element = new Element(seed, state);
        double[] u = Moved(element.Coordinates, seed, 1.9, size), up = new double[16], down = new double[16], force = new double[16], tangent = new double[256];
        element.Respond(u, change, force, tangent);
        const double Step = 1e-6;
        double largest = force.Max(Math.Abs), stiffest = tangent.Max(Math.Abs);
        for (int j = 0; j < 16; j++)
        {
            double kept = u[j];
            u[j] = kept + Step;
            double above = element.Respond(u, change, up, new double[256]).Stored;
            u[j] = kept - Step;
            double below = element.Respond(u, change, down, new double[256]).Stored;
            u[j] = kept;
            // Rounding of the energy over the step, and truncation of a central difference.
            Close.To(force[j], (above - below) / (2 * Step), 0, 1e-6 * largest, $"force {j}");
            for (int i = 0; i < 16; i++)
                Close.To(tangent[16 * i + j], (up[i] - down[i]) / (2 * Step), 0, 1e-7 * stiffest, $"tangent {i}, {j}");
        }
    }

    [Theory]
    [InlineData(5, 0.3)]
    [InlineData(6, 1.5707963267948966)]
    [InlineData(7, -2.9)]
    public void A_rigid_movement_strains_nothing_and_turns_force_and_tangent(int seed, double angle)
    {
        var element = new Element(seed, OutOfPlaneState.Held);
        double[] u = Moved(element.Coordinates, seed, 0.2, 0.4), turned = Turned(element.Coordinates, u, angle), rigid = Turned(element.Coordinates, new double[16], angle);
        double[] force = new double[16], tangent = new double[256], forceThere = new double[16], tangentThere = new double[256], rest = new double[16];
        element.Respond(u, 12, force, tangent);
        element.Respond(turned, 12, forceThere, tangentThere);
        element.Respond(rigid, 0, rest, new double[256]);
        (double s, double c) = Math.SinCos(angle);
        double largest = force.Max(Math.Abs), stiffest = tangent.Max(Math.Abs);
        for (int i = 0; i < 16; i++)
        {
            // Movements of some hundred mm are known to 1e-14 mm, strains to as much per mm of element.
            Close.To(0, rest[i], 0, 1e-13 * stiffest, $"rigid {i}");
            double expected = i % 2 == 0 ? c * force[i] - s * force[i + 1] : s * force[i - 1] + c * force[i];
            Close.To(expected, forceThere[i], 0, 1e-12 * stiffest, $"force {i}");
        }
        for (int a = 0; a < 16; a += 2)
        {
            for (int b = 0; b < 16; b += 2)
            {
                double xx = tangent[16 * a + b], xy = tangent[16 * a + b + 1], yx = tangent[16 * a + 16 + b], yy = tangent[16 * a + 17 + b];
                Close.To(c * c * xx - c * s * (xy + yx) + s * s * yy, tangentThere[16 * a + b], 0, 1e-12 * stiffest, $"tangent xx {a}, {b}");
                Close.To(c * s * (xx - yy) + c * c * xy - s * s * yx, tangentThere[16 * a + b + 1], 0, 1e-12 * stiffest, $"tangent xy {a}, {b}");
            }
        }
        Assert.True(largest > 1);
    }

    [Fact]
    public void At_rest_the_tangent_is_the_small_stiffness_and_heat_gives_the_small_thermal_force()
    {
        var element = new Element(8, OutOfPlaneState.Held);
        double[] tangent = new double[256], stiffness = new double[256], force = new double[16], thermal = new double[16], rate = new double[16];
        element.Respond(new double[16], 0, force, tangent, rate);
        Quadrilateral8.Stiffness(element.Coordinates, element.Material, Width, stiffness);
        Quadrilateral8.ThermalForce(element.Coordinates, element.Material, Width, thermal);
        for (int i = 0; i < 256; i++)
            Close.To(stiffness[i], tangent[i], 1e-13, 1e-13 * stiffness.Max(Math.Abs), $"tangent {i}");
        for (int i = 0; i < 16; i++)
            Close.To(thermal[i], rate[i], 1e-12, 1e-12 * thermal.Max(Math.Abs), $"heat {i}");
    }

    [Theory]
    [InlineData(9, 0.3)]
    [InlineData(10, 0.8)]
    public void Heat_changes_force_and_energy_by_the_reported_rates(int seed, double size)
    {
        var element = new Element(seed, OutOfPlaneState.Held);
        double[] u = Moved(element.Coordinates, seed, 0.7, size), up = new double[16], down = new double[16], force = new double[16], rate = new double[16];
        double above = element.Respond(u, 41, up, new double[256]).Stored, below = element.Respond(u, 39, down, new double[256]).Stored;
        PlaneEnergy energy = element.Respond(u, 40, force, new double[256], rate);
        Close.To((above - below) / 2, energy.StoredByTemperature, 1e-9, 0, "energy");
        for (int i = 0; i < 16; i++)
            Close.To((up[i] - down[i]) / 2, rate[i], 1e-9, 1e-11 * force.Max(Math.Abs), $"force {i}");
    }

    /// <summary>A bar of length 2 stretched by λ, sides free to move: nominal stress E·ln(λ)/λ, true stress E·ln λ over the plane's change of area.</summary>
    [Theory]
    [InlineData(1.7, 0)]
    [InlineData(0.6, 0)]
    [InlineData(1.3, 0.3)]
    public void A_stretched_bar_has_the_stress_of_its_logarithmic_strain(double stretch, double poisson)
    {
        const double Young = 1000;
        var material = PlaneElasticity.Isotropic(Young, poisson, 0, OutOfPlaneState.Free);
        double[] coordinates = Samples.FromCorners<Quadrilateral8>([0, 0, 2, 0, 2, 1, 0, 1]);
        double across = Math.Pow(stretch, -poisson);
        double[] u = [.. coordinates.Select((value, i) => (i % 2 == 0 ? stretch - 1 : across - 1) * value)], force = new double[16], gradients = new double[16], stresses = new double[16];
        var element = new Element(coordinates, material);
        element.Respond(u, 0, force, new double[256]);
        Close.To(Width * Young * Math.Log(stretch) / stretch, force[2] + force[4] + force[10], 1e-12, 0, "force at the end");
        Close.To(0, force[5] + force[7] + force[13], 0, 1e-9, "force at the side");
        Quadrilateral8.DisplacementGradients(coordinates, material, u, gradients);
        Span<double> strain = stackalloc double[3], moduli = stackalloc double[9];
        for (int p = 0; p < 4; p++)
        {
            (strain[0], strain[1], strain[2]) = (Math.Log(stretch), Math.Log(across), 0);
            material.Update(strain, 0, [], [], stresses.AsSpan(4 * p, 4), moduli);
        }
        TurningElement.TrueStress(gradients, stresses);
        for (int p = 0; p < 4; p++)
            Close.To(Young * Math.Log(stretch) / (stretch * across), stresses[4 * p], 1e-12, 0, "true stress");
    }

    /// <summary>The law is asked in a measure that turns along: the plastic state of a turned element is the same, its force turned, its tangent the derivative of the force.</summary>
    [Theory]
    [InlineData(11, OutOfPlaneState.Held)]
    [InlineData(12, OutOfPlaneState.Free)]
    public void A_yielding_material_turns_along(int seed, OutOfPlaneState state)
    {
        const double Angle = 2.1, Step = 1e-6;
        var constants = new OrthotropicConstants(70000, 70000, 70000, 0.33, 0.33, 0.33, 70000 / 2.66);
        var law = new J2Plasticity(constants, new YieldCurve([0, 0.1], [200, 260], [], []), 500, state, 293.15);
        double[] coordinates = Samples.Distorted<Quadrilateral8>(seed, curved: true), byX = new double[32], byY = new double[32], areas = new double[4];
        Quadrilateral8.ShapeGradients(coordinates, byX, byY, areas);
        int size = 4 * law.StateSize;
        double[] virgin = new double[size], here = new double[size], there = new double[size], force = new double[16], forceThere = new double[16], tangent = new double[256], up = new double[16], down = new double[16];
        double[] u = Moved(coordinates, seed, 0, 0.15), turned = Turned(coordinates, u, Angle);
        PlaneEnergy energy = Respond(u, here, force, new double[256]), energyThere = Respond(turned, there, forceThere, tangent);
        Assert.True(energy.Dissipated > 10, "it must yield");
        Close.To(energy.Dissipated, energyThere.Dissipated, 1e-10, 0, "dissipated");
        for (int i = 0; i < size; i++)
            Close.To(here[i], there[i], 1e-10, 1e-13, $"state {i}");
        (double sine, double cosine) = Math.SinCos(Angle);
        for (int i = 0; i < 16; i += 2)
            Close.To(cosine * force[i] - sine * force[i + 1], forceThere[i], 0, 1e-10 * force.Max(Math.Abs), $"force {i}");
        for (int j = 0; j < 16; j++)
        {
            double kept = turned[j];
            turned[j] = kept + Step;
            Respond(turned, there, up, new double[256]);
            turned[j] = kept - Step;
            Respond(turned, there, down, new double[256]);
            turned[j] = kept;
            for (int i = 0; i < 16; i++)
                Close.To((up[i] - down[i]) / (2 * Step), tangent[16 * i + j], 0, 1e-6 * tangent.Max(Math.Abs), $"tangent {i}, {j}");
        }

        PlaneEnergy Respond(double[] displacements, double[] tentative, double[] intoForce, double[] intoTangent) =>
            TurningElement.Respond(byX, byY, areas, law, Width, displacements, 0, virgin, tentative, intoForce, intoTangent, []);
    }

    private static double[] Moved(double[] coordinates, int seed, double angle, double size)
    {
        Random random = new(seed);
        return Turned(coordinates, [.. Enumerable.Range(0, 16).Select(_ => size * (random.NextDouble() - 0.5))], angle);
    }

    private static double[] Turned(double[] coordinates, double[] u, double angle)
    {
        (double s, double c) = Math.SinCos(angle);
        double[] turned = new double[16];
        for (int i = 0; i < 16; i += 2)
        {
            double x = coordinates[i] + u[i], y = coordinates[i + 1] + u[i + 1];
            turned[i] = 110 + c * x - s * y - coordinates[i];
            turned[i + 1] = -70 + s * x + c * y - coordinates[i + 1];
        }
        return turned;
    }

    private sealed class Element
    {
        private readonly double[] _byX = new double[32], _byY = new double[32], _areas = new double[4];

        public Element(int seed, OutOfPlaneState state)
            : this(Samples.Distorted<Quadrilateral8>(seed, curved: true), Samples.Laminate(state))
        {
        }

        public Element(double[] coordinates, PlaneElasticity material)
        {
            (Coordinates, Material) = (coordinates, material);
            Quadrilateral8.ShapeGradients(coordinates, _byX, _byY, _areas);
        }

        public double[] Coordinates { get; }

        public PlaneElasticity Material { get; }

        public PlaneEnergy Respond(double[] u, double change, double[] force, double[] tangent, double[]? rate = null) =>
            TurningElement.Respond(_byX, _byY, _areas, Material, Width, u, change, [], [], force, tangent, rate ?? []);
    }
}
