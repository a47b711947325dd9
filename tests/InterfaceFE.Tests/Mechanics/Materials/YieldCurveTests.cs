using InterfaceFE.Mechanics.Materials;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Materials;

public sealed class YieldCurveTests
{
    private static readonly YieldCurve Curve = new([0, 0.01, 0.05], [180, 220, 230], [233.15, 293.15, 373.15], [1.1, 1, 0.8]);

    [Theory]
    [InlineData(0, 180, 4000)]
    [InlineData(0.005, 200, 4000)]
    [InlineData(0.01, 220, 250)]
    [InlineData(0.03, 225, 250)]
    [InlineData(0.05, 230, 0)]
    [InlineData(0.4, 230, 0)]
    public void Stress_is_straight_between_points_and_level_beyond(double strain, double stress, double slope)
    {
        Close.To(stress, Curve.At(strain).Stress, 1e-14);
        Close.To(slope, Curve.At(strain).Slope, 1e-12);
    }

    [Fact]
    public void Area_is_the_work_of_yielding()
    {
        Close.To(0.5 * (180 + 220) * 0.01 + 0.5 * (220 + 225) * 0.02, Curve.Area(0.03), 1e-14);
        Close.To(Curve.Area(0.05) + 230 * 0.1, Curve.Area(0.15), 1e-14);
    }

    [Theory]
    [InlineData(233.15, 1.1)]
    [InlineData(263.15, 1.05)]
    [InlineData(313.15, 0.95)]
    [InlineData(373.15, 0.8)]
    public void Share_follows_temperature(double temperature, double share) => Close.To(share, Curve.ShareAt(temperature).Share, 1e-14);

    [Theory]
    [InlineData(0, 5)]
    [InlineData(0.004, 60)]
    [InlineData(0.009, 9000)]
    [InlineData(0.2, 40)]
    public void Growth_takes_the_excess_away_over_any_number_of_pieces(double from, double excess)
    {
        const double stiffness = 80000, share = 0.9;
        double grown = Curve.Growth(from, excess, stiffness, share, out double slope);
        Close.To(excess, stiffness * grown + share * (Curve.At(from + grown).Stress - Curve.At(from).Stress), 1e-13);
        Close.To(Curve.At(from + grown).Slope, slope, 1e-12);
    }

    [Fact]
    public void Tables_that_make_no_curve_are_refused()
    {
        Assert.Throws<ArgumentException>(() => new YieldCurve([], []));
        Assert.Throws<ArgumentException>(() => new YieldCurve([0, 0.1], [100]));
        Assert.Throws<ArgumentException>(() => new YieldCurve([0.01], [100]));
        Assert.Throws<ArgumentException>(() => new YieldCurve([0, 0.1], [100, 90]));
        Assert.Throws<ArgumentException>(() => new YieldCurve([0, 0], [100, 110]));
        Assert.Throws<ArgumentException>(() => new YieldCurve([0], [double.NaN]));
        Assert.Throws<ArgumentException>(() => new YieldCurve([0], [100], [300, 200], [1, 1]));
        Assert.Throws<ArgumentException>(() => new YieldCurve([0], [100], [300], []));
    }
}
