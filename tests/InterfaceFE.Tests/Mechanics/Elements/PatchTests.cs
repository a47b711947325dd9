using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;
using MathNet.Numerics.LinearAlgebra;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Elements;

public sealed class PatchTestsOfEightNodes : PatchTests<Quadrilateral8>
{
    [Fact]
    public void One_element_alone_has_one_movement_without_strain_beside_the_rigid_ones() =>
        // The known price of 2×2 points (rank 4·3 = 12 of 16); two joined elements show that it cannot pass on.
        Assert.Equal(4, ZeroEigenvalues(PlaneMesh.Grid(8, 1, 1, (i, j) => (i, j))));
}

public sealed class PatchTestsOfFourNodes : PatchTests<Quadrilateral4>
{
    [Fact]
    public void One_element_alone_has_only_rigid_movements_without_strain() =>
        Assert.Equal(3, ZeroEigenvalues(PlaneMesh.Grid(4, 1, 1, (i, j) => (i, j))));
}

/// <summary>Uniform strain on a distorted mesh, movements without strain, free expansion.</summary>
public abstract class PatchTests<TElement>
    where TElement : struct, IPlaneElement
{
    [Theory]
    [InlineData(OutOfPlaneState.Held, 1600, 800, 0)]
    [InlineData(OutOfPlaneState.Free, 4000.0 / 3, 0, 0)]
    [InlineData(OutOfPlaneState.Held, 1600, 800, 0.77)]
    public void Distorted_patch_reproduces_uniform_stress(OutOfPlaneState state, double normal, double outOfPlane, double turn)
    {
        // Source: MacNeal and Harder, Finite Elem. Anal. Des. 1 (1985) 3-20; plane strain values computed from the same strain. Also as drawn at another angle.
        PlaneMesh mesh = BenchmarkMeshes.DistortedPatch(TElement.Nodes);
        (double s, double c) = Math.SinCos(turn);
        PlaneMesh turned = Moved(mesh, (x, y) => (c * x - s * y, s * x + c * y));
        PlaneModel<TElement> model = new(turned, PlaneElasticity.Isotropic(1e6, 0.25, 0, state), width: 0.001);
        for (int node = 0; node < mesh.X.Length; node++)
            if (mesh.X[node] is 0 or 0.24 || mesh.Y[node] is 0 or 0.12)
            {
                (double x, double y) = (mesh.X[node], mesh.Y[node]);
                (double u, double v) = (1e-3 * (x + y / 2), 1e-3 * (y + x / 2));
                model.Hold([node], 0, c * u - s * v);
                model.Hold([node], 1, s * u + c * v);
            }
        model.Solve();
        for (int e = 0; e < mesh.ElementCount; e++)
        {
            double[] stresses = model.StressesOf(e);
            for (int point = 0; point < 4; point++)
            {
                // Equal normal stresses and shear 400, turned: the mean stays, the shear part turns by twice the angle.
                (double s2, double c2) = Math.SinCos(2 * turn);
                Close.To(normal - 400 * s2, stresses[4 * point], 1e-10, 0, "xx");
                Close.To(normal + 400 * s2, stresses[4 * point + 1], 1e-10, 0, "yy");
                Close.To(outOfPlane, stresses[4 * point + 2], 1e-10, 1e-12, "zz");
                Close.To(400 * c2, stresses[4 * point + 3], 1e-10, 0, "xy");
            }
        }
    }

    [Fact]
    public void Distorted_patch_under_uniform_edge_traction_deforms_uniformly()
    {
        // Source: uniaxial plane stress, strain = stress/E; edge forces from the traction instead of held displacements.
        PlaneMesh grid = PlaneMesh.Grid(TElement.Nodes, 2, 2, (i, j) => (i == 1 && j == 1 ? 1.3 : i, i == 1 && j == 1 ? 0.8 : j), straightSides: true);
        PlaneModel<TElement> model = new(grid, PlaneElasticity.Isotropic(1000, 0.3, 0, OutOfPlaneState.Free), width: 3);
        model.Hold(grid.Left, 0);
        model.Hold([grid.Left[0]], 1);
        model.LoadEdge(grid.Right, (_, _) => (5, 0));
        model.Solve();
        for (int node = 0; node < grid.X.Length; node++)
        {
            Close.To(5e-3 * grid.X[node], model.Displacements[2 * node], 1e-11, 1e-14);
            Close.To(-0.3 * 5e-3 * grid.Y[node], model.Displacements[2 * node + 1], 1e-11, 1e-14);
        }
    }

    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public void Two_joined_elements_have_exactly_three_movements_without_strain(bool distorted) =>
        Assert.Equal(3, ZeroEigenvalues(PlaneMesh.Grid(
            TElement.Nodes, 2, 1, (i, j) => distorted ? (i + (i == 1 ? 0.3 * (j - 0.4) : 0), j + 0.2 * i * j) : (i, j), straightSides: true)));

    [Theory]
    [InlineData(OutOfPlaneState.Held)]
    [InlineData(OutOfPlaneState.Free)]
    public void Free_thermal_expansion_gives_no_stress_in_the_plane(OutOfPlaneState state)
    {
        // Source: definition of the free strain; turned laminate, so that the sheared expansion counts too.
        PlaneMesh mesh = BenchmarkMeshes.DistortedPatch(TElement.Nodes);
        PlaneElasticity material = Samples.Laminate(state);
        PlaneModel<TElement> model = new(mesh, material) { TemperatureChange = -60 };
        model.Hold([0], 0);
        model.Hold([0, 1], 1);
        model.Solve();
        // Scale: stress of the same cooling when blocked.
        double[] blocked = new double[4];
        material.Stress([0, 0, 0], -60, blocked);
        double scale = blocked.Max(Math.Abs);
        for (int e = 0; e < mesh.ElementCount; e++)
        {
            double[] stresses = model.StressesOf(e);
            for (int point = 0; point < 4; point++)
            {
                Close.To(0, stresses[4 * point], 0, 1e-11 * scale);
                Close.To(0, stresses[4 * point + 1], 0, 1e-11 * scale);
                Close.To(state == OutOfPlaneState.Held ? 17000 * 11e-6 * 60 : 0, stresses[4 * point + 2], 0, 1e-11 * scale);
                Close.To(0, stresses[4 * point + 3], 0, 1e-11 * scale);
            }
        }
        Close.To(-60 * material.Expansion[0] * 0.24, model.Displacements[2], 1e-10);
        double[] force = model.InternalForce();
        Close.To(0, force.Max(Math.Abs), 0, 1e-11 * scale * 0.24);
    }

    /// <summary>Number of eigenvalues that are zero to round-off.</summary>
    private protected static int ZeroEigenvalues(PlaneMesh mesh)
    {
        Matrix<double> stiffness = new PlaneModel<TElement>(mesh, PlaneElasticity.Isotropic(1000, 0.3, 0, OutOfPlaneState.Held)).DenseStiffness();
        double[] values = [.. stiffness.Evd(Symmetricity.Symmetric).EigenValues.Select(v => Math.Abs(v.Real))];
        double largest = values.Max();
        int zeros = values.Count(v => v < 1e-12 * largest);
        // A clear gap, or the count means nothing.
        Assert.Equal(zeros, values.Count(v => v < 1e-5 * largest));
        return zeros;
    }

    private static PlaneMesh Moved(PlaneMesh mesh, Func<double, double, (double X, double Y)> map)
    {
        (double X, double Y)[] moved = [.. mesh.X.Zip(mesh.Y, map)];
        return new PlaneMesh { X = [.. moved.Select(p => p.X)], Y = [.. moved.Select(p => p.Y)], NodesPerElement = mesh.NodesPerElement, Connectivity = mesh.Connectivity };
    }
}
