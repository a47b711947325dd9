using InterfaceFE.Units;

namespace InterfaceFE.Decks;

/// <summary>How peel and shear share the fracture.</summary>
public enum Mixing
{
    /// <summary>Each mode keeps its own curve; fracture by the sum of the energy shares (Yang and Thouless 2001).</summary>
    [Word("independent modes", "each mode keeps its own curve; fracture where G_I/toughness_I + G_II/toughness_II = 1")]
    IndependentModes,

    /// <summary>One damage variable, toughness by Benzeggagh and Kenane 1996.</summary>
    [Word("benzeggagh-kenane", "one damage variable; toughness rises from peel to shear with the given exponent; bilinear curves only")]
    BenzeggaghKenane,

    /// <summary>One damage variable, toughness by the power law of the energy shares.</summary>
    [Word("power law", "one damage variable; fracture where (G_I/toughness_I)^exponent + (G_II/toughness_II)^exponent = 1; bilinear curves only")]
    PowerLaw,

    /// <summary>Potential of Park, Paulino and Roesler 2009.</summary>
    [Word("coupled potential", "tractions from one potential of both separations (Park, Paulino and Roesler 2009); curves of the law `potential` only")]
    CoupledPotential,
}

/// <summary>How the energy share of a mode is counted in the energy criterion.</summary>
public enum EnergyCount
{
    /// <summary>Area under the curve up to the largest separation.</summary>
    [Word("largest separation", "area under the curve up to the largest separation")]
    LargestSeparation,

    /// <summary>Stored plus dissipated along the path.</summary>
    [Word("net work", "stored plus dissipated along the path")]
    NetWork,
}

/// <summary>A bonding layer.</summary>
[Block("A bonding layer: thickness, one curve of traction against separation for peel and one for shear, and how they mix.")]
public sealed record LayerDeck
{
    /// <summary>Thickness [mm].</summary>
    [Key("thickness", "Thickness of the layer; gives strain of the layer and, with `bulk`, stiffness and free opening.", Dimension = Dimension.Length, Example = "1.1 mm", Above = 0)]
    public required double Thickness { get; init; }

    /// <summary>Curve of peel traction against opening.</summary>
    [Key("peel", "Peel traction against opening.")]
    public required CurveDeck Peel { get; init; }

    /// <summary>Curve of shear traction against sliding.</summary>
    [Key("shear", "Shear traction against sliding, the same in both senses.")]
    public required CurveDeck Shear { get; init; }

    /// <summary>How the modes mix.</summary>
    [Key("mixing", "How peel and shear share the fracture.")]
    public required Mixing Mixing { get; init; }

    /// <summary>Exponent of Benzeggagh and Kenane or of the power law.</summary>
    [Key("exponent", "Exponent of Benzeggagh and Kenane or of the power law (there at least 0.5); needed with these.", Example = "2.1", AtLeast = 0.1, AtMost = 20)]
    public double? Exponent { get; init; }

    /// <summary>Energy count of the criterion.</summary>
    [Key("counted by", "How the energy share of a mode is counted (independent modes).", Default = "largest separation")]
    public EnergyCount CountedBy { get; init; }

    /// <summary>Release length as a share of each mode's final separation.</summary>
    [Key("release length", "Length of the release branch at fracture, as a share of each mode's final separation (independent modes).", Default = "0.05", Above = 0, AtMost = 0.5)]
    public double ReleaseLength { get; init; } = 0.05;

    /// <summary>Stiffness when pressed together [MPa/mm].</summary>
    [Key("contact stiffness", "Stiffness of the layer when pressed together; left out: the stiffness of the peel curve.", Dimension = Dimension.LayerStiffness, Example = "1000 MPa/mm", Above = 0)]
    public double? ContactStiffness { get; init; }

    /// <summary>Coefficient of friction of faces that are not bonded, or no longer; null: none.</summary>
    [Key("friction", "Coefficient of friction (Coulomb) of the faces where they never were bonded or have separated, once pressed together; left out: none. They stick with the contact stiffness.", Example = "0.3", Above = 0, AtMost = 5)]
    public double? Friction { get; init; }

    /// <summary>Bulk properties of the layer's material.</summary>
    [Key("bulk", "Properties of the layer's material, for stiffness and free opening by temperature.")]
    public BulkDeck? Bulk { get; init; }

    /// <summary>Cavities that ambient pressure cannot reach.</summary>
    [Key("cavities", "Area share of unvented cavities against opening; ambient pressure other than that of `measured at` then adds to the peel curve (independent modes).")]
    public CavitiesDeck? Cavities { get; init; }

    /// <summary>Relaxation of the tractions.</summary>
    [Key("relaxation", "Relaxation of the tractions with time and temperature; the curves are then those of a sudden load. Laws that unload to the origin only.")]
    public RelaxationDeck? Relaxation { get; init; }

    /// <summary>Conditions of the test behind the curves.</summary>
    [Key("measured at", "Conditions under which the curves were measured; stated in the summary.")]
    public MeasuredAtDeck? MeasuredAt { get; init; }

    /// <summary>Note on the origin of the data.</summary>
    [Key("source", "Where the data come from, free text.", Example = "invented for the demo")]
    public string? Source { get; init; }
}

/// <summary>Shape of a curve of traction against separation.</summary>
public enum CurveShape
{
    /// <summary>Linear rise, linear fall.</summary>
    [Word("bilinear", "linear rise to the strength, linear fall to zero; needs stiffness, strength, toughness")]
    Bilinear,

    /// <summary>Linear rise, plateau, linear fall.</summary>
    [Word("trapezoid", "linear rise, plateau at the strength, linear fall; needs stiffness, strength, toughness; `plateau until` sets the shape")]
    Trapezoid,

    /// <summary>Linear rise, exponential fall.</summary>
    [Word("exponential", "linear rise, exponential fall that ends at the final separation; needs stiffness, strength, toughness, final separation")]
    Exponential,

    /// <summary>Linear rise, parabolic fall.</summary>
    [Word("linear-parabolic", "linear rise to the strength, then a parabola that starts level at the strength and ends at zero; needs stiffness, strength, toughness")]
    LinearParabolic,

    /// <summary>One mode of the coupled potential.</summary>
    [Word("potential", "one mode of the coupled potential; needs strength, toughness, exponent, initial slope")]
    Potential,

    /// <summary>Points joined by straight lines.</summary>
    [Word("table", "points joined by straight lines, from [0, 0] to traction 0; needs opening or sliding, and traction")]
    Table,
}

/// <summary>A curve of traction against separation of one mode.</summary>
[Block("A curve of traction against separation of one mode.")]
public sealed record CurveDeck
{
    /// <summary>Shape.</summary>
    [Key("law", "Shape of the curve.")]
    public required CurveShape Law { get; init; }

    /// <summary>Initial stiffness [MPa/mm]; null: from the bulk properties.</summary>
    [Key("stiffness", "Initial stiffness; left out: from `bulk` and the thickness (modulus over thickness, confined as `bulk` says).", Dimension = Dimension.LayerStiffness, Example = "1.5 MPa/mm", Above = 0)]
    public double? Stiffness { get; init; }

    /// <summary>Largest traction [MPa].</summary>
    [Key("strength", "Largest traction.", Dimension = Dimension.Stress, Example = "0.45 MPa", Above = 0)]
    public double? Strength { get; init; }

    /// <summary>Area under the curve [N/mm].</summary>
    [Key("toughness", "Fracture energy, the area under the curve; with a table it is checked against the area.", Dimension = Dimension.Toughness, Example = "2.0 kJ/m^2", Above = 0)]
    public double? Toughness { get; init; }

    /// <summary>End of the trapezoid's plateau [mm].</summary>
    [Key("plateau until", "Separation at the end of the trapezoid's plateau; left out, with `final separation` left out too: two thirds of the final separation.", Dimension = Dimension.Length, Example = "3.2 mm", Above = 0)]
    public double? PlateauUntil { get; init; }

    /// <summary>Separation at which the traction is gone [mm].</summary>
    [Key("final separation", "Separation at which the traction is gone; needed by `exponential`, and another way than `plateau until` to set the shape of a trapezoid.", Dimension = Dimension.Length, Example = "5 mm", Above = 0)]
    public double? FinalSeparation { get; init; }

    /// <summary>Exponent of a mode of the coupled potential.</summary>
    [Key("exponent", "Exponent of a mode of the coupled potential: 2 falls almost straight, above 2 hollow, below 2 bulging.", Example = "3", Above = 1, AtMost = 20)]
    public double? Exponent { get; init; }

    /// <summary>Initial slope indicator of a mode of the coupled potential.</summary>
    [Key("initial slope", "Initial slope indicator of a mode of the coupled potential: separation at the strength over the final separation; the smaller, the stiffer.", Example = "0.02", Above = 0, Below = 1)]
    public double? InitialSlope { get; init; }

    /// <summary>Plastic share of unloading.</summary>
    [Key("plastic share", "Share of plastic separation on unloading (independent modes): 0 (left out) unloads to the origin, 1 with the initial stiffness. In shear the layer then yields in both senses; closing below a plastic opening meets no resistance until the faces touch.", Example = "0.3", AtLeast = 0, AtMost = 1)]
    public double? PlasticShare { get; init; }

    /// <summary>Openings of a table [mm].</summary>
    [Key("opening", "Openings of a peel table, rising from 0 mm.", Dimension = Dimension.Length, Example = "[0 mm, 0.3 mm, 4 mm, 7 mm]", AtLeast = 0)]
    public IReadOnlyList<double>? Opening { get; init; }

    /// <summary>Slidings of a table [mm].</summary>
    [Key("sliding", "Slidings of a shear table, rising from 0 mm.", Dimension = Dimension.Length, Example = "[0 mm, 0.3 mm, 4 mm, 7 mm]", AtLeast = 0)]
    public IReadOnlyList<double>? Sliding { get; init; }

    /// <summary>Tractions of a table [MPa].</summary>
    [Key("traction", "Tractions of a table, from 0 MPa back to 0 MPa.", Dimension = Dimension.Stress, Example = "[0 MPa, 0.42 MPa, 0.5 MPa, 0 MPa]", AtLeast = 0)]
    public IReadOnlyList<double>? Traction { get; init; }
}

/// <summary>Whether a thin layer can contract along itself.</summary>
public enum Confinement
{
    /// <summary>Held between stiff faces: no strain along the layer.</summary>
    [Word("confined", "held between stiff faces: no strain along the layer")]
    Confined,

    /// <summary>Free to contract.</summary>
    [Word("unconfined", "free to contract along the layer")]
    Unconfined,
}

/// <summary>Bulk properties of a layer's material.</summary>
[Block("Properties of the layer's material in bulk.")]
public sealed record BulkDeck
{
    /// <summary>Young's modulus [MPa].</summary>
    [Key("young", "Young's modulus.", Dimension = Dimension.Stress, Example = "2.4 GPa", Above = 0)]
    public required double Young { get; init; }

    /// <summary>Poisson's ratio.</summary>
    [Key("poisson", "Poisson's ratio.", Example = "0.38", Above = -1, Below = 0.5)]
    public required double Poisson { get; init; }

    /// <summary>Thermal expansion [1/K].</summary>
    [Key("expansion", "Thermal expansion; opens the layer with temperature.", Dimension = Dimension.Expansion, Example = "60e-6 1/K", Default = "0 1/K")]
    public double Expansion { get; init; }

    /// <summary>Confinement.</summary>
    [Key("between faces", "Whether the layer is held along itself by stiff faces.", Default = "confined")]
    public Confinement BetweenFaces { get; init; }
}

/// <summary>Cavities in a layer that opens.</summary>
[Block("Area share of unvented cavities in the opening layer: the peel traction is that of the test plus (ambient pressure - pressure of the test) times this share.")]
public sealed record CavitiesDeck
{
    /// <summary>Openings [mm].</summary>
    [Key("opening", "Openings, rising; the first where cavities begin, the last where they are vented, at most the final separation.", Dimension = Dimension.Length, Example = "[0.3 mm, 0.8 mm, 3 mm, 4 mm]", AtLeast = 0, LeastCount = 3)]
    public required IReadOnlyList<double> Opening { get; init; }

    /// <summary>Shares.</summary>
    [Key("share", "Area share of unvented cavities at each opening, 0 first and last.", Example = "[0, 0.6, 0.6, 0]", AtLeast = 0, AtMost = 1, LeastCount = 3)]
    public required IReadOnlyList<double> Share { get; init; }
}

/// <summary>How relaxation times move with temperature.</summary>
public enum ShiftLaw
{
    /// <summary>Not at all.</summary>
    [Word("none", "the same times at every temperature")]
    None,

    /// <summary>Williams, Landel and Ferry 1955.</summary>
    [Word("wlf", "Williams, Landel and Ferry: log10 of the factor = -c1·(T - reference)/(c2 + T - reference); nothing relaxes at and below reference - c2")]
    Wlf,

    /// <summary>Arrhenius.</summary>
    [Word("arrhenius", "Arrhenius: ln of the factor = activation·(1/T - 1/reference)")]
    Arrhenius,
}

/// <summary>Relaxation of a layer by a Prony series.</summary>
[Block("Relaxation of a layer's tractions by a Prony series: under a sudden separation that is then held, each share of the traction fades with its own time; the rest lasts. Damage follows the separation.")]
public sealed record RelaxationDeck
{
    /// <summary>Shares.</summary>
    [Key("share", "Share of the traction that fades with each time; at most 1 in sum.", Example = "[0.3, 0.2]", Above = 0, AtMost = 1, LeastCount = 1, MostCount = 16)]
    public required IReadOnlyList<double> Share { get; init; }

    /// <summary>Times [s].</summary>
    [Key("time", "Relaxation times at the reference temperature.", Dimension = Dimension.Time, Example = "[10 s, 1 h]", Above = 0, LeastCount = 1, MostCount = 16)]
    public required IReadOnlyList<double> Time { get; init; }

    /// <summary>Shift with temperature.</summary>
    [Key("shift", "How the times move with temperature.", Default = "none")]
    public ShiftLaw Shift { get; init; }

    /// <summary>Reference temperature [K].</summary>
    [Key("reference", "Temperature at which the times hold; needed with a shift.", Dimension = Dimension.Temperature, Example = "23 °C", Above = 0)]
    public double? Reference { get; init; }

    /// <summary>c1 of WLF.</summary>
    [Key("c1", "First constant of `wlf`.", Example = "17.4", Above = 0)]
    public double? C1 { get; init; }

    /// <summary>c2 of WLF [K].</summary>
    [Key("c2", "Second constant of `wlf`.", Dimension = Dimension.TemperatureDifference, Example = "51.6 K", Above = 0)]
    public double? C2 { get; init; }

    /// <summary>Activation energy over the gas constant [K].</summary>
    [Key("activation", "Activation energy over the gas constant, for `arrhenius`.", Dimension = Dimension.TemperatureDifference, Example = "9600 K", Above = 0)]
    public double? Activation { get; init; }
}

/// <summary>Conditions of the test behind a law.</summary>
[Block("Conditions under which the curves were measured.")]
public sealed record MeasuredAtDeck
{
    /// <summary>Temperature [K].</summary>
    [Key("temperature", "Temperature of the test.", Dimension = Dimension.Temperature, Example = "23 °C", AtLeast = 0)]
    public double? Temperature { get; init; }

    /// <summary>Ambient pressure [MPa].</summary>
    [Key("pressure", "Ambient pressure of the test.", Dimension = Dimension.Stress, Example = "1.013 bar", AtLeast = 0)]
    public double? Pressure { get; init; }

    /// <summary>Speed of the crosshead [mm/s].</summary>
    [Key("speed", "Speed of the crosshead.", Dimension = Dimension.Speed, Example = "2 mm/min", AtLeast = 0)]
    public double? Speed { get; init; }
}
