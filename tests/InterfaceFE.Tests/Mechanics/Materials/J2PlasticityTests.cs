using InterfaceFE.Mechanics.Materials;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Materials;

/// <summary>The law at a point against closed forms and differences. All material data are invented.</summary>
public sealed class J2PlasticityTests
{
    private const double Young = 70000, Poisson = 0.33, StressFree = 293.15, Shear = Young / (2 * (1 + Poisson));
    private static readonly YieldCurve Table = new([0, 0.004, 0.02], [180, 210, 230]);
    private static readonly YieldCurve Warm = new([0, 0.004, 0.02], [180, 210, 230], [203.15, 293.15, 423.15], [1.1, 1, 0.7]);

    public static TheoryData<OutOfPlaneState, double, bool> Materials() => new()
    {
        { OutOfPlaneState.Held, 0, false },
        { OutOfPlaneState.Held, 900, true },
        { OutOfPlaneState.Free, 0, false },
        { OutOfPlaneState.Free, 900, true },
    };

    [Theory]
    [MemberData(nameof(Materials))]
    public void Stress_returns_to_the_yield_surface_to_the_last_digits(OutOfPlaneState state, double kinematic, bool warm)
    {
        var point = new Walk(Law(state, kinematic, warm));
        var random = new Random(3);
        int yielded = 0;
        for (int i = 0; i < 200; i++)
        {
            point.Go([.. point.Strain.Select(e => e + 0.01 * (random.NextDouble() - 0.5))], warm ? 80 * random.NextDouble() - 40 : 0);
            double yield = point.Law.Curve.At(point.Kappa).Stress * point.Law.Curve.ShareAt(StressFree + point.Change).Share;
            double size = point.ShiftedSize(kinematic);
            Assert.True(size <= yield * (1 + 1e-12), $"{size} above {yield}");
            if (!point.Grew)
                continue;
            yielded++;
            Close.To(yield, size, 1e-13);
            if (state == OutOfPlaneState.Free)
                Assert.Equal(0, point.Stress[2]);
        }
        Assert.True(yielded > 100);
    }

    [Theory]
    [MemberData(nameof(Materials))]
    public void Tangent_and_change_with_temperature_are_those_of_differences(OutOfPlaneState state, double kinematic, bool warm)
    {
        J2Plasticity law = Law(state, kinematic, warm);
        var random = new Random(11);
        double[] up = new double[4], down = new double[4], unused = new double[9], tentative = new double[law.StateSize];
        for (int trial = 0; trial < 40; trial++)
        {
            var point = new Walk(law);
            for (int i = 0; i < 4; i++)
                point.Go([.. point.Strain.Select(e => e + 0.02 * (random.NextDouble() - 0.5))], warm ? 60 * random.NextDouble() - 30 : 0);
            double[] accepted = point.Accepted;
            double[] strain = [.. point.Strain.Select(e => e + 0.02 * (random.NextDouble() - 0.5))], tangent = new double[9], stress = new double[4], rate = new double[3];
            double change = warm ? 25 : 0;
            law.Update(strain, change, accepted, tentative, stress, tangent, rate);
            const double step = 1e-7;
            for (int j = 0; j < 3; j++)
            {
                double kept = strain[j];
                strain[j] = kept + step;
                law.Update(strain, change, accepted, tentative, up, unused);
                strain[j] = kept - step;
                law.Update(strain, change, accepted, tentative, down, unused);
                strain[j] = kept;
                for (int i = 0; i < 3; i++)
                {
                    int at = i == 2 ? 3 : i;
                    // Truncation: second derivatives are about Young over the yield strain, 3e7 MPa.
                    Close.To((up[at] - down[at]) / (2 * step), tangent[3 * i + j], 0, 2e-5 * Young, $"trial {trial}, tangent {i}, {j}");
                    Close.To(tangent[3 * j + i], tangent[3 * i + j], 0, 1e-12 * Young, "symmetry");
                }
            }
            law.Update(strain, change + 0.01, accepted, tentative, up, unused);
            law.Update(strain, change - 0.01, accepted, tentative, down, unused);
            for (int i = 0; i < 3; i++)
                Close.To((up[i == 2 ? 3 : i] - down[i == 2 ? 3 : i]) / 0.02, rate[i], 0, 1e-4 * Young * 23e-6, $"trial {trial}, temperature {i}");
        }
    }

    [Fact]
    public void Tension_free_out_of_plane_follows_the_table_and_the_kinematic_slope()
    {
        foreach (double kinematic in (double[])[0, 1500])
        {
            var point = new Walk(Law(OutOfPlaneState.Free, kinematic, false));
            foreach (double along in (double[])[0.001, 0.003, 0.008, 0.03])
            {
                point.Stretch(along);
                // Closed form: stress s with along = s/E + kappa, s = table(kappa) + H·kappa.
                double kappa = along - point.Stress[0] / Young;
                if (along <= 180 / Young)
                    Close.To(Young * along, point.Stress[0], 1e-12);
                else
                    Close.To(Table.At(kappa).Stress + kinematic * kappa, point.Stress[0], 1e-12);
                Close.To(kappa, point.Kappa, 0, 1e-14);
                Close.To(-0.5 * kappa, point.Accepted[1], 0, 1e-14);
            }
        }
    }

    [Fact]
    public void Equal_tension_two_ways_free_out_of_plane_follows_the_table()
    {
        var point = new Walk(Law(OutOfPlaneState.Free, 0, false));
        foreach (double strain in (double[])[0.002, 0.005, 0.02])
        {
            point.Go([strain, strain, 0], 0);
            // Closed form: q = s, strain = s(1-nu)/E + kappa/2.
            double kappa = 2 * (strain - point.Stress[0] * (1 - Poisson) / Young);
            Close.To(Table.At(kappa).Stress, point.Stress[0], 1e-12);
            Close.To(point.Stress[0], point.Stress[1], 1e-14);
            Close.To(kappa, point.Kappa, 1e-12);
        }
    }

    [Theory]
    [InlineData(OutOfPlaneState.Held)]
    [InlineData(OutOfPlaneState.Free)]
    public void Shear_follows_the_table_in_both_states(OutOfPlaneState state)
    {
        var point = new Walk(Law(state, 0, false));
        point.Go([0, 0, 0.006], 0);
        point.Go([0, 0, 0.02], 0);
        // Closed form: q = sqrt(3)·tau, gamma = tau/G + sqrt(3)·kappa.
        double kappa = (0.02 - point.Stress[3] / Shear) / Math.Sqrt(3);
        Close.To(Table.At(kappa).Stress / Math.Sqrt(3), point.Stress[3], 1e-12);
        Close.To(kappa, point.Kappa, 1e-12);
    }

    [Fact]
    public void Held_tension_without_hardening_tends_to_two_over_root_three_of_yield()
    {
        var point = new Walk(new J2Plasticity(Constants(0), new YieldCurve([0], [180]), 0, OutOfPlaneState.Held, StressFree));
        for (int i = 1; i <= 400; i++)
            point.Stretch(0.0005 * i);
        Close.To(2 / Math.Sqrt(3) * 180, point.Stress[0], 1e-6);
        Close.To(0.5 * point.Stress[0], point.Stress[2], 1e-3);
    }

    [Fact]
    public void Reversed_tension_with_kinematic_hardening_follows_the_straight_loop()
    {
        const double yield = 180, slope = 2000, largest = 0.012;
        J2Plasticity law = new(Constants(0), new YieldCurve([0], [yield]), slope, OutOfPlaneState.Free, StressFree);
        foreach (int strides in (int[])[1, 7])
        {
            var point = new Walk(law);
            double plastic = 0, spent = 0, back = 0, strain = 0;
            foreach (double to in (double[])[largest, -largest, largest, -largest, 0.002])
            {
                double from = strain;
                for (int i = 1; i <= strides; i++)
                    point.Stretch(strain = from + (to - from) * i / strides);
                // Closed form: elastic from the old plastic strain unless the shifted stress passes yield.
                double trial = Young * (to - plastic), shifted = trial - back, growth = Math.Max(Math.Abs(shifted) - yield, 0) / (Young + slope);
                plastic += Math.Sign(shifted) * growth;
                back = slope * plastic;
                spent += yield * growth;
                Close.To(Young * (to - plastic), point.Stress[0], 1e-11);
                Close.To(plastic, point.Accepted[0], 1e-11);
                Close.To(spent, point.Energy.Dissipated, 1e-11);
                Close.To(0.5 * point.Stress[0] * point.Stress[0] / Young + 0.5 * slope * plastic * plastic, point.Energy.Stored, 1e-11);
            }
        }
    }

    [Theory]
    [MemberData(nameof(Materials))]
    public void Work_put_in_is_stored_or_spent_with_an_error_of_second_order(OutOfPlaneState state, double kinematic, bool warm)
    {
        double[] errors = new double[3];
        for (int level = 0; level < errors.Length; level++)
        {
            var point = new Walk(Law(state, kinematic, warm));
            int strides = 200 << level;
            double work = 0;
            for (int i = 1; i <= strides; i++)
            {
                double s = 2 * Math.PI * i / strides;
                double[] before = [.. point.Stress], from = [.. point.Strain];
                double rateBefore = point.Energy.StoredByTemperature, changeBefore = point.Change;
                point.Go([0.01 * Math.Sin(s), 0.006 * (1 - Math.Cos(s)), 0.015 * Math.Sin(2 * s)], warm ? 60 * Math.Sin(s) : 0);
                for (int c = 0; c < 3; c++)
                    work += 0.5 * (before[c == 2 ? 3 : c] + point.Stress[c == 2 ? 3 : c]) * (point.Strain[c] - from[c]);
                work += 0.5 * (rateBefore + point.Energy.StoredByTemperature) * (point.Change - changeBefore);
            }
            errors[level] = Math.Abs(work - point.Energy.Stored - point.Energy.Dissipated) / point.Energy.Dissipated;
        }
        Assert.True(errors[2] < 1e-4, string.Join(", ", errors));
        Assert.True(errors[1] / errors[2] > 2.5, string.Join(", ", errors));
    }

    [Theory]
    [MemberData(nameof(Materials))]
    public void Elastic_answer_is_that_of_elasticity_and_its_tangent_the_same_to_the_last_bit(OutOfPlaneState state, double kinematic, bool warm)
    {
        J2Plasticity law = Law(state, kinematic, warm);
        PlaneElasticity elasticity = PlaneElasticity.Isotropic(Young, Poisson, 23e-6, state);
        double[] strain = [4e-4, -2e-4, 5e-4], stress = new double[4], expected = new double[4], tangent = new double[9], tangentExpected = new double[9], rate = new double[3], rateExpected = new double[3];
        double[] tentative = new double[law.StateSize];
        PlaneEnergy energy = law.Update(strain, -12, new double[law.StateSize], tentative, stress, tangent, rate);
        PlaneEnergy energyExpected = elasticity.Update(strain, -12, [], [], expected, tangentExpected, rateExpected);
        Assert.Equal(tangentExpected, tangent);
        Assert.Equal(rateExpected, rate);
        for (int i = 0; i < 4; i++)
            Close.To(expected[i], stress[i], 1e-12, 1e-12);
        Close.To(energyExpected.Stored, energy.Stored, 1e-12);
        Close.To(energyExpected.StoredByTemperature, energy.StoredByTemperature, 1e-12);
        Assert.Equal(0, energy.Dissipated);
    }

    [Theory]
    [MemberData(nameof(Materials))]
    public void Asked_again_at_the_accepted_strain_a_yielded_point_stays_and_answers_elastically(OutOfPlaneState state, double kinematic, bool warm)
    {
        var random = new Random(5);
        var point = new Walk(Law(state, kinematic, warm));
        for (int i = 0; i < 300; i++)
        {
            point.Go([.. point.Strain.Select(e => e + 0.01 * (random.NextDouble() - 0.5))], warm ? 40 * random.NextDouble() : 0);
            double[] stress = [.. point.Stress], accepted = point.Accepted;
            point.Go([.. point.Strain], point.Change);
            Assert.Equal(accepted, point.Accepted);
            for (int c = 0; c < 4; c++)
                Close.To(stress[c], point.Stress[c], 0, 1e-10);
            Assert.False(point.Grew);
        }
    }

    [Fact]
    public void Heating_a_held_bar_lowers_yield_and_lets_it_flow()
    {
        // Strain blocked along x, y free, z free: sigma = -E·alpha·dT until it meets the falling yield stress, then it follows it.
        var point = new Walk(Law(OutOfPlaneState.Free, 0, true));
        for (int i = 1; i <= 120; i++)
            point.Stretch(0, i);
        (double share, _) = Warm.ShareAt(StressFree + 120);
        Close.To(-share * Warm.At(point.Kappa).Stress, point.Stress[0], 1e-12);
        Close.To(Young * (23e-6 * 120 - point.Kappa), -point.Stress[0], 1e-12);
    }

    [Fact]
    public void Turned_expansion_by_direction_gives_the_turned_answer()
    {
        OrthotropicConstants constants = Constants(23e-6) with { ExpansionY = 40e-6 };
        const double angle = 0.7;
        (double s, double c) = Math.SinCos(angle);
        J2Plasticity law = new(constants, Table, 500, OutOfPlaneState.Held, StressFree), turned = law.Rotated(angle);
        double[] strain = [0.004, -0.001, 0.006], there = [c * c * 0.004 - s * s * 0.001 - c * s * 0.006, s * s * 0.004 - c * c * 0.001 + c * s * 0.006, 2 * c * s * 0.005 + (c * c - s * s) * 0.006];
        double[] stress = new double[4], other = new double[4], tangent = new double[9], tentative = new double[5];
        PlaneEnergy one = law.Update(strain, 60, new double[5], tentative, stress, tangent), two = turned.Update(there, 60, new double[5], tentative, other, tangent);
        Close.To(one.Stored, two.Stored, 1e-12);
        Close.To(one.Dissipated, two.Dissipated, 1e-12);
        Close.To(c * c * stress[0] + s * s * stress[1] - 2 * c * s * stress[3], other[0], 1e-12);
        Close.To(stress[2], other[2], 1e-12);
    }

    [Fact]
    public void Laminates_and_negative_hardening_are_refused()
    {
        Assert.Throws<ArgumentException>(() => new J2Plasticity(Constants(0) with { YoungY = 9000 }, Table, 0, OutOfPlaneState.Held, StressFree));
        Assert.Throws<ArgumentException>(() => new J2Plasticity(Constants(0), Table, -1, OutOfPlaneState.Held, StressFree));
    }

    private static OrthotropicConstants Constants(double expansion) => new(Young, Young, Young, Poisson, Poisson, Poisson, Shear, expansion, expansion, expansion);

    private static J2Plasticity Law(OutOfPlaneState state, double kinematic, bool warm) => new(Constants(23e-6), warm ? Warm : Table, kinematic, state, StressFree);

    /// <summary>A point that is led along a path of strain.</summary>
    private sealed class Walk(J2Plasticity law)
    {
        public J2Plasticity Law => law;

        public double[] Accepted { get; private set; } = new double[law.StateSize];

        public double[] Strain { get; private set; } = new double[3];

        public double[] Stress { get; } = new double[4];

        public double Change { get; private set; }

        public PlaneEnergy Energy { get; private set; }

        public bool Grew { get; private set; }

        public double Kappa => Accepted[J2Plasticity.EquivalentStrain];

        public void Go(double[] strain, double change)
        {
            double before = Kappa;
            double[] tentative = new double[Accepted.Length];
            Energy = law.Update(strain, change, Accepted, tentative, Stress, new double[9]);
            (Accepted, Strain, Change, Grew) = (tentative, strain, change, tentative[J2Plasticity.EquivalentStrain] > before);
        }

        /// <summary>Stretches along x with no stress along y.</summary>
        public void Stretch(double along, double change = 0)
        {
            double[] tentative = new double[Accepted.Length], tangent = new double[9], strain = [along, Strain[1], 0];
            for (int i = 0; i < 50; i++)
            {
                law.Update(strain, change, Accepted, tentative, Stress, tangent);
                if (Math.Abs(Stress[1]) < 1e-11)
                    break;
                strain[1] -= Stress[1] / tangent[4];
            }
            Go(strain, change);
        }

        public double ShiftedSize(double kinematic)
        {
            double mean = (Stress[0] + Stress[1] + Stress[2]) / 3, back = 2 * kinematic / 3;
            double x = Stress[0] - mean - back * Accepted[0], y = Stress[1] - mean - back * Accepted[1], z = Stress[2] - mean + back * (Accepted[0] + Accepted[1]), xy = Stress[3] - 0.5 * back * Accepted[2];
            return Math.Sqrt(1.5 * (x * x + y * y + z * z + 2 * xy * xy));
        }
    }
}
