using System.Globalization;
using InterfaceFE.Mechanics.Layers;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

public sealed class ReleaseTests
{
    /// <summary>Separation path that reaches fracture with turns; p from 0 to 1.</summary>
    private static (double W, double V) Wander(IndependentModesLaw law, int kind, double p)
    {
        double w = law.FinalOpening, v = law.FinalSliding;
        return kind switch
        {
            0 => (0.9 * w * p, 1.1 * v * p),
            1 => (1.2 * w * p * p, 0.9 * v * Math.Sin(2 * p)),
            2 => (1.1 * w * Math.Sin(1.7 * p), -0.8 * v * p * p),
            3 => (0.5 * w * Math.Sin(2.5 * p), 1.2 * v * p),
            _ => (1.2 * w * p, 0.4 * v * Math.Sin(5 * p)),
        };
    }

    [Fact]
    public void Criterion_is_exactly_one_at_separation_on_any_path_and_both_tractions_vanish_together()
    {
        Random random = new(11);
        foreach (IndependentModesLaw law in Laws.Independent)
        {
            for (int trial = 0; trial < 60; trial++)
            {
                LawWalk walk = new(law);
                double w = 0, v = 0, dissipated = 0, damage = 0;
                double size = trial < 30 ? 0.02 : 0.2;
                int released = 0;
                while (walk.Answer.Branch != LawBranch.Separated)
                {
                    w = Math.Max(-0.05, w + law.FinalOpening * size * (random.NextDouble() - 0.4));
                    v += law.FinalSliding * size * (random.NextDouble() - 0.4);
                    walk.To(w, v);
                    released += walk.Answer.Branch == LawBranch.Releasing ? 1 : 0;
                    Assert.True(walk.Answer.Dissipated >= dissipated && walk.Answer.Damage >= damage && walk.Answer.Damage <= 1);
                    (dissipated, damage) = (walk.Answer.Dissipated, walk.Answer.Damage);
                    double sum = walk.Answer.EnergyPeel / law.PeelToughness + walk.Answer.EnergyShear / law.ShearToughness;
                    Assert.True(sum <= 1 + 1e-12);
                    if (walk.Answer.Branch == LawBranch.Separated)
                    {
                        Close.To(1, sum, 1e-12, 0, "sum");
                        Close.To(0, Math.Abs(walk.Answer.Shear), 0, 0);
                        Close.To(0, Math.Max(0, walk.Answer.Peel), 0, 0);
                        Close.To(1, walk.Answer.Damage);
                    }
                    else if (walk.Answer.Branch == LawBranch.Releasing)
                    {
                        Assert.True(Math.Abs(walk.Answer.Shear) > 0 || walk.Answer.Peel > 0);
                    }
                }
                Close.To(0, Math.Abs(walk.To(-1, 0).Answer.Shear), 0, 0);
                Assert.True(trial >= 30 || released > 0);
            }
        }
    }

    [Theory]
    [InlineData(EnergyCounting.LargestSeparation)]
    [InlineData(EnergyCounting.NetWork)]
    public void Sum_of_work_shares_over_trapezoids_tends_to_one_at_second_order(EnergyCounting counting)
    {
        foreach (double share in new[] { 0.1, 0.05, 0.02 })
        {
            IndependentModesLaw law = new(Laws.Decaying, Laws.ShearLine, 10, share, counting);
            double[] errors = [.. new[] { 250, 500, 1000, 2000, 4000 }.Select(strides => MeanError(law, strides))];
            double order = Math.Log2(errors[0] / errors[^1]) / 4;
            TestContext.Current.TestOutputHelper?.WriteLine(string.Create(CultureInfo.InvariantCulture, $"rho {share}: mean errors {errors[0]:e2} to {errors[^1]:e2}, order {order:f2}"));
            // Kinks inside strides scatter single errors; the mean over forty random paths shows the order.
            Assert.InRange(order, 1.8, 2.2);
        }

        static double MeanError(IndependentModesLaw law, int strides)
        {
            Random random = new(17);
            double sum = 0;
            for (int i = 0; i < 40; i++)
                sum += Error(law, random.NextDouble(), random.NextDouble(), random.NextDouble(), strides) / 40;
            return sum;
        }

        // Work per mode summed outside the law; these paths never unload, so both counts agree with it.
        static double Error(IndependentModesLaw law, double a, double b, double c, int strides)
        {
            LawWalk walk = new(law);
            double sum = 0;
            for (int i = 1; i <= strides; i++)
            {
                Separation from = walk.Separation;
                LayerResponse last = walk.Answer;
                double p = (double)i / strides, w = law.FinalOpening * p * (0.3 + 0.7 * a + 0.3 * c * p), v = law.FinalSliding * (0.2 + 0.8 * b) * (p + c / 3 * Math.Sin(3 * p));
                if (walk.Answer.Branch == LawBranch.Separated)
                    break;
                walk.To(w, v);
                sum += 0.5 * (last.Peel + walk.Answer.Peel) * (w - from.Opening) / law.PeelToughness + 0.5 * (last.Shear + walk.Answer.Shear) * (v - from.Sliding) / law.ShearToughness;
            }
            Assert.Equal(LawBranch.Separated, walk.Answer.Branch);
            return Math.Abs(sum - 1);
        }
    }

    [Fact]
    public void Sum_follows_one_minus_what_is_due_while_releasing()
    {
        foreach (IndependentModesLaw law in Laws.Independent)
        {
            LawWalk walk = new(law);
            double startDamage = double.NaN, startSum = double.NaN;
            int seen = 0;
            for (int i = 1; i <= 4000 && walk.Answer.Branch != LawBranch.Separated; i++)
            {
                (double w, double v) = Wander(law, 0, i / 4000.0);
                walk.To(w, v);
                if (walk.Answer.Branch != LawBranch.Releasing)
                    continue;
                // States 9 and 13 hold R0 and the damage at the start.
                (startSum, startDamage) = (walk.Accepted[9], walk.Accepted[13]);
                double s = 1 - (walk.Answer.Damage - startDamage) / (1 - startDamage);
                Close.To(1 - startSum * s * s, walk.Answer.EnergyPeel / law.PeelToughness + walk.Answer.EnergyShear / law.ShearToughness, 1e-12);
                seen++;
            }
            Assert.True(seen > 5);
        }
    }

    [Fact]
    public void Work_is_stored_plus_dissipated_on_every_stride_to_the_order_of_the_sum()
    {
        foreach (IndependentModesLaw law in Laws.Independent)
        {
            for (int kind = 0; kind < 5; kind++)
            {
                LawWalk walk = new(law);
                double work = 0;
                for (int i = 1; i <= 12; i++)
                {
                    (double w, double v) = Wander(law, kind, 1.3 * i / 12);
                    work += walk.WorkTo(w, v, 1500);
                    Close.To(work, walk.Answer.Stored + walk.Answer.Dissipated, 2e-6, 2e-6, $"kind {kind} stride {i} {walk.Answer.Branch}");
                }
            }
        }
    }

    [Fact]
    public void Net_work_counts_dissipated_shares_that_sum_to_one()
    {
        IndependentModesLaw law = new(Laws.PeelLine, new BilinearCurve(8, 2, 0.8), 30, 0.05, EnergyCounting.NetWork);
        LawWalk walk = new LawWalk(law).To(0.2, 0.2).To(0.1, 0.3).To(0.3, -0.1).To(0.2, 0.4).To(0.6, 0.5).To(1, 1);
        Assert.Equal(LawBranch.Separated, walk.Answer.Branch);
        Close.To(0.8, walk.Answer.Dissipated, 1e-12);
    }

    [Fact]
    public void Result_does_not_depend_on_how_a_straight_way_is_parted()
    {
        foreach (IndependentModesLaw law in Laws.Independent)
        {
            foreach (double end in new[] { 0.3, 0.5, 0.55, 0.6, 0.8, 1.5 })
            {
                LayerResponse once = new LawWalk(law).To(end * law.FinalOpening, end * law.FinalSliding).Answer;
                LawWalk walk = new(law);
                for (int i = 1; i <= 50; i++)
                    walk.To(end * law.FinalOpening * i / 50, end * law.FinalSliding * i / 50);
                Close.To(once.Peel, walk.Answer.Peel, 1e-9, 1e-11);
                Close.To(once.Shear, walk.Answer.Shear, 1e-9, 1e-11);
                Close.To(once.Dissipated, walk.Answer.Dissipated, 1e-11);
                Close.To(once.Damage, walk.Answer.Damage, 1e-11);
                Close.To(once.EnergyPeel, walk.Answer.EnergyPeel, 1e-11);
            }
        }
    }
}
