namespace InterfaceFE.Results;

/// <summary>Temperatures as output shows them.</summary>
internal static class Celsius
{
    /// <summary>
    /// Degrees Celsius of an absolute temperature [K], rounded to 1e-9 degrees: a double of some hundred kelvin is known to 6e-14 only, and without the rounding
    /// 233.15 K would be written as -39.99999999999997 °C.
    /// </summary>
    public static double From(double kelvin) => double.IsFinite(kelvin) ? Math.Round(kelvin - 273.15, 9) : kelvin;
}
