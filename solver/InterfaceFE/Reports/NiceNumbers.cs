namespace InterfaceFE.Reports;

/// <summary>Round numbers for ticks and scales: 1, 2 or 5 times a power of ten.</summary>
internal static class NiceNumbers
{
    /// <summary>The largest nice number that is not above a positive value.</summary>
    public static double AtMost(double value)
    {
        double power = Math.Pow(10, Math.Floor(Math.Log10(value)));
        double lead = value / power;
        return (lead >= 5 ? 5 : lead >= 2 ? 2 : 1) * power;
    }

    /// <summary>The least nice number that is not below a positive value, of 1, 1.5, 2, 3, 4, 5, 6, 8 times a power of ten.</summary>
    public static double AtLeast(double value)
    {
        double power = Math.Pow(10, Math.Floor(Math.Log10(value)));
        foreach (double lead in (ReadOnlySpan<double>)[1, 1.5, 2, 3, 4, 5, 6, 8])
            if (value <= lead * power * (1 + 1e-12))
                return lead * power;
        return 10 * power;
    }

    /// <summary>Ticks within bounds, about so many.</summary>
    public static List<double> Ticks(double least, double largest, int about)
    {
        double apart = AtMost((largest - least) / about * 1.5);
        List<double> ticks = [];
        for (double k = Math.Ceiling(least / apart - 1e-9); k * apart <= largest + 1e-9 * apart; k++)
            ticks.Add(k * apart);
        return ticks;
    }
}
