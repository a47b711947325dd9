using InterfaceFE.Mechanics.Layers;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

public sealed class PowerLawTests
{
    [Theory]
    [InlineData(0.5)]
    [InlineData(1)]
    [InlineData(1.7)]
    [InlineData(4)]
    public void Sum_of_the_powers_of_the_shares_is_one_at_separation_on_proportional_ways(double exponent)
    {
        PowerLaw law = new(Laws.PeelLine, Laws.ShearLine, exponent, 30);
        for (int k = 0; k <= 40; k++)
        {
            double angle = Math.PI * (k / 40.0 - 0.5), dw = Math.Cos(angle), dv = Math.Sin(angle);
            LawWalk walk = new(law);
            for (int i = 1; walk.Answer.Branch != LawBranch.Separated; i++)
                walk.To(0.013 * i * law.FinalOpening * dw, 0.013 * i * law.FinalOpening * dv);
            Close.To(1, Math.Pow(walk.Answer.EnergyPeel / law.PeelToughness, exponent) + Math.Pow(walk.Answer.EnergyShear / law.ShearToughness, exponent), 1e-11, 0, $"angle {angle}");
        }
    }

    [Fact]
    public void Exponent_one_starts_to_soften_where_the_squares_of_the_tractions_over_their_strengths_sum_to_one()
    {
        PowerLaw law = new(Laws.PeelLine, Laws.ShearLine, 1, 30);
        for (int k = 0; k <= 20; k++)
        {
            double angle = 0.5 * Math.PI * k / 20, peel = 2.5 * Math.Cos(angle), shear = 4 * Math.Sin(angle), w = peel / 20, v = shear / 8;
            LawWalk walk = new(law);
            Close.To(0, walk.To(0.999999 * w, 0.999999 * v).Answer.Damage, 0, 0);
            Close.To(peel, walk.Answer.Peel, 2e-6, 1e-12);
            Close.To(shear, walk.Answer.Shear, 2e-6, 1e-12);
            Assert.True(walk.To(1.000001 * w, 1.000001 * v).Answer.Damage > 0);
        }
    }

    [Fact]
    public void Tractions_follow_the_closed_form_of_a_mixed_bilinear_curve()
    {
        const double Alpha = 1.7;
        PowerLaw law = new(Laws.PeelLine, Laws.ShearLine, Alpha, 30);
        Random random = new(4);
        for (int trial = 0; trial < 300; trial++)
        {
            double w = 0.7 * random.NextDouble(), v = 1.2 * (2 * random.NextDouble() - 1), peelEnergy = 20 * w * w, shearEnergy = 8 * v * v, mix = shearEnergy / (peelEnergy + shearEnergy);
            double toughness = Math.Pow(Math.Pow((1 - mix) / 0.8, Alpha) + Math.Pow(mix / 2.2, Alpha), -1 / Alpha);
            double onset = Math.Pow(Math.Pow((1 - mix) / (2.5 * 2.5 / 40), Alpha) + Math.Pow(mix / (4.0 * 4 / 16), Alpha), -1 / Alpha);
            double e = Math.Sqrt(peelEnergy + shearEnergy), first = Math.Sqrt(2 * onset), last = 2 * toughness / first;
            double kept = e <= first ? 1 : e >= last ? 0 : first * (last - e) / (e * (last - first));
            LayerResponse answer = new LawWalk(law).To(w, v).Answer;
            Close.To(kept * 20 * w, answer.Peel, 1e-11, 1e-13);
            Close.To(kept * 8 * v, answer.Shear, 1e-11, 1e-13);
        }
    }

    [Fact]
    public void Exponents_below_a_half_are_refused()
    {
        foreach (double bad in new[] { 0.49, 0, -1, double.NaN, 21 })
            Assert.Throws<ArgumentOutOfRangeException>(() => new PowerLaw(Laws.PeelLine, Laws.ShearLine, bad, 30));
    }
}
