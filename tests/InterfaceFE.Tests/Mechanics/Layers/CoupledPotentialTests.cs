using InterfaceFE.Mechanics.Layers;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

public sealed class CoupledPotentialTests
{
    [Fact]
    public void Growing_tractions_are_the_derivatives_of_the_published_potential()
    {
        Random random = new(8);
        foreach (CoupledPotentialLaw law in Laws.Potentials)
        {
            (PotentialMode peel, PotentialMode shear) = Modes(law);
            int tried = 0;
            while (tried < 300)
            {
                double w = law.FinalOpening * random.NextDouble(), v = law.FinalSliding * (2 * random.NextDouble() - 1), h = 1e-5 * Math.Min(w, Math.Abs(v));
                LayerResponse answer = new LawWalk(law).To(w, v).Answer;
                if (answer.Peel == 0 || answer.Shear == 0 || w + h > law.FinalOpening || Math.Abs(v) + h > law.FinalSliding)
                    continue;
                tried++;
                Close.To((Psi(peel, shear, w + h, v) - Psi(peel, shear, w - h, v)) / (2 * h), answer.Peel, 1e-6, 1e-6 * peel.Strength, "peel");
                Close.To((Psi(peel, shear, w, v + h) - Psi(peel, shear, w, v - h)) / (2 * h), answer.Shear, 1e-6, 1e-6 * shear.Strength, "shear");
                Close.To(Psi(peel, shear, w, v), answer.Stored + answer.Dissipated, 1e-10, 1e-12, "energy");
                Close.To(answer.PeelBySliding, answer.ShearByOpening, 1e-10, 1e-10 * law.Stiffness.Peel, "symmetry");
            }
        }
    }

    [Fact]
    public void Modes_alone_reach_their_strength_where_the_initial_slope_says_and_spend_their_toughness()
    {
        foreach (CoupledPotentialLaw law in Laws.Potentials)
        {
            (PotentialMode peel, PotentialMode shear) = Modes(law);
            foreach ((PotentialMode mode, bool isPeel) in new[] { (peel, true), (shear, false) })
            {
                double at = mode.InitialSlope * mode.FinalSeparation, most = 0;
                LawWalk walk = new(law);
                for (int i = 1; i <= 2000; i++)
                {
                    double x = i * mode.FinalSeparation / 2000;
                    LayerResponse answer = isPeel ? walk.To(x, 0).Answer : walk.To(0, -x).Answer;
                    most = Math.Max(most, isPeel ? answer.Peel : -answer.Shear);
                }
                Close.To(mode.Strength, most, 2e-5, 0, "strength");
                Close.To(mode.Strength, isPeel ? new LawWalk(law).To(at, 0).Answer.Peel : new LawWalk(law).To(0, at).Answer.Shear, 1e-12, 0, "at the peak");
                Close.To(mode.Toughness, walk.Answer.Dissipated, 1e-12, 0, "toughness");
                Assert.Equal(LawBranch.Separated, walk.Answer.Branch);
            }
        }
    }

    [Fact]
    public void Unloading_keeps_both_secants_of_the_joint_maxima()
    {
        Random random = new(3);
        foreach (CoupledPotentialLaw law in Laws.Potentials)
        {
            for (int trial = 0; trial < 200; trial++)
            {
                double w = 0.8 * law.FinalOpening * random.NextDouble(), v = 0.8 * law.FinalSliding * random.NextDouble();
                LawWalk walk = new LawWalk(law).To(w, 0.1 * v).To(0.2 * w, -v);
                LayerResponse joint = new LawWalk(law).To(w, v).Answer;
                for (int i = 0; i < 5; i++)
                {
                    double a = random.NextDouble(), b = 2 * random.NextDouble() - 1;
                    LayerResponse answer = walk.To(a * w, b * v).Answer;
                    Close.To(a * joint.Peel, answer.Peel, 1e-11, 1e-13);
                    Close.To(b * joint.Shear, answer.Shear, 1e-11, 1e-13);
                    Close.To(0, answer.DissipatedByOpening, 0, 1e-12 * law.Stiffness.Peel);
                }
                walk.To(-0.1, 0.5 * v);
                Close.To(-3, walk.Answer.Peel, 1e-12);
                Close.To(0.5 * joint.Shear, walk.Answer.Shear, 1e-11, 1e-13);
            }
        }
    }

    [Fact]
    public void The_tougher_mode_goes_on_alone_where_the_other_has_lost_its_traction()
    {
        // Shear is the tougher one: past the sliding at which its energy left falls to the difference of the toughnesses peel is gone and shear is not.
        CoupledPotentialLaw law = Laws.Potentials.First();
        LawWalk walk = new(law);
        double slide = 0;
        while (walk.To(1e-5 * law.FinalOpening, slide += 0.001 * law.FinalSliding).Answer.Peel > 0)
            Assert.True(slide < law.FinalSliding);
        Assert.InRange(slide, 0.1 * law.FinalSliding, 0.95 * law.FinalSliding);
        Assert.True(walk.Answer.Shear > 0 && walk.Answer.Branch == LawBranch.Growing);
        Close.To(law.ShearToughness - law.PeelToughness, walk.AcceptedWorkTo(1e-5 * law.FinalOpening, law.FinalSliding, 4000), 3e-3);
    }

    [Fact]
    public void Modes_outside_their_range_are_refused()
    {
        foreach (double bad in new[] { 1, 0, 21, double.NaN })
            Assert.Throws<ArgumentOutOfRangeException>(() => new PotentialMode(3, 1, bad, 0.01));
        foreach (double bad in new[] { 0, 0.46, -1, double.NaN })
            Assert.Throws<ArgumentOutOfRangeException>(() => new PotentialMode(3, 1, 3, bad));
        Close.To(1, new PotentialMode(3, 1, 3, 0.447).Toughness);
    }

    private static (PotentialMode Peel, PotentialMode Shear) Modes(CoupledPotentialLaw law)
    {
        PotentialMode third = new(2, 0.9, 2, 0.01);
        PotentialMode[] all = [Laws.HollowPeel, Laws.BulgingShear, third];
        return (all.First(m => m.FinalSeparation == law.FinalOpening && m.Toughness == law.PeelToughness), all.First(m => m.FinalSeparation == law.FinalSliding && m.Toughness == law.ShearToughness));
    }

    /// <summary>The potential as the paper writes it, with its energy constants.</summary>
    private static double Psi(PotentialMode peel, PotentialMode shear, double w, double v)
    {
        double alpha = peel.Exponent, beta = shear.Exponent, phiN = peel.Toughness, phiT = shear.Toughness;
        double m = alpha * (alpha - 1) * peel.InitialSlope * peel.InitialSlope / (1 - alpha * peel.InitialSlope * peel.InitialSlope);
        double n = beta * (beta - 1) * shear.InitialSlope * shear.InitialSlope / (1 - beta * shear.InitialSlope * shear.InitialSlope);
        double gammaN = Math.Pow(alpha / m, m), gammaT = Math.Pow(beta / n, n);
        if (phiN >= phiT)
            gammaN *= -phiN;
        else
            gammaT *= -phiT;
        double x = w / peel.FinalSeparation, y = Math.Abs(v) / shear.FinalSeparation;
        return Math.Min(phiN, phiT) + (gammaN * Math.Pow(1 - x, alpha) * Math.Pow(m / alpha + x, m) + Math.Max(0, phiN - phiT)) * (gammaT * Math.Pow(1 - y, beta) * Math.Pow(n / beta + y, n) + Math.Max(0, phiT - phiN));
    }
}
