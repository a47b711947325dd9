using System.Globalization;

namespace InterfaceFE.Units;

/// <summary>
/// Strict reading of decimal numbers: no thousands separators, no leading zeros (some readers take <c>010</c> for eight), no hexadecimal, no NaN, no infinity,
/// no overflow to infinity and no underflow to 0.
/// </summary>
public static class NumberText
{
    /// <summary>Length of the number at the start of the text: sign, digits, point, power of ten; 0 when none starts there.</summary>
    internal static int Measure(ReadOnlySpan<char> text)
    {
        int at = 0;
        if (at < text.Length && text[at] is '+' or '-')
            at++;
        int digits = CountDigits(text, ref at);
        if (at < text.Length && text[at] == '.')
        {
            at++;
            digits += CountDigits(text, ref at);
        }
        if (digits == 0)
            return 0;
        int end = at;
        if (at < text.Length && text[at] is 'e' or 'E')
        {
            at++;
            if (at < text.Length && text[at] is '+' or '-')
                at++;
            if (CountDigits(text, ref at) > 0)
                end = at;
        }
        return end;
    }

    /// <summary>Reads a number that fills the text; false with a message that completes "…: MESSAGE".</summary>
    public static bool TryRead(ReadOnlySpan<char> text, out double value, out string error)
    {
        value = double.NaN;
        error = "";
        if (text.Length == 0 || Measure(text) != text.Length)
            error = NotANumber(text);
        else if (HasLeadingZero(text))
            error = "starts with a 0 before another digit, which some programs read as an octal number; leave that 0 out";
        else if (!double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out value) || !double.IsFinite(value))
            error = "is too large a number";
        else if (value == 0 && HasNonZeroDigit(text))
            error = "is too small a number to be told from 0";
        if (error.Length > 0)
            value = double.NaN;
        return error.Length == 0;
    }

    /// <summary>The number with its decimal point moved: value · 10^<paramref name="shift"/>, rounded once. The text must be one that <see cref="TryRead"/> takes.</summary>
    internal static double ReadShifted(ReadOnlySpan<char> text, int shift)
    {
        int mark = text.IndexOfAny('e', 'E');
        ReadOnlySpan<char> digits = mark < 0 ? text : text[..mark];
        // The power fits an int: larger ones were refused as too large or too small.
        long power = shift + (mark < 0 || !int.TryParse(text[(mark + 1)..], NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out int given) ? 0 : given);
        return double.Parse(string.Create(CultureInfo.InvariantCulture, $"{digits}e{power}"), NumberStyles.Float, CultureInfo.InvariantCulture);
    }

    /// <summary>The number with so many significant digits, for messages.</summary>
    public static string Rounded(double value, int digits)
    {
        string format = "E" + (digits - 1).ToString(CultureInfo.InvariantCulture);
        return Write(double.IsFinite(value) ? double.Parse(value.ToString(format, CultureInfo.InvariantCulture), CultureInfo.InvariantCulture) : value);
    }

    /// <summary>The shortest text that reads back as the same number.</summary>
    public static string Write(double value) => value.ToString("R", CultureInfo.InvariantCulture).Replace('E', 'e').Replace("e-0", "e-", StringComparison.Ordinal);

    private static string NotANumber(ReadOnlySpan<char> text)
    {
        string word = text.ToString();
        if (word.TrimStart('+', '-', '.').ToUpperInvariant() is "NAN" or "INF" or "INFINITY")
            return "is not a number to calculate with; give a finite one";
        if (word.StartsWith('−') || word.StartsWith('–'))
            return "starts with a dash that is not the minus sign; write -";
        if (word.Contains(',', StringComparison.Ordinal) && Measure(word.Replace(',', '.')) == word.Length)
            return "has a comma; write the decimal point as .";
        if (word.StartsWith("0x", StringComparison.OrdinalIgnoreCase) || word.Contains('_', StringComparison.Ordinal))
            return "is not a decimal number";
        return "is not a number";
    }

    private static bool HasLeadingZero(ReadOnlySpan<char> text)
    {
        ReadOnlySpan<char> digits = text.TrimStart("+-");
        return digits.Length > 1 && digits[0] == '0' && char.IsAsciiDigit(digits[1]);
    }

    private static bool HasNonZeroDigit(ReadOnlySpan<char> text)
    {
        foreach (char c in text)
        {
            if (c is 'e' or 'E')
                return false;
            if (c is >= '1' and <= '9')
                return true;
        }
        return false;
    }

    private static int CountDigits(ReadOnlySpan<char> text, ref int at)
    {
        int start = at;
        while (at < text.Length && char.IsAsciiDigit(text[at]))
            at++;
        return at - start;
    }
}
