namespace InterfaceFE.Geometry;

/// <summary>How firmly a division line is wanted at a place: of places that lie too close to each other the firmest is kept.</summary>
internal enum Firmness
{
    /// <summary>End of a run.</summary>
    RunEnd,

    /// <summary>End of a joint or of a bonded stretch.</summary>
    Joint,

    /// <summary>Edge of a grip.</summary>
    Grip,

    /// <summary>Point of a gauge.</summary>
    Gauge,

    /// <summary>End of a finer place.</summary>
    Finer,
}

/// <summary>A place on the way to becoming a division line; a soft one is dropped when another place lies within its slack.</summary>
internal readonly record struct Breakpoint(double Q, Firmness Firmness, double Slack);

/// <summary>Runs that share one division because joints connect them; a run without joints is a group of its own.</summary>
internal sealed class RunGroup
{
    public List<Run> Runs { get; } = [];

    public List<Breakpoint> Breakpoints { get; } = [];

    /// <summary>Division lines that must exist, ascending.</summary>
    public double[] Places { get; private set; } = [];

    /// <summary>Stretches between neighbouring places.</summary>
    public Segment[] Segments { get; private set; } = [];

    /// <summary>
    /// Makes places of the breakpoints: ends of runs and joints within a tolerance become one, and softer ones are dropped where a place lies within their slack.
    /// </summary>
    public void Settle(double tolerance)
    {
        List<Breakpoint> firm = [];
        foreach (Breakpoint point in Breakpoints.Where(b => b.Firmness <= Firmness.Joint).OrderBy(b => b.Q).ThenBy(b => b.Firmness))
        {
            if (firm.Count == 0 || point.Q - firm[^1].Q > tolerance)
                firm.Add(point);
            else if (point.Firmness < firm[^1].Firmness)
                firm[^1] = point;
        }
        List<double> places = [.. firm.Select(b => b.Q)];
        foreach (IGrouping<Firmness, Breakpoint> soft in Breakpoints.Where(b => b.Firmness > Firmness.Joint).GroupBy(b => b.Firmness).OrderBy(g => g.Key))
            AddSoft(places, [.. soft.OrderBy(b => b.Q)], tolerance);
        places.Sort();
        Places = [.. places];
        Segments = new Segment[places.Count - 1];
        for (int i = 0; i < Segments.Length; i++)
            Segments[i] = new Segment(places[i], places[i + 1]);
    }

    /// <summary>Adds soft places that no place is near; of those near to each other their middle, whatever the side they are looked at from.</summary>
    private static void AddSoft(List<double> places, List<Breakpoint> soft, double tolerance)
    {
        double SlackOf(Breakpoint point) => Math.Max(tolerance, point.Slack);
        soft.RemoveAll(s => places.Exists(p => Math.Abs(p - s.Q) <= SlackOf(s)));
        for (int i = 0; i < soft.Count;)
        {
            int last = i;
            while (last + 1 < soft.Count && soft[last + 1].Q - soft[i].Q <= Math.Min(SlackOf(soft[i]), SlackOf(soft[last + 1])))
                last++;
            places.Add(last == i ? soft[i].Q : (soft[i].Q + soft[last].Q) / 2);
            i = last + 1;
        }
    }

    /// <summary>Index of the place nearest to q.</summary>
    public int PlaceNear(double q)
    {
        int at = Array.BinarySearch(Places, q);
        if (at >= 0)
            return at;
        at = ~at;
        if (at == 0)
            return 0;
        return at == Places.Length || q - Places[at - 1] <= Places[at] - q ? at - 1 : at;
    }

    /// <summary>Indices of the first and one past the last segment between two values of q.</summary>
    public (int First, int Past) Covered(double q0, double q1) => (PlaceNear(Math.Min(q0, q1)), PlaceNear(Math.Max(q0, q1)));

    /// <summary>Division points of a run in walking order.</summary>
    public double[] PointsOf(Run run)
    {
        (int first, int past) = Covered(run.Start, run.End);
        List<double> points = [Places[first]];
        for (int i = first; i < past; i++)
            points.AddRange(Segments[i].Points.AsSpan(1));
        if (run.Heading < 0)
            points.Reverse();
        return [.. points];
    }
}

/// <summary>A stretch between two neighbouring places of a group.</summary>
internal sealed class Segment(double from, double to)
{
    public double From { get; } = from;

    public double To { get; } = to;

    public double Length => To - From;

    /// <summary>Largest element length wanted.</summary>
    public double Wanted { get; set; } = double.PositiveInfinity;

    /// <summary>Largest ratio of neighbouring elements.</summary>
    public double Growth { get; set; } = double.PositiveInfinity;

    /// <summary>Number of even elements when a deck gives it; 0: free.</summary>
    public int Count { get; set; }

    /// <summary>Whether a joint is bonded here.</summary>
    public bool IsBond { get; set; }

    /// <summary>Strip that gave the number.</summary>
    public Strip? CountBy { get; set; }

    /// <summary>Any strip that lies here, for messages.</summary>
    public Strip? Owner { get; set; }

    /// <summary>Length wanted at the two ends.</summary>
    public double[] AtEnds { get; } = new double[2];

    /// <summary>Division points, both ends included.</summary>
    public double[] Points { get; set; } = [];
}

/// <summary>Two ends of segments that meet.</summary>
internal readonly record struct Meeting(Segment A, int EndA, Segment B, int EndB);
