using InterfaceFE.Units;

namespace InterfaceFE.Decks;

/// <summary>
/// Material of an adherend. Isotropic when <see cref="Young"/> and <see cref="Poisson"/> hold one number, else orthotropic with axes x (along), y (through the thickness), z (out of plane).
/// </summary>
[Block("A material of adherends: elastic, and with a yield curve elastic and plastic. One number each makes it isotropic; values by direction make it orthotropic: x along, y through the thickness, z out of plane.")]
public sealed record MaterialDeck
{
    /// <summary>Young's modulus or moduli [MPa].</summary>
    [Key("young", "Young's modulus, one number or by direction {x, y, z}.", Dimension = Dimension.Stress, Example = "70 GPa", Above = 0)]
    public required Directional Young { get; init; }

    /// <summary>Poisson's ratio, or ratios ij: stress along i, contraction along j.</summary>
    [Key("poisson", "Poisson's ratio, one number or {xy, xz, zy}; ij is stress along i, contraction along j.", Example = "0.33", Above = -1, Below = 10)]
    public required PoissonRatios Poisson { get; init; }

    /// <summary>In-plane shear modulus xy [MPa]; orthotropic only.</summary>
    [Key("shear modulus", "Shear modulus {xy}; needed when young is given by direction, derived otherwise.")]
    public ShearModuli? ShearModulus { get; init; }

    /// <summary>Thermal expansion [1/K].</summary>
    [Key("expansion", "Thermal expansion, one number or by direction {x, y, z}.", Dimension = Dimension.Expansion, Example = "23e-6 1/K", Default = "0 1/K", Above = -1e-3, Below = 1e-3)]
    public Directional Expansion { get; init; } = new(0);

    /// <summary>Density [t/mm³]; null: not known.</summary>
    [Key("density", "Density; needed where the model has `gravity`.", Dimension = Dimension.Density, Example = "2700 kg/m^3", Above = 0)]
    public double? Density { get; init; }

    /// <summary>Yielding; null: the material stays elastic.</summary>
    [Key("yield curve", "Yielding by von Mises; isotropic materials in eight-node elements. Left out: the material stays elastic.")]
    public YieldCurveDeck? YieldCurve { get; init; }

    /// <summary>Note on the origin of the data.</summary>
    [Key("source", "Where the data come from, free text.", Example = "invented for the demo")]
    public string? Source { get; init; }
}

/// <summary>Yield stress by plastic strain and temperature.</summary>
[Block("Yielding by von Mises: yield stress against plastic strain of a tensile test, straight between the points and level beyond the last, and how temperature and reversed loading change it.")]
public sealed record YieldCurveDeck
{
    /// <summary>Equivalent plastic strains [-].</summary>
    [Key("plastic strain", "Plastic strains of the table, rising from 0; [0] alone with one stress yields without hardening.", Example = "[0, 0.05]", AtLeast = 0, LeastCount = 1)]
    public required IReadOnlyList<double> PlasticStrain { get; init; }

    /// <summary>Yield stresses [MPa].</summary>
    [Key("stress", "Yield stresses of the table (true stress), not falling.", Dimension = Dimension.Stress, Example = "[180 MPa, 230 MPa]", Above = 0, LeastCount = 1)]
    public required IReadOnlyList<double> Stress { get; init; }

    /// <summary>Kinematic hardening [MPa].</summary>
    [Key("kinematic hardening", "Slope of stress against plastic strain by which the yield surface moves instead of growing, so that reversed loading yields earlier; it adds to the table: stress in tension = table + slope · plastic strain.", Dimension = Dimension.Stress, Example = "1 GPa", Default = "0 MPa", AtLeast = 0)]
    public double KinematicHardening { get; init; }

    /// <summary>Temperatures of the shares [K].</summary>
    [Key("temperature", "Temperatures at which `share of stress` is given, rising; they must span all temperatures of the deck.", Dimension = Dimension.Temperature, Example = "[-40 °C, 20 °C, 150 °C]", AtLeast = 0, LeastCount = 2)]
    public IReadOnlyList<double>? Temperature { get; init; }

    /// <summary>Share of the table's stresses at each temperature [-].</summary>
    [Key("share of stress", "Share of the table's stresses that holds at each `temperature`, straight between them.", Example = "[1.05, 1, 0.85]", Above = 0, LeastCount = 2)]
    public IReadOnlyList<double>? ShareOfStress { get; init; }
}

/// <summary>A value by direction; a single number stands for all three. Written as a number or as a map {x, y, z}.</summary>
/// <param name="X">Along.</param>
/// <param name="Y">Through the thickness.</param>
/// <param name="Z">Out of plane.</param>
public readonly record struct Directional(double X, double Y, double Z)
{
    /// <summary>The same value in all directions.</summary>
    public Directional(double all) : this(all, all, all)
    {
    }
}

/// <summary>Poisson's ratios ij (stress along i, contraction along j). Written as a number or as a map {xy, xz, zy}.</summary>
/// <param name="Xy">Stress along x, contraction along y.</param>
/// <param name="Xz">Stress along x, contraction along z.</param>
/// <param name="Zy">Stress along z, contraction along y.</param>
public readonly record struct PoissonRatios(double Xy, double Xz, double Zy)
{
    /// <summary>The same ratio for all pairs.</summary>
    public PoissonRatios(double all) : this(all, all, all)
    {
    }
}

/// <summary>Shear moduli of an orthotropic material.</summary>
[Block("Shear moduli of an orthotropic material.")]
public sealed record ShearModuli
{
    /// <summary>Shear modulus in the plane of the model [MPa].</summary>
    [Key("xy", "Shear modulus in the plane of the model.", Dimension = Dimension.Stress, Example = "3.6 GPa", Above = 0)]
    public required double Xy { get; init; }

    /// <summary>Shear modulus along and out of plane [MPa].</summary>
    [Key("xz", "Shear modulus in the plane of a sheet; needed by plies that are turned.", Dimension = Dimension.Stress, Example = "4.1 GPa", Above = 0)]
    public double? Xz { get; init; }

    /// <summary>Shear modulus through the thickness and out of plane [MPa].</summary>
    [Key("zy", "Shear modulus through the thickness and out of plane; needed by plies that are turned.", Dimension = Dimension.Stress, Example = "3.6 GPa", Above = 0)]
    public double? Zy { get; init; }
}
