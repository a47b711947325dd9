using System.Globalization;
using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Elements;

/// <summary>
/// Quarter ring of radii 4.12 and 4.32, thickness 0.1, E = 1e7, nu = 0.25, clamped at one end, unit load across the other (MacNeal and Harder, Finite Elem.
/// Anal. Des. 1 (1985) 3-20): movement along the load 0.08734.
/// </summary>
public sealed class CurvedBeamTests(ITestOutputHelper output)
{
    // The published value is that of beam theory; a two-dimensional solution with a clamped end and this depth lies within 2 % of it.
    private const double Published = 0.08734;

    [Theory]
    [InlineData(6, 1)]
    [InlineData(24, 2)]
    public void Eight_nodes_match_the_published_value(int around, int through) => Close.To(Published, Tip<Quadrilateral8>(around, through), 0.02);

    [Theory]
    [InlineData(48, 2)]
    public void Four_nodes_match_the_published_value_when_refined(int around, int through) => Close.To(Published, Tip<Quadrilateral4>(around, through), 0.02);

    [Fact]
    public void Both_elements_converge_to_the_closed_form_of_plane_elasticity()
    {
        // Source: Timoshenko and Goodier, Theory of Elasticity, curved bar under a radial end force (from memory): movement of the loaded end
        // pi·(a² + b²)·P/(E·t·[(a² + b²)·ln(b/a) - (b² - a²)]), with the clamped end held on the mean. Clamping it fully changes it by less than 0.2 % at this depth.
        const double a = 4.12, b = 4.32;
        double closed = Math.PI * (a * a + b * b) / (1e7 * 0.1 * ((a * a + b * b) * Math.Log(b / a) - (b * b - a * a)));
        output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"closed form {closed:F6}"));
        Close.To(closed, Tip<Quadrilateral8>(48, 2), 0.003);
        Close.To(closed, Tip<Quadrilateral4>(120, 4), 0.003);
    }

    private double Tip<TElement>(int around, int through)
        where TElement : struct, IPlaneElement
    {
        PlaneMesh mesh = BenchmarkMeshes.QuarterRing(TElement.Nodes, around, through, 4.12, 4.32);
        PlaneModel<TElement> model = new(mesh, PlaneElasticity.Isotropic(1e7, 0.25, 0, OutOfPlaneState.Free), width: 0.1);
        model.Hold(mesh.Right, 0);
        model.Hold(mesh.Right, 1);
        // The free end lies on the y axis; its shear is radial there.
        model.LoadEdge(mesh.Left, (_, _) => (0, 1 / (0.2 * 0.1)));
        model.Solve();
        double tip = (model.Displacements[2 * mesh.Left[0] + 1] + model.Displacements[2 * mesh.Left[^1] + 1]) / 2;
        output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{TElement.Nodes} nodes, {around} × {through}: {tip:F6}, {tip / Published:F4} of the published value"));
        return tip;
    }
}
