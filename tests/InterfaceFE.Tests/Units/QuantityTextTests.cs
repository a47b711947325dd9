using System.Globalization;
using InterfaceFE.Units;
using Xunit;

namespace InterfaceFE.Tests.Units;

public class QuantityTextTests
{
    [Theory]
    [InlineData("1.1 mm", Dimension.Length, 1.1)]
    [InlineData("2700 kg/m^3", Dimension.Density, 2.7e-9)]
    [InlineData("2.7 t/m^3", Dimension.Density, 2.7e-9)]
    [InlineData("35 µm", Dimension.Length, 0.035)]
    [InlineData("35 μm", Dimension.Length, 0.035)]
    [InlineData("1.5m", Dimension.Length, 1500)]
    [InlineData("-.5 cm", Dimension.Length, -5)]
    [InlineData("2.0 kJ/m^2", Dimension.Toughness, 2)]
    [InlineData("2.0 kJ/m²", Dimension.Toughness, 2)]
    [InlineData("350 J/(m*m)", Dimension.Toughness, 0.35)]
    [InlineData("0.35 N/mm", Dimension.Toughness, 0.35)]
    [InlineData("0.35 kPa*m", Dimension.Toughness, 0.35)]
    [InlineData("23e-6 1/K", Dimension.Expansion, 23e-6)]
    [InlineData("23e-6/K", Dimension.Expansion, 23e-6)]
    [InlineData("23 µm/m/K", Dimension.Expansion, 23e-6)]
    [InlineData("2.3e-5 K^-1", Dimension.Expansion, 23e-6)]
    [InlineData("-40 °C", Dimension.Temperature, 233.15)]
    [InlineData("60 K", Dimension.TemperatureDifference, 60)]
    [InlineData("2 mm/min", Dimension.Speed, 2.0 / 60)]
    [InlineData("70 GPa", Dimension.Stress, 70000)]
    [InlineData("1.013 bar", Dimension.Stress, 0.1013)]
    [InlineData("70 N/mm^2", Dimension.Stress, 70)]
    [InlineData("101300 Pa", Dimension.Stress, 0.1013)]
    [InlineData("6 h", Dimension.Time, 21600)]
    [InlineData("5 deg", Dimension.Angle, 5 * Math.PI / 180)]
    [InlineData("5°", Dimension.Angle, 5 * Math.PI / 180)]
    [InlineData("2 deg/min", Dimension.AngularSpeed, 2 * Math.PI / 180 / 60)]
    [InlineData("12 N*m", Dimension.Moment, 12000)]
    [InlineData("12 N·m", Dimension.Moment, 12000)]
    [InlineData("1.5 MPa/mm", Dimension.LayerStiffness, 1.5)]
    [InlineData("1.5 N/mm^3", Dimension.LayerStiffness, 1.5)]
    [InlineData("0.33", Dimension.None, 0.33)]
    [InlineData("5 %", Dimension.None, 0.05)]
    public void A_quantity_becomes_internal_units(string text, Dimension dimension, double expected)
    {
        Assert.True(QuantityText.TryRead(text, dimension, null, out double value, out string error), error);
        Close.To(expected, value, 4e-16, 0, text);
    }

    [Theory]
    [InlineData("25", Dimension.Length, "needs its unit (a length), for example 2.5 mm")]
    [InlineData("25 MPa", Dimension.Length, "is a stress or modulus, but a length is due, for example 2.5 mm")]
    [InlineData("0.3 mm", Dimension.None, "has a unit, but a bare number is due here, for example 0.5")]
    [InlineData("20 K", Dimension.Temperature, "is in K, which is kept for differences; write the temperature in °C: -253.15 °C")]
    [InlineData("20 °C", Dimension.TemperatureDifference, "is a temperature, but a difference of temperature is due, for example 60 K; °C is a point on the scale, a difference is in K")]
    [InlineData("5 deg", Dimension.None, "has a unit, but a bare number is due here, for example 0.5")]
    [InlineData("010 mm", Dimension.Length, "starts with a 0 before another digit, which some programs read as an octal number; leave that 0 out; wanted is a length, for example 2.5 mm")]
    [InlineData("1,5 mm", Dimension.Length, "has a comma; write the decimal point as .; wanted is a length, for example 2.5 mm")]
    [InlineData("1e-400 mm", Dimension.Length, "is too small a number to be told from 0; wanted is a length, for example 2.5 mm")]
    [InlineData("1e308 km", Dimension.Length, "is too large a number")]
    [InlineData("", Dimension.Length, "is not a number; wanted is a length, for example 2.5 mm")]
    public void A_wrong_quantity_says_what_is_due(string text, Dimension dimension, string message)
    {
        Assert.False(QuantityText.TryRead(text, dimension, null, out double value, out string error));
        Assert.Equal(message, error);
        Assert.True(double.IsNaN(value));
    }

    [Fact]
    public void Writing_and_reading_give_the_same_double()
    {
        Random random = new(20240611);
        foreach (Dimension dimension in Enum.GetValues<Dimension>())
            for (int i = 0; i < 300; i++)
            {
                // Temperatures come from decks, so they are a decimal number of °C above absolute zero.
                double value = dimension == Dimension.Temperature
                    ? Math.Round(random.NextDouble() * 1000 - 273, 3) + 273.15
                    : (random.NextDouble() - 0.5) * Math.Pow(10, random.Next(-12, 12));
                string text = QuantityText.Write(value, dimension);
                Assert.True(QuantityText.TryRead(text, dimension, null, out double back, out string error), text + ": " + error);
                Assert.Equal(value, back);
            }
    }

    [Fact]
    public void A_culture_with_decimal_commas_changes_nothing()
    {
        CultureInfo before = CultureInfo.CurrentCulture;
        try
        {
            CultureInfo.CurrentCulture = new CultureInfo("de-DE");
            Assert.True(QuantityText.TryRead("1.5 mm", Dimension.Length, null, out double value, out _));
            Assert.Equal(1.5, value);
            Assert.Equal("1.5 mm", QuantityText.Write(1.5, Dimension.Length));
        }
        finally
        {
            CultureInfo.CurrentCulture = before;
        }
    }

    [Fact]
    public void Example_of_each_dimension_is_valid()
    {
        foreach (Dimension dimension in Enum.GetValues<Dimension>())
            Assert.True(QuantityText.TryRead(DimensionText.Example(dimension), dimension, null, out _, out string error), error);
    }
}
