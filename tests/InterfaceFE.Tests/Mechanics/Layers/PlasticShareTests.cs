using InterfaceFE.Mechanics.Layers;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

public sealed class PlasticShareTests
{
    public static TheoryData<double> Shares => [0, 0.2, 0.5, 1];

    [Theory]
    [MemberData(nameof(Shares))]
    public void Peel_unloads_on_the_line_to_the_plastic_opening_and_closes_freely_below_it(double share)
    {
        foreach (ITractionCurve curve in Laws.Curves)
        {
            IndependentModesLaw law = new(curve, Laws.ShearLine, 5, 0.01, EnergyCounting.LargestSeparation, share, 0);
            foreach (double part in new[] { 0.3, 0.6, 0.9 })
            {
                double m = part * curve.FinalSeparation, traction = curve.Traction(m), plastic = share * (m - traction / curve.Stiffness);
                LawWalk walk = new LawWalk(law).To(m, 0);
                Close.To(traction, walk.Answer.Peel, 1e-12);
                foreach (double down in new[] { 0.9, 0.4, 0.05, 0.5, 1 })
                {
                    walk.To(plastic + down * (m - plastic), 0);
                    Close.To(down * traction, walk.Answer.Peel, 1e-10, 1e-12);
                    Close.To(traction / (m - plastic), walk.Try(plastic + 0.99 * down * (m - plastic), 0).PeelByOpening, 1e-10);
                    Close.To(0.5 * down * down * traction * (m - plastic), walk.Answer.Stored, 1e-10, 1e-13);
                    Close.To(curve.Area(m) - 0.5 * traction * (m - plastic), walk.Answer.Dissipated, 1e-10, 1e-13);
                }
                Close.To(0, walk.To(0.999 * plastic, 0).Answer.Peel, 0, 0);
                Close.To(5 * -0.01, walk.To(-0.01, 0).Answer.Peel, 1e-12);
                double next = Math.Min(1.05 * m, 0.98 * curve.FinalSeparation);
                Close.To(curve.Traction(next), walk.To(next, 0).Answer.Peel, 1e-10, 0, "beyond the largest opening the curve goes on");
            }
        }
    }

    [Theory]
    [MemberData(nameof(Shares))]
    public void Shear_yields_the_other_way_after_a_reversal_and_its_largest_separation_goes_on(double share)
    {
        IndependentModesLaw law = new(Laws.PeelLine, Laws.Plateau, 5, 0.01, EnergyCounting.LargestSeparation, 0, share);
        TrapezoidCurve curve = Laws.Plateau;
        double m = 2.0, traction = curve.Traction(m), plastic = share * (m - traction / curve.Stiffness), reach = m - plastic;
        LawWalk walk = new LawWalk(law).To(0, m);
        Close.To(-0.5 * traction, walk.To(0, plastic - 0.5 * reach).Answer.Shear, 1e-11);
        Close.To(-traction, walk.To(0, plastic - reach * (1 - 1e-12)).Answer.Shear, 1e-10);
        double dissipated = walk.Answer.Dissipated;
        Close.To(curve.Area(m) - 0.5 * traction * reach, dissipated, 1e-11);
        // 0.3 mm more, the other way: the largest separation is then 2.3 mm, the plastic sliding has gone back by its own growth.
        walk.To(0, plastic - reach - 0.3);
        Close.To(-curve.Traction(2.3), walk.Answer.Shear, 1e-11);
        double reachNow = (1 - share) * 2.3 + share * curve.Traction(2.3) / curve.Stiffness, plasticNow = plastic - (2.3 - reachNow - plastic);
        Close.To(curve.Area(2.3) - 0.5 * curve.Traction(2.3) * reachNow, walk.Answer.Dissipated, 1e-11);
        Close.To(0, walk.To(0, plasticNow).Answer.Shear, 0, 1e-10);
        Close.To(curve.Traction(2.3), walk.To(0, plasticNow + reachNow).Answer.Shear, 1e-10);
    }

    [Fact]
    public void Cycles_of_growing_sliding_spend_the_toughness_however_often_they_turn()
    {
        Random random = new(6);
        foreach (double share in new[] { 0, 0.3, 1.0 })
        {
            for (int trial = 0; trial < 30; trial++)
            {
                IndependentModesLaw law = new(Laws.PeelLine, Laws.Decaying, 5, 0.02, EnergyCounting.NetWork, 0.5, share);
                LawWalk walk = new(law);
                double work = 0;
                for (int i = 0; walk.Answer.Branch != LawBranch.Separated; i++)
                    work += walk.AcceptedWorkTo(0, (i % 2 == 0 ? 1 : -1) * law.FinalSliding * random.NextDouble() * (0.1 + 0.1 * i), 300);
                Close.To(law.ShearToughness, walk.Answer.Dissipated, 1e-11, 0, $"share {share}");
                Close.To(work, walk.Answer.Dissipated, 2e-3, 0, $"share {share}");
            }
        }
    }

    [Fact]
    public void Shares_outside_zero_to_one_are_refused()
    {
        foreach (double bad in new[] { -0.1, 1.1, double.NaN })
        {
            Assert.Throws<ArgumentOutOfRangeException>(() => new IndependentModesLaw(Laws.PeelLine, Laws.ShearLine, 1, 0.05, EnergyCounting.NetWork, bad));
            Assert.Throws<ArgumentOutOfRangeException>(() => new IndependentModesLaw(Laws.PeelLine, Laws.ShearLine, 1, 0.05, EnergyCounting.NetWork, 0, bad));
        }
    }
}
