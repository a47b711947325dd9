using System.Globalization;
using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Elements;

/// <summary>
/// Thick cylinder, radii 3 and 9, unit pressure inside, E = 1000, held out of plane, towards incompressibility (case of MacNeal and Harder, Finite Elem.
/// Anal. Des. 1 (1985) 3-20); reference computed from the closed form of Lamé, u(a) = (1+nu)·p·a²·[(1-2nu)·a + b²/a]/(E·(b² - a²)).
/// </summary>
public sealed class CylinderTests(ITestOutputHelper output)
{
    [Theory]
    [InlineData(0.3, 4.58250e-3)]
    [InlineData(0.49, 5.03993e-3)]
    [InlineData(0.499, 5.06025e-3)]
    [InlineData(0.4999, 5.06227e-3)]
    public void Inner_radius_grows_as_the_closed_form_for_both_elements(double poisson, double expected)
    {
        double closed = (1 + poisson) * 9 * ((1 - 2 * poisson) * 3 + 27) / (1000 * 72);
        Close.To(expected, closed, 2e-6, 0, "closed form");
        Close.To(closed, InnerMovement<Quadrilateral8>(8, 6, poisson), 0.005, 0, "eight nodes");
        Close.To(closed, InnerMovement<Quadrilateral4>(24, 20, poisson), 0.005, 0, "four nodes");
    }

    [Fact]
    public void Stresses_match_the_closed_form_near_incompressibility()
    {
        // Source: Lamé; radial and hoop stress A ∓ B/r², A = p·a²/(b² - a²), B = A·b²; axial 2·nu·A. At Gauss points, eight nodes, 1 % of the pressure.
        const double nu = 0.4999, constant = 9.0 / 72, varying = constant * 81;
        PlaneMesh mesh = BenchmarkMeshes.QuarterRing(8, 12, 12, 3, 9);
        PlaneModel<Quadrilateral8> model = Solve<Quadrilateral8>(mesh, nu);
        double[] positions = new double[8];
        for (int e = 0; e < mesh.ElementCount; e++)
        {
            double[] stresses = model.StressesOf(e);
            Quadrilateral8.GaussPositions(mesh.CoordinatesOf(e), positions);
            for (int point = 0; point < 4; point++)
            {
                double x = positions[2 * point], y = positions[2 * point + 1], r2 = x * x + y * y;
                double radial = constant - varying / r2, hoop = constant + varying / r2;
                Close.To((radial * x * x + hoop * y * y) / r2, stresses[4 * point], 0, 0.01, "xx");
                Close.To((radial * y * y + hoop * x * x) / r2, stresses[4 * point + 1], 0, 0.01, "yy");
                Close.To(2 * nu * constant, stresses[4 * point + 2], 0, 0.01, "zz");
                Close.To((radial - hoop) * x * y / r2, stresses[4 * point + 3], 0, 0.01, "xy");
            }
        }
    }

    [Fact]
    public void Eight_nodes_converge_at_least_with_the_second_order()
    {
        const double nu = 0.3;
        double closed = (1 + nu) * 9 * ((1 - 2 * nu) * 3 + 27) / (1000 * 72);
        double coarse = Math.Abs(InnerMovement<Quadrilateral8>(3, 3, nu) / closed - 1), fine = Math.Abs(InnerMovement<Quadrilateral8>(6, 6, nu) / closed - 1);
        Assert.True(fine < coarse / 4, string.Create(CultureInfo.InvariantCulture, $"error {coarse:E2} on the coarse mesh, {fine:E2} on the fine one"));
    }

    private double InnerMovement<TElement>(int around, int through, double poisson)
        where TElement : struct, IPlaneElement
    {
        PlaneMesh ring = BenchmarkMeshes.QuarterRing(TElement.Nodes, around, through, 3, 9);
        double movement = Solve<TElement>(ring, poisson).Displacements[2 * ring.Right[0]];
        double closed = (1 + poisson) * 9 * ((1 - 2 * poisson) * 3 + 27) / (1000 * 72);
        string mesh = string.Create(CultureInfo.InvariantCulture, $"{TElement.Nodes} nodes, {around} × {through}, nu {poisson}");
        output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{mesh}: {movement:E5}, {movement / closed:F5} of the closed form"));
        return movement;
    }

    private static PlaneModel<TElement> Solve<TElement>(PlaneMesh mesh, double poisson)
        where TElement : struct, IPlaneElement
    {
        PlaneModel<TElement> model = new(mesh, PlaneElasticity.Isotropic(1000, poisson, 0, OutOfPlaneState.Held));
        model.Hold(mesh.Left, 0);
        model.Hold(mesh.Right, 1);
        model.LoadEdge(mesh.Bottom, (nx, ny) => (-nx, -ny));
        model.Solve();
        return model;
    }
}
