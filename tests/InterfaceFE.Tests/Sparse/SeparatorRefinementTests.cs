using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

public class SeparatorRefinementTests
{
    [Fact]
    public void A_refined_separator_separates_and_is_not_worse()
    {
        int better = 0;
        for (int seed = 0; seed < 40; seed++)
        {
            var random = new Random(seed);
            var graph = VertexGraph.FromPattern(Graphs.Random(80, 130, random));
            var side = new Side[80];
            // Any division in which a separator lies between the pieces.
            for (int v = 0; v < 80; v++)
                side[v] = random.Next(2) == 0 ? Side.Left : Side.Right;
            for (int v = 0; v < 80; v++)
                if (side[v] == Side.Left && Neighbours(graph, v).Any(w => side[w] == Side.Right))
                    side[v] = Side.Separator;
            Separation before = Measure(graph, side), after = new SeparatorRefinement(graph, graph.Weight, side).Run(Part(80));
            Separates(graph, side);
            Assert.Equal(Measure(graph, side), after);
            Assert.True(after.Cost <= before.Cost, $"{before} became {after}");
            Assert.True(after.Imbalance <= Math.Max(before.Imbalance, Separation.LargestImbalance), $"{before} became {after}");
            better += after.Separator < before.Separator ? 1 : 0;
        }
        Assert.True(better > 30, $"only {better} of 40 got smaller");
    }

    [Fact]
    public void A_ragged_separator_of_a_long_grid_becomes_a_straight_one()
    {
        const int length = 20, height = 5;
        var edges = new List<(int, int)>();
        for (int i = 0; i < length; i++)
            for (int j = 0; j < height; j++)
            {
                if (i + 1 < length)
                    edges.Add((i * height + j, (i + 1) * height + j));
                if (j + 1 < height)
                    edges.Add((i * height + j, i * height + j + 1));
            }
        var graph = VertexGraph.FromPattern(Graphs.Of(length * height, edges, v => (v / height, v % height)));
        var side = new Side[length * height];
        for (int v = 0; v < side.Length; v++)
        {
            int column = v / height, edge = v % height % 2 == 0 ? 8 : 11;
            side[v] = column < edge ? Side.Left : column > edge ? Side.Right : Side.Separator;
        }
        for (int v = 0; v < side.Length; v++)
            if (side[v] == Side.Left && Neighbours(graph, v).Any(w => side[w] == Side.Right))
                side[v] = Side.Separator;
        Assert.True(Measure(graph, side).Separator > height);
        Separation after = new SeparatorRefinement(graph, graph.Weight, side).Run(Part(side.Length));
        Separates(graph, side);
        Assert.Equal(height, after.Separator);
    }

    [Fact]
    public void Vertices_outside_the_part_stay_outside()
    {
        var random = new Random(7);
        var graph = VertexGraph.FromPattern(Graphs.Random(60, 100, random));
        var side = new Side[60];
        int[] part = Enumerable.Range(0, 60).Where(v => v % 3 != 0).ToArray();
        foreach (int v in part)
            side[v] = v % 2 == 0 ? Side.Left : Side.Right;
        foreach (int v in part)
            if (side[v] == Side.Right && Neighbours(graph, v).Any(w => side[w] == Side.Left))
                side[v] = Side.Separator;
        new SeparatorRefinement(graph, graph.Weight, side).Run(part);
        for (int v = 0; v < 60; v++)
            Assert.Equal(v % 3 == 0, side[v] == Side.Outside);
        Separates(graph, side);
    }

    private static int[] Part(int count) => Enumerable.Range(0, count).ToArray();

    private static int[] Neighbours(VertexGraph graph, int v) => graph.Neighbours[graph.Start[v]..graph.Start[v + 1]];

    private static Separation Measure(VertexGraph graph, Side[] side)
    {
        long Of(Side wanted) => Enumerable.Range(0, graph.Count).Where(v => side[v] == wanted).Sum(v => graph.Weight[v]);
        return new Separation(Of(Side.Left), Of(Side.Right), Of(Side.Separator), graph.Weight.Sum());
    }

    private static void Separates(VertexGraph graph, Side[] side)
    {
        for (int v = 0; v < graph.Count; v++)
            if (side[v] == Side.Left)
                Assert.DoesNotContain(Neighbours(graph, v), w => side[w] == Side.Right);
    }
}
