using InterfaceFE.Units;

namespace InterfaceFE.Decks;

/// <summary>A whole deck, in internal units (mm, N, MPa, s, K; angles in rad).</summary>
[Block("A deck describes one specimen or joint: what it is made of, how it is bonded, held and loaded, and what to keep.")]
[NotBuiltYet("coupon")]
[NotBuiltYet("variants")]
[NotBuiltYet("fit")]
public sealed record Deck
{
    /// <summary>Title of the run.</summary>
    [Key("title", "What the run is about, one line; it heads figures and summary.", Example = "Stiffener taped to a roof panel, a cold night")]
    public required string Title { get; init; }

    /// <summary>Files of materials or layers that were brought in; resolved by the reader.</summary>
    [Key("include", "Files with `materials` or `layers` to bring in, from the deck's folder or the `inputs` folder above it.", Example = "[materials.yaml]")]
    public IReadOnlyList<string>? Include { get; init; }

    /// <summary>Width, out-of-plane state and the like.</summary>
    [Key("model", "Width of the specimen and the assumptions of the calculation.")]
    public required ModelDeck Model { get; init; }

    /// <summary>Materials by name.</summary>
    [Key("materials", "Materials of the adherends, by name.", LeastCount = 1, MayBeIncluded = true)]
    public required IReadOnlyDictionary<string, MaterialDeck> Materials { get; init; }

    /// <summary>Bonding layers by name.</summary>
    [Key("layers", "Bonding layers (tape, foam, adhesive), by name.", MayBeIncluded = true)]
    public IReadOnlyDictionary<string, LayerDeck>? Layers { get; init; }

    /// <summary>Adherends by name.</summary>
    [Key("adherends", "The bodies that are bonded, by name.", LeastCount = 1)]
    public required IReadOnlyDictionary<string, AdherendDeck> Adherends { get; init; }

    /// <summary>Joints by name.</summary>
    [Key("joints", "Where adherends are bonded to each other, by name.")]
    public IReadOnlyDictionary<string, JointDeck>? Joints { get; init; }

    /// <summary>Temperature without thermal stress [K].</summary>
    [Key("stress-free temperature", "Temperature at which nothing is stressed and at which the sequence starts.", Dimension = Dimension.Temperature, Example = "20 °C", Default = "20 °C", AtLeast = 0)]
    public double StressFreeTemperature { get; init; } = 293.15;

    /// <summary>Grips by name.</summary>
    [Key("grips", "Places that the sequence fixes, moves or loads, by name.", LeastCount = 1)]
    public required IReadOnlyDictionary<string, GripDeck> Grips { get; init; }

    /// <summary>Stages in order.</summary>
    [Key("sequence", "What happens, stage by stage, in order.", LeastCount = 1)]
    public required IReadOnlyList<StageDeck> Sequence { get; init; }

    /// <summary>What to store.</summary>
    [Key("keep", "What to store: curves, gauges, fields.")]
    public KeepDeck? Keep { get; init; }

    /// <summary>Settings of the march.</summary>
    [Key("march", "Settings of the load march; the defaults suit most decks.")]
    public MarchDeck? March { get; init; }
}

/// <summary>State out of the plane of the model.</summary>
public enum OutOfPlane
{
    /// <summary>Plane strain.</summary>
    [Word("held", "plane strain: no strain out of plane")]
    Held,

    /// <summary>Plane stress.</summary>
    [Word("free", "plane stress: free to contract out of plane")]
    Free,

    /// <summary>Generalised plane strain.</summary>
    [Word("uniform strain", "the strain out of plane is the same throughout what joints tie together; its size leaves no force out of plane, or is given")]
    UniformStrain,
}

/// <summary>Treatment of rotations.</summary>
public enum RotationSetting
{
    /// <summary>Small displacements and rotations.</summary>
    [Word("small", "displacements and rotations are small: equilibrium on the undeformed shape")]
    Small,

    /// <summary>Finite displacements and rotations.</summary>
    [Word("finite", "displacements and rotations are as large as they come: equilibrium on the deformed shape, logarithmic strain; eight-node elements")]
    Finite,
}

/// <summary>Kind of solid element.</summary>
public enum ElementKind
{
    /// <summary>Eight-node quadrilaterals with six-node layer elements.</summary>
    [Word("eight-node", "quadratic quadrilaterals with six-node layer elements")]
    EightNode,

    /// <summary>Four-node quadrilaterals with incompatible modes and four-node layer elements.</summary>
    [Word("four-node", "bilinear quadrilaterals with incompatible modes and four-node layer elements")]
    FourNode,
}

/// <summary>Integration of the layer along a layer element.</summary>
public enum LayerIntegration
{
    /// <summary>Ten sub-intervals with two Gauss points each.</summary>
    [Word("sub-intervals", "ten sub-intervals with two Gauss points each")]
    SubIntervals,

    /// <summary>Plain Gauss rule: three points for six-node, two for four-node elements.</summary>
    [Word("gauss", "plain Gauss rule: three points (six-node) or two (four-node)")]
    Gauss,

    /// <summary>Lobatto rule: three points for six-node, two for four-node elements, at the nodes.</summary>
    [Word("lobatto", "Lobatto rule with its points at the nodes: three (six-node) or two (four-node)")]
    Lobatto,
}

/// <summary>Assumptions of the calculation.</summary>
[Block("Width of the specimen and the assumptions of the calculation.")]
[NotBuiltYet("mirror")]
public sealed record ModelDeck
{
    /// <summary>Width of the specimen [mm].</summary>
    [Key("width", "Width of the specimen out of plane; forces are of the whole specimen.", Dimension = Dimension.Length, Example = "20 mm", Above = 0)]
    public required double Width { get; init; }

    /// <summary>Out-of-plane state.</summary>
    [Key("out of plane", "State out of plane.", Default = "held")]
    public OutOfPlane OutOfPlane { get; init; }

    /// <summary>Given strain out of plane; null: the one that leaves no force.</summary>
    [Key("strain out of plane", "Strain out of plane, reached over the first stage that loads, cools or waits; with `uniform strain` only. Left out: the strain that leaves no force out of plane.", Example = "0.001", Above = -0.1, Below = 0.1)]
    public double? StrainOutOfPlane { get; init; }

    /// <summary>Direction of weight; null: none.</summary>
    [Key("gravity", "Direction in which the weight of the adherends acts, with 9.80665 m/s²; it comes on over the first stage that loads, cools or waits, and stays. Left out: no weight.", Example = "-y")]
    public PullDirection? Gravity { get; init; }

    /// <summary>Rotation setting; written in every deck.</summary>
    [Key("rotation", "Whether rotations are small or finite; written in every deck, since `small` limits what the run is good for.")]
    public required RotationSetting Rotation { get; init; }

    /// <summary>Kind of solid element.</summary>
    [Key("elements", "Kind of solid element.", Default = "eight-node")]
    public ElementKind Elements { get; init; }

    /// <summary>Integration along layer elements.</summary>
    [Key("layer integration", "Integration along layer elements.", Default = "sub-intervals")]
    public LayerIntegration LayerIntegration { get; init; }
}

/// <summary>Settings of the march.</summary>
[Block("Settings of the load march; the defaults suit most decks.")]
public sealed record MarchDeck
{
    /// <summary>Relative force tolerance of Newton's method.</summary>
    [Key("tolerance", "Largest force out of balance, relative to the largest summed element force.", Default = "1e-10", Above = 0, AtMost = 1e-3)]
    public double Tolerance { get; init; } = 1e-10;

    /// <summary>First stride of each stage, share of the stage.</summary>
    [Key("first stride", "First stride of each stage, as a share of the stage.", Default = "0.02", Above = 0, AtMost = 1)]
    public double FirstStride { get; init; } = 0.02;

    /// <summary>Largest stride, share of the stage.</summary>
    [Key("largest stride", "Largest stride, as a share of the stage.", Default = "0.1", Above = 0, AtMost = 1)]
    public double LargestStride { get; init; } = 0.1;

    /// <summary>Aim for the energy path error of a whole run.</summary>
    [Key("path error", "Energy path error that strides aim for, relative to the energy put in.", Default = "3e-4", Above = 0, AtMost = 0.1)]
    public double PathError { get; init; } = 3e-4;

    /// <summary>Largest number of points of a stage.</summary>
    [Key("most points", "Largest number of points of a stage before the run stops.", Default = "2000", AtLeast = 1)]
    public int MostPoints { get; init; } = 2000;

    /// <summary>How the load is controlled.</summary>
    [Key("control", "How the march is controlled where the layer softens.", Default = "automatic")]
    public ControlSetting Control { get; init; }
}

/// <summary>How the march is controlled.</summary>
public enum ControlSetting
{
    /// <summary>The stage's own control, and layer work where that fails or the path turns back.</summary>
    [Word("automatic", "the stage's own control, and layer work where the path turns back; left again after")]
    Automatic,

    /// <summary>The stage's own control only.</summary>
    [Word("own", "the stage's own control only: the run stops at a limit point")]
    Own,

    /// <summary>Arc length over watched unknowns instead of layer work.</summary>
    [Word("arc length", "as automatic, with arc length over grips and active separations instead of layer work")]
    ArcLength,
}
