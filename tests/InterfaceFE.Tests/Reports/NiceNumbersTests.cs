using InterfaceFE.Reports;
using Xunit;

namespace InterfaceFE.Tests.Reports;

public class NiceNumbersTests
{
    [Theory]
    [InlineData(37, 20, 40)]
    [InlineData(1, 1, 1)]
    [InlineData(0.0512, 0.05, 0.06)]
    [InlineData(9.9e5, 5e5, 1e6)]
    public void Round_numbers_enclose_a_value(double value, double below, double above)
    {
        Close.To(below, NiceNumbers.AtMost(value), 1e-12);
        Close.To(above, NiceNumbers.AtLeast(value), 1e-12);
    }

    [Fact]
    public void Ticks_lie_within_the_bounds_and_reach_both_when_round()
    {
        List<double> ticks = NiceNumbers.Ticks(-40, 40, 6);
        Close.To(-40, ticks[0]);
        Close.To(40, ticks[^1]);
        Assert.InRange(ticks.Count, 4, 12);
    }
}
