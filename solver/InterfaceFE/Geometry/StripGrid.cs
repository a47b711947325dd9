namespace InterfaceFE.Geometry;

/// <summary>
/// Nodes and elements of one strip: columns of nodes along, each from the lower to the upper side. Corner columns hold a node at each line through the thickness and,
/// with eight-node elements, one between lines; middle columns (eight-node only) hold a node at each line.
/// </summary>
internal sealed class StripGrid
{
    private readonly bool _quadratic;
    private readonly int _firstNode;
    private readonly double[] _lines;
    private readonly List<(Run Run, double Q)> _corners = [];
    private readonly Dictionary<Run, (int First, double[] Points)> _columnsOf = [];

    /// <summary>Lays out a strip.</summary>
    /// <param name="strip">The strip.</param>
    /// <param name="along">Division points q of each run in walking order.</param>
    /// <param name="lines">Shares of the thickness at the lines between elements, 0 to 1.</param>
    /// <param name="quadratic">Eight-node, or else four-node elements.</param>
    /// <param name="firstNode">Number of the first node.</param>
    public StripGrid(Strip strip, IReadOnlyDictionary<Run, double[]> along, double[] lines, bool quadratic, int firstNode)
    {
        (Strip, _lines, _quadratic, _firstNode) = (strip, lines, quadratic, firstNode);
        foreach (Run run in strip.Runs)
        {
            double[] points = along[run];
            int first = Math.Max(0, _corners.Count - 1);
            // A column between a bend and a straight run belongs to the straight run, whose q may be shared with the run it is bonded to.
            if (_corners.Count == 0)
                _corners.Add((run, points[0]));
            else if (_corners[^1].Run.IsBend)
                _corners[^1] = (run, points[0]);
            for (int i = 1; i < points.Length; i++)
                _corners.Add((run, points[i]));
            _columnsOf[run] = (first, points);
        }
    }

    public Strip Strip { get; }

    public int ElementsAlong => _corners.Count - 1;

    /// <summary>Shares of the thickness at the lines between rows of elements.</summary>
    public ReadOnlySpan<double> Lines => _lines;

    public int ElementsThrough => _lines.Length - 1;

    /// <summary>Nodes of a strip.</summary>
    public static long CountNodes(int along, int through, bool quadratic) =>
        quadratic ? (along + 1L) * (2 * through + 1) + (long)along * (through + 1) : (along + 1L) * (through + 1);

    public int NodeCount => (int)CountNodes(ElementsAlong, ElementsThrough, _quadratic);

    private int CornerColumnSize => _quadratic ? 2 * ElementsThrough + 1 : ElementsThrough + 1;

    private int ColumnPitch => CornerColumnSize + (_quadratic ? ElementsThrough + 1 : 0);

    /// <summary>Writes the coordinates of all nodes.</summary>
    public void WriteNodes(double[] x, double[] y)
    {
        for (int column = 0; column <= ElementsAlong; column++)
        {
            (Run run, double q) = _corners[column];
            int node = CornerNode(column, 0);
            for (int line = 0; line <= ElementsThrough; line++)
            {
                (x[node], y[node]) = run.Point(q, Offset(_lines[line]));
                node++;
                if (_quadratic && line < ElementsThrough)
                {
                    (x[node], y[node]) = run.Point(q, Offset((_lines[line] + _lines[line + 1]) / 2));
                    node++;
                }
            }
        }
        if (_quadratic)
            WriteMiddleNodes(x, y);
    }

    private void WriteMiddleNodes(double[] x, double[] y)
    {
        foreach (Run run in Strip.Runs)
        {
            (int first, double[] points) = _columnsOf[run];
            for (int i = 1; i < points.Length; i++)
                for (int line = 0; line <= ElementsThrough; line++)
                {
                    int node = MiddleNode(first + i - 1, line);
                    (x[node], y[node]) = run.Point((points[i - 1] + points[i]) / 2, Offset(_lines[line]));
                }
        }
    }

    private double Offset(double share) => (share - 0.5) * Strip.Thickness;

    private int CornerNode(int column, int line) => _firstNode + column * ColumnPitch + (_quadratic ? 2 * line : line);

    private int MiddleNode(int column, int line) => _firstNode + column * ColumnPitch + CornerColumnSize + line;

    /// <summary>Nodes of all elements, column by column, from the lower side up, counter-clockwise.</summary>
    public int[] Connectivity()
    {
        int perElement = _quadratic ? 8 : 4;
        int[] nodes = new int[ElementsAlong * ElementsThrough * perElement];
        int at = 0;
        for (int column = 0; column < ElementsAlong; column++)
            for (int line = 0; line < ElementsThrough; line++)
            {
                nodes[at++] = CornerNode(column, line);
                nodes[at++] = CornerNode(column + 1, line);
                nodes[at++] = CornerNode(column + 1, line + 1);
                nodes[at++] = CornerNode(column, line + 1);
                if (!_quadratic)
                    continue;
                nodes[at++] = MiddleNode(column, line);
                nodes[at++] = CornerNode(column + 1, line) + 1;
                nodes[at++] = MiddleNode(column, line + 1);
                nodes[at++] = CornerNode(column, line) + 1;
            }
        return nodes;
    }

    /// <summary>All edges by name.</summary>
    public Dictionary<string, MeshedEdge> Edges()
    {
        Dictionary<string, MeshedEdge> edges = [];
        foreach ((string name, EdgeSpan span) in Strip.Edges)
            edges[name] = span.IsEnd ? End(span) : Face(span);
        return edges;
    }

    /// <summary>Nodes of a joint's face between two division lines, from lower to higher x, with the x of the lines between elements.</summary>
    public (int[] Nodes, double[] X) FaceBetween(JointFace face, Span ends)
    {
        (int first, double[] points) = _columnsOf[face.Run];
        int line = face.Side == Side.Upper ? ElementsThrough : 0;
        int step = face.Run.Heading;
        List<int> nodes = [];
        List<double> positions = [];
        for (int i = step > 0 ? 0 : points.Length - 1; i >= 0 && i < points.Length; i += step)
        {
            double x = points[i];
            if (x < ends.From || x > ends.To)
                continue;
            if (_quadratic && positions.Count > 0)
                nodes.Add(MiddleNode(first + (step > 0 ? i - 1 : i), line));
            nodes.Add(CornerNode(first + i, line));
            positions.Add(x);
        }
        return ([.. nodes], [.. positions]);
    }

    private MeshedEdge End(EdgeSpan span)
    {
        int column = span.Side == Side.Left ? 0 : ElementsAlong;
        int first = CornerNode(column, 0);
        int[] nodes = new int[CornerColumnSize];
        double[] arc = new double[CornerColumnSize];
        for (int i = 0; i < nodes.Length; i++)
        {
            nodes[i] = first + i;
            double share = !_quadratic ? _lines[i] : i % 2 == 0 ? _lines[i / 2] : (_lines[i / 2] + _lines[i / 2 + 1]) / 2;
            arc[i] = share * Strip.Thickness;
        }
        return Ordered(span, nodes, arc);
    }

    private MeshedEdge Face(EdgeSpan span)
    {
        int line = span.Side == Side.Upper ? ElementsThrough : 0;
        double offset = Strip.OffsetOf(span.Side);
        List<int> nodes = [CornerNode(_columnsOf[Strip.Runs[span.FirstRun]].First, line)];
        List<double> arc = [0];
        double start = 0;
        for (int i = span.FirstRun; i <= span.LastRun; i++)
        {
            Run run = Strip.Runs[i];
            (int first, double[] points) = _columnsOf[run];
            double stretch = run.Stretch(offset);
            for (int j = 1; j < points.Length; j++)
            {
                if (_quadratic)
                {
                    nodes.Add(MiddleNode(first + j - 1, line));
                    arc.Add(start + stretch * (run.Along(points[j - 1]) + run.Along(points[j])) / 2);
                }
                nodes.Add(CornerNode(first + j, line));
                arc.Add(start + stretch * run.Along(points[j]));
            }
            start += stretch * run.Length;
        }
        return Ordered(span, [.. nodes], [.. arc]);
    }

    private MeshedEdge Ordered(EdgeSpan span, int[] nodes, double[] arc)
    {
        if (Strip.IsReversed(span))
        {
            double length = arc[^1];
            Array.Reverse(nodes);
            Array.Reverse(arc);
            for (int i = 0; i < arc.Length; i++)
                arc[i] = length - arc[i];
        }
        return new MeshedEdge { Nodes = nodes, Arc = arc };
    }
}
