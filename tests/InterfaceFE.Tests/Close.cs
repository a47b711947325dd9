using System.Globalization;
using Xunit;

namespace InterfaceFE.Tests;

/// <summary>The one way to compare numbers in tests: prints all four numbers, and NaN never passes.</summary>
internal static class Close
{
    /// <summary>Passes when |actual - expected| is at most relative·|expected| + absolute.</summary>
    public static void To(double expected, double actual, double relative = 1e-12, double absolute = 0, string what = "")
    {
        double difference = Math.Abs(actual - expected);
        if (difference <= relative * Math.Abs(expected) + absolute)
            return;
        Assert.Fail(string.Create(CultureInfo.InvariantCulture, $"{what} expected {expected:R}, got {actual:R}, difference {difference:R}, allowed {relative:R} relative + {absolute:R}"));
    }
}
