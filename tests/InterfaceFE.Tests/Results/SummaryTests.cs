using System.Globalization;
using System.Text.Json;
using InterfaceFE.Results;
using Xunit;

namespace InterfaceFE.Tests.Results;

public class SummaryTests
{
    [Fact]
    public void Summary_has_the_agreed_keys()
    {
        RunHistory history = InventedRun.Peel();
        using JsonDocument json = Written(InventedRun.PeelSummary(history));
        JsonElement root = json.RootElement;
        Assert.Equal("finished", root.GetProperty("status").GetString());
        Assert.Equal("hold with care", root.GetProperty("self-check").GetProperty("verdict").GetString());
        Assert.Equal(3.2e-12, root.GetProperty("self-check").GetProperty("balance").GetDouble());
        Assert.Equal(0.0041, root.GetProperty("self-check").GetProperty("path error").GetDouble());
        JsonElement grip = root.GetProperty("grips").GetProperty("upper block");
        Assert.Equal(history.Points.Max(point => point.Grips[0].Force), grip.GetProperty("peak force [N]").GetDouble());
        Assert.Equal(JsonValueKind.Null, grip.GetProperty("peak moment [N mm]").ValueKind);
        Assert.Equal(1, root.GetProperty("joints").GetProperty("bond").GetProperty("largest damage").GetDouble());
        Assert.Equal(0.0015, root.GetProperty("adherends").GetProperty("upper arm").GetProperty("largest plastic strain").GetDouble());
        Assert.Equal("bond at 30 mm", root.GetProperty("first damage").GetProperty("where").GetString());
        Assert.Equal(JsonValueKind.Null, root.GetProperty("first yield").ValueKind);
        Assert.Equal(1.25, root.GetProperty("timings [s]").GetProperty("march").GetDouble());
        Assert.Equal(64, root.GetProperty("deck hash").GetString()!.Length);
    }

    [Theory]
    [InlineData(RunStatus.Finished, "finished")]
    [InlineData(RunStatus.StoppedEarly, "stopped early")]
    [InlineData(RunStatus.Severed, "severed")]
    [InlineData(RunStatus.Interrupted, "interrupted")]
    public void Status_is_told_in_words(RunStatus status, string words) => Assert.Equal(words, SummaryWords.Of(status));

    [Theory]
    [InlineData(Verdict.NumbersHold, "numbers hold")]
    [InlineData(Verdict.HoldWithCare, "hold with care")]
    [InlineData(Verdict.DoNotHold, "do not hold")]
    public void Verdict_is_told_in_words(Verdict verdict, string words) => Assert.Equal(words, SummaryWords.Of(verdict));

    [Fact]
    public void A_number_that_is_not_finite_is_null_and_the_file_stays_valid()
    {
        RunSummary summary = new() { Status = RunStatus.StoppedEarly, Cause = "the force \"ran away\" at -40 °C", Title = "Prüfling" };
        summary.SelfCheck.PathError = double.NaN;
        summary.SelfCheck.Balance = double.PositiveInfinity;
        using JsonDocument json = Written(summary);
        Assert.Equal(JsonValueKind.Null, json.RootElement.GetProperty("self-check").GetProperty("path error").ValueKind);
        Assert.Equal(JsonValueKind.Null, json.RootElement.GetProperty("self-check").GetProperty("balance").ValueKind);
        Assert.Equal("the force \"ran away\" at -40 °C", json.RootElement.GetProperty("cause").GetString());
    }

    [Fact]
    public void The_text_is_aligned_and_in_the_invariant_culture()
    {
        CultureInfo before = CultureInfo.CurrentCulture;
        try
        {
            CultureInfo.CurrentCulture = new CultureInfo("de-DE");
            StringWriter text = new(CultureInfo.InvariantCulture) { NewLine = "\n" };
            RunHistory history = InventedRun.Peel();
            SummaryText.Write(InventedRun.PeelSummary(history), text);
            string[] lines = text.ToString().TrimEnd('\n').Split('\n');
            Assert.Equal(history.Title, lines[0]);
            Assert.Contains("  ended           finished", lines);
            Assert.Contains("  self-check      hold with care (balance 3.2e-12, path error 0.0041)", lines);
            Assert.Contains("  upper arm       equivalent stress 180.5 MPa at x 41 mm, y 8 mm, plastic strain 0.0015", lines);
            Assert.All(lines.Skip(1), line => Assert.True(line.Length > 18 && line[17] == ' ' && line[18] != ' ', line));
        }
        finally
        {
            CultureInfo.CurrentCulture = before;
        }
    }

    [Theory]
    [InlineData(0, "0")]
    [InlineData(123456.7, "123457")]
    [InlineData(0.00012346, "1.235e-4")]
    [InlineData(9.99996, "10")]
    [InlineData(-12.3456, "-12.35")]
    [InlineData(double.NaN, "–")]
    public void Numbers_of_the_text_have_four_significant_digits(double value, string words) => Assert.Equal(words, SummaryText.Number(value));

    private static JsonDocument Written(RunSummary summary)
    {
        using MemoryStream stream = new();
        SummaryWriter.Write(stream, summary);
        return JsonDocument.Parse(stream.ToArray());
    }
}
