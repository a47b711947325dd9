using InterfaceFE.Results;
using Xunit;

namespace InterfaceFE.Tests.Results.Observers;

public class PeakTests
{
    [Fact]
    public void A_parabola_symmetric_about_a_point_has_its_peak_there()
    {
        double[] x = [0, 1, 2, 3, 4], y = [.. x.Select(v => 5 - (v - 2) * (v - 2))];
        Peak peak = Peak.Of(x, y)!;
        Close.To(5, peak.Value, 1e-14);
        Close.To(2, peak.At, 1e-14);
        Assert.Equal(2, peak.Index);
    }

    [Theory]
    [InlineData(0.1)]
    [InlineData(0.05)]
    [InlineData(0.025)]
    public void A_peak_between_points_is_found_to_second_order(double step)
    {
        // Source: sin has its peak of 1 at π/2; the parabola errs by the fourth power of the step in value, the chord as measure by the square in place.
        double[] x = [.. Enumerable.Range(0, (int)(3 / step)).Select(i => i * step)], y = [.. x.Select(Math.Sin)];
        Peak peak = Peak.Of(x, y)!;
        Close.To(1, peak.Value, 0, 0.1 * step * step * step);
        Close.To(Math.PI / 2, peak.At, 0, 0.2 * step * step);
        Assert.True(peak.Value >= y.Max());
    }

    [Fact]
    public void A_peak_at_an_end_is_that_point()
    {
        Assert.Equal(new Peak(3, 2, 2), Peak.Of([0, 1, 2], [1, 2, 3]));
        Assert.Equal(new Peak(3, 0, 0), Peak.Of([0, 1, 2], [3, 2, 1]));
        Assert.Equal(new Peak(4, 7, 0), Peak.Of([7], [4]));
        Assert.Null(Peak.Of([], []));
    }

    [Fact]
    public void A_plateau_and_points_that_coincide_give_next_to_their_own_value()
    {
        // At the kink before a plateau the parabola rises a little above it; by less than an eighth of the last rise.
        Assert.InRange(Peak.Of([0, 1, 2, 3], [1, 2, 2, 2])!.Value, 2, 2 + 1.0 / 8);
        Assert.Equal(0, Peak.Of([0, 1, 2], [0, 0, 0])!.Value);
        Peak twice = Peak.Of([0, 1, 1, 2], [0, 2, 2, 0])!;
        Assert.Equal((2.0, 1.0), (twice.Value, twice.At));
    }

    [Fact]
    public void At_a_snap_back_the_abscissa_stays_on_the_curve()
    {
        // A curve that turns back: (cos t, sin t) from t = 0.2 to 2.9 and mirrored, so that the abscissa falls through the peak.
        double[] t = [.. Enumerable.Range(0, 28).Select(i => 0.2 + 0.1 * i)];
        Peak peak = Peak.Of([.. t.Select(Math.Cos)], [.. t.Select(Math.Sin)])!;
        Close.To(1, peak.Value, 0, 1e-4);
        Close.To(0, peak.At, 0, 2e-3);
        // Force and travel falling back together after the peak along the same line.
        Peak back = Peak.Of([0, 1, 2, 1.5], [0, 1, 2, 1.4])!;
        Assert.InRange(back.Value, 2, 2.2);
        Assert.InRange(back.At, 1.9, 2.2);
    }
}
