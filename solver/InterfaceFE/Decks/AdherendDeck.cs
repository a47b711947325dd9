using InterfaceFE.Units;

namespace InterfaceFE.Decks;

/// <summary>An adherend: a material and a shape.</summary>
[Block("A body that is bonded: a rectangle, or a sheet bent along a line.")]
[NotBuiltYet("curved")]
public sealed record AdherendDeck
{
    /// <summary>Material name.</summary>
    [Key("of", "Name of the material; with `plies`, of those that name none of their own.", Example = "aluminium")]
    public required string Of { get; init; }

    /// <summary>Rectangular shape.</summary>
    [Key("rectangle", "A rectangle; edges `top`, `bottom`, `left end`, `right end`.")]
    public RectangleDeck? Rectangle { get; init; }

    /// <summary>Sheet shape.</summary>
    [Key("sheet", "A sheet of even thickness along a line; edges `upper face`, `lower face`, `left end`, `right end` and named stretches.")]
    public SheetDeck? Sheet { get; init; }

    /// <summary>Plies from the bottom or lower face up; null: one material throughout.</summary>
    [Key("plies", "Plies from the bottom (lower face) up; their thicknesses add up to that of the adherend.", Example = "[{thickness: 0.5 mm, angle: 0 deg}, {thickness: 0.5 mm, angle: 90 deg}]", LeastCount = 1, MostCount = 500)]
    public IReadOnlyList<PlyDeck>? Plies { get; init; }

    /// <summary>Width [mm]; null: the model's.</summary>
    [Key("width", "Width out of plane; left out: the model's.", Dimension = Dimension.Length, Example = "25 mm", Above = 0)]
    public double? Width { get; init; }

    /// <summary>Division into elements.</summary>
    [Key("elements", "Division into elements; left out: as fine as the joints need.")]
    public ElementsDeck? Elements { get; init; }
}

/// <summary>A ply.</summary>
[Block("A ply of a laminate.")]
public sealed record PlyDeck
{
    /// <summary>Thickness [mm].</summary>
    [Key("thickness", "Thickness of the ply.", Dimension = Dimension.Length, Example = "0.25 mm", Above = 0)]
    public required double Thickness { get; init; }

    /// <summary>Angle about the thickness axis [rad].</summary>
    [Key("angle", "Turn of the material about the thickness axis, from x along the adherend towards z out of plane.", Dimension = Dimension.Angle, Example = "45 deg", Default = "0 deg")]
    public double Angle { get; init; }

    /// <summary>Material name; null: the adherend's.</summary>
    [Key("of", "Name of the material; left out: that of the adherend.", Example = "carbon")]
    public string? Of { get; init; }
}

/// <summary>A rectangle.</summary>
[Block("A rectangle with sides along x and y.")]
public sealed record RectangleDeck
{
    /// <summary>Lower left corner [mm].</summary>
    [Key("corner", "Lower left corner [x, y].", Dimension = Dimension.Length, Example = "[0 mm, 0 mm]", LeastCount = 2, MostCount = 2)]
    public required IReadOnlyList<double> Corner { get; init; }

    /// <summary>Length along x and height along y [mm].</summary>
    [Key("size", "Length along x and height along y.", Dimension = Dimension.Length, Example = "[300 mm, 4 mm]", LeastCount = 2, MostCount = 2, Above = 0)]
    public required IReadOnlyList<double> Size { get; init; }
}

/// <summary>A bent sheet.</summary>
[Block("A sheet of even thickness: its mid-line is drawn by corner points from left to right, rounded by the bend radius.")]
public sealed record SheetDeck
{
    /// <summary>Thickness [mm].</summary>
    [Key("thickness", "Thickness of the sheet.", Dimension = Dimension.Length, Example = "2 mm", Above = 0)]
    public required double Thickness { get; init; }

    /// <summary>Corner points of the mid-line [mm].</summary>
    [Key("line", "Corner points [x, y] of the mid-line, in order; the first end is the left end.", Dimension = Dimension.Length, Example = "[[0 mm, 5 mm], [40 mm, 5 mm]]", LeastCount = 2)]
    public required IReadOnlyList<IReadOnlyList<double>> Line { get; init; }

    /// <summary>Bend radius of the mid-line at each inner corner [mm].</summary>
    [Key("bend radius", "Radius of the mid-line at each inner corner; needed when the line has corners.", Dimension = Dimension.Length, Example = "6 mm", Above = 0)]
    public double? BendRadius { get; init; }

    /// <summary>Names of straight runs, numbered from 1 along the line.</summary>
    [Key("stretches", "Names for straight runs of the line, by number from 1 at the left end.", Example = "{left foot: 1, crown: 3, right foot: 5}", AtLeast = 1)]
    public IReadOnlyDictionary<string, int>? Stretches { get; init; }
}

/// <summary>Division of an adherend into elements.</summary>
[Block("Division of an adherend into elements.")]
public sealed record ElementsDeck
{
    /// <summary>Number along; null: from element lengths.</summary>
    [Key("along", "Number of elements along; left out: from the joints and `length`.", Example = "300", AtLeast = 1, AtMost = 1000000)]
    public int? Along { get; init; }

    /// <summary>Number through the thickness.</summary>
    [Key("through", "Number of elements through the thickness; left out: chosen so that elements keep a good shape, and at least six where the material has a yield curve.", Example = "4", AtLeast = 1, AtMost = 1000)]
    public int? Through { get; init; }

    /// <summary>Largest element length away from joints [mm].</summary>
    [Key("length", "Largest element length along, away from joints.", Dimension = Dimension.Length, Example = "2 mm", Above = 0)]
    public double? Length { get; init; }

    /// <summary>Places where the division is finer.</summary>
    [Key("finer", "Places where elements along are shorter.")]
    public IReadOnlyList<FinerDeck>? Finer { get; init; }

    /// <summary>Ratio of heights of neighbouring elements through the thickness, towards bonded faces.</summary>
    [Key("growth", "Largest ratio of the lengths of neighbouring elements along.", Default = "1.3", Above = 1, AtMost = 4)]
    public double Growth { get; init; } = 1.3;
}

/// <summary>A place where elements are shorter.</summary>
[Block("A place along an adherend where elements are shorter.")]
public sealed record FinerDeck
{
    /// <summary>Start of the place, along the adherend from its left end [mm].</summary>
    [Key("from", "Start of the place, along the adherend from its left end.", Dimension = Dimension.Length, Example = "30 mm", AtLeast = 0)]
    public required double From { get; init; }

    /// <summary>End of the place [mm].</summary>
    [Key("to", "End of the place, along the adherend from its left end.", Dimension = Dimension.Length, Example = "60 mm", AtLeast = 0)]
    public required double To { get; init; }

    /// <summary>Element length there [mm].</summary>
    [Key("length", "Element length there.", Dimension = Dimension.Length, Example = "0.2 mm", Above = 0)]
    public required double Length { get; init; }
}

/// <summary>A joint: two facing edges and a layer between them.</summary>
[Block("Two facing edges with a layer between them. Positions along a joint count from the lower x of its lower face.")]
public sealed record JointDeck
{
    /// <summary>Layer name.</summary>
    [Key("layer", "Name of the layer.", Example = "tape")]
    public required string Layer { get; init; }

    /// <summary>Upper edge.</summary>
    [Key("upper", "Edge above the layer, as `EDGE of ADHEREND`; for a sheet a named stretch.", Example = "left foot of hat")]
    public required string Upper { get; init; }

    /// <summary>Lower edge.</summary>
    [Key("lower", "Edge below the layer, as `EDGE of ADHEREND`.", Example = "top of panel")]
    public required string Lower { get; init; }

    /// <summary>Width of the bond [mm]; null: the model's.</summary>
    [Key("width", "Width of the bond; left out: the model's.", Dimension = Dimension.Length, Example = "15 mm", Above = 0)]
    public double? Width { get; init; }

    /// <summary>How the layer is drawn.</summary>
    [Key("drawn", "Whether the two edges lie on each other or the layer's thickness apart.", Default = "zero thickness")]
    public DrawnThickness Drawn { get; init; }

    /// <summary>Line that gives the frame of opening and sliding.</summary>
    [Key("frame", "Line along which sliding is counted, and across which opening; matters where the faces turn against each other.", Default = "mid-line")]
    public FrameLine Frame { get; init; }

    /// <summary>Starter crack.</summary>
    [Key("starter crack", "A stretch at one end that is not bonded from the start.")]
    public StarterCrackDeck? StarterCrack { get; init; }

    /// <summary>Unbonded stretches.</summary>
    [Key("unbonded", "Further stretches that are not bonded.")]
    public IReadOnlyList<StretchDeck>? Unbonded { get; init; }

    /// <summary>Element length along the joint [mm]; null: by formula.</summary>
    [Key("element length", "Element length along the joint; left out: half the length that gives 1 % error, from layer and adherends.", Dimension = Dimension.Length, Example = "0.5 mm", Above = 0)]
    public double? ElementLength { get; init; }
}

/// <summary>How a layer is drawn.</summary>
public enum DrawnThickness
{
    /// <summary>The edges lie on each other.</summary>
    [Word("zero thickness", "the two edges lie on each other; the thickness counts by the law alone")]
    Zero,

    /// <summary>The edges lie the layer's thickness apart.</summary>
    [Word("true thickness", "the two edges lie the layer's thickness apart, and turning of the layer slides it")]
    True,
}

/// <summary>Line that gives the frame of a layer.</summary>
public enum FrameLine
{
    /// <summary>Half way between the faces.</summary>
    [Word("mid-line", "half way between the two edges")]
    MidLine,

    /// <summary>The upper face.</summary>
    [Word("upper face", "the edge above the layer")]
    UpperFace,

    /// <summary>The lower face.</summary>
    [Word("lower face", "the edge below the layer")]
    LowerFace,
}

/// <summary>End of a joint.</summary>
public enum JointEnd
{
    /// <summary>The end at the lower x.</summary>
    [Word("start", "the end at the lower x")]
    Start,

    /// <summary>The end at the higher x.</summary>
    [Word("end", "the end at the higher x")]
    End,
}

/// <summary>A starter crack.</summary>
[Block("A starter crack at one end of a joint.")]
public sealed record StarterCrackDeck
{
    /// <summary>From which end.</summary>
    [Key("from", "End of the joint at which the crack starts.")]
    public required JointEnd From { get; init; }

    /// <summary>Length [mm].</summary>
    [Key("length", "Length of the crack from that end.", Dimension = Dimension.Length, Example = "50 mm", Above = 0)]
    public required double Length { get; init; }
}

/// <summary>A stretch of a joint.</summary>
[Block("A stretch of a joint, by positions from its start.")]
public sealed record StretchDeck
{
    /// <summary>Start of the stretch [mm].</summary>
    [Key("from", "Start of the stretch.", Dimension = Dimension.Length, Example = "40 mm", AtLeast = 0)]
    public required double From { get; init; }

    /// <summary>End of the stretch [mm].</summary>
    [Key("to", "End of the stretch.", Dimension = Dimension.Length, Example = "50 mm", AtLeast = 0)]
    public required double To { get; init; }
}
