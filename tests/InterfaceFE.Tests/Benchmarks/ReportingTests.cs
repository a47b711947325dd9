using InterfaceFE.Benchmarks.Engine;
using InterfaceFE.Benchmarks.Reporting;
using InterfaceFE.Benchmarks.Timing;
using Xunit;

namespace InterfaceFE.Tests.Benchmarks;

public class ReportingTests
{
    [Theory]
    [InlineData(new[] { 3.0, 1.0, 2.0 }, 2.0)]
    [InlineData(new[] { 4.0, 1.0, 3.0, 2.0 }, 2.5)]
    [InlineData(new[] { 7.0 }, 7.0)]
    [InlineData(new[] { 1.0, 1.0, 1.0, 1.0, 1e9 }, 1.0)]
    public void Median_is_the_middle_of_the_readings(double[] readings, double expected)
    {
        Samples samples = new();
        foreach (double reading in readings)
            samples.Add(reading);
        Close.To(expected, samples.Median, relative: 0);
    }

    [Fact]
    public void Median_of_no_reading_is_not_a_number() => Assert.True(double.IsNaN(new Samples().Median));

    [Fact]
    public void Table_pads_its_columns_and_escapes_what_would_end_a_cell()
    {
        MarkdownTable table = new("model", "ms");
        table.Add("a|b", "1.0");
        table.Add("long name", "10");
        Assert.Equal("""
            | model     |  ms |
            |-----------|----:|
            | a\|b      | 1.0 |
            | long name |  10 |

            """.ReplaceLineEndings("\n"), table.ToString());
    }

    [Fact]
    public void Table_refuses_a_row_of_another_length() => Assert.Throws<ArgumentException>(() => new MarkdownTable("model", "ms").Add("one"));

    [Theory]
    [InlineData(1234.4, "1234")]
    [InlineData(12.345, "12.3")]
    [InlineData(1.2345, "1.23")]
    [InlineData(0.12345, "0.1235")]
    [InlineData(0.00012345, "1.2E-4")]
    [InlineData(0, "0")]
    [InlineData(double.NaN, "–")]
    public void Numbers_have_few_digits(double value, string expected) => Assert.Equal(expected, Digits.Three(value));

    [Fact]
    public void Ratio_prints_on_one_line_whatever_the_culture() => Assert.Equal("ratio strip.full.cholmod 4.123", new Ratio("strip.full.cholmod", 4.12345).ToString());

    [Fact]
    public void Target_is_a_floor_or_a_ceiling()
    {
        Assert.True(new Target("speed", 4).Holds(4));
        Assert.False(new Target("speed", 4).Holds(3.99));
        Assert.True(new Target("order", 1.2, IsCeiling: true).Holds(1.2));
        Assert.False(new Target("order", 1.2, IsCeiling: true).Holds(1.21));
        Assert.False(new Target("speed", 4).Holds(double.NaN));
    }

    [Fact]
    public void Time_is_shared_out_between_arithmetic_memory_and_the_rest()
    {
        MachineRates rates = new(512, PeakFlopsPerMs: 100e6, CacheBytesPerMs: 50e6, MemoryBytesPerMs: 10e6);
        Bound whole = Bound.Of(milliseconds: 10, flops: 200e6, bytes: 50e6, rates);
        Close.To(0.2, whole.Arithmetic);
        Close.To(0.5, whole.Memory);
        Close.To(0.3, whole.Rest);
        Assert.Equal("memory", whole.Name);
        Bound path = Bound.Of(milliseconds: 1, flops: 60e6, bytes: 5e6, rates);
        Close.To(0.1, path.Memory);
        Assert.Equal("arithmetic", path.Name);
    }
}
