namespace InterfaceFE.Reports;

/// <summary>A figure as a plain description, free of any drawing library: header, legend, panels one above the other, keys, and a colour bar underneath.</summary>
internal sealed record Figure
{
    /// <summary>Bold first line.</summary>
    public required string Title { get; init; }

    /// <summary>Grey lines under the title; long ones are broken.</summary>
    public IReadOnlyList<string> Subtitles { get; init; } = [];

    /// <summary>Panels from top to bottom.</summary>
    public required IReadOnlyList<Panel> Panels { get; init; }

    /// <summary>Keys of areas and lines that are no curves.</summary>
    public IReadOnlyList<Key> Keys { get; init; } = [];

    /// <summary>Colour bar, if colours stand for a number.</summary>
    public ColourBar? Bar { get; init; }
}

/// <summary>One pair of axes.</summary>
internal sealed record Panel
{
    public required string XTitle { get; init; }

    public required string YTitle { get; init; }

    /// <summary>Height in the figure's own pixels, axes included.</summary>
    public double Height { get; init; } = 400;

    /// <summary>Words above the panel.</summary>
    public string? Caption { get; init; }

    /// <summary>Limits; null: from the data.</summary>
    public Limits? Limits { get; init; }

    public IReadOnlyList<Curve> Curves { get; init; } = [];

    public IReadOnlyList<Band> Bands { get; init; } = [];

    public IReadOnlyList<Note> Notes { get; init; } = [];

    public IReadOnlyList<StageLine> StageLines { get; init; } = [];

    /// <summary>Drawing of the model, in the axes' coordinates.</summary>
    public Picture? Picture { get; init; }

    /// <summary>Map of damage over position and point.</summary>
    public DamageMap? Map { get; init; }

    /// <summary>Whether ticks along y are whole numbers.</summary>
    public bool WholeNumbersY { get; init; }

    /// <summary>Whether there are grid lines.</summary>
    public bool Grid { get; init; } = true;
}

/// <summary>Limits of a pair of axes; bottom above top in number turns the axis over.</summary>
internal readonly record struct Limits(double Left, double Right, double Bottom, double Top);

/// <summary>How a curve shows its points.</summary>
internal enum Marking
{
    /// <summary>A dozen filled markers spread along the curve.</summary>
    Some,

    /// <summary>A hollow marker at each point (thinned when there are very many).</summary>
    Hollow,

    /// <summary>None.</summary>
    None,
}

/// <summary>A curve. Curves of the same style and name share one entry of the legend; an empty name has none.</summary>
/// <param name="Name">Name in the legend.</param>
/// <param name="X">Abscissas; pairs that are not finite break the line.</param>
/// <param name="Y">Ordinates.</param>
/// <param name="Style">Number of the style, from 0; gives colour, dash and marker.</param>
internal sealed record Curve(string Name, double[] X, double[] Y, int Style)
{
    public Marking Marking { get; init; } = Marking.Some;

    /// <summary>Finely dotted instead of the style's dash.</summary>
    public bool Dotted { get; init; }
}

/// <summary>A pale area between two curves over the same abscissas.</summary>
internal sealed record Band(string Name, double[] X, double[] Low, double[] High, int Style);

/// <summary>A point with words beside it.</summary>
internal sealed record Note(double X, double Y, string Text, int Style);

/// <summary>A line across the panel where a stage begins, with words.</summary>
internal sealed record StageLine(double Y, string Text);

/// <summary>What a key shows.</summary>
internal enum KeyKind
{
    /// <summary>An area in a colour.</summary>
    Area,

    /// <summary>A layer that is intact.</summary>
    Intact,

    /// <summary>A layer that softens.</summary>
    Softening,

    /// <summary>A layer that is separated.</summary>
    Separated,

    /// <summary>Hatching.</summary>
    Hatched,
}

/// <summary>An entry of the keys.</summary>
internal sealed record Key(KeyKind Kind, string Text, uint Colour = 0);

/// <summary>A continuous colour bar with its words and unit.</summary>
internal sealed record ColourBar(ColourMap Map, double Least, double Largest, string Words);

/// <summary>State of a stretch of a layer in a picture.</summary>
internal enum LayerState
{
    /// <summary>No damage.</summary>
    Intact,

    /// <summary>Damage above 0, below 1.</summary>
    Softening,

    /// <summary>Damage 1, or never bonded.</summary>
    Separated,
}

/// <summary>A line of points [mm].</summary>
internal sealed record Polyline(double[] X, double[] Y);

/// <summary>A stretch of a layer between its two faces.</summary>
internal sealed record LayerStretch(LayerState State, Polyline Lower, Polyline Upper);

/// <summary>A drawing of the model in mm.</summary>
internal sealed record Picture
{
    /// <summary>x of the corners of all triangles, three each [mm].</summary>
    public required float[] TriangleX { get; init; }

    /// <summary>y of the corners [mm].</summary>
    public required float[] TriangleY { get; init; }

    /// <summary>Place in the colour map of the corners, 0 to 1.</summary>
    public required float[] TrianglePlace { get; init; }

    /// <summary>Colours of the triangles' places.</summary>
    public required ColourMap Map { get; init; }

    /// <summary>Triangles in one colour each (0xRRGGBB) instead of by place; null: by place.</summary>
    public uint[]? TriangleColour { get; init; }

    /// <summary>Closed areas to hatch.</summary>
    public IReadOnlyList<Polyline> Hatched { get; init; } = [];

    /// <summary>Outlines of the adherends.</summary>
    public required IReadOnlyList<Polyline> Outlines { get; init; }

    /// <summary>Layers.</summary>
    public required IReadOnlyList<LayerStretch> Layers { get; init; }
}

/// <summary>Damage over positions (columns) and points (rows).</summary>
/// <param name="Positions">Bounds of the columns [mm], one more than columns.</param>
/// <param name="Rows">Bounds of the rows in points, one more than rows.</param>
/// <param name="Damage">Damage of each row: 0 to 1, NaN where never bonded.</param>
internal sealed record DamageMap(double[] Positions, double[] Rows, IReadOnlyList<float[]> Damage);
