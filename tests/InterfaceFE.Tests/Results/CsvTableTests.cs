using System.Globalization;
using InterfaceFE.Results;
using Xunit;

namespace InterfaceFE.Tests.Results;

public class CsvTableTests
{
    [Fact]
    public void Fields_are_quoted_only_where_they_must_be()
    {
        StringWriter text = new();
        using (CsvTable table = new(text, ["plain", "with, comma", "with \"quote\""]))
            table.Add("two\nlines").Add((string?)null).Add(" kept as is ").EndRow();
        Assert.Equal("plain,\"with, comma\",\"with \"\"quote\"\"\"\r\n\"two\nlines\",, kept as is \r\n", text.ToString());
    }

    [Theory]
    [InlineData("de-DE")]
    [InlineData("ar-SA")]
    [InlineData("sv-SE")]
    public void Numbers_are_the_shortest_that_read_back_in_any_culture(string culture)
    {
        CultureInfo before = CultureInfo.CurrentCulture;
        try
        {
            CultureInfo.CurrentCulture = new CultureInfo(culture);
            StringWriter text = new(CultureInfo.InvariantCulture);
            using (CsvTable table = new(text, ["a", "b", "c", "d", "e", "f", "g"]))
                table.Add(-1234567).Add(0.1 + 0.2).Add(-0.0).Add(1e-300).Add((double?)null).Add(double.NaN).Add(-1.5).EndRow();
            Assert.Equal("a,b,c,d,e,f,g\r\n-1234567,0.30000000000000004,0,1E-300,,NaN,-1.5\r\n", text.ToString());
        }
        finally
        {
            CultureInfo.CurrentCulture = before;
        }
    }

    [Fact]
    public void A_row_of_the_wrong_length_is_refused()
    {
        using CsvTable table = new(new StringWriter(), ["a", "b"]);
        table.Add(1);
        Assert.Throws<InvalidOperationException>(table.EndRow);
        table.Add(2);
        Assert.Throws<InvalidOperationException>(() => table.Add(3));
    }

    [Fact]
    public void Rows_are_in_the_file_before_it_is_closed_and_there_is_no_byte_order_mark()
    {
        using TemporaryFolder folder = new();
        string path = folder.File("t.csv");
        using CsvTable table = new(path, ["temperature [°C]"]);
        table.Add(20.0).EndRow();
        using FileStream open = new(path, FileMode.Open, FileAccess.Read, FileShare.ReadWrite);
        byte[] bytes = new byte[open.Length];
        open.ReadExactly(bytes);
        Assert.Equal("temperature [°C]\r\n20\r\n"u8.ToArray(), bytes);
    }
}
