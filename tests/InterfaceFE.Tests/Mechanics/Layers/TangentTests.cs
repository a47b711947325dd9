using InterfaceFE.Mechanics.Layers;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

public sealed class TangentTests
{
    [Fact]
    public void Tangent_and_gradient_of_dissipation_are_derivatives_on_every_branch()
    {
        Random random = new(5);
        foreach (ILayerLaw law in Laws.All)
        {
            Dictionary<LawBranch, int> met = [];
            int crossing = 0, tried = 0;
            for (int trial = 0; trial < 4000; trial++)
            {
                LawWalk walk = new(law);
                int strides = random.Next(0, 5);
                double reach = random.NextDouble();
                for (int i = 0; i < strides; i++)
                    walk.To(law.FinalOpening * reach * (random.NextDouble() - 0.1), law.FinalSliding * reach * (2 * random.NextDouble() - 1));
                double w = law.FinalOpening * 1.1 * reach * (random.NextDouble() - 0.1), v = law.FinalSliding * 1.1 * reach * (2 * random.NextDouble() - 1);
                if (!Smooth(law, walk, w, v))
                    continue;
                LayerResponse here = walk.Try(w, v);
                bool crosses = law is IndependentModesLaw && walk.Accepted[4] == 0 && Phase(law, walk, w, v) == 1;
                crossing += crosses ? 1 : 0;
                met[here.Branch] = met.GetValueOrDefault(here.Branch) + 1;
                tried++;
                walk.CheckDerivatives(w, v, 0.1 * Math.Min(law.FinalOpening, law.FinalSliding), 2e-5, law.GetType().Name + (crosses ? " crossing" : ""));
            }
            TestContext.Current.TestOutputHelper?.WriteLine($"{law.GetType().Name}: {tried} points, {crossing} crossing strides, {string.Join(", ", met)}");
            Assert.True(met.GetValueOrDefault(LawBranch.Growing) > 50 && met.GetValueOrDefault(LawBranch.Separated) > (law is CoupledPotentialLaw ? 5 : 20));
            Assert.True(law is not IndependentModesLaw || (crossing > 20 && met[LawBranch.Releasing] > 20));
        }
    }

    private static double Phase(ILayerLaw law, LawWalk walk, double w, double v)
    {
        double[] tentative = new double[law.StateSize];
        law.Update(new Separation(w, v), default, walk.Accepted, tentative);
        return tentative[4];
    }

    /// <summary>Whether the tangent is continuous around the point, so that a central difference means something.</summary>
    private static bool Smooth(ILayerLaw law, LawWalk walk, double w, double v)
    {
        double h = 2e-6 * 0.1 * Math.Min(law.FinalOpening, law.FinalSliding), scale = Math.Max(law.Stiffness.Peel, law.Stiffness.Shear);
        LayerResponse here = walk.Try(w, v);
        foreach ((double dw, double dv) in new[] { (h, 0.0), (-h, 0.0), (0.0, h), (0.0, -h) })
        {
            LayerResponse near = walk.Try(w + dw, v + dv);
            if (near.Branch != here.Branch || Math.Abs(near.PeelByOpening - here.PeelByOpening) > 1e-3 * scale || Math.Abs(near.ShearBySliding - here.ShearBySliding) > 1e-3 * scale
                || Math.Abs(near.PeelBySliding - here.PeelBySliding) > 1e-3 * scale || Math.Abs(near.ShearByOpening - here.ShearByOpening) > 1e-3 * scale)
                return false;
        }
        return true;
    }

    [Fact]
    public void Tangent_at_the_largest_separation_so_far_is_that_of_growth()
    {
        foreach ((int index, ILayerLaw law) in Laws.All.Index())
        {
            foreach (double share in new[] { 0.5, 0.6, 0.8 })
            {
                double w = share * law.FinalOpening, h = 1e-7 * law.FinalOpening;
                LawWalk walk = new LawWalk(law).To(w, 0);
                LayerResponse here = walk.Try(w, 0), ahead = walk.Try(w + h, 0), behind = walk.Try(w - h, 0);
                Close.To((ahead.Peel - here.Peel) / h, here.PeelByOpening, 1e-4, 1e-4 * law.Stiffness.Peel, "ahead");
                Close.To((ahead.Dissipated - here.Dissipated) / h, here.DissipatedByOpening, 1e-4, 1e-6, "spent ahead");
                Close.To((here.Peel - behind.Peel) / h, behind.PeelByOpening, 1e-5, 1e-6 * law.Stiffness.Peel, "unloading behind");
                if (index < Laws.Secant.Count())
                    Close.To(here.Peel / w, behind.PeelByOpening, 1e-6, 0, "secant behind");
                Assert.Equal(LawBranch.Unloading, behind.Branch);
            }
        }
    }

    [Fact]
    public void Release_tangent_is_skew_when_the_toughnesses_differ()
    {
        IndependentModesLaw law = new(Laws.PeelLine, Laws.ShearLine, 30);
        LawWalk walk = new(law);
        for (int i = 0; walk.Answer.Branch != LawBranch.Releasing; i++)
            walk.To(1e-3 * i, 2e-3 * i);
        walk.To(walk.Separation.Opening + 1e-3, walk.Separation.Sliding + 2e-3);
        Close.To(law.PeelToughness / law.ShearToughness, walk.Answer.PeelBySliding / walk.Answer.ShearByOpening, 1e-9);
        Assert.False(law.HasSymmetricTangent);
    }

    [Fact]
    public void Updating_twice_gives_the_same_bytes_and_leaves_the_accepted_state_alone()
    {
        Random random = new(21);
        foreach (ILayerLaw law in Laws.All)
        {
            double[] accepted = new double[law.StateSize], first = new double[law.StateSize], second = new double[law.StateSize];
            for (int i = 0; i < 300; i++)
            {
                Separation z = new(law.FinalOpening * (random.NextDouble() - 0.2), law.FinalSliding * (random.NextDouble() - 0.5));
                if (i % 60 == 0)
                    accepted.AsSpan().Clear();
                double[] before = [.. accepted];
                LayerResponse a = law.Update(z, default, accepted, first);
                second.AsSpan().Fill(double.NaN);
                law.Update(new Separation(9, 9), default, accepted, second);
                LayerResponse b = law.Update(z, default, accepted, second);
                Assert.Equal(a, b);
                Assert.Equal(first.Select(BitConverter.DoubleToInt64Bits), second.Select(BitConverter.DoubleToInt64Bits));
                Assert.Equal(before, accepted);
                first.CopyTo(accepted, 0);
            }
        }
    }
}
