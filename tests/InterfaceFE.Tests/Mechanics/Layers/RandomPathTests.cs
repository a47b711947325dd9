using InterfaceFE.Mechanics.Layers;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

/// <summary>Random closed paths with reversal, re-closing and pressing, every law and mixing.</summary>
public sealed class RandomPathTests
{
    public static TheoryData<int> Each => [.. Enumerable.Range(0, Laws.All.Count())];

    [Theory]
    [MemberData(nameof(Each))]
    public void Work_is_stored_plus_dissipated_along_closed_paths_and_none_gains_energy(int index)
    {
        ILayerLaw law = Laws.All.ElementAt(index);
        Random random = new(12);
        double size = Math.Max(law.PeelToughness, law.ShearToughness), worst = 0, least = double.PositiveInfinity;
        for (int trial = 0; trial < 30; trial++)
        {
            LawWalk walk = new(law);
            double work = 0, reach = 0.1 + 0.7 * random.NextDouble(), dissipated = 0;
            for (int leg = 0; leg < 7; leg++)
            {
                (double w, double v) = leg == 6 ? (0, 0) : (law.FinalOpening * reach * (1.2 * random.NextDouble() - 0.2), law.FinalSliding * reach * (2 * random.NextDouble() - 1));
                work += walk.AcceptedWorkTo(w, v, 500);
                worst = Math.Max(worst, Math.Abs(work - walk.Answer.Stored - walk.Answer.Dissipated) / size);
                Assert.True(walk.Answer.Dissipated >= dissipated);
                dissipated = walk.Answer.Dissipated;
            }
            least = Math.Min(least, work / size);
        }
        TestContext.Current.TestOutputHelper?.WriteLine(FormattableString.Invariant($"{law.GetType().Name} {index}: work and books differ by {worst:e2}, least work of a closed path {least:e2}, in toughnesses"));
        // The trapezoidal rule over 500 strides a leg; a steep first rise costs it most.
        Assert.InRange(worst, 0, 2e-3);
        Assert.True(least >= -1e-4);
    }

    [Theory]
    [InlineData(EnergyCounting.LargestSeparation, 0)]
    [InlineData(EnergyCounting.NetWork, 0)]
    [InlineData(EnergyCounting.LargestSeparation, 0.5)]
    [InlineData(EnergyCounting.NetWork, 0.5)]
    public void Sum_of_the_shares_is_one_at_separation_along_curved_paths_with_reversal(EnergyCounting counting, double plastic)
    {
        IndependentModesLaw law = new(Laws.Parabola, Laws.Plateau, 6, 0.05, counting, plastic, plastic);
        for (int trial = 0; trial < 60; trial++)
        {
            LawWalk walk = new(law);
            double wave = 0.2 + 0.1 * (trial % 20), last = 0;
            for (int i = 1; walk.Answer.Branch != LawBranch.Separated; i++)
            {
                double p = i / 400.0;
                walk.To(law.FinalOpening * p * (0.6 + 0.5 * Math.Sin(9 * p * wave)), law.FinalSliding * p * Math.Cos(7 * wave * p + trial));
                double sum = walk.Answer.EnergyPeel / law.PeelToughness + walk.Answer.EnergyShear / law.ShearToughness;
                Assert.True(sum <= 1 + 1e-12);
                last = sum;
            }
            Close.To(1, last, 1e-12);
            if (counting == EnergyCounting.NetWork)
                Assert.True(walk.Answer.Dissipated <= Math.Max(law.PeelToughness, law.ShearToughness) && walk.Answer.Dissipated >= Math.Min(law.PeelToughness, law.ShearToughness) * (1 - 1e-12));
        }
    }
}
