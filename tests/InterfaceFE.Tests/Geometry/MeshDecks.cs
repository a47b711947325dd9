using InterfaceFE.Decks;

namespace InterfaceFE.Tests.Geometry;

/// <summary>Invented decks for tests of the mesher.</summary>
internal static class MeshDecks
{
    public static MaterialDeck Steel { get; } = new() { Young = new Directional(210e3), Poisson = new PoissonRatios(0.3) };

    /// <summary>Soft tape: trapezoid 0.5 MPa, 2 N/mm, 2.5 MPa/mm.</summary>
    public static LayerDeck Tape { get; } = Layer(CurveShape.Trapezoid, 2.5, 0.5, 2.0, 1.1);

    /// <summary>Stiff adhesive: bilinear 57 MPa, 0.28 N/mm, 1e5 MPa/mm.</summary>
    public static LayerDeck Epoxy { get; } = Layer(CurveShape.Bilinear, 1e5, 57, 0.28, 0.2);

    public static LayerDeck Layer(CurveShape law, double stiffness, double strength, double toughness, double thickness)
    {
        CurveDeck curve = new() { Law = law, Stiffness = stiffness, Strength = strength, Toughness = toughness };
        return new LayerDeck { Thickness = thickness, Peel = curve, Shear = curve, Mixing = Mixing.IndependentModes };
    }

    public static AdherendDeck Rectangle(double x, double y, double length, double height, ElementsDeck? elements = null, double? width = null) => new()
    {
        Of = "steel",
        Rectangle = new RectangleDeck { Corner = [x, y], Size = [length, height] },
        Elements = elements,
        Width = width,
    };

    public static AdherendDeck Sheet(double thickness, double? radius, double[][] line, Dictionary<string, int>? stretches = null, ElementsDeck? elements = null) => new()
    {
        Of = "steel",
        Sheet = new SheetDeck { Thickness = thickness, Line = line, BendRadius = radius, Stretches = stretches },
        Elements = elements,
    };

    /// <summary>Hat of 2 mm sheet on a panel from (0, 0) to (300, 4): feet 60 mm, crown 60 mm.</summary>
    public static AdherendDeck Hat(bool walkedBack = false)
    {
        double[][] line = [[60, 5], [120, 5], [130, 45], [170, 45], [180, 5], [240, 5]];
        Dictionary<string, int> stretches = new() { ["left foot"] = 1, ["crown"] = 3, ["right foot"] = 5 };
        if (walkedBack)
        {
            Array.Reverse(line);
            stretches = new() { ["left foot"] = 5, ["crown"] = 3, ["right foot"] = 1 };
        }
        return Sheet(2, 6, line, stretches);
    }

    public static JointDeck Joint(string upper, string lower, string layer = "layer", StarterCrackDeck? crack = null, StretchDeck[]? unbonded = null, double? length = null, double? width = null) => new()
    {
        Layer = layer,
        Upper = upper,
        Lower = lower,
        StarterCrack = crack,
        Unbonded = unbonded,
        ElementLength = length,
        Width = width,
    };

    public static Deck Deck(Dictionary<string, AdherendDeck> adherends, Dictionary<string, JointDeck>? joints = null, LayerDeck? layer = null,
        ElementKind kind = ElementKind.EightNode, Dictionary<string, GripDeck>? grips = null, KeepDeck? keep = null) => new()
        {
            Title = "test",
            Model = new ModelDeck { Width = 20, Rotation = RotationSetting.Small, Elements = kind },
            Materials = new Dictionary<string, MaterialDeck> { ["steel"] = Steel },
            Layers = new Dictionary<string, LayerDeck> { ["layer"] = layer ?? Tape },
            Adherends = adherends,
            Joints = joints,
            Grips = grips ?? [],
            Sequence = [],
            Keep = keep,
        };

    /// <summary>Peel coupon: arms of a length and height, bonded over the whole face but for a starter crack.</summary>
    public static Deck Peel(double length, double height, double crack, LayerDeck layer, ElementKind kind = ElementKind.EightNode, Dictionary<string, GripDeck>? grips = null) =>
        Deck(
            new() { ["lower arm"] = Rectangle(0, 0, length, height), ["upper arm"] = Rectangle(0, height, length, height) },
            new() { ["bond"] = Joint("bottom of upper arm", "top of lower arm", crack: new StarterCrackDeck { From = JointEnd.Start, Length = crack }) },
            layer, kind, grips);

    /// <summary>Hat with both feet on a panel.</summary>
    public static Deck HatOnPanel(ElementKind kind = ElementKind.EightNode, bool walkedBack = false, Dictionary<string, GripDeck>? grips = null, KeepDeck? keep = null) =>
        Deck(
            new() { ["panel"] = Rectangle(0, 0, 300, 4), ["hat"] = Hat(walkedBack) },
            new() { ["left strip"] = Joint("left foot of hat", "top of panel"), ["right strip"] = Joint("right foot of hat", "top of panel") },
            Tape, kind, grips, keep);
}
