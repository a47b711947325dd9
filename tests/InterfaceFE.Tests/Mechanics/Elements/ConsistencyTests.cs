using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Elements;

public sealed class ConsistencyTestsOfEightNodes : ConsistencyTests<Quadrilateral8>;

public sealed class ConsistencyTestsOfFourNodes : ConsistencyTests<Quadrilateral4>;

/// <summary>
/// Stiffness, forces, stresses and energy of one distorted element of a turned laminate, each from the others; and what must not happen under rigid motion.
/// </summary>
public abstract class ConsistencyTests<TElement>
    where TElement : struct, IPlaneElement
{
    private const double Width = 7;

    [Theory]
    [InlineData(1, OutOfPlaneState.Held)]
    [InlineData(2, OutOfPlaneState.Free)]
    [InlineData(3, OutOfPlaneState.Held)]
    public void Internal_force_is_stiffness_times_displacements_plus_thermal_force(int seed, OutOfPlaneState state)
    {
        int n = TElement.Unknowns;
        double[] coordinates = Samples.Distorted<TElement>(seed, curved: true), u = Samples.Displacements<TElement>(seed);
        PlaneElasticity material = Samples.Laminate(state);
        double[] k = new double[n * n], thermal = new double[n], force = new double[n];
        TElement.Stiffness(coordinates, material, Width, k);
        TElement.ThermalForce(coordinates, material, Width, thermal);
        TElement.InternalForce(coordinates, material, Width, u, -45, force);
        double size = force.Max(Math.Abs);
        for (int i = 0; i < n; i++)
        {
            double expected = -45 * thermal[i];
            for (int j = 0; j < n; j++)
            {
                expected += k[i * n + j] * u[j];
                Assert.Equal(k[i * n + j], k[j * n + i]);
            }
            Close.To(expected, force[i], 0, 1e-12 * size, $"force {i}");
        }
    }

    [Theory]
    [InlineData(4, OutOfPlaneState.Held)]
    [InlineData(5, OutOfPlaneState.Free)]
    public void Thermal_force_is_the_derivative_of_the_internal_force_by_temperature(int seed, OutOfPlaneState state)
    {
        int n = TElement.Unknowns;
        double[] coordinates = Samples.Distorted<TElement>(seed, curved: true), u = Samples.Displacements<TElement>(seed);
        PlaneElasticity material = Samples.Laminate(state);
        double[] up = new double[n], down = new double[n], thermal = new double[n];
        TElement.InternalForce(coordinates, material, Width, u, 31, up);
        TElement.InternalForce(coordinates, material, Width, u, 29, down);
        TElement.ThermalForce(coordinates, material, Width, thermal);
        double size = up.Max(Math.Abs);
        for (int i = 0; i < n; i++)
            Close.To((up[i] - down[i]) / 2, thermal[i], 0, 1e-12 * size);
    }

    [Theory]
    [InlineData(6, OutOfPlaneState.Held, 0)]
    [InlineData(7, OutOfPlaneState.Held, 80)]
    [InlineData(8, OutOfPlaneState.Free, -80)]
    public void Internal_force_is_the_derivative_of_the_energy(int seed, OutOfPlaneState state, double change)
    {
        double[] coordinates = Samples.Distorted<TElement>(seed, curved: true), u = Samples.Displacements<TElement>(seed), force = new double[TElement.Unknowns];
        PlaneElasticity material = Samples.Laminate(state);
        TElement.InternalForce(coordinates, material, Width, u, change, force);
        double size = force.Max(Math.Abs);
        for (int i = 0; i < u.Length; i++)
        {
            double kept = u[i], energy = 0;
            foreach (int sign in (ReadOnlySpan<int>)[1, -1])
            {
                u[i] = kept + sign * 1e-3;
                energy += sign * TElement.StrainEnergy(coordinates, material, Width, u, change);
            }
            u[i] = kept;
            // Quadratic: the central difference has round-off alone.
            Close.To(force[i], energy / 2e-3, 0, 1e-9 * size, $"unknown {i}");
        }
    }

    [Fact]
    public void Energy_is_half_of_displacements_times_force_without_temperature_and_that_of_szz_when_free_to_expand()
    {
        double[] coordinates = Samples.Distorted<TElement>(9, curved: true), u = Samples.Displacements<TElement>(9), force = new double[TElement.Unknowns];
        PlaneElasticity material = Samples.Laminate(OutOfPlaneState.Held);
        TElement.InternalForce(coordinates, material, Width, u, 0, force);
        Close.To(0.5 * u.Zip(force, (a, b) => a * b).Sum(), TElement.StrainEnergy(coordinates, material, Width, u, 0), 1e-12);

        // Held out of plane but free in it: a bar of modulus E_z held at its ends, ½·E_z·(alpha_z·dT)² per volume. E_z and alpha_z of the sample.
        for (int i = 0; i < TElement.Nodes; i++)
        {
            double x = coordinates[2 * i], y = coordinates[2 * i + 1];
            u[2 * i] = 60 * (material.Expansion[0] * x + 0.5 * material.Expansion[2] * y);
            u[2 * i + 1] = 60 * (material.Expansion[1] * y + 0.5 * material.Expansion[2] * x);
        }
        double expected = 0.5 * 17000 * Math.Pow(11e-6 * 60, 2) * TElement.Shape(coordinates).Area * Width;
        Close.To(expected, TElement.StrainEnergy(coordinates, material, Width, u, 60), 1e-10);
    }

    [Fact]
    public void Stresses_are_those_of_the_displacement_gradients()
    {
        double[] coordinates = Samples.Distorted<TElement>(10, curved: true), u = Samples.Displacements<TElement>(10);
        double[] gradients = new double[16], stresses = new double[16];
        PlaneElasticity material = Samples.Laminate(OutOfPlaneState.Held);
        TElement.DisplacementGradients(coordinates, material, u, gradients);
        TElement.Stresses(coordinates, material, u, 25, stresses);
        double[] expected = new double[4];
        for (int point = 0; point < 4; point++)
        {
            material.Stress([gradients[4 * point], gradients[4 * point + 3], gradients[4 * point + 1] + gradients[4 * point + 2]], 25, expected);
            for (int i = 0; i < 4; i++)
                Close.To(expected[i], stresses[4 * point + i], 1e-13, 1e-12);
        }
    }

    [Fact]
    public void Displacement_gradients_are_exact_for_a_linear_field()
    {
        double[] coordinates = Samples.Distorted<TElement>(11, curved: true), u = new double[TElement.Unknowns], gradients = new double[16];
        for (int i = 0; i < TElement.Nodes; i++)
        {
            double x = coordinates[2 * i], y = coordinates[2 * i + 1];
            u[2 * i] = 0.5 + 0.01 * x - 0.03 * y;
            u[2 * i + 1] = 0.2 + 0.07 * x + 0.02 * y;
        }
        TElement.DisplacementGradients(coordinates, Samples.Laminate(OutOfPlaneState.Free), u, gradients);
        for (int point = 0; point < 4; point++)
        {
            Close.To(0.01, gradients[4 * point], 1e-12);
            Close.To(-0.03, gradients[4 * point + 1], 1e-12);
            Close.To(0.07, gradients[4 * point + 2], 1e-12);
            Close.To(0.02, gradients[4 * point + 3], 1e-12);
        }
    }

    [Fact]
    public void Infinitesimal_rigid_motion_gives_no_force()
    {
        int n = TElement.Unknowns;
        double[] coordinates = Samples.Distorted<TElement>(12, curved: true), u = new double[n], force = new double[n], k = new double[n * n];
        PlaneElasticity material = Samples.Laminate(OutOfPlaneState.Held);
        TElement.Stiffness(coordinates, material, Width, k);
        for (int i = 0; i < TElement.Nodes; i++)
        {
            u[2 * i] = 0.3 - 0.1 * coordinates[2 * i + 1];
            u[2 * i + 1] = -0.2 + 0.1 * coordinates[2 * i];
        }
        TElement.InternalForce(coordinates, material, Width, u, 0, force);
        // Round-off of sums whose terms are stiffness times displacement.
        double terms = k.Max(Math.Abs) * u.Max(Math.Abs);
        foreach (double f in force)
            Close.To(0, f, 0, 1e-14 * terms);
    }

    [Fact]
    public void Turning_element_material_and_displacements_together_turns_the_force()
    {
        const double angle = 0.9;
        double[] coordinates = Samples.Distorted<TElement>(13, curved: true), u = Samples.Displacements<TElement>(13);
        double[] before = new double[TElement.Unknowns], after = new double[TElement.Unknowns];
        PlaneElasticity material = Samples.Laminate(OutOfPlaneState.Held);
        TElement.InternalForce(coordinates, material, Width, u, 20, before);
        TElement.InternalForce(Turned(coordinates), material.Rotated(angle), Width, Turned(u), 20, after);
        double[] expected = Turned(before);
        for (int i = 0; i < after.Length; i++)
            Close.To(expected[i], after[i], 0, 1e-12 * before.Max(Math.Abs));

        static double[] Turned(double[] vectors)
        {
            double[] turned = new double[vectors.Length];
            (double s, double c) = Math.SinCos(angle);
            for (int i = 0; i < vectors.Length; i += 2)
                (turned[i], turned[i + 1]) = (c * vectors[i] - s * vectors[i + 1], s * vectors[i] + c * vectors[i + 1]);
            return turned;
        }
    }

    [Fact]
    public void Kernels_allocate_nothing()
    {
        int n = TElement.Unknowns;
        double[] coordinates = Samples.Distorted<TElement>(14, curved: true), u = Samples.Displacements<TElement>(14);
        double[] k = new double[n * n], force = new double[n], sixteen = new double[16], nodal = new double[4 * TElement.Nodes], eight = new double[8];
        PlaneElasticity material = Samples.Laminate(OutOfPlaneState.Held);
        double sum = 0;
        Run();
        long before = GC.GetAllocatedBytesForCurrentThread();
        Run();
        Assert.Equal(0, GC.GetAllocatedBytesForCurrentThread() - before);
        Assert.True(double.IsFinite(sum));

        void Run()
        {
            TElement.Stiffness(coordinates, material, Width, k);
            TElement.ThermalForce(coordinates, material, Width, force);
            TElement.InternalForce(coordinates, material, Width, u, 10, force);
            TElement.Stresses(coordinates, material, u, 10, sixteen);
            TElement.ExtrapolateToNodes(4, sixteen, nodal);
            TElement.DisplacementGradients(coordinates, material, u, sixteen);
            TElement.GaussPositions(coordinates, eight);
            sum += TElement.StrainEnergy(coordinates, material, Width, u, 10) + TElement.Shape(coordinates).Area;
        }
    }
}
