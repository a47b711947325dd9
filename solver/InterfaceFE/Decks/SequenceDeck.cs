using InterfaceFE.Units;

namespace InterfaceFE.Decks;

/// <summary>How a grip holds the nodes of its place.</summary>
public enum GripHold
{
    /// <summary>All its nodes move as one rigid body.</summary>
    [Word("rigid", "the place moves as one rigid body, as in a clamp or a bonded block")]
    Rigid,

    /// <summary>Each node by itself; may be fixed, not pulled.</summary>
    [Word("each point", "each point by itself: the edge may deform; can be fixed in x or y, not pulled or turned")]
    EachPoint,
}

/// <summary>A grip: a place that the sequence fixes, moves or loads.</summary>
[Block("A place that the sequence fixes, moves or loads: a pin at a point, a block on a stretch of an edge, or a whole edge.")]
public sealed record GripDeck
{
    /// <summary>Edge or edges; with several, each is a body of its own and may only be fixed.</summary>
    [Key("on", "Edge as `EDGE of ADHEREND`, or a list of edges (each then held by itself; such a grip is fixed, not pulled).", Example = "upper face of hat", LeastCount = 1)]
    public required IReadOnlyList<string> On { get; init; }

    /// <summary>Point on the edge: start, middle, end, or a distance; makes the grip a pin.</summary>
    [Key("at", "Point on the edge: start, middle, end, or a distance from its start; the grip is then a pin.", Example = "middle")]
    public EdgePoint? At { get; init; }

    /// <summary>Start of the stretch of the edge that is gripped [mm].</summary>
    [Key("from", "Start of the gripped stretch of the edge; with `to`, the grip is a rigid block.", Dimension = Dimension.Length, Example = "0 mm", AtLeast = 0)]
    public double? From { get; init; }

    /// <summary>End of the stretch of the edge that is gripped [mm].</summary>
    [Key("to", "End of the gripped stretch of the edge.", Dimension = Dimension.Length, Example = "10 mm", AtLeast = 0)]
    public double? To { get; init; }

    /// <summary>Pin of a rigid block [mm].</summary>
    [Key("pin", "Point [x, y] at which a rigid block is pulled and about which it turns; left out: its middle.", Dimension = Dimension.Length, Example = "[5 mm, 12 mm]", LeastCount = 2, MostCount = 2)]
    public IReadOnlyList<double>? Pin { get; init; }

    /// <summary>How the nodes are held together.</summary>
    [Key("hold", "Whether the place moves as one rigid body or each point by itself.", Default = "rigid")]
    public GripHold Hold { get; init; }

    /// <summary>Load train between the grip and the crosshead; null: none, the grip itself is driven.</summary>
    [Key("load train", "What stands between the grip and the crosshead of the machine; what the sequence pulls, pushes or fixes along the pull is then the crosshead.")]
    public LoadTrainDeck? LoadTrain { get; init; }
}

/// <summary>A load train.</summary>
[Block("Machine, load cell and fixtures in series with a grip, as a spring along its pull. Adds the column `NAME crosshead [mm]` to grips.csv.")]
public sealed record LoadTrainDeck
{
    /// <summary>Stiffness [N/mm].</summary>
    [Key("stiffness", "Force per travel of the crosshead with a rigid specimen.", Dimension = Dimension.Stiffness, Example = "5 kN/mm", Above = 0)]
    public required double Stiffness { get; init; }
}

/// <summary>A point on an edge: a share of its length or a distance from its start. Written as start, middle, end or a length.</summary>
/// <param name="Share">Share of the edge, 0 to 1; NaN when a distance is given.</param>
/// <param name="Distance">Distance from the edge's start [mm]; NaN when a share is given.</param>
public readonly record struct EdgePoint(double Share, double Distance)
{
    /// <summary>Position on an edge of the given length [mm].</summary>
    public double On(double length) => double.IsNaN(Distance) ? Share * length : Distance;
}

/// <summary>A component of a grip's movement.</summary>
public enum GripComponent
{
    /// <summary>Displacement along x.</summary>
    [Word("x", "displacement along x")]
    X,

    /// <summary>Displacement along y.</summary>
    [Word("y", "displacement along y")]
    Y,

    /// <summary>Rotation.</summary>
    [Word("rotation", "rotation, counter-clockwise positive")]
    Rotation,
}

/// <summary>Sense of a pull.</summary>
public enum PullDirection
{
    /// <summary>Towards +x.</summary>
    [Word("+x", "to the right")]
    PlusX,

    /// <summary>Towards -x.</summary>
    [Word("-x", "to the left")]
    MinusX,

    /// <summary>Towards +y.</summary>
    [Word("+y", "upwards")]
    PlusY,

    /// <summary>Towards -y.</summary>
    [Word("-y", "downwards")]
    MinusY,
}

/// <summary>From where a target displacement is counted.</summary>
public enum CountedFrom
{
    /// <summary>From where the grip stands when the stage starts.</summary>
    [Word("start of this stage", "from where the grip stands when the stage starts")]
    StartOfThisStage,

    /// <summary>From the stress-free state.</summary>
    [Word("stress-free state", "from the stress-free state")]
    StressFreeState,
}

/// <summary>One stage of a sequence; exactly one of its verbs is set (a temperature verb may stand with no other).</summary>
[Block("One stage. It has one verb: fix, let go, pull, push, turn, press, cool to, heat to or wait.")]
[NotBuiltYet("jump")]
public sealed record StageDeck
{
    /// <summary>Grips to fix, each with components.</summary>
    [Key("fix", "Grips to fix where they stand, each with its components (x, y, rotation).", Example = "{left end: [x, y]}")]
    public IReadOnlyDictionary<string, IReadOnlyList<GripComponent>>? Fix { get; init; }

    /// <summary>Grips to let go.</summary>
    [Key("let go", "Grips to let go; their forces fade over the stage.", Example = "[clamp]", LeastCount = 1)]
    public IReadOnlyList<string>? LetGo { get; init; }

    /// <summary>Pull a grip.</summary>
    [Key("pull", "Pull a grip along a direction, by travel or by force.")]
    public PullDeck? Pull { get; init; }

    /// <summary>Push a grip: the same as a pull, in words of compression.</summary>
    [Key("push", "Push a grip along a direction, by travel or by force.")]
    public PullDeck? Push { get; init; }

    /// <summary>Turn grips.</summary>
    [Key("turn", "Turn grips, by angle or by moment.")]
    public TurnDeck? Turn { get; init; }

    /// <summary>Press on faces.</summary>
    [Key("press", "Bring faces under pressure; it stays on until another stage changes it.")]
    public PressDeck? Press { get; init; }

    /// <summary>Temperature to cool to [K].</summary>
    [Key("cool to", "Temperature to cool the whole model to.", Dimension = Dimension.Temperature, Example = "-40 °C", AtLeast = 0)]
    public double? CoolTo { get; init; }

    /// <summary>Temperature to heat to [K].</summary>
    [Key("heat to", "Temperature to heat the whole model to.", Dimension = Dimension.Temperature, Example = "80 °C", AtLeast = 0)]
    public double? HeatTo { get; init; }

    /// <summary>Time to wait [s].</summary>
    [Key("wait", "Time during which nothing is changed.", Dimension = Dimension.Time, Example = "1 h", Above = 0)]
    public double? Wait { get; init; }

    /// <summary>Duration of a temperature stage or a stage by force [s].</summary>
    [Key("over", "Duration of a stage of cooling, heating, force, moment or pressure; left out: 60 s.", Dimension = Dimension.Time, Example = "6 h", Above = 0)]
    public double? Over { get; init; }
}

/// <summary>A pull or push.</summary>
[Block("A pull or push of a grip, by travel (its displacement is driven) or by force.")]
public sealed record PullDeck
{
    /// <summary>The grip.</summary>
    [Key("grip", "Name of the grip.", Example = "crown")]
    public required string Grip { get; init; }

    /// <summary>Direction.</summary>
    [Key("along", "Direction of the pull; force and displacement of the grip count positive along it.")]
    public required PullDirection Along { get; init; }

    /// <summary>Travel [mm].</summary>
    [Key("travel", "How far the grip is moved; give this or `force`.", Dimension = Dimension.Length, Example = "8 mm", Above = 0)]
    public double? Travel { get; init; }

    /// <summary>Force [N].</summary>
    [Key("force", "Force to reach; give this or `travel`.", Dimension = Dimension.Force, Example = "200 N", AtLeast = 0)]
    public double? Force { get; init; }

    /// <summary>Speed [mm/s].</summary>
    [Key("speed", "Speed of the travel; left out: 1 mm/min.", Dimension = Dimension.Speed, Example = "2 mm/min", Above = 0)]
    public double? Speed { get; init; }

    /// <summary>From where the travel is counted.</summary>
    [Key("counted from", "From where the travel is counted.", Default = "start of this stage")]
    public CountedFrom CountedFrom { get; init; }
}

/// <summary>A turn of one or more grips in proportion.</summary>
[Block("A turn of one or more grips in proportion, by angle (rotations are driven) or by moment.")]
public sealed record TurnDeck
{
    /// <summary>Grips with their share of the angle or moment; counter-clockwise positive.</summary>
    [Key("grips", "Grips, each with its share of the angle or moment; counter-clockwise positive.", Example = "{upper arm: 1, lower arm: -1}", LeastCount = 1)]
    public required IReadOnlyDictionary<string, double> Grips { get; init; }

    /// <summary>Angle [rad].</summary>
    [Key("angle", "Angle for a share of 1; give this or `moment`.", Dimension = Dimension.Angle, Example = "5 deg")]
    public double? Angle { get; init; }

    /// <summary>Moment [N·mm].</summary>
    [Key("moment", "Moment for a share of 1; give this or `angle`.", Dimension = Dimension.Moment, Example = "12 N*m")]
    public double? Moment { get; init; }

    /// <summary>Angular speed [rad/s].</summary>
    [Key("speed", "Angular speed; left out: 1 deg/min.", Dimension = Dimension.AngularSpeed, Example = "2 deg/min", Above = 0)]
    public double? Speed { get; init; }
}

/// <summary>Pressure on faces.</summary>
[Block("Pressure on faces, beyond the ambient one. With `rotation: finite` it follows them: it stays normal to the deformed face and acts on its deformed length; with `small` it acts on the shape before deformation.")]
public sealed record PressDeck
{
    /// <summary>Edges under pressure.</summary>
    [Key("on", "Edge as `EDGE of ADHEREND`, or a list of edges; the whole edge is pressed, over the adherend's width.", Example = "top of panel", LeastCount = 1)]
    public required IReadOnlyList<string> On { get; init; }

    /// <summary>Pressure at the end of the stage [MPa].</summary>
    [Key("pressure", "Pressure to reach, positive towards the body, negative for suction; 0 takes it off.", Dimension = Dimension.Stress, Example = "5 kPa")]
    public required double Pressure { get; init; }
}

/// <summary>Kind of a gauge.</summary>
public enum GaugeKind
{
    /// <summary>Change of distance between two points.</summary>
    [Word("clip gauge", "change of the distance between two points, positive apart [mm]")]
    ClipGauge,

    /// <summary>Slope of an edge.</summary>
    [Word("inclinometer", "rotation of an edge at a point, counter-clockwise positive [rad]")]
    Inclinometer,

    /// <summary>Strain along an edge.</summary>
    [Word("strain gauge", "strain along an edge at a point [-]")]
    StrainGauge,
}

/// <summary>A gauge.</summary>
[Block("A virtual gauge on the specimen.")]
public sealed record GaugeDeck
{
    /// <summary>Kind.</summary>
    [Key("kind", "What it reads.")]
    public required GaugeKind Kind { get; init; }

    /// <summary>Edge of the point.</summary>
    [Key("on", "Edge as `EDGE of ADHEREND`.", Example = "top of panel")]
    public required string On { get; init; }

    /// <summary>Point on the edge.</summary>
    [Key("at", "Point on the edge: start, middle, end, or a distance from its start.", Example = "20 mm")]
    public required EdgePoint At { get; init; }

    /// <summary>Edge of the second point of a clip gauge.</summary>
    [Key("to", "Edge of the second point of a clip gauge.", Example = "bottom of lower arm")]
    public string? To { get; init; }

    /// <summary>Second point of a clip gauge.</summary>
    [Key("to at", "Second point of a clip gauge on its edge; left out: as `at`.", Example = "20 mm")]
    public EdgePoint? ToAt { get; init; }
}

/// <summary>What to store.</summary>
[Block("What to store.")]
public sealed record KeepDeck
{
    /// <summary>Grips whose curves are drawn; the first is the main one.</summary>
    [Key("curves of", "Grips whose force against displacement is drawn; the first is the main one.", Example = "[crown]")]
    public IReadOnlyList<string>? CurvesOf { get; init; }

    /// <summary>Gauges by name.</summary>
    [Key("gauges", "Virtual gauges, by name; each adds a column to grips.csv.")]
    public IReadOnlyDictionary<string, GaugeDeck>? Gauges { get; init; }

    /// <summary>Fields are stored at every so many points; 0: none. The last point of each stage is always stored unless none.</summary>
    [Key("fields", "How often fields are stored: `every N points`, or `none`.", Example = "every 10 points", Default = "every 10 points")]
    public FieldInterval Fields { get; init; } = new(10);
}

/// <summary>Interval of stored fields in points; 0 for none. Written as <c>every N points</c> or <c>none</c>.</summary>
/// <param name="Points">Number of points between stored fields; 0 for none.</param>
public readonly record struct FieldInterval(int Points);
