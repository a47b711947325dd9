using InterfaceFE.Decks;

namespace InterfaceFE.Tests.Marching;

/// <summary>
/// A bar in tension across a layer: two blocks one above the other, no lateral contraction, so that traction is uniform and the path is known in closed form:
/// travel u = w + 2·H·σ(w)/E.
/// </summary>
internal static class BarDeck
{
    public const double Height = 50, Young = 1000, Length = 4, Width = 2.5, Stiffness = 1000, Strength = 5, Toughness = 0.2;

    public static Deck Make(double travel, double height = Height, ControlSetting control = ControlSetting.Automatic, double pathError = 3e-4, ElementKind elements = ElementKind.EightNode, double? loadTrain = null) => new()
    {
        Title = "Bar across a layer",
        Model = new ModelDeck { Width = Width, Rotation = RotationSetting.Small, OutOfPlane = OutOfPlane.Free, Elements = elements },
        Materials = new Dictionary<string, MaterialDeck> { ["stuff"] = new() { Young = new Directional(Young), Poisson = new PoissonRatios(0) } },
        Layers = new Dictionary<string, LayerDeck>
        {
            ["glue"] = new()
            {
                Thickness = 0.2,
                Peel = new CurveDeck { Law = CurveShape.Bilinear, Stiffness = Stiffness, Strength = Strength, Toughness = Toughness },
                Shear = new CurveDeck { Law = CurveShape.Bilinear, Stiffness = Stiffness, Strength = Strength, Toughness = Toughness },
                Mixing = Mixing.IndependentModes,
            },
        },
        Adherends = new Dictionary<string, AdherendDeck>
        {
            ["lower"] = new() { Of = "stuff", Rectangle = new RectangleDeck { Corner = [0, 0], Size = [Length, height] }, Elements = new ElementsDeck { Along = 2, Through = 4 } },
            ["upper"] = new() { Of = "stuff", Rectangle = new RectangleDeck { Corner = [0, height], Size = [Length, height] }, Elements = new ElementsDeck { Along = 2, Through = 4 } },
        },
        Joints = new Dictionary<string, JointDeck> { ["bond"] = new() { Layer = "glue", Upper = "bottom of upper", Lower = "top of lower", ElementLength = 2 } },
        Grips = new Dictionary<string, GripDeck> { ["base"] = new() { On = ["bottom of lower"] }, ["head"] = new() { On = ["top of upper"], LoadTrain = loadTrain is { } stiffness ? new LoadTrainDeck { Stiffness = stiffness } : null } },
        Sequence =
        [
            new StageDeck { Fix = new Dictionary<string, IReadOnlyList<GripComponent>> { ["base"] = [GripComponent.X, GripComponent.Y, GripComponent.Rotation], ["head"] = [GripComponent.X, GripComponent.Rotation] } },
            new StageDeck { Pull = new PullDeck { Grip = "head", Along = PullDirection.PlusY, Travel = travel } },
        ],
        March = new MarchDeck { Control = control, PathError = pathError },
    };
}
