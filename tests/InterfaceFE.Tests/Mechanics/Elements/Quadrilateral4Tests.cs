using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Elements;

public sealed class Quadrilateral4Tests
{
    [Fact]
    public void Pure_bending_of_a_rectangle_is_exact_and_its_inner_parameters_are_those_of_the_parabola()
    {
        // Source: pure bending of plane stress, u = k·x·y, v = -k·x²/2 - nu·k·y²/2; corner values only are prescribed. On a rectangle 2a × 2b the parabola that the
        // four nodes miss is v: (k·a²/2)·(1 - xi²) + (nu·k·b²/2)·(1 - eta²).
        const double a = 3, b = 0.5, k = 1e-3, nu = 0.3, e = 1000;
        double[] coordinates = [-a, -b, a, -b, a, b, -a, b], u = new double[8], inner = new double[4], stresses = new double[16], positions = new double[8];
        PlaneElasticity material = PlaneElasticity.Isotropic(e, nu, 0, OutOfPlaneState.Free);
        for (int i = 0; i < 4; i++)
        {
            double x = coordinates[2 * i], y = coordinates[2 * i + 1];
            u[2 * i] = k * x * y;
            u[2 * i + 1] = -k * x * x / 2 - nu * k * y * y / 2;
        }
        Quadrilateral4.InnerParameters(coordinates, material, u, inner);
        Close.To(0, inner[0], 0, 1e-15);
        Close.To(k * a * a / 2, inner[1], 1e-12);
        Close.To(0, inner[2], 0, 1e-15);
        Close.To(nu * k * b * b / 2, inner[3], 1e-12);
        Quadrilateral4.Stresses(coordinates, material, u, 0, stresses);
        Quadrilateral4.GaussPositions(coordinates, positions);
        for (int point = 0; point < 4; point++)
        {
            Close.To(e * k * positions[2 * point + 1], stresses[4 * point], 1e-11);
            Close.To(0, stresses[4 * point + 1], 0, 1e-12);
            Close.To(0, stresses[4 * point + 3], 0, 1e-12);
        }
        Close.To(0.5 * e * k * k * (2 * b * b * b / 3) * 2 * a, Quadrilateral4.StrainEnergy(coordinates, material, 1, u, 0), 1e-12);
    }

    [Fact]
    public void Condensed_stiffness_holds_the_energy_of_the_recovered_modes()
    {
        // The condensed stiffness and the recovered modes are two ways to the same energy; without the modes the element stores more.
        double[] coordinates = Samples.Distorted<Quadrilateral4>(21, curved: false), u = Samples.Displacements<Quadrilateral4>(21), k = new double[64];
        PlaneElasticity material = Samples.Laminate(OutOfPlaneState.Held);
        Quadrilateral4.Stiffness(coordinates, material, 2, k);
        double condensed = 0;
        for (int i = 0; i < 8; i++)
            for (int j = 0; j < 8; j++)
                condensed += 0.5 * u[i] * k[8 * i + j] * u[j];
        Close.To(condensed, Quadrilateral4.StrainEnergy(coordinates, material, 2, u, 0), 1e-12);
        double[] byX = new double[16], byY = new double[16], areas = new double[4];
        Quadrilateral4.ShapeGradients(coordinates, byX, byY, areas);
        double plain = 0;
        for (int point = 0; point < 4; point++)
        {
            double xx = 0, yy = 0, xy = 0;
            for (int i = 0; i < 4; i++)
            {
                xx += byX[4 * point + i] * u[2 * i];
                yy += byY[4 * point + i] * u[2 * i + 1];
                xy += byY[4 * point + i] * u[2 * i] + byX[4 * point + i] * u[2 * i + 1];
            }
            plain += material.EnergyDensity([xx, yy, xy], 0) * areas[point] * 2;
        }
        Assert.True(condensed < 0.999 * plain, $"modes must soften: {condensed} against {plain}");
    }
}
