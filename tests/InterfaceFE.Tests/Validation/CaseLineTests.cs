using InterfaceFE.Validation.Framework;
using Xunit;

namespace InterfaceFE.Tests.Validation;

public class CaseLineTests
{
    [Theory]
    [InlineData(100, 100.1, 1e-3, true)]
    [InlineData(100, 99.9, 1e-3, true)]
    [InlineData(100, 100.11, 1e-3, false)]
    [InlineData(-100, -99.9, 1e-3, true)]
    [InlineData(-100, 100, 1e-3, false)]
    [InlineData(0, 1e-6, 1e-6, true)]
    [InlineData(0, -2e-6, 1e-6, false)]
    [InlineData(100, double.NaN, 1e9, false)]
    [InlineData(100, double.PositiveInfinity, 1e9, false)]
    [InlineData(double.NaN, 1, 1e9, false)]
    public void A_value_holds_within_its_tolerance_and_never_when_not_finite(double expected, double got, double tolerance, bool holds)
    {
        var line = new CaseLine("what", expected, got, tolerance, "mm", "source");
        Assert.Equal((holds, true, holds ? "HOLD" : "DOES NOT HOLD"), (line.Holds, line.IsJudged, line.Verdict));
    }

    [Theory]
    [InlineData(1e-9, true)]
    [InlineData(1.0000001e-9, false)]
    [InlineData(-1, true)]
    [InlineData(double.NaN, false)]
    [InlineData(double.NegativeInfinity, false)]
    public void A_limit_holds_up_to_itself(double got, bool holds) => Assert.Equal(holds, CaseLine.AtMost("what", 1e-9, got, "", "source").Holds);

    [Fact]
    public void Reported_and_skipped_values_are_not_judged_and_broken_ones_never_hold()
    {
        Assert.False(CaseLine.Reported("what", double.NaN, "", "source").IsJudged);
        Assert.False(CaseLine.Skipped("what", "why").IsJudged);
        CaseLine broken = CaseLine.Broken("what", "why");
        Assert.True(broken.IsJudged && !broken.Holds);
    }

    [Fact]
    public void Differences_are_told_in_percent_of_the_expected_value_with_their_sign()
    {
        Assert.Equal("+0.5 %", new CaseLine("", 200, 201, 1, "", "").DifferenceText());
        Assert.Equal("-0.5 %", new CaseLine("", 200, 199, 1, "", "").DifferenceText());
        Assert.Equal("+0.5 %", new CaseLine("", -200, -199, 1, "", "").DifferenceText());
        Assert.Equal("", CaseLine.AtMost("", 1, 0.5, "", "").DifferenceText());
    }
}
