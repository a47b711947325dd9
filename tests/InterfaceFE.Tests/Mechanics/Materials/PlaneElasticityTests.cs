using InterfaceFE.Mechanics.Materials;
using MathNet.Numerics.LinearAlgebra;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Materials;

public sealed class PlaneElasticityTests
{
    // Invented: a laminate with all constants different, no axis special.
    private static readonly OrthotropicConstants Laminate = new(24000, 9000, 17000, 0.30, 0.12, 0.28, 3600, 14e-6, 30e-6, 11e-6);

    private static readonly double[] Strain = [1.3e-3, -0.7e-3, 2.1e-3];

    [Fact]
    public void Isotropic_held_matches_the_textbook_matrix()
    {
        // Source: plane strain stiffness of any elasticity textbook, E/((1+nu)(1-2nu))·[1-nu, nu, 0; nu, 1-nu, 0; 0, 0, (1-2nu)/2].
        const double e = 70000, nu = 0.33, a = 23e-6;
        PlaneElasticity material = PlaneElasticity.Isotropic(e, nu, a, OutOfPlaneState.Held);
        double f = e / ((1 + nu) * (1 - 2 * nu));
        double[] expected = [f * (1 - nu), f * nu, 0, f * nu, f * (1 - nu), 0, 0, 0, e / (2 * (1 + nu))];
        for (int i = 0; i < 9; i++)
            Close.To(expected[i], material.Stiffness[i], 1e-14, 0, $"stiffness {i}");
        Close.To((1 + nu) * a, material.Expansion[0], 1e-15);
        Close.To((1 + nu) * a, material.Expansion[1], 1e-15);
        Close.To(0, material.Expansion[2]);
        Close.To(e / (1 - nu * nu), material.YoungAlongX, 1e-14);
        Close.To(e / (2 * (1 + nu)), material.ShearModulus, 1e-14);
    }

    [Fact]
    public void Isotropic_free_matches_the_textbook_matrix()
    {
        // Source: plane stress stiffness of any elasticity textbook, E/(1-nu²)·[1, nu, 0; nu, 1, 0; 0, 0, (1-nu)/2].
        const double e = 210000, nu = 0.3, a = 12e-6;
        PlaneElasticity material = PlaneElasticity.Isotropic(e, nu, a, OutOfPlaneState.Free);
        double f = e / (1 - nu * nu);
        double[] expected = [f, f * nu, 0, f * nu, f, 0, 0, 0, f * (1 - nu) / 2];
        for (int i = 0; i < 9; i++)
            Close.To(expected[i], material.Stiffness[i], 1e-14, 0, $"stiffness {i}");
        Close.To(a, material.Expansion[0], 1e-15);
        Close.To(e, material.YoungAlongX, 1e-14);
        double[] stress = new double[4];
        material.Stress(Strain, 30, stress);
        Assert.Equal(0, stress[2]);
    }

    [Theory]
    [InlineData(OutOfPlaneState.Held, 0)]
    [InlineData(OutOfPlaneState.Held, 0.7)]
    [InlineData(OutOfPlaneState.Free, 0)]
    [InlineData(OutOfPlaneState.Free, -2.2)]
    public void Orthotropic_matches_the_full_three_dimensional_law(OutOfPlaneState state, double angle)
    {
        // Source: derived; the 6×6 compliance (xx, yy, zz, yz, zx, xy) is inverted in full and solved for the state out of plane, strains turned as tensors.
        const double change = -60;
        PlaneElasticity material = PlaneElasticity.Orthotropic(Laminate, state).Rotated(angle);
        double[] own = Turned(Strain, -angle, engineering: true);
        Matrix<double> stiffness = FullCompliance(Laminate).Inverse();
        Vector<double> thermal = Vector<double>.Build.Dense([Laminate.ExpansionX * change, Laminate.ExpansionY * change, Laminate.ExpansionZ * change, 0, 0, 0]);
        Vector<double> total = Vector<double>.Build.Dense([own[0], own[1], 0, 0, 0, own[2]]);
        Vector<double> full = stiffness * (total - thermal);
        if (state == OutOfPlaneState.Free)
        {
            total[2] = -full[2] / stiffness[2, 2];
            full = stiffness * (total - thermal);
        }
        double[] inPlane = Turned([full[0], full[1], full[5]], angle, engineering: false);

        double[] stress = new double[4];
        material.Stress(Strain, change, stress);
        Close.To(inPlane[0], stress[0], 1e-12, 1e-10, "xx");
        Close.To(inPlane[1], stress[1], 1e-12, 1e-10, "yy");
        Close.To(full[2], stress[2], 1e-12, 1e-10, "zz");
        Close.To(inPlane[2], stress[3], 1e-12, 1e-10, "xy");
        Close.To(0.5 * (full * (total - thermal)), material.EnergyDensity(Strain, change), 1e-12, 0, "energy");
    }

    [Fact]
    public void Held_orthotropic_expansion_adds_the_contraction_of_the_third_direction()
    {
        // Source: physics of the held state, alpha_x + nu_zx·alpha_z with nu_zx = nu_xz·E_z/E_x, derived.
        PlaneElasticity material = PlaneElasticity.Orthotropic(Laminate, OutOfPlaneState.Held);
        double zx = Laminate.PoissonXz * Laminate.YoungZ / Laminate.YoungX;
        Close.To(Laminate.ExpansionX + zx * Laminate.ExpansionZ, material.Expansion[0], 1e-14);
        Close.To(Laminate.ExpansionY + Laminate.PoissonZy * Laminate.ExpansionZ, material.Expansion[1], 1e-14);
        Close.To(Laminate.YoungX / (1 - Laminate.PoissonXz * zx), material.YoungAlongX, 1e-13);
        // At free in-plane strain nothing is left in the plane, and szz is that of a bar held at its ends.
        double[] stress = new double[4];
        const double change = 50;
        material.Stress([material.Expansion[0] * change, material.Expansion[1] * change, 0], change, stress);
        Close.To(0, stress[0], 0, 1e-12);
        Close.To(0, stress[1], 0, 1e-12);
        Close.To(-Laminate.YoungZ * Laminate.ExpansionZ * change, stress[2], 1e-12);
    }

    [Fact]
    public void Isotropic_is_the_orthotropic_law_with_equal_constants_and_the_same_in_all_axes()
    {
        PlaneElasticity material = PlaneElasticity.Isotropic(1000, 0.4, 1e-5, OutOfPlaneState.Held);
        PlaneElasticity turned = material.Rotated(1.1);
        for (int i = 0; i < 9; i++)
            Close.To(material.Stiffness[i], turned.Stiffness[i], 1e-13, 1e-10);
        for (int i = 0; i < 3; i++)
            Close.To(material.Expansion[i], turned.Expansion[i], 1e-13, 1e-19);
    }

    [Theory]
    [InlineData(OutOfPlaneState.Held, 0.31)]
    [InlineData(OutOfPlaneState.Held, 2.9)]
    [InlineData(OutOfPlaneState.Free, -1.3)]
    public void Turning_material_and_strain_together_turns_the_stress(OutOfPlaneState state, double angle)
    {
        // Source: objectivity; tensors turned as R·e·Rᵀ.
        PlaneElasticity material = PlaneElasticity.Orthotropic(Laminate, state).Rotated(0.2);
        double[] before = new double[4], after = new double[4];
        material.Stress(Strain, 40, before);
        material.Rotated(angle).Stress(Turned(Strain, angle, engineering: true), 40, after);
        double[] expected = Turned([before[0], before[1], before[3]], angle, engineering: false);
        Close.To(expected[0], after[0], 1e-12, 1e-10);
        Close.To(expected[1], after[1], 1e-12, 1e-10);
        Close.To(expected[2], after[3], 1e-12, 1e-10);
        Close.To(before[2], after[2], 1e-12, 1e-10);
        Close.To(material.EnergyDensity(Strain, 40), material.Rotated(angle).EnergyDensity(Turned(Strain, angle, engineering: true), 40), 1e-12);
    }

    [Fact]
    public void Turning_by_a_right_angle_swaps_the_axes_and_turning_back_restores_them()
    {
        PlaneElasticity material = PlaneElasticity.Orthotropic(Laminate, OutOfPlaneState.Free);
        PlaneElasticity upright = material.Rotated(Math.PI / 2);
        Close.To(Laminate.YoungY, upright.YoungAlongX, 1e-13);
        Close.To(Laminate.YoungX, material.YoungAlongX, 1e-13);
        Close.To(Laminate.ShearXy, material.ShearModulus, 1e-13);
        Close.To(Laminate.ExpansionY, upright.Expansion[0], 1e-13);
        PlaneElasticity back = upright.Rotated(-Math.PI / 2);
        for (int i = 0; i < 9; i++)
            Close.To(material.Stiffness[i], back.Stiffness[i], 1e-13, 1e-9);
    }

    [Fact]
    public void Stress_is_the_derivative_of_the_energy_density()
    {
        PlaneElasticity material = PlaneElasticity.Orthotropic(Laminate, OutOfPlaneState.Held).Rotated(0.5);
        double[] stress = new double[4];
        material.Stress(Strain, -35, stress);
        double[] inPlane = [stress[0], stress[1], stress[3]];
        for (int i = 0; i < 3; i++)
        {
            // Quadratic in the strain: the central difference has round-off alone.
            const double step = 1e-4;
            double[] up = [.. Strain], down = [.. Strain];
            up[i] += step;
            down[i] -= step;
            Close.To(inPlane[i], (material.EnergyDensity(up, -35) - material.EnergyDensity(down, -35)) / (2 * step), 1e-10, 1e-9);
        }
    }

    [Theory]
    [InlineData(-1, 9000, 17000, 0.3, 0.12, 0.28, 3600, "greater than 0")]
    [InlineData(24000, 9000, 0, 0.3, 0.12, 0.28, 3600, "greater than 0")]
    [InlineData(24000, 9000, 17000, 0.3, 0.12, 0.28, 0, "shear modulus")]
    [InlineData(24000, 9000, 17000, double.NaN, 0.12, 0.28, 3600, "finite")]
    [InlineData(24000, 9000, 17000, 1.7, 0.12, 0.28, 3600, "xy and yx")]
    [InlineData(24000, 9000, 17000, 0.3, 1.3, 0.28, 3600, "xz and zx")]
    [InlineData(24000, 9000, 17000, 0.3, 0.12, 1.4, 3600, "zy and yz")]
    [InlineData(10000, 10000, 10000, 0.6, 0.6, 0.6, 3600, "together")]
    public void Unstable_constants_are_refused_with_the_reason(double x, double y, double z, double xy, double xz, double zy, double g, string words)
    {
        OrthotropicConstants constants = new(x, y, z, xy, xz, zy, g);
        ArgumentException fault = Assert.Throws<ArgumentException>(() => PlaneElasticity.Orthotropic(constants, OutOfPlaneState.Held));
        Assert.Contains(words, fault.Message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(3)]
    public void Constants_are_accepted_exactly_when_all_eigenvalues_of_the_compliance_are_positive(int seed)
    {
        // Source: eigenvalues of the compliance of normal strains, from a dense library.
        Random random = new(seed);
        int stable = 0, unstable = 0;
        for (int i = 0; i < 400; i++)
        {
            OrthotropicConstants constants = new(Modulus(), Modulus(), Modulus(), Ratio(), Ratio(), Ratio(), 1);
            bool positive = FullCompliance(constants).Evd(Symmetricity.Symmetric).EigenValues.All(v => v.Real > 0);
            Assert.Equal(positive, constants.Fault() is null);
            _ = positive ? stable++ : unstable++;
        }
        Assert.True(stable > 50 && unstable > 50, $"both kinds must occur: {stable} stable, {unstable} unstable");

        double Modulus() => 1 + 9 * random.NextDouble();

        double Ratio() => 2 * random.NextDouble() - 0.7;
    }

    [Theory]
    [InlineData(0.5)]
    [InlineData(-1.0)]
    [InlineData(double.NaN)]
    public void Isotropic_ratio_outside_its_range_is_refused(double poisson) =>
        Assert.Contains("0.5", Assert.Throws<ArgumentException>(() => PlaneElasticity.Isotropic(1000, poisson, 0, OutOfPlaneState.Held)).Message, StringComparison.Ordinal);

    [Fact]
    public void Angle_that_is_no_number_is_refused() =>
        Assert.Throws<ArgumentException>(() => PlaneElasticity.Isotropic(1000, 0.3, 0, OutOfPlaneState.Held).Rotated(double.NaN));

    private static Matrix<double> FullCompliance(in OrthotropicConstants c)
    {
        Matrix<double> s = Matrix<double>.Build.Dense(6, 6);
        s[0, 0] = 1 / c.YoungX;
        s[1, 1] = 1 / c.YoungY;
        s[2, 2] = 1 / c.YoungZ;
        s[0, 1] = s[1, 0] = -c.PoissonXy / c.YoungX;
        s[0, 2] = s[2, 0] = -c.PoissonXz / c.YoungX;
        s[1, 2] = s[2, 1] = -c.PoissonZy / c.YoungZ;
        // Shear out of plane takes no part in the plane; any positive modulus does.
        s[3, 3] = s[4, 4] = 1 / 1234.0;
        s[5, 5] = 1 / c.ShearXy;
        return s;
    }

    // R·t·Rᵀ of a symmetric 2×2 tensor given as xx, yy, xy; with engineering shear the third entry is twice the tensor's.
    private static double[] Turned(double[] tensor, double angle, bool engineering)
    {
        double factor = engineering ? 0.5 : 1;
        Matrix<double> t = Matrix<double>.Build.DenseOfRowArrays([tensor[0], factor * tensor[2]], [factor * tensor[2], tensor[1]]);
        Matrix<double> r = Matrix<double>.Build.DenseOfRowArrays([Math.Cos(angle), -Math.Sin(angle)], [Math.Sin(angle), Math.Cos(angle)]);
        Matrix<double> turned = r * t * r.Transpose();
        return [turned[0, 0], turned[1, 1], turned[0, 1] / factor];
    }
}
