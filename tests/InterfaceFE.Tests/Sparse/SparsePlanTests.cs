using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

public class SparsePlanTests
{
    [Fact]
    public void Root_unknowns_come_last()
    {
        SparsePlan plan = SparsePlan.Analyze(new StripModel(20, 2).Model.Pattern);
        Assert.Equal(4, plan.RootUnknownCount);
        foreach (int unknown in plan.RootUnknowns)
            Assert.True(plan.Pattern.IsRoot[plan.Pattern.VertexOfUnknown[unknown]]);
    }

    [Fact]
    public void Order_is_a_permutation_and_the_plan_repeats()
    {
        SlotPattern pattern = new StripModel(80, 5, true).Model.Pattern;
        SparsePlan first = SparsePlan.Analyze(pattern), second = SparsePlan.Analyze(pattern);
        Assert.Equal(Enumerable.Range(0, pattern.UnknownCount), first.OldOf.Order());
        Assert.Equal(first.OldOf, second.OldOf);
        Assert.Equal(first.Rows, second.Rows);
    }

    [Fact]
    public void A_tridiagonal_chain_has_no_fill_to_speak_of()
    {
        var model = new SparseModel();
        for (int v = 0; v < 1000; v++)
            model.Vertex(v, 0, 1);
        for (int v = 0; v + 1 < 1000; v++)
            model.Spring(v, v + 1, 1);
        SparsePlan plan = SparsePlan.Analyze(model.Pattern, new PlanOptions(FrontCost: 0, EntryCost: 0));
        // Without fill 1999; nested dissection of a chain fills less than another 1000.
        Assert.InRange(plan.FactorNonZeros, 1999, 2999);
    }

    [Fact]
    public void Work_grows_in_proportion_to_the_length_of_a_strip()
    {
        SparsePlan shorter = SparsePlan.Analyze(new StripModel(200, 4).Model.Pattern), longer = SparsePlan.Analyze(new StripModel(800, 4).Model.Pattern);
        Assert.InRange(longer.Flops / shorter.Flops, 3.5, 6);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    public void Coordinates_that_do_not_differ_still_give_an_order(int kind)
    {
        var model = new SparseModel();
        for (int v = 0; v < 400; v++)
            model.Vertex(kind, 0, 2, changeable: v % 2 == 0);
        for (int v = 0; v < 400; v++)
            for (int d = 0; d < 2; d++)
            {
                model.Spring(2 * v + d, v + 1 < 400 ? 2 * (v + 1) + d : -1, 1);
                model.Spring(2 * v + d, -1, 0.1);
            }
        Checks.SolvesAsDense(model, Checks.Factored(model), [], new Random(2), 1e-9);
    }

    [Fact]
    public void A_full_graph_larger_than_a_leaf_is_ordered()
    {
        var random = new Random(4);
        var model = new SparseModel();
        for (int v = 0; v < 150; v++)
            model.Vertex(random.NextDouble(), random.NextDouble(), 1);
        for (int v = 0; v < 150; v++)
            for (int w = 0; w < v; w++)
                model.Spring(v, w, random.NextDouble());
        model.Spring(0, -1, 1);
        Checks.SolvesAsDense(model, Checks.Factored(model), [], random, 1e-9);
    }

    [Fact]
    public void Bad_patterns_are_refused()
    {
        Refused(unknowns: [0, 5]);
        Refused(unknowns: [0, -1]);
        Refused(unknowns: [1, 1]);
        Refused(vertexOfUnknown: [0, 1, 0]);
        Refused(vertexOfUnknown: [0, 0, 7]);
        Refused(x: [0, double.NaN]);
        Refused(x: [0]);
        Refused(start: [0, 1]);
        Refused(start: [0, 2, 1, 2]);
    }

    private static void Refused(int[]? unknowns = null, int[]? vertexOfUnknown = null, double[]? x = null, int[]? start = null)
    {
        var pattern = new SlotPattern
        {
            UnknownCount = 3,
            VertexOfUnknown = vertexOfUnknown ?? [0, 0, 1],
            VertexX = x ?? [0, 1],
            VertexY = [0, 0],
            IsRoot = [false, false],
            IsChangeable = [false, false],
            SlotStart = start ?? [0, 2],
            SlotUnknowns = unknowns ?? [0, 2],
        };
        Assert.Throws<ArgumentException>(() => SparsePlan.Analyze(pattern));
    }
}
