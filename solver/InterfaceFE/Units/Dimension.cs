namespace InterfaceFE.Units;

/// <summary>The kinds of quantity that a deck can state. Each has one internal unit: mm, N, MPa, s, K and what follows from them.</summary>
public enum Dimension
{
    /// <summary>A bare number.</summary>
    None,

    /// <summary>Length, internal unit mm.</summary>
    Length,

    /// <summary>Angle, internal unit rad.</summary>
    Angle,

    /// <summary>Force, internal unit N.</summary>
    Force,

    /// <summary>Moment, internal unit N·mm.</summary>
    Moment,

    /// <summary>Stress, pressure or modulus, internal unit MPa.</summary>
    Stress,

    /// <summary>Traction per separation, internal unit MPa/mm.</summary>
    LayerStiffness,

    /// <summary>Stiffness of a spring, internal unit N/mm.</summary>
    Stiffness,

    /// <summary>Fracture energy per area, internal unit N/mm (equal to kJ/m²).</summary>
    Toughness,

    /// <summary>Temperature on a scale, internal unit K (absolute). Written in °C in decks.</summary>
    Temperature,

    /// <summary>Difference of temperature, internal unit K. Written in K in decks.</summary>
    TemperatureDifference,

    /// <summary>Thermal expansion, internal unit 1/K.</summary>
    Expansion,

    /// <summary>Time, internal unit s.</summary>
    Time,

    /// <summary>Speed, internal unit mm/s.</summary>
    Speed,

    /// <summary>Angular speed, internal unit rad/s.</summary>
    AngularSpeed,

    /// <summary>Mass per volume, internal unit t/mm³ (N·s²/mm⁴).</summary>
    Density,
}
