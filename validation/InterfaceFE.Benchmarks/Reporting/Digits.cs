using System.Globalization;

namespace InterfaceFE.Benchmarks.Reporting;

/// <summary>Numbers in tables: about three digits, no exponent where it can be avoided.</summary>
public static class Digits
{
    /// <summary>Three significant digits from 1 up, four decimals below; a dash for NaN.</summary>
    public static string Three(double value)
    {
        if (double.IsNaN(value))
            return "–";
        double size = Math.Abs(value);
        string format = size switch
        {
            >= 100 => "0",
            >= 10 => "0.0",
            >= 1 => "0.00",
            >= 0.001 => "0.0000",
            0 => "0",
            _ => "0.0E+0",
        };
        return value.ToString(format, CultureInfo.InvariantCulture);
    }

    /// <summary>A share in per cent.</summary>
    public static string Percent(double share) => (100 * share).ToString("0", CultureInfo.InvariantCulture) + " %";

    /// <summary>A whole number with thousands set apart.</summary>
    public static string Whole(double value) => value.ToString("#,0", CultureInfo.InvariantCulture).Replace(',', ' ');
}
