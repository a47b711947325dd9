using InterfaceFE.Reports;
using Xunit;

namespace InterfaceFE.Tests.Reports;

public class ColourMapTests
{
    // Values of Scientific colour maps 7.0.1 (Crameri 2021) at places that are no control colours; 3 of 255 is the stated closeness.
    [Theory]
    [InlineData(1, 2, 27, 89)]
    [InlineData(13, 11, 45, 93)]
    [InlineData(100, 83, 117, 73)]
    [InlineData(201, 249, 163, 130)]
    public void Batlow_comes_close_to_its_published_colours(int index, int red, int green, int blue)
    {
        uint colour = ColourMap.Batlow.At(index / 255.0);
        Close.To(red, (colour >> 16) & 0xFF, 0, 3);
        Close.To(green, (colour >> 8) & 0xFF, 0, 3);
        Close.To(blue, colour & 0xFF, 0, 3);
    }

    [Fact]
    public void Batlow_grows_lighter_throughout_so_that_it_reads_in_grey()
    {
        double before = -1;
        for (int i = 0; i <= 32; i++)
        {
            double lightness = Luminance(ColourMap.Batlow.At(i / 32.0));
            Assert.True(lightness > before, $"at {i} of 32");
            before = lightness;
        }
    }

    [Theory]
    [InlineData(-0.6, 17, 100, 150)]
    [InlineData(0.403922, 204, 135, 95)]
    public void Vik_comes_close_to_its_published_colours(double place, int red, int green, int blue)
    {
        uint colour = ColourMap.Vik.At(0.5 * (1 + place));
        Close.To(red, (colour >> 16) & 0xFF, 0, 3);
        Close.To(green, (colour >> 8) & 0xFF, 0, 3);
        Close.To(blue, colour & 0xFF, 0, 3);
    }

    [Fact]
    public void Vik_is_lightest_in_its_middle()
    {
        Assert.True(Luminance(ColourMap.Vik.At(0.5)) > Luminance(ColourMap.Vik.At(0.25)));
        Assert.True(Luminance(ColourMap.Vik.At(0.5)) > Luminance(ColourMap.Vik.At(0.75)));
    }

    [Theory]
    [InlineData(-1, 0x011959u)]
    [InlineData(2, 0xFACCFAu)]
    [InlineData(double.NaN, 0x011959u)]
    [InlineData(double.PositiveInfinity, 0xFACCFAu)]
    public void Places_outside_take_the_colour_of_the_end(double place, uint colour) => Assert.Equal(colour, ColourMap.Batlow.At(place));

    private static double Luminance(uint colour) => 0.2126 * Linear(colour >> 16) + 0.7152 * Linear(colour >> 8) + 0.0722 * Linear(colour);

    private static double Linear(uint channel)
    {
        double value = (channel & 0xFF) / 255.0;
        return value <= 0.04045 ? value / 12.92 : Math.Pow((value + 0.055) / 1.055, 2.4);
    }
}
