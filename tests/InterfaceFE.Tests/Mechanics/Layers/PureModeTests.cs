using InterfaceFE.Mechanics.Layers;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

public sealed class PureModeTests
{
    [Fact]
    public void Every_law_dissipates_its_toughness_in_pure_modes_for_random_strides()
    {
        Random random = new(7);
        foreach (ILayerLaw law in Laws.All)
        {
            for (int trial = 0; trial < 40; trial++)
            {
                bool peel = trial % 2 == 0;
                double final = peel ? law.FinalOpening : law.FinalSliding, toughness = peel ? law.PeelToughness : law.ShearToughness, most = 0;
                LawWalk walk = new(law);
                while (most < final)
                {
                    most += final * random.NextDouble() * (trial < 10 ? 0.02 : 0.5);
                    Go(walk, peel, peel || random.Next(2) == 0 ? most : -most);
                    if (random.Next(2) == 0)
                        Go(walk, peel, (peel ? random.NextDouble() : 2 * random.NextDouble() - 1) * most);
                }
                Go(walk, peel, 1.01 * most);
                Close.To(toughness, walk.Answer.Dissipated, 1e-12, 0, law.GetType().Name);
                Close.To(1, walk.Answer.Damage);
                Close.To(0, walk.Answer.Stored, 0, 0);
                Close.To(0, walk.Answer.Peel, 0, 0);
                Close.To(0, walk.Answer.Shear, 0, 0);
                Assert.Equal(LawBranch.Separated, walk.Answer.Branch);
            }
        }
    }

    [Fact]
    public void One_huge_stride_dissipates_the_toughness()
    {
        foreach (ILayerLaw law in Laws.All)
        {
            // A curve that falls ever steeper gives way a little beyond its final separation, by less than the release length times its last share of length.
            foreach (double size in new[] { 1.001, 10, 1e8, 1e150, 1e300 })
            {
                Close.To(law.PeelToughness, new LawWalk(law).To(size * law.FinalOpening, 0).Answer.Dissipated, 1e-12, 0, $"{law.GetType().Name} {size}");
                Close.To(law.ShearToughness, new LawWalk(law).To(0, -size * law.FinalSliding).Answer.Dissipated, 1e-12, 0, $"{law.GetType().Name} {size}");
            }
        }
    }

    [Fact]
    public void Stored_and_dissipated_add_up_to_the_area_whatever_the_stride()
    {
        Random random = new(3);
        foreach (ITractionCurve curve in Laws.Curves)
        {
            IndependentModesLaw law = new(curve, Laws.ShearLine, 5, 0.01);
            for (int i = 0; i < 200; i++)
            {
                double end = curve.FinalSeparation * 0.98 * random.NextDouble();
                LayerResponse once = new LawWalk(law).To(end, 0).Answer, twice = new LawWalk(law).To(0.3 * end, 0).To(0.1 * end, 0).To(end, 0).Answer;
                Close.To(curve.Area(end), once.Stored + once.Dissipated, 1e-13, 1e-15 * curve.Toughness);
                Close.To(once.Dissipated, twice.Dissipated, 1e-14, 1e-15);
                Close.To(curve.Traction(end), once.Peel, 1e-14);
            }
        }
        foreach (OneDamageLaw law in Laws.OneDamage)
        {
            BilinearCurve peel = new(law.Stiffness.Peel, Strength(law), law.PeelToughness);
            for (int i = 0; i < 200; i++)
            {
                double end = law.FinalOpening * random.NextDouble();
                LayerResponse once = new LawWalk(law).To(end, 0).Answer;
                Close.To(peel.Traction(end), once.Peel, 1e-12, 1e-13);
                Close.To(peel.Area(end), once.Stored + once.Dissipated, 1e-12);
            }
        }

        static double Strength(OneDamageLaw law) => 2 * law.PeelToughness / law.FinalOpening;
    }

    [Fact]
    public void Linear_softening_is_reproduced_by_the_release_branch()
    {
        foreach (double share in new[] { 0.02, 0.05, 0.3 })
        {
            IndependentModesLaw law = new(Laws.PeelLine, Laws.ShearLine, 5, share);
            LawWalk walk = new(law);
            for (int i = 1; i <= 137; i++)
            {
                double w = Laws.PeelLine.FinalSeparation * i / 137;
                Close.To(Laws.PeelLine.Traction(w), walk.To(w, 0).Answer.Peel, 1e-10, 1e-13, "peel");
                double jump = new LawWalk(law).To(w, 0).Answer.Peel;
                Close.To(Laws.PeelLine.Traction(w), jump, 1e-10, 1e-13, "in one stride");
            }
            for (int i = 1; i <= 137; i++)
            {
                double v = Laws.ShearLine.FinalSeparation * i / 137;
                Close.To(-Laws.ShearLine.Traction(v), new LawWalk(law).To(0, -0.8 * v).To(0, -v).Answer.Shear, 1e-10, 1e-13, "shear");
            }
        }
    }

    [Fact]
    public void Unloading_returns_to_the_origin_and_pressing_meets_the_contact_stiffness_at_any_damage()
    {
        foreach (ILayerLaw law in Laws.Secant)
        {
            foreach (double share in new[] { 0, 0.01, 0.3, 0.8, 0.99, 2 })
            {
                LawWalk walk = new LawWalk(law).To(share * law.FinalOpening, 0);
                double loaded = walk.Answer.Peel, dissipated = walk.Answer.Dissipated, damage = walk.Answer.Damage;
                Close.To(0.25 * loaded, walk.Try(0.25 * share * law.FinalOpening, 0).Peel, 1e-12, 1e-14);
                Close.To(0, walk.To(0, 0).Answer.Peel, 0, 0);
                double press = -0.1 * law.FinalOpening;
                walk.To(press, 0);
                Close.To(law.Stiffness.Contact * press, walk.Answer.Peel);
                Close.To(law.Stiffness.Contact, walk.Answer.PeelByOpening);
                Close.To(0.5 * law.Stiffness.Contact * press * press, walk.Answer.Stored);
                Close.To(dissipated, walk.Answer.Dissipated, 0, 0);
                Close.To(damage, walk.Answer.Damage, 0, 0);
                Close.To(loaded, walk.To(share * law.FinalOpening, 0).Answer.Peel, 1e-12, 1e-14);
            }
        }
    }

    [Fact]
    public void Pressing_spends_nothing_and_sliding_under_pressure_goes_on()
    {
        foreach (ILayerLaw law in Laws.All)
        {
            LawWalk walk = new LawWalk(law).To(-0.3, 0);
            Close.To(0, walk.Answer.Dissipated, 0, 0);
            Close.To(0, walk.Answer.EnergyPeel, 0, 0);
            for (int i = 1; i <= 30; i++)
                walk.To(-0.3 - 0.01 * i, law.FinalSliding * i / 29);
            Close.To(law.ShearToughness, walk.Answer.Dissipated, 1e-12);
            Close.To(0, walk.Answer.Shear, 0, 0);
            Close.To(law.Stiffness.Contact * -0.6, walk.Answer.Peel, 1e-12);
        }
    }

    [Fact]
    public void Zero_tiny_huge_and_non_finite_separations_are_survived()
    {
        double[] sizes = [0, 1e-320, 1e-200, 1e-30, 1e-9, 1, 1e9, 1e120, 1e300];
        foreach (ILayerLaw law in Laws.All)
        {
            Close.To(law.Stiffness.Peel, new LawWalk(law).To(0, 0).Answer.PeelByOpening);
            Close.To(law.Stiffness.Shear, new LawWalk(law).To(0, 0).Answer.ShearBySliding);
            foreach (double w in sizes)
            {
                foreach (double v in sizes)
                {
                    foreach (double sign in new[] { -1.0, 1 })
                    {
                        LayerResponse answer = new LawWalk(law).To(w, sign * v).To(1e-3 * w, 2 * sign * v).To(w * 1.5, -v).Answer;
                        Assert.True(double.IsFinite(answer.Peel + answer.Shear + answer.Dissipated + answer.Damage + answer.PeelByOpening + answer.PeelBySliding + answer.ShearBySliding + answer.Stored
                            + answer.DissipatedByOpening + answer.DissipatedBySliding), $"{law.GetType().Name} {w} {v}");
                        Assert.True(double.IsFinite(new LawWalk(law).To(-w, sign * v).Answer.Shear), $"{law.GetType().Name} -{w} {v}");
                    }
                }
            }
            foreach (double bad in new[] { double.NaN, double.PositiveInfinity, double.NegativeInfinity })
            {
                Assert.False(double.IsFinite(new LawWalk(law).To(bad, 0).Answer.Peel));
                Assert.False(double.IsFinite(new LawWalk(law).To(0, bad).Answer.Shear));
            }
        }
    }

    private static void Go(LawWalk walk, bool peel, double separation) => walk.To(peel ? separation : 0, peel ? 0 : separation);
}
