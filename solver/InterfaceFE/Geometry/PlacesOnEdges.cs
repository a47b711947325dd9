using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>Places on edges that grips and gauges name and that must fall on nodes.</summary>
internal sealed class PlacesOnEdges
{
    /// <summary>
    /// Share of the thickness within which the place of a grip or gauge is moved to another place (a joint's end, say) instead of making a sliver of an element.
    /// </summary>
    public const double Slack = 2e-3;

    private readonly Dictionary<string, Strip> _byName;

    private PlacesOnEdges(Strip[] strips)
    {
        _byName = strips.ToDictionary(s => s.Name);
        OnEnds = [.. strips.Select(_ => new List<double>())];
    }

    /// <summary>Places on faces.</summary>
    public List<(Run Run, double Q, Firmness Firmness)> OnFaces { get; } = [];

    /// <summary>Per strip, shares of the thickness from the lower side.</summary>
    public List<double>[] OnEnds { get; }

    /// <summary>Collects the places of a deck.</summary>
    /// <exception cref="DeckException">All edges that do not exist and places beyond an edge.</exception>
    public static PlacesOnEdges Collect(Deck deck, Strip[] strips)
    {
        PlacesOnEdges places = new(strips);
        List<DeckProblem> problems = [];
        void Try(Action add)
        {
            try
            {
                add();
            }
            catch (DeckException fault)
            {
                problems.AddRange(fault.Problems);
            }
        }
        foreach ((string name, GripDeck grip) in deck.Grips)
            foreach (string on in grip.On)
                Try(() => places.AddGrip("grips." + name, on, grip));
        foreach ((string name, GaugeDeck gauge) in deck.Keep?.Gauges ?? new Dictionary<string, GaugeDeck>())
            Try(() => places.AddGauge("keep.gauges." + name, gauge));
        if (problems.Count > 0)
            throw new DeckException(problems);
        return places;
    }

    private void AddGrip(string path, string on, GripDeck grip)
    {
        (Strip strip, EdgeSpan edge) = Find(on, path + ".on");
        double length = strip.LengthOf(edge);
        if (grip.At is { } at)
            Add(strip, edge, at.On(length), length, Firmness.Grip, path + ".at", on);
        if (grip.From is { } from)
            Add(strip, edge, from, length, Firmness.Grip, path + ".from", on);
        if (grip.To is { } to)
            Add(strip, edge, to, length, Firmness.Grip, path + ".to", on);
        if (grip.From is { } start && grip.To is { } end && !(end > start))
            throw new DeckException(path + ".to", Text.Of($"{end:G6} mm must be greater than `from`, {start:G6} mm"));
    }

    private void AddGauge(string path, GaugeDeck gauge)
    {
        (Strip strip, EdgeSpan edge) = Find(gauge.On, path + ".on");
        double length = strip.LengthOf(edge);
        Add(strip, edge, gauge.At.On(length), length, Firmness.Gauge, path + ".at", gauge.On);
        if (gauge.To == null)
            return;
        (strip, edge) = Find(gauge.To, path + ".to");
        length = strip.LengthOf(edge);
        Add(strip, edge, (gauge.ToAt ?? gauge.At).On(length), length, Firmness.Gauge, gauge.ToAt != null ? path + ".to at" : path + ".at", gauge.To);
    }

    private (Strip Strip, EdgeSpan Edge) Find(string text, string path)
    {
        EdgeName name = EdgeName.Parse(text, path);
        if (!_byName.TryGetValue(name.Adherend, out Strip? strip))
            throw EdgeName.NoAdherend(text, path, name.Adherend, _byName.Keys);
        if (!strip.Edges.TryGetValue(name.Edge, out EdgeSpan edge))
            throw EdgeName.NoEdge(text, path, name.Edge, name.Adherend, strip.Edges.Keys);
        return (strip, edge);
    }

    private void Add(Strip strip, EdgeSpan edge, double position, double length, Firmness firmness, string path, string text)
    {
        if (!(position >= -1e-9 * length) || position > length * (1 + 1e-9))
            throw new DeckException(path, Text.Of($"{position:G6} mm lies beyond \"{text}\", which is {length:G6} mm long"));
        if (edge.IsEnd)
        {
            OnEnds[strip.Index].Add(strip.HeightOn(edge, Math.Clamp(position, 0, length)));
            return;
        }
        (Run run, double q) = strip.Locate(edge, position);
        OnFaces.Add((run, q, firmness));
    }
}
