using System.Globalization;

namespace InterfaceFE.Validation.Framework;

/// <summary>How a line is judged.</summary>
public enum LineKind
{
    /// <summary>The difference to the expected value, relative to it, is at most the tolerance.</summary>
    Close,

    /// <summary>The value is at most the expected one.</summary>
    AtMost,

    /// <summary>The value is not judged.</summary>
    Reported,

    /// <summary>Nothing was measured; the source says why. Not judged.</summary>
    Skipped,
}

/// <summary>One comparison of a case.</summary>
/// <param name="What">What is compared, in words.</param>
/// <param name="Expected">Value that the code did not produce, or the limit; NaN: none.</param>
/// <param name="Got">Value that the code produced; one that is not finite never holds.</param>
/// <param name="Tolerance">Largest difference relative to the expected value (absolute where that is 0).</param>
/// <param name="Unit">Unit of both values; empty for none.</param>
/// <param name="Source">Where the expected value and the tolerance are from.</param>
public sealed record CaseLine(string What, double Expected, double Got, double Tolerance, string Unit, string Source)
{
    /// <summary>How the line is judged.</summary>
    public LineKind Kind { get; private init; } = LineKind.Close;

    /// <summary>Difference relative to the expected value, absolute where that is 0; NaN where there is none.</summary>
    public double Difference => Expected == 0 ? Got : (Got - Expected) / Math.Abs(Expected);

    /// <summary>Whether the line counts for the verdict.</summary>
    public bool IsJudged => Kind is LineKind.Close or LineKind.AtMost;

    /// <summary>Whether a judged line holds.</summary>
    public bool Holds => Kind switch
    {
        LineKind.Close => double.IsFinite(Got) && Math.Abs(Difference) <= Tolerance,
        LineKind.AtMost => double.IsFinite(Got) && Got <= Expected,
        _ => true,
    };

    /// <summary>The verdict in words.</summary>
    public string Verdict => Kind switch
    {
        LineKind.Reported => "reported",
        LineKind.Skipped => "skipped",
        _ => Holds ? "HOLD" : "DOES NOT HOLD",
    };

    /// <summary>A value that must not exceed a limit.</summary>
    public static CaseLine AtMost(string what, double limit, double got, string unit, string source) =>
        new(what, limit, got, 0, unit, source) { Kind = LineKind.AtMost };

    /// <summary>A value that is shown and not judged, beside another where there is one.</summary>
    public static CaseLine Reported(string what, double got, string unit, string source, double beside = double.NaN) =>
        new(what, beside, got, 0, unit, source) { Kind = LineKind.Reported };

    /// <summary>Something that was not measured here.</summary>
    public static CaseLine Skipped(string what, string why) => new(what, double.NaN, double.NaN, 0, "", why) { Kind = LineKind.Skipped };

    /// <summary>Something that broke: never holds.</summary>
    public static CaseLine Broken(string what, string why) => new(what, double.NaN, double.NaN, 0, "", why);

    /// <summary>A number with six digits.</summary>
    public static string Number(double value) =>
        double.IsNaN(value) ? "" : Math.Abs(value) is 0 or (>= 1e-4 and < 1e7) ? value.ToString("G6", CultureInfo.InvariantCulture) : value.ToString("0.####e0", CultureInfo.InvariantCulture);

    /// <summary>The difference in words: percent, or parts where it is very small; empty for a limit.</summary>
    public string DifferenceText() => Kind is LineKind.AtMost or LineKind.Skipped || double.IsNaN(Difference) ? ""
        : Expected == 0 ? Difference.ToString("0.##e0", CultureInfo.InvariantCulture) : Percent(Difference, sign: true);

    /// <summary>The tolerance in words.</summary>
    public string ToleranceText() => Kind switch
    {
        LineKind.Close => double.IsNaN(Expected) ? "" : Expected == 0 ? Number(Tolerance) : Percent(Tolerance, sign: false),
        LineKind.AtMost => "at most",
        _ => "",
    };

    private static string Percent(double share, bool sign)
    {
        if (!double.IsFinite(share))
            return "";
        double percent = 100 * share;
        string format = Math.Abs(percent) is 0 or >= 0.0095 ? "0.0##" : "0.#e0";
        return (sign && share > 0 ? "+" : "") + percent.ToString(format, CultureInfo.InvariantCulture) + " %";
    }
}
