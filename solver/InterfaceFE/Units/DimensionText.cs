namespace InterfaceFE.Units;

/// <summary>What messages, the deck reference and the writer need to know about each <see cref="Dimension"/>.</summary>
public static class DimensionText
{
    private static readonly Row[] Rows =
    [
        new(Dimension.None, "a bare number", "", "0.5", default),
        new(Dimension.Length, "a length", "mm", "2.5 mm", new(1, 0, 0, 0, 0)),
        new(Dimension.Angle, "an angle", "rad", "5 deg", new(0, 0, 0, 0, 1)),
        new(Dimension.Force, "a force", "N", "200 N", new(0, 1, 0, 0, 0)),
        new(Dimension.Moment, "a moment", "N*mm", "12 N*m", new(1, 1, 0, 0, 0)),
        new(Dimension.Stress, "a stress or modulus", "MPa", "70 GPa", new(-2, 1, 0, 0, 0)),
        new(Dimension.LayerStiffness, "a stiffness of a layer (traction per separation)", "MPa/mm", "1.5 MPa/mm", new(-3, 1, 0, 0, 0)),
        new(Dimension.Stiffness, "a stiffness (force per travel)", "N/mm", "5 kN/mm", new(-1, 1, 0, 0, 0)),
        new(Dimension.Toughness, "a toughness (energy per area)", "N/mm", "2.0 kJ/m^2", new(-1, 1, 0, 0, 0)),
        new(Dimension.Temperature, "a temperature", "°C", "20 °C", new(0, 0, 0, 1, 0)),
        new(Dimension.TemperatureDifference, "a difference of temperature", "K", "60 K", new(0, 0, 0, 1, 0)),
        new(Dimension.Expansion, "a thermal expansion", "1/K", "23e-6 1/K", new(0, 0, 0, -1, 0)),
        new(Dimension.Time, "a time", "s", "6 h", new(0, 0, 1, 0, 0)),
        new(Dimension.Speed, "a speed", "mm/s", "2 mm/min", new(1, 0, -1, 0, 0)),
        new(Dimension.AngularSpeed, "an angular speed", "rad/s", "2 deg/min", new(0, 0, -1, 0, 1)),
        new(Dimension.Density, "a density (mass per volume)", "t/mm^3", "2700 kg/m^3", new(-4, 1, 2, 0, 0)),
    ];

    /// <summary>The dimension in words, with its article: "a length".</summary>
    public static string Words(Dimension dimension) => Rows[(int)dimension].Words;

    /// <summary>The unit in which values are written and calculated; empty for a bare number. Temperatures are written in °C and calculated in K.</summary>
    public static string Unit(Dimension dimension) => Rows[(int)dimension].Unit;

    /// <summary>A valid value as it would be written in a deck.</summary>
    public static string Example(Dimension dimension) => Rows[(int)dimension].Example;

    /// <summary>Powers of the base quantities.</summary>
    internal static UnitPowers Powers(Dimension dimension) => Rows[(int)dimension].Powers;

    /// <summary>The kind of quantity that has these powers, in words; for powers that no deck states, the powers themselves.</summary>
    internal static string Words(UnitPowers powers)
    {
        if (powers == default)
            return "a plain ratio";
        if (powers == Powers(Dimension.Moment))
            return "a moment or an energy";
        foreach (Row row in Rows)
            if (row.Powers == powers && row.Dimension is not (Dimension.Temperature or Dimension.Stiffness))
                return row.Words;
        return "in " + InBaseUnits(powers);
    }

    private static string InBaseUnits(UnitPowers powers)
    {
        (string Name, int Power)[] parts = [("N", powers.Force), ("mm", powers.Length), ("s", powers.Time), ("K", powers.Kelvin), ("rad", powers.Angle)];
        string above = string.Join("*", parts.Where(p => p.Power > 0).Select(p => Raised(p.Name, p.Power)));
        string below = string.Join("/", parts.Where(p => p.Power < 0).Select(p => Raised(p.Name, -p.Power)));
        return (above.Length == 0 ? "1" : above) + (below.Length == 0 ? "" : "/" + below);
    }

    private static string Raised(string name, int power) => power == 1 ? name : string.Create(System.Globalization.CultureInfo.InvariantCulture, $"{name}^{power}");

    private sealed record Row(Dimension Dimension, string Words, string Unit, string Example, UnitPowers Powers);
}
