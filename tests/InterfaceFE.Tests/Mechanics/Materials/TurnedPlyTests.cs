using InterfaceFE.Mechanics.Materials;
using MathNet.Numerics.LinearAlgebra;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Materials;

public sealed class TurnedPlyTests
{
    // Invented: all constants different.
    private static readonly OrthotropicConstants Ply = new(140000, 9000, 11000, 0.31, 0.27, 0.41, 5200, -0.5e-6, 31e-6, 26e-6);
    private const double ShearXz = 4700, ShearZy = 3300;

    [Theory]
    [InlineData(OutOfPlaneState.Held)]
    [InlineData(OutOfPlaneState.Free)]
    public void Not_turned_it_is_the_orthotropic_material(OutOfPlaneState state) => Same(PlaneElasticity.Orthotropic(Ply, state), TurnedPly.Of(Ply, ShearXz, ShearZy, 0, state));

    [Theory]
    [InlineData(OutOfPlaneState.Held)]
    [InlineData(OutOfPlaneState.Free)]
    public void Turned_by_a_right_angle_x_and_z_change_places(OutOfPlaneState state)
    {
        OrthotropicConstants swapped = new(Ply.YoungZ, Ply.YoungY, Ply.YoungX, Ply.PoissonZy, Ply.PoissonXz * Ply.YoungZ / Ply.YoungX, Ply.PoissonXy, ShearZy, Ply.ExpansionZ, Ply.ExpansionY, Ply.ExpansionX);
        Same(PlaneElasticity.Orthotropic(swapped, state), TurnedPly.Of(Ply, ShearXz, ShearZy, Math.PI / 2, state));
    }

    [Fact]
    public void Held_it_answers_as_the_turned_three_dimensional_law()
    {
        const double angle = 0.6, change = -70, across = 4e-4;
        double[] strain = [8e-4, -3e-4, 6e-4];
        // Strains of the model as a tensor (x, y, z), turned about y into the material's axes, the law applied there, and the stress turned back.
        Matrix<double> r = Matrix<double>.Build.DenseOfArray(new[,] { { Math.Cos(angle), 0, Math.Sin(angle) }, { 0, 1, 0 }, { -Math.Sin(angle), 0, Math.Cos(angle) } });
        Matrix<double> e = Matrix<double>.Build.DenseOfArray(new[,] { { strain[0], strain[2] / 2, 0 }, { strain[2] / 2, strain[1], 0 }, { 0, 0, across } });
        Matrix<double> own = r * e * r.Transpose();
        Matrix<double> compliance = Matrix<double>.Build.DenseOfArray(new[,]
        {
            { 1 / Ply.YoungX, -Ply.PoissonXy / Ply.YoungX, -Ply.PoissonXz / Ply.YoungX },
            { -Ply.PoissonXy / Ply.YoungX, 1 / Ply.YoungY, -Ply.PoissonZy / Ply.YoungZ },
            { -Ply.PoissonXz / Ply.YoungX, -Ply.PoissonZy / Ply.YoungZ, 1 / Ply.YoungZ },
        });
        Vector<double> elastic = Vector<double>.Build.DenseOfArray([own[0, 0] - Ply.ExpansionX * change, own[1, 1] - Ply.ExpansionY * change, own[2, 2] - Ply.ExpansionZ * change]);
        Vector<double> normal = compliance.Solve(elastic);
        double xy = 2 * Ply.ShearXy * own[0, 1], xz = 2 * ShearXz * own[0, 2], zy = 2 * ShearZy * own[1, 2];
        Matrix<double> stress = r.Transpose() * Matrix<double>.Build.DenseOfArray(new[,] { { normal[0], xy, xz }, { xy, normal[1], zy }, { xz, zy, normal[2] } }) * r;
        double energy = 0.5 * (normal * elastic) + xy * own[0, 1] + xz * own[0, 2] + zy * own[1, 2];

        PlaneElasticity ply = TurnedPly.Of(Ply, ShearXz, ShearZy, angle, OutOfPlaneState.Held);
        double[] got = new double[4];
        ply.Stress(strain, change, got, across);
        double[] expected = [stress[0, 0], stress[1, 1], stress[2, 2], stress[0, 1]];
        for (int i = 0; i < 4; i++)
            Close.To(expected[i], got[i], 1e-12, 0, $"stress {i}");
        Close.To(energy, ply.EnergyDensity(strain, change, across), 1e-12);
    }

    [Fact]
    public void Free_its_modulus_along_x_is_that_of_a_turned_ply()
    {
        const double angle = 0.5;
        (double s, double c) = Math.SinCos(angle);
        // Source: 1/Ex = c⁴/E1 + (1/G - 2ν/E1)·s²c² + s⁴/E2 of any text on laminates.
        double modulus = 1 / (Math.Pow(c, 4) / Ply.YoungX + (1 / ShearXz - 2 * Ply.PoissonXz / Ply.YoungX) * s * s * c * c + Math.Pow(s, 4) / Ply.YoungZ);
        PlaneElasticity ply = TurnedPly.Of(Ply, ShearXz, ShearZy, angle, OutOfPlaneState.Free);
        Close.To(modulus, ply.YoungAlongX, 1e-12);
        Close.To(c * c * Ply.ExpansionX + s * s * Ply.ExpansionZ, ply.Expansion[0], 1e-12);
    }

    [Fact]
    public void Constants_that_are_no_material_are_refused()
    {
        Assert.Throws<ArgumentException>(() => TurnedPly.Of(Ply with { PoissonXz = 5 }, ShearXz, ShearZy, 0.3, OutOfPlaneState.Held));
        Assert.Throws<ArgumentException>(() => TurnedPly.Of(Ply, 0, ShearZy, 0.3, OutOfPlaneState.Held));
    }

    private static void Same(PlaneElasticity expected, PlaneElasticity actual)
    {
        double[] strain = [8e-4, -3e-4, 6e-4], one = new double[4], other = new double[4];
        expected.Stress(strain, 40, one, 2e-4);
        actual.Stress(strain, 40, other, 2e-4);
        for (int i = 0; i < 4; i++)
            Close.To(one[i], other[i], 1e-12, 1e-12, $"stress {i}");
        Close.To(expected.EnergyDensity(strain, 40, 2e-4), actual.EnergyDensity(strain, 40, 2e-4), 1e-12);
        for (int i = 0; i < 9; i++)
            Close.To(expected.Stiffness[i], actual.Stiffness[i], 1e-12, 1e-9, $"stiffness {i}");
    }
}
