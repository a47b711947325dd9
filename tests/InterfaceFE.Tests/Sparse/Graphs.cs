using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

/// <summary>Patterns that are plain graphs, one slot for each edge, and what a good order of them looks like.</summary>
internal static class Graphs
{
    /// <summary>A graph; unknowns per vertex 1 unless given.</summary>
    public static SlotPattern Of(int count, IEnumerable<(int, int)> edges, Func<int, (double X, double Y)> at, bool changeable = false, bool root = false, Func<int, int>? unknowns = null)
    {
        var vertexOf = new List<int>();
        var first = new int[count];
        for (int v = 0; v < count; v++)
        {
            first[v] = vertexOf.Count;
            vertexOf.AddRange(Enumerable.Repeat(v, unknowns?.Invoke(v) ?? 1));
        }
        var slots = new List<int>();
        foreach ((int a, int b) in edges)
            slots.AddRange([first[a], first[b]]);
        return new SlotPattern
        {
            UnknownCount = vertexOf.Count,
            VertexOfUnknown = vertexOf.ToArray(),
            VertexX = Enumerable.Range(0, count).Select(v => at(v).X).ToArray(),
            VertexY = Enumerable.Range(0, count).Select(v => at(v).Y).ToArray(),
            IsRoot = Enumerable.Repeat(root, count).ToArray(),
            IsChangeable = Enumerable.Repeat(changeable, count).ToArray(),
            SlotStart = Enumerable.Range(0, slots.Count / 2 + 1).Select(s => 2 * s).ToArray(),
            SlotUnknowns = slots.ToArray(),
        };
    }

    /// <summary>Random edges between vertices of one to three unknowns at random places, some of them changeable.</summary>
    public static SlotPattern Random(int count, int edges, Random random)
    {
        var pairs = new List<(int, int)>();
        for (int e = 0; e < edges; e++)
        {
            int a = random.Next(count), b = random.Next(count - 1);
            pairs.Add((a, b < a ? b : b + 1));
        }
        (double, double)[] places = Enumerable.Range(0, count).Select(_ => (random.NextDouble(), random.NextDouble())).ToArray();
        int[] unknowns = Enumerable.Range(0, count).Select(_ => random.Next(1, 4)).ToArray();
        SlotPattern pattern = Of(count, pairs, v => places[v], unknowns: v => unknowns[v]);
        for (int v = 0; v < count; v++)
            pattern.IsChangeable[v] = random.Next(4) == 0;
        return pattern;
    }

    /// <summary>Graphs that no mesh has.</summary>
    public static SlotPattern Odd(string kind) => kind switch
    {
        "one vertex" => Of(1, [], _ => (3, 4)),
        "no vertex" => Of(0, [], _ => (0, 0)),
        "star" => Of(100_000, Enumerable.Range(1, 99_999).Select(v => (0, v)), v => (Math.Cos(v), v == 0 ? 0 : Math.Sin(v))),
        "long path" => Of(100_000, Enumerable.Range(0, 99_999).Select(v => (v, v + 1)), v => (v, 0)),
        "path in one place" => Of(100_000, Enumerable.Range(0, 99_999).Select(v => (v, v + 1)), _ => (1, 1), changeable: true),
        "pieces" => Of(5000, Enumerable.Range(0, 4999).Where(v => v % 7 != 0).Select(v => (v, v + 1)), v => (v % 70, v / 70)),
        "no edges" => Of(3000, [], v => (v % 50, v / 50)),
        "clique" => Of(300, Enumerable.Range(0, 300).SelectMany(a => Enumerable.Range(0, a).Select(b => (a, b))), v => (v, 0)),
        "all root" => Of(40, Enumerable.Range(0, 39).Select(v => (v, v + 1)), v => (v, 0), root: true),
        "one heavy vertex" => Of(200, Enumerable.Range(0, 199).Select(v => (v, v + 1)), v => (v, 0), unknowns: v => v == 150 ? 1000 : 1),
        _ => throw new ArgumentOutOfRangeException(nameof(kind)),
    };

    /// <summary>
    /// Asserts that each vertex of the order had the fewest unknowns around it when its turn came, constant vertices before changeable ones, by eliminating with plain sets.
    /// Vertices outside the order stay to the end.
    /// </summary>
    public static void IsMinimumDegree(VertexGraph graph, bool[] isChangeable, int[] order)
    {
        HashSet<int>[] around = Enumerable.Range(0, graph.Count).Select(v => graph.Neighbours[graph.Start[v]..graph.Start[v + 1]].ToHashSet()).ToArray();
        var left = order.ToHashSet();
        foreach (int pivot in order)
        {
            IEnumerable<int> rivals = left.Any(v => !isChangeable[v]) ? left.Where(v => !isChangeable[v]) : left;
            Assert.Contains(pivot, rivals);
            Assert.Equal(rivals.Min(v => around[v].Sum(w => graph.Weight[w])), around[pivot].Sum(w => graph.Weight[w]));
            left.Remove(pivot);
            foreach (int v in around[pivot])
            {
                around[v].UnionWith(around[pivot]);
                around[v].ExceptWith([v, pivot]);
            }
        }
    }
}
