using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

public class CutSweepTests
{
    [Fact]
    public void The_sweep_finds_the_cheapest_balanced_cut()
    {
        for (int seed = 0; seed < 30; seed++)
        {
            var random = new Random(seed);
            var graph = VertexGraph.FromPattern(Graphs.Random(40, 70, random));
            int[] sorted = Enumerable.Range(0, 40).ToArray();
            random.Shuffle(sorted);
            var side = new Side[40];
            Array.Fill(side, Side.Left);
            double cost = new CutSweep(graph, graph.Weight, side, 40).Run(sorted);
            long separator = Enumerable.Range(0, 40).Where(v => side[v] == Side.Separator).Sum(v => graph.Weight[v]);
            (double expected, long fewest) = Cheapest(graph, sorted);
            Close.To(expected, cost, relative: 1e-14);
            Assert.Equal(fewest, separator);
            for (int v = 0; v < 40; v++)
                if (side[v] == Side.Left)
                    Assert.DoesNotContain(graph.Neighbours[graph.Start[v]..graph.Start[v + 1]], w => side[w] == Side.Right);
        }
    }

    /// <summary>Tries every cut and both one-sided separators, counted anew each time.</summary>
    private static (double Cost, long Separator) Cheapest(VertexGraph graph, int[] sorted)
    {
        long total = graph.Weight.Sum();
        (double Cost, long Separator) best = (double.MaxValue, 0);
        for (int last = 0; last + 1 < sorted.Length; last++)
        {
            HashSet<int> left = sorted.Take(last + 1).ToHashSet();
            long before = left.Sum(v => graph.Weight[v]);
            if (Math.Abs(2.0 * before / total - 1) > Separation.LargestImbalance && last + 1 != sorted.Length / 2)
                continue;
            foreach (bool fromLeft in new[] { true, false })
            {
                long separator = sorted.Where(v => left.Contains(v) == fromLeft
                    && graph.Neighbours[graph.Start[v]..graph.Start[v + 1]].Any(w => left.Contains(w) != fromLeft)).Sum(v => graph.Weight[v]);
                double cost = new Separation(before, total - before, separator, total).Cost;
                if (cost < best.Cost)
                    best = (cost, separator);
            }
        }
        return best;
    }
}
