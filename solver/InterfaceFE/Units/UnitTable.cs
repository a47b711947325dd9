namespace InterfaceFE.Units;

/// <summary>
/// The units a deck may use. A value in a unit becomes internal as value · Numerator / Denominator, so that 1.013 bar is divided by 10 and not multiplied by a rounded 0.1.
/// </summary>
internal static class UnitTable
{
    private static readonly UnitPowers Length = new(1, 0, 0, 0, 0);
    private static readonly UnitPowers Force = new(0, 1, 0, 0, 0);
    private static readonly UnitPowers Stress = new(-2, 1, 0, 0, 0);
    private static readonly UnitPowers Time = new(0, 0, 1, 0, 0);
    private static readonly UnitPowers Energy = new(1, 1, 0, 0, 0);
    private static readonly UnitPowers Mass = new(-1, 1, 2, 0, 0);
    private static readonly UnitPowers Angle = new(0, 0, 0, 0, 1);

    private static readonly Dictionary<string, KnownUnit> Units = new(StringComparer.Ordinal)
    {
        ["mm"] = new(1, 1, Length),
        ["m"] = new(1000, 1, Length),
        ["cm"] = new(10, 1, Length),
        ["µm"] = new(1, 1000, Length),
        ["nm"] = new(1, 1e6, Length),
        ["km"] = new(1e6, 1, Length),
        ["N"] = new(1, 1, Force),
        ["kN"] = new(1000, 1, Force),
        ["MN"] = new(1e6, 1, Force),
        ["mN"] = new(1, 1000, Force),
        ["MPa"] = new(1, 1, Stress),
        ["GPa"] = new(1000, 1, Stress),
        ["kPa"] = new(1, 1000, Stress),
        ["hPa"] = new(1, 1e4, Stress),
        ["Pa"] = new(1, 1e6, Stress),
        ["bar"] = new(1, 10, Stress),
        ["mbar"] = new(1, 1e4, Stress),
        ["s"] = new(1, 1, Time),
        ["ms"] = new(1, 1000, Time),
        ["min"] = new(60, 1, Time),
        ["h"] = new(3600, 1, Time),
        ["d"] = new(86400, 1, Time),
        ["K"] = new(1, 1, new(0, 0, 0, 1, 0)),
        ["rad"] = new(1, 1, Angle),
        ["mrad"] = new(1, 1000, Angle),
        ["deg"] = new(Math.PI, 180, Angle),
        ["°"] = new(Math.PI, 180, Angle),
        ["J"] = new(1000, 1, Energy),
        ["kJ"] = new(1e6, 1, Energy),
        ["mJ"] = new(1, 1, Energy),
        ["t"] = new(1, 1, Mass),
        ["kg"] = new(1, 1000, Mass),
        ["%"] = new(1, 100, default),
    };

    /// <summary>Names of all units, in the order of the table.</summary>
    public static IReadOnlyCollection<string> Names => Units.Keys;

    /// <summary>Finds a unit by name; upper and lower case differ.</summary>
    public static bool TryFind(string name, out KnownUnit unit) => Units.TryGetValue(name, out unit);
}

/// <summary>A unit: internal value = value · <paramref name="Numerator"/> / <paramref name="Denominator"/>.</summary>
/// <param name="Numerator">Above the line.</param>
/// <param name="Denominator">Below the line.</param>
/// <param name="Powers">Powers of the base quantities.</param>
internal readonly record struct KnownUnit(double Numerator, double Denominator, UnitPowers Powers)
{
    /// <summary>Product of two units.</summary>
    public static KnownUnit operator *(KnownUnit a, KnownUnit b) => new(a.Numerator * b.Numerator, a.Denominator * b.Denominator, a.Powers + b.Powers);

    /// <summary>One over the unit.</summary>
    public KnownUnit Inverse => new(Denominator, Numerator, Powers * -1);
}
