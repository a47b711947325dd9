using System.Globalization;

namespace InterfaceFE.Mechanics.Layers;

/// <summary>Checks of the numbers that laws and curves are built from; messages carry the value and the range.</summary>
internal static class Admissible
{
    /// <summary>A finite number above 0.</summary>
    /// <exception cref="ArgumentOutOfRangeException">Otherwise.</exception>
    public static double Positive(double value, string name)
    {
        if (!double.IsFinite(value) || value <= 0)
            throw new ArgumentOutOfRangeException(name, value, $"{name} must be a finite number greater than 0");
        return value;
    }

    /// <summary>A finite number within bounds, bounds included.</summary>
    /// <exception cref="ArgumentOutOfRangeException">Otherwise.</exception>
    public static double Within(double value, double least, double most, string name)
    {
        if (!(value >= least && value <= most))
            throw new ArgumentOutOfRangeException(name, value, string.Create(CultureInfo.InvariantCulture, $"{name} must lie between {least:R} and {most:R}"));
        return value;
    }

    /// <summary>Text of an error with invariant numbers.</summary>
    public static string Text(FormattableString message) => FormattableString.Invariant(message);
}
