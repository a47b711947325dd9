namespace InterfaceFE.Units;

/// <summary>
/// Reads quantities as a deck writes them ("1.1 mm", "2.0 kJ/m^2", "-40 °C") into internal units, and writes them back. A number with a dimension must carry its
/// unit; °C is never a difference and K never a temperature.
/// </summary>
public static class QuantityText
{
    private const double ZeroCelsius = 273.15;

    /// <summary>Reads a quantity of a dimension. False with a message that completes "… MESSAGE" and leaves NaN in <paramref name="value"/>.</summary>
    /// <param name="text">As written; spaces around it do not count.</param>
    /// <param name="dimension">What is due.</param>
    /// <param name="example">A valid value for the message; null: a common one of the dimension.</param>
    /// <param name="value">The value in internal units (mm, N, MPa, s, K, rad).</param>
    /// <param name="error">What is wrong and what would be right.</param>
    public static bool TryRead(string text, Dimension dimension, string? example, out double value, out string error)
    {
        ArgumentNullException.ThrowIfNull(text);
        example ??= DimensionText.Example(dimension);
        string trimmed = text.Trim();
        int length = NumberText.Measure(trimmed);
        string number = length == 0 ? trimmed.Split(' ')[0] : trimmed[..length];
        string unit = trimmed[number.Length..].Trim();
        // A number is told from its unit by the first sign that cannot belong to it; "010", "1,5" and ".nan" must be seen whole.
        if (length > 0 && trimmed.Length > length && trimmed[length] is ',' or '.' or '_' or 'x')
            (number, unit) = (trimmed.Split(' ')[0], "");
        if (!NumberText.TryRead(number, out value, out error))
        {
            error = $"{error}; wanted is {DimensionText.Words(dimension)}, for example {example}";
            return false;
        }
        error = dimension switch
        {
            Dimension.None => ReadBare(unit, ref value, example),
            Dimension.Temperature => ReadTemperature(unit, ref value, example),
            _ => ReadWithUnit(number, unit, dimension, ref value, example),
        };
        if (error.Length == 0 && !double.IsFinite(value))
            error = "is too large a number";
        if (error.Length > 0)
            value = double.NaN;
        return error.Length == 0;
    }

    /// <summary>The quantity with its unit, so that reading it back gives the same double.</summary>
    public static string Write(double value, Dimension dimension)
    {
        string unit = DimensionText.Unit(dimension);
        string number = dimension == Dimension.Temperature ? CelsiusOf(value) : NumberText.Write(value);
        return unit.Length == 0 ? number : number + " " + unit;
    }

    private static string ReadBare(string unit, ref double value, string example)
    {
        if (unit.Length == 0)
            return "";
        if (unit == "%")
        {
            value /= 100;
            return "";
        }
        return $"has a unit, but a bare number is due here, for example {example}";
    }

    private static string ReadTemperature(string unit, ref double value, string example)
    {
        if (unit is "°C" or "℃")
        {
            value += ZeroCelsius;
            return "";
        }
        if (unit.Length == 0)
            return $"needs its unit, for example {example}";
        if (unit == "K")
            return value < 0
                ? $"is in K, which is kept for differences; write the temperature in °C, for example {example}"
                : $"is in K, which is kept for differences; write the temperature in °C: {NumberText.Rounded(value - ZeroCelsius, 6)} °C";
        if (unit is "C" or "degC" or "deg C" or "oC" or "°" or "°c" or "ºC" or "° C")
            return $"needs the unit °C, for example {example}";
        return UnitExpression.TryRead(unit, out KnownUnit known, out string error)
            ? $"is {DimensionText.Words(known.Powers)}, but a temperature is due, for example {example}"
            : $"is not understood: {error}; wanted is a temperature, for example {example}";
    }

    private static string ReadWithUnit(string number, string unit, Dimension dimension, ref double value, string example)
    {
        if (unit.Length == 0)
            return $"needs its unit ({DimensionText.Words(dimension)}), for example {example}";
        if (unit is "°C" or "℃")
            return $"is a temperature, but {DimensionText.Words(dimension)} is due, for example {example}"
                + (dimension == Dimension.TemperatureDifference ? "; °C is a point on the scale, a difference is in K" : "");
        if (!UnitExpression.TryRead(unit, out KnownUnit known, out string error))
            return $"is not understood: {error}; wanted is {DimensionText.Words(dimension)}, for example {example}";
        if (known.Powers != DimensionText.Powers(dimension))
            return $"is {DimensionText.Words(known.Powers)}, but {DimensionText.Words(dimension)} is due, for example {example}";
        value = Convert(number, value, known);
        return "";
    }

    /// <summary>Internal value; rounded once where the unit is a power of ten, so that 1.013 bar is 0.1013 MPa and not its neighbour.</summary>
    private static double Convert(string number, double value, KnownUnit unit)
    {
        double factor = unit.Numerator / unit.Denominator;
        int power = (int)Math.Round(Math.Log10(factor));
        double exact = NumberText.ReadShifted("1", Math.Abs(power));
        bool isPower = power >= 0 ? unit.Numerator == exact * unit.Denominator : unit.Denominator == exact * unit.Numerator;
        return isPower ? NumberText.ReadShifted(number, power) : value * unit.Numerator / unit.Denominator;
    }

    private static string CelsiusOf(double kelvin)
    {
        double celsius = kelvin - ZeroCelsius;
        for (int decimals = 0; decimals <= 15; decimals++)
        {
            double rounded = Math.Round(celsius, decimals);
            if (rounded + ZeroCelsius == kelvin)
                return NumberText.Write(rounded);
        }
        return NumberText.Write(celsius);
    }
}
