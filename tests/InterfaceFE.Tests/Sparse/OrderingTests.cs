using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

public class OrderingTests
{
    private static readonly PlanOptions Options = new();

    [Fact]
    public void Every_interior_vertex_with_unknowns_is_ordered_once()
    {
        SlotPattern pattern = new StripModel(60, 4).Model.Pattern;
        var graph = VertexGraph.FromPattern(pattern);
        IEnumerable<int> interior = Enumerable.Range(0, graph.Count).Where(v => !pattern.IsRoot[v] && graph.Weight[v] > 0);
        Assert.Equal(interior, NestedDissection.Order(graph, pattern, Options).Order());
    }

    [Fact]
    public void Changeable_vertices_come_last_in_a_leaf()
    {
        SlotPattern pattern = new StripModel(6, 3).Model.Pattern;
        var graph = VertexGraph.FromPattern(pattern);
        int[] order = NestedDissection.Order(graph, pattern, Options with { LeafVertices = graph.Count });
        int constant = order.Count(v => !pattern.IsChangeable[v]);
        Assert.InRange(constant, 1, order.Length - 1);
        Assert.All(order.Take(constant), v => Assert.False(pattern.IsChangeable[v]));
        Assert.All(order.Skip(constant), v => Assert.True(pattern.IsChangeable[v]));
    }

    [Fact]
    public void Leaves_follow_minimum_degree_with_halo()
    {
        for (int seed = 0; seed < 20; seed++)
        {
            var random = new Random(seed);
            SlotPattern pattern = Graphs.Random(24, 40, random);
            var graph = VertexGraph.FromPattern(pattern);
            int[] part = Enumerable.Range(0, 24).Where(_ => random.Next(3) > 0).ToArray(), ordered = (int[])part.Clone();
            new LeafOrdering(graph, pattern.IsChangeable).Order(ordered);
            Assert.Equal(part, ordered.Order());
            Graphs.IsMinimumDegree(graph, pattern.IsChangeable, ordered);
        }
    }

    [Fact]
    public void A_path_to_the_root_does_not_pay_for_separators_of_other_branches()
    {
        // One row of vertices, all changeable: the top separator is one vertex, and so must be the top front when fronts cost nothing by themselves.
        SlotPattern pattern = Graphs.Of(1023, Enumerable.Range(0, 1022).Select(v => (v, v + 1)), v => (v, 0), changeable: true);
        SparsePlan plan = SparsePlan.Analyze(pattern, new PlanOptions(LeafVertices: 1, FrontCost: 0, EntryCost: 0));
        int tops = 0;
        for (int s = 0; s < plan.FrontCount; s++)
            if (plan.Parent[s] < 0)
            {
                tops++;
                Assert.Equal(1, plan.Columns(s));
            }
        Assert.Equal(1, tops);
    }

    [Fact]
    public void Costly_fronts_are_merged_into_fewer()
    {
        SlotPattern pattern = new StripModel(100, 5).Model.Pattern;
        SparsePlan apart = SparsePlan.Analyze(pattern, Options with { FrontCost = 0 }), together = SparsePlan.Analyze(pattern, Options with { FrontCost = 1e5 });
        Assert.True(together.FrontCount < apart.FrontCount / 2, $"{together.FrontCount} of {apart.FrontCount}");
        Assert.True(together.FactorNonZeros > apart.FactorNonZeros);
    }

    [Theory]
    [InlineData("one vertex")]
    [InlineData("no vertex")]
    [InlineData("star")]
    [InlineData("long path")]
    [InlineData("path in one place")]
    [InlineData("pieces")]
    [InlineData("no edges")]
    [InlineData("clique")]
    [InlineData("all root")]
    [InlineData("one heavy vertex")]
    public void Odd_graphs_are_ordered_completely_and_the_same_each_time(string kind)
    {
        SlotPattern pattern = Graphs.Odd(kind);
        SparsePlan first = SparsePlan.Analyze(pattern), second = SparsePlan.Analyze(pattern);
        var seen = new bool[pattern.UnknownCount];
        foreach (int unknown in first.OldOf)
            seen[unknown] = true;
        Assert.DoesNotContain(false, seen);
        Assert.Equal(pattern.UnknownCount, first.OldOf.Length);
        Assert.Equal(first.OldOf, second.OldOf);
        Assert.Equal(first.Rows, second.Rows);
    }

    [Fact]
    public void A_star_and_pieces_have_no_fill()
    {
        foreach (string kind in new[] { "star", "no edges" })
        {
            SlotPattern pattern = Graphs.Odd(kind);
            SparsePlan plan = SparsePlan.Analyze(pattern, new PlanOptions(FrontCost: 0, EntryCost: 0));
            Assert.Equal(pattern.UnknownCount + pattern.SlotStart.Zip(pattern.SlotStart.Skip(1)).Count(s => s.Second - s.First == 2), plan.FactorNonZeros);
        }
    }

    [Fact]
    public void A_square_grid_fills_no_more_than_theory_allows()
    {
        // Nested dissection of an n by n grid with nine-point coupling: at most 31/4 n² log2 n entries, leading term (A. George, SIAM J. Numer. Anal. 10 (1973) 345).
        const int n = 64;
        var edges = new List<(int, int)>();
        for (int i = 0; i < n; i++)
            for (int j = 0; j < n; j++)
                foreach ((int di, int dj) in new[] { (0, 1), (1, 0), (1, 1), (1, -1) })
                    if (i + di < n && (uint)(j + dj) < n)
                        edges.Add((i * n + j, (i + di) * n + j + dj));
        SparsePlan plan = SparsePlan.Analyze(Graphs.Of(n * n, edges, v => (v / n, v % n)), new PlanOptions(FrontCost: 0, EntryCost: 0));
        Assert.InRange(plan.FactorNonZeros, n * n * 5, 31.0 / 4 * n * n * Math.Log2(n));
    }
}
