using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

public class LargeStripTests
{
    [Fact]
    public void A_strip_of_a_hundred_thousand_unknowns_solves_with_a_small_residual()
    {
        SparseModel model = new StripModel(2000, 12, penalty: 1e3).Model;
        SparsePlan plan = SparsePlan.Analyze(model.Pattern);
        var factor = new WorkingFactor(plan);
        model.Load(factor);
        Assert.Equal(FactorStatus.Done, factor.Factor().Status);
        double[] b = Checks.RandomVector(model.Unknowns, new Random(6)), x = new double[b.Length];
        int[] held = model.RootUnknowns();
        factor.Solve(b, x, held);
        Close.To(0, Checks.BackwardError(model, b, x, held), absolute: 1e-14);
        Assert.Equal(new Inertia(model.Unknowns - held.Length, 0, 0), factor.Inertia(held));
        // Measured 0.423; a poor order needs several times as many.
        Assert.InRange(plan.Flops, 0.1e9, 0.5e9);
    }
}
