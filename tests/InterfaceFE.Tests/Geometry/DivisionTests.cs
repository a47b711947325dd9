using InterfaceFE.Geometry;
using Xunit;

namespace InterfaceFE.Tests.Geometry;

public class DivisionTests
{
    private static double[] Lengths(double[] points) => [.. points.Zip(points.Skip(1), (a, b) => b - a)];

    [Fact]
    public void A_whole_number_of_wanted_lengths_gives_just_that_many_elements()
    {
        double[] points = new GradedDivision(0.3 * 7, 0.3, 0.3, 0.3, Math.Log(1.3)).Points(1, 1 + 0.3 * 7);
        Assert.Equal(8, points.Length);
        Assert.All(Lengths(points), l => Close.To(0.3, l, 1e-9));
    }

    [Fact]
    public void A_steep_start_grows_by_the_ratio_and_not_more()
    {
        double[] lengths = Lengths(new GradedDivision(100, 10, 0.1, 10, Math.Log(1.25)).Points(0, 100));
        for (int i = 1; i < lengths.Length; i++)
            Assert.InRange(lengths[i] / lengths[i - 1], 1 / 1.25 - 1e-9, 1.25 + 1e-9);
        // Geometric growth: from 0.1 to 10 at 1.25 takes ln(100)/ln(1.25) = 20.6 elements over (10 - 0.1)/ln(1.25) = 44.4 mm, then 55.6 mm at 10.
        Assert.Equal(27, lengths.Length);
        // The first element on a ramp that starts at v is v (r - 1)/ln r long.
        Close.To(0.1 * 0.25 / Math.Log(1.25), lengths[0], 1e-9);
    }

    [Fact]
    public void A_level_dips_below_both_ends_where_the_count_asks_for_it()
    {
        GradedDivision division = new(10.05, 1, 1, 1, Math.Log(1.3));
        Assert.True(division.CanHold(11));
        double[] lengths = Lengths(division.Points(0, 10.05));
        Assert.Equal(11, lengths.Length);
        Assert.True(lengths[5] < lengths[0] && lengths.Max() <= 1);
        for (int i = 1; i < lengths.Length; i++)
            Assert.InRange(lengths[i] / lengths[i - 1], 1 / 1.3, 1.3);
        for (int i = 0; i < lengths.Length; i++)
            Close.To(lengths[i], lengths[^(i + 1)], 1e-9);
    }

    [Fact]
    public void A_stretch_too_short_to_dip_lowers_its_ends_just_enough()
    {
        GradedDivision division = new(1.2, 1, 1, 1, Math.Log(1.2));
        Assert.False(division.CanHold(2));
        (double start, double end) = division.EndsToHold(2);
        Close.To(start, end);
        Assert.True((division with { AtStart = start, AtEnd = end }).CanHold(2));
        Assert.False((division with { AtStart = 1.001 * start, AtEnd = 1.001 * end }).CanHold(2));
    }

    [Fact]
    public void The_longer_end_gives_way_first()
    {
        GradedDivision division = new(30, 15, 9, 15, Math.Log(1.3));
        Assert.False(division.CanHold(3));
        (double start, double end) = division.EndsToHold(3);
        Assert.Equal(9, start);
        Assert.InRange(end, 9, 15 - 1e-3);
        Assert.True((division with { AtEnd = end }).CanHold(3));
    }

    [Fact]
    public void Even_lines_move_to_the_places_and_keep_their_number()
    {
        int[]? counts = EvenDivision.Counts([0, 2.6, 10], 10);
        Assert.Equal([3, 7], counts!);
        Assert.Equal([7, 3], EvenDivision.Counts([0, 7.4, 10], 10)!);
        // A place half way between two lines goes the same way from both ends.
        Assert.Equal(EvenDivision.Counts([0, 2.5, 10], 10)!.Reverse(), EvenDivision.Counts([0, 7.5, 10], 10)!);
        Assert.Null(EvenDivision.Counts([0, 5, 5.1, 10], 10));
        Assert.Null(EvenDivision.Counts([0, 0.2, 10], 10));
        Close.To(0.4, EvenDivision.LargestMove([0, 2.6, 10], counts!), 1e-12);
    }
}
