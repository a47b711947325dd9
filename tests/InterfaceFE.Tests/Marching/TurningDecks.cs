using InterfaceFE.Decks;

namespace InterfaceFE.Tests.Marching;

/// <summary>Slender parts that turn by large angles, whose paths are known. Without lateral contraction and free out of plane, so that beams bend with E and ends may be clamped without disturbance.</summary>
internal static class TurningDecks
{
    private static readonly GripComponent[] All = [GripComponent.X, GripComponent.Y, GripComponent.Rotation];

    /// <summary>Elastica: length, thickness, width [mm] and modulus [MPa].</summary>
    public const double Length = 200, Thickness = 1, Width = 10, Young = 70000;

    /// <summary>E·I of the elastica [N·mm²].</summary>
    public const double Bending = Young * Width * Thickness * Thickness * Thickness / 12;

    /// <summary>A cantilever whose tip is loaded by a force along +y of constant direction, or by a moment.</summary>
    /// <param name="force">Force [N]; 0 for a moment.</param>
    /// <param name="moment">Moment [N·mm].</param>
    /// <param name="along">Elements along.</param>
    public static Deck Cantilever(double force, double moment = 0, int along = 60) => Make(
        "Cantilever",
        Width,
        Young,
        new AdherendDeck { Of = "stuff", Rectangle = new RectangleDeck { Corner = [0, 0], Size = [Length, Thickness] }, Elements = new ElementsDeck { Along = along, Through = 1 } },
        new Dictionary<string, GripDeck> { ["root"] = new() { On = ["left end of beam"] }, ["tip"] = new() { On = ["right end of beam"] } },
        new Dictionary<string, IReadOnlyList<GripComponent>> { ["root"] = All },
        force > 0
            ? new StageDeck { Pull = new PullDeck { Grip = "tip", Along = PullDirection.PlusY, Force = force } }
            : new StageDeck { Turn = new TurnDeck { Moment = moment, Grips = new Dictionary<string, double> { ["tip"] = 1 } } });

    /// <summary>
    /// Half of Williams' toggle by symmetry, in inches and pounds taken as mm and N: a straight leg that rises to the middle, clamped at its foot; the middle goes down without turning.
    /// </summary>
    /// <param name="rise">Rise of the middle.</param>
    /// <param name="force">Half of the force at the middle.</param>
    public static Deck Toggle(double rise, double force)
    {
        const double Axial = 1.885e6, Flexural = 9270, Half = 12.943;
        double thickness = Math.Sqrt(12 * Flexural / Axial), young = 1e7;
        return Make(
            "Toggle",
            Axial / (young * thickness),
            young,
            new AdherendDeck { Of = "stuff", Sheet = new SheetDeck { Thickness = thickness, Line = [[0, 0], [Half, rise]] }, Elements = new ElementsDeck { Along = 24, Through = 1 } },
            new Dictionary<string, GripDeck> { ["foot"] = new() { On = ["left end of beam"] }, ["middle"] = new() { On = ["right end of beam"] } },
            new Dictionary<string, IReadOnlyList<GripComponent>> { ["foot"] = All, ["middle"] = [GripComponent.X, GripComponent.Rotation] },
            new StageDeck { Pull = new PullDeck { Grip = "middle", Along = PullDirection.MinusY, Force = force } });
    }

    /// <summary>
    /// Lee's frame: two legs of 120 at a right angle, hinged at both ends, loaded 24 from the corner on the level one. The corner is rounded by the least radius that a sheet may have.
    /// </summary>
    /// <param name="force">Force.</param>
    public static Deck Frame(double force)
    {
        const double Leg = 120, Thick = 2, Wide = 3, Radius = 1.5;
        return Make(
            "Frame",
            Wide,
            720,
            new AdherendDeck { Of = "stuff", Sheet = new SheetDeck { Thickness = Thick, Line = [[0, 0], [0, Leg], [Leg, Leg]], BendRadius = Radius }, Elements = new ElementsDeck { Length = 4, Through = 2 } },
            new Dictionary<string, GripDeck>
            {
                ["foot"] = new() { On = ["left end of beam"], At = new EdgePoint(0.5, double.NaN) },
                ["far end"] = new() { On = ["right end of beam"], At = new EdgePoint(0.5, double.NaN) },
                ["load"] = new() { On = ["upper face of beam"], At = new EdgePoint(double.NaN, Leg - Radius + Math.PI / 2 * (Radius + Thick / 2) + 24 - Radius) },
            },
            new Dictionary<string, IReadOnlyList<GripComponent>> { ["foot"] = [GripComponent.X, GripComponent.Y], ["far end"] = [GripComponent.X, GripComponent.Y] },
            new StageDeck { Pull = new PullDeck { Grip = "load", Along = PullDirection.MinusY, Force = force } });
    }

    /// <summary>Width of peeled strips [mm].</summary>
    public const double PeelWidth = 10;

    /// <summary>Toughness of their layer [N/mm].</summary>
    public const double PeelToughness = 1;

    /// <summary>
    /// A strip on a stiff base, peeled off from its left end upwards by travel, while a force of constant size pulls it along x: steady after some growth, with the vertical force that the
    /// energy balance of peeling asks for.
    /// </summary>
    /// <param name="young">Modulus of the strip [MPa].</param>
    /// <param name="thickness">Thickness of the strip [mm].</param>
    /// <param name="alongX">Force along x [N], at most 0; it makes the angle of peel less than a right one.</param>
    /// <param name="travel">Travel upwards [mm].</param>
    /// <param name="layerThickness">Thickness of the layer [mm].</param>
    /// <param name="drawn">How the layer is drawn.</param>
    /// <param name="frame">Line of the layer's frame.</param>
    /// <param name="length">Length of the strip [mm].</param>
    public static Deck Peel(
        double young, double thickness, double alongX, double travel, double layerThickness = 0.2, DrawnThickness drawn = DrawnThickness.Zero, FrameLine frame = FrameLine.MidLine, double length = 60)
    {
        double lift = drawn == DrawnThickness.True ? layerThickness : 0;
        var curve = new CurveDeck { Law = CurveShape.Bilinear, Stiffness = 40, Strength = 2, Toughness = PeelToughness };
        List<StageDeck> sequence =
        [
            new StageDeck { Fix = new Dictionary<string, IReadOnlyList<GripComponent>> { ["base"] = All } },
            new StageDeck { Pull = new PullDeck { Grip = "end", Along = PullDirection.PlusY, Travel = travel } },
        ];
        if (alongX < 0)
            sequence.Insert(1, new StageDeck { Pull = new PullDeck { Grip = "end", Along = PullDirection.MinusX, Force = -alongX } });
        return new Deck
        {
            Title = "Peeled strip",
            Model = new ModelDeck { Width = PeelWidth, Rotation = RotationSetting.Finite, OutOfPlane = OutOfPlane.Free },
            Materials = new Dictionary<string, MaterialDeck>
            {
                ["strip"] = new() { Young = new Directional(young), Poisson = new PoissonRatios(0) },
                ["base"] = new() { Young = new Directional(7e4), Poisson = new PoissonRatios(0) },
            },
            Layers = new Dictionary<string, LayerDeck> { ["glue"] = new() { Thickness = layerThickness, Peel = curve, Shear = curve, Mixing = Mixing.IndependentModes, CountedBy = EnergyCount.NetWork } },
            Adherends = new Dictionary<string, AdherendDeck>
            {
                ["base"] = new() { Of = "base", Rectangle = new RectangleDeck { Corner = [0, -2], Size = [length, 2] }, Elements = new ElementsDeck { Through = 1 } },
                ["strip"] = new() { Of = "strip", Rectangle = new RectangleDeck { Corner = [0, lift], Size = [length, thickness] }, Elements = new ElementsDeck { Through = 1 } },
            },
            Joints = new Dictionary<string, JointDeck>
            {
                ["bond"] = new()
                {
                    Layer = "glue",
                    Upper = "bottom of strip",
                    Lower = "top of base",
                    ElementLength = 0.5,
                    Drawn = drawn,
                    Frame = frame,
                    StarterCrack = new StarterCrackDeck { From = JointEnd.Start, Length = 10 },
                },
            },
            Grips = new Dictionary<string, GripDeck> { ["base"] = new() { On = ["bottom of base"] }, ["end"] = new() { On = ["left end of strip"] } },
            Sequence = sequence,
        };
    }

    /// <summary>Length, thickness [mm] and modulus [MPa] of a strip that pressure bulges.</summary>
    public const double BulgeLength = 200, BulgeThickness = 0.5, BulgeYoung = 2000;

    /// <summary>A thin strip between two pins, bulged by pressure on its lower face.</summary>
    /// <param name="pressure">Pressure [MPa].</param>
    public static Deck Bulge(double pressure) => Make(
        "Bulge",
        Width,
        BulgeYoung,
        new AdherendDeck { Of = "stuff", Rectangle = new RectangleDeck { Corner = [0, 0], Size = [BulgeLength, BulgeThickness] }, Elements = new ElementsDeck { Along = 100, Through = 1 } },
        new Dictionary<string, GripDeck> { ["left"] = new() { On = ["left end of beam"] }, ["right"] = new() { On = ["right end of beam"] } },
        new Dictionary<string, IReadOnlyList<GripComponent>> { ["left"] = [GripComponent.X, GripComponent.Y], ["right"] = [GripComponent.X, GripComponent.Y] },
        new StageDeck { Press = new PressDeck { On = ["bottom of beam"], Pressure = pressure } });

    /// <summary>
    /// Rise of that strip as a membrane: a circular arc of half angle α whose force T = p·R stretches it by ε, so that sin α/α = 1/(1 + ε). T = E·t·ln(1 + ε)/(1 + ε) by the logarithmic
    /// strain. Bending takes p·E·I/T² off the rise, near the pins.
    /// </summary>
    /// <param name="pressure">Pressure [MPa].</param>
    public static double BulgeRise(double pressure)
    {
        double low = 1e-6, high = 1.5;
        for (int i = 0; i < 200; i++)
        {
            double angle = 0.5 * (low + high), stretch = angle / Math.Sin(angle), radius = BulgeLength / (2 * Math.Sin(angle));
            if (BulgeYoung * BulgeThickness * Math.Log(stretch) / stretch < pressure * radius)
                low = angle;
            else
                high = angle;
        }
        double arc = BulgeLength / (2 * Math.Sin(low)), force = pressure * arc;
        return arc * (1 - Math.Cos(low)) - pressure * BulgeYoung * Math.Pow(BulgeThickness, 3) / 12 / (force * force);
    }

    private static Deck Make(
        string title, double width, double young, AdherendDeck beam, Dictionary<string, GripDeck> grips, Dictionary<string, IReadOnlyList<GripComponent>> held, StageDeck load) => new()
        {
            Title = title,
            Model = new ModelDeck { Width = width, Rotation = RotationSetting.Finite, OutOfPlane = OutOfPlane.Free },
            Materials = new Dictionary<string, MaterialDeck> { ["stuff"] = new() { Young = new Directional(young), Poisson = new PoissonRatios(0) } },
            Adherends = new Dictionary<string, AdherendDeck> { ["beam"] = beam },
            Grips = grips,
            Sequence = [new StageDeck { Fix = held }, load],
        };
}
