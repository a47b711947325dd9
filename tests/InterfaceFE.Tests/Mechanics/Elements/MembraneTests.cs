using System.Globalization;
using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Elements;

/// <summary>Two published membranes: the tapered panel of Cook (1974) and the elliptic membrane LE1 of the NAFEMS standard benchmarks.</summary>
public sealed class MembraneTests(ITestOutputHelper output)
{
    [Theory]
    [InlineData(OutOfPlaneState.Free, 23.967)]
    [InlineData(OutOfPlaneState.Held, 21.524)]
    public void Tapered_panel_sinks_as_the_reference(OutOfPlaneState state, double reference)
    {
        // Source: Cook 1974, E = 1, nu = 1/3, unit shear spread evenly over the right edge; v at its middle (48, 52). Reference computed on a graded 64 × 64 mesh, ± 0.002.
        Close.To(reference, Panel<Quadrilateral8>(8, state), 0.01, 0, "eight nodes");
        Close.To(reference, Panel<Quadrilateral4>(20, state), 0.01, 0, "four nodes");
        // The corner of 108° limits the order on even meshes; graded towards it as the reference is, the element comes to 0.1 %.
        Close.To(reference, Panel<Quadrilateral8>(16, state, graded: true), 0.001, 0, "eight nodes, graded");
    }

    [Fact]
    public void Elliptic_membrane_carries_the_published_stress()
    {
        // Source: NAFEMS LE1, E = 210000 MPa, nu = 0.3, 10 MPa outward on the outer edge; stress yy at (2, 0) 92.7 MPa published, 92.658 converged (computed).
        Close.To(92.658, Ellipse<Quadrilateral8>(24, 16, OutOfPlaneState.Free).StressYy, 0.01, 0, "eight nodes");
        Close.To(92.658, Ellipse<Quadrilateral4>(40, 24, OutOfPlaneState.Free).StressYy, 0.01, 0, "four nodes");
    }

    [Theory]
    [InlineData(OutOfPlaneState.Free, -0.1022e-3)]
    [InlineData(OutOfPlaneState.Held, -0.0930e-3)]
    public void Elliptic_membrane_moves_inwards_at_the_same_point(OutOfPlaneState state, double movement)
    {
        // Source: as above, computed; lengths in m here, three to four digits given. The stress is the same in both states (no body force, one edge loaded).
        (double stress, double u) = Ellipse<Quadrilateral8>(48, 32, state);
        Close.To(movement, u, 1e-3);
        Close.To(92.658, stress, 0.001);
    }

    private double Panel<TElement>(int divisions, OutOfPlaneState state, bool graded = false)
        where TElement : struct, IPlaneElement
    {
        PlaneMesh mesh = BenchmarkMeshes.TaperedPanel(TElement.Nodes, divisions, graded);
        PlaneModel<TElement> model = new(mesh, PlaneElasticity.Isotropic(1, 1.0 / 3, 0, state));
        model.Hold(mesh.Left, 0);
        model.Hold(mesh.Left, 1);
        model.LoadEdge(mesh.Right, (_, _) => (0, 1.0 / 16));
        model.Solve();
        // The quoted point (48, 52) is the middle of the right edge: corners lie at 44 and 60.
        int middle = mesh.Right[mesh.Right.Length / 2];
        Close.To(52, mesh.Y[middle], 1e-12);
        double v = model.Displacements[2 * middle + 1];
        output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{TElement.Nodes} nodes, {divisions} × {divisions}{(graded ? " graded" : "")}, {state}: {v:F4}"));
        return v;
    }

    private (double StressYy, double U) Ellipse<TElement>(int around, int through, OutOfPlaneState state)
        where TElement : struct, IPlaneElement
    {
        PlaneMesh mesh = BenchmarkMeshes.EllipticMembrane(TElement.Nodes, around, through);
        PlaneModel<TElement> model = new(mesh, PlaneElasticity.Isotropic(210000, 0.3, 0, state), width: 0.1);
        model.Hold(mesh.Left, 0);
        model.Hold(mesh.Right, 1);
        model.LoadEdge([.. mesh.Top.Reverse()], (nx, ny) => (10 * nx, 10 * ny));
        model.Solve();
        int node = mesh.Right[0];
        Close.To(2, mesh.X[node], 1e-12);
        double stress = model.StressAtNode(node)[1], u = model.Displacements[2 * node];
        output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{TElement.Nodes} nodes, {around} × {through}, {state}: stress yy {stress:F3} MPa, u {u * 1000:F5} mm"));
        return (stress, u);
    }
}
