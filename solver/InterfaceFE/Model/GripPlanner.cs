using System.Globalization;
using InterfaceFE.Decks;
using InterfaceFE.Geometry;

namespace InterfaceFE.Model;

/// <summary>Turns the grips of a deck into bodies of nodes on the mesh. Grips on the same nodes held the same way share a body.</summary>
public static class GripPlanner
{
    /// <summary>Plans the grips.</summary>
    /// <exception cref="DeckException">An edge does not exist, a place lies off its edge, or grips overlap.</exception>
    public static (IReadOnlyList<GripBody> Bodies, IReadOnlyList<Grip> Grips) Plan(Deck deck, Mesh mesh)
    {
        var finder = new EdgeFinder(mesh);
        var bodies = new List<GripBody>();
        var grips = new List<Grip>();
        foreach ((string name, GripDeck grip) in deck.Grips)
        {
            var own = new List<int>();
            foreach (string edgeText in grip.On)
            {
                FoundEdge found = finder.Find(edgeText, $"grips.{name}.on");
                GripBody body = Body(name, grip, edgeText, found.Edge, mesh);
                int same = bodies.FindIndex(b => b.Rigid == body.Rigid && b.Nodes.AsSpan().SequenceEqual(body.Nodes) && (!b.Rigid || (b.PinX == body.PinX && b.PinY == body.PinY)));
                if (same < 0)
                {
                    RefuseOverlap(name, body, bodies);
                    bodies.Add(body);
                    same = bodies.Count - 1;
                }
                own.Add(same);
            }
            grips.Add(new Grip(name, own) { LoadTrains = grip.LoadTrain is { } train ? [.. Pulled(deck, name).Select(component => new LoadTrain(own[0], component, train.Stiffness))] : [] });
        }
        return (bodies, grips);
    }

    /// <summary>Axes along which the sequence pulls or pushes a grip.</summary>
    private static IEnumerable<GripComponent> Pulled(Deck deck, string name) =>
        deck.Sequence.Select(s => s.Pull ?? s.Push).Where(p => p?.Grip == name).Select(p => SequencePlanner.Of(p!.Along).Component).Distinct();

    private static GripBody Body(string name, GripDeck grip, string edgeText, MeshedEdge edge, Mesh mesh)
    {
        if (grip.At is { } at)
        {
            double position = at.On(edge.Length);
            RequireOnEdge($"grips.{name}.at", position, edge, edgeText);
            int node = edge.Nodes[edge.Nearest(position)];
            return new GripBody { Name = edgeText, Rigid = false, Nodes = [node], PinX = mesh.X[node], PinY = mesh.Y[node] };
        }
        double from = grip.From ?? 0, to = grip.To ?? edge.Length;
        RequireOnEdge($"grips.{name}.from", from, edge, edgeText);
        RequireOnEdge($"grips.{name}.to", to, edge, edgeText);
        int first = edge.Nearest(from), last = edge.Nearest(to);
        if (last <= first)
            throw new DeckException($"grips.{name}.to", string.Create(CultureInfo.InvariantCulture, $"the gripped stretch from {from:G6} mm to {to:G6} mm holds no element of '{edgeText}': give a longer stretch"));
        int[] nodes = edge.Nodes[first..(last + 1)];
        double x = grip.Pin is { } pin ? pin[0] : 0.5 * (mesh.X[nodes[0]] + mesh.X[nodes[^1]]);
        double y = grip.Pin is { } pinned ? pinned[1] : 0.5 * (mesh.Y[nodes[0]] + mesh.Y[nodes[^1]]);
        return new GripBody { Name = edgeText, Rigid = grip.Hold == GripHold.Rigid, Nodes = nodes, PinX = x, PinY = y };
    }

    private static void RequireOnEdge(string path, double position, MeshedEdge edge, string edgeText)
    {
        if (position < -1e-9 * edge.Length || position > edge.Length * (1 + 1e-9))
            throw new DeckException(path, string.Create(CultureInfo.InvariantCulture, $"{position:G6} mm lies beyond '{edgeText}', which is {edge.Length:G6} mm long"));
    }

    private static void RefuseOverlap(string name, GripBody body, List<GripBody> bodies)
    {
        foreach (GripBody other in bodies)
            if ((body.Rigid || other.Rigid) && body.Nodes.Intersect(other.Nodes).Any())
                throw new DeckException($"grips.{name}.on", $"'{body.Name}' shares points with another grip on '{other.Name}' and one of them is rigid: a point can belong to one rigid grip only; use `hold: each point`, or grip the same stretch with the same pin in both");
    }
}
