using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>A side of a strip. Upper is to the left of the walking direction.</summary>
internal enum Side
{
    /// <summary>To the right of the walking direction; bottom of a rectangle.</summary>
    Lower,

    /// <summary>To the left of the walking direction; top of a rectangle.</summary>
    Upper,

    /// <summary>First end of the line.</summary>
    Left,

    /// <summary>Last end of the line.</summary>
    Right,
}

/// <summary>A named edge: a side, and for faces the first and last run it covers (indices into <see cref="Strip.Runs"/>).</summary>
internal readonly record struct EdgeSpan(Side Side, int FirstRun, int LastRun)
{
    /// <summary>Whether the edge is an end and not a face.</summary>
    public bool IsEnd => Side is Side.Left or Side.Right;
}

/// <summary>Any adherend: a mid-line of straight runs and bends with an even thickness. A rectangle is a single run to +x.</summary>
internal sealed class Strip
{
    public required int Index { get; init; }

    public required string Name { get; init; }

    public required AdherendDeck Deck { get; init; }

    public required double Width { get; init; }

    public required double Thickness { get; init; }

    public required IReadOnlyList<Run> Runs { get; init; }

    /// <summary>Edges by name; a stretch alone stands for its upper face.</summary>
    public required IReadOnlyDictionary<string, EdgeSpan> Edges { get; init; }

    /// <summary>Names of stretches alone, with the index of their run.</summary>
    public required IReadOnlyDictionary<string, int> Stretches { get; init; }

    public double Length => Runs[^1].StartArc + Runs[^1].Length;

    public double Growth => Deck.Elements?.Growth ?? 1.3;

    public string Path => "adherends." + Name;

    public bool StraightAlongX => Runs.All(r => r.Heading == 1);

    public double OffsetOf(Side side) => side == Side.Upper ? Thickness / 2 : -Thickness / 2;

    /// <summary>Length of an edge [mm], along the true arc in bends.</summary>
    public double LengthOf(EdgeSpan edge)
    {
        if (edge.IsEnd)
            return Thickness;
        double length = 0;
        for (int i = edge.FirstRun; i <= edge.LastRun; i++)
            length += Runs[i].Length * Runs[i].Stretch(OffsetOf(edge.Side));
        return length;
    }

    /// <summary>Whether an edge starts where the line ends (faces), or at the upper side (ends): an edge starts at its lower x, an upright one at its lower y.</summary>
    public bool IsReversed(EdgeSpan edge)
    {
        (double x0, double y0) = EndPoint(edge, false);
        (double x1, double y1) = EndPoint(edge, true);
        return Math.Abs(x1 - x0) <= 1e-6 * Thickness ? y1 < y0 : x1 < x0;
    }

    /// <summary>Run and q at a position on a face from the edge's start [mm].</summary>
    public (Run Run, double Q) Locate(EdgeSpan edge, double position)
    {
        bool reversed = IsReversed(edge);
        double left = position;
        for (int step = 0; ; step++)
        {
            int index = reversed ? edge.LastRun - step : edge.FirstRun + step;
            Run run = Runs[index];
            double stretch = run.Stretch(OffsetOf(edge.Side));
            double length = run.Length * stretch;
            if (left <= length || step == edge.LastRun - edge.FirstRun)
            {
                double along = Math.Clamp(left, 0, length) / stretch;
                return (run, run.At(reversed ? run.Length - along : along));
            }
            left -= length;
        }
    }

    /// <summary>Share of the thickness from the lower side at a position on an end [mm].</summary>
    public double HeightOn(EdgeSpan end, double position)
    {
        double share = position / Thickness;
        return IsReversed(end) ? 1 - share : share;
    }

    private (double X, double Y) EndPoint(EdgeSpan edge, bool last)
    {
        switch (edge.Side)
        {
            case Side.Left:
                return Runs[0].Point(Runs[0].Start, OffsetOf(last ? Side.Upper : Side.Lower));
            case Side.Right:
                return Runs[^1].Point(Runs[^1].End, OffsetOf(last ? Side.Upper : Side.Lower));
            default:
                Run run = Runs[last ? edge.LastRun : edge.FirstRun];
                return run.Point(last ? run.End : run.Start, OffsetOf(edge.Side));
        }
    }
}
