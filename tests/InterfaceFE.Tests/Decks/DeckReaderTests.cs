using CsCheck;
using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using Xunit;

namespace InterfaceFE.Tests.Decks;

public class DeckReaderTests
{
    internal static string RoofText() => File.ReadAllText(Repository.Path("tests", "InterfaceFE.Tests", "Decks", "Roof.yaml"));

    internal static Deck Good(DeckReading reading)
    {
        Assert.Empty(reading.Problems);
        return Assert.IsType<Deck>(reading.Deck);
    }

    [Fact]
    public void A_good_deck_is_read_in_internal_units()
    {
        DeckReading reading = DeckReader.ReadText(RoofText(), "roof.yaml");
        Deck deck = Good(reading);

        Assert.Empty(reading.Warnings);
        Assert.Equal(20, deck.Model.Width);
        Assert.Equal(OutOfPlane.Held, deck.Model.OutOfPlane);
        Assert.Equal(new Directional(70000), deck.Materials["aluminium"].Young);
        Assert.Equal(new PoissonRatios(0.30, 0.12, 0.30), deck.Materials["glass laminate"].Poisson);
        Assert.Equal(3600, deck.Materials["glass laminate"].ShearModulus!.Xy);
        Assert.Equal([0, 0.3, 4, 7], deck.Layers!["tape"].Peel.Opening!);
        Assert.Equal(0.05, deck.Layers["tape"].ReleaseLength);
        Assert.Equal(["panel", "hat"], deck.Adherends.Keys);
        Assert.Equal([130.0, 40], deck.Adherends["hat"].Sheet!.Line[2]);
        Assert.Equal(3, deck.Adherends["hat"].Sheet!.Stretches!["crown"]);
        Assert.Equal(293.15, deck.StressFreeTemperature);
        Assert.Equal(new EdgePoint(0.5, double.NaN), deck.Grips["crown"].At);
        Assert.Equal(["left end of panel", "right end of panel"], deck.Grips["ends"].On);
        Assert.Equal(["ends", "left end"], deck.Sequence[0].Fix!.Keys);
        Close.To(233.15, deck.Sequence[1].CoolTo!.Value);
        Assert.Equal(21600, deck.Sequence[1].Over);
        Assert.Equal(PullDirection.PlusY, deck.Sequence[2].Pull!.Along);
        Close.To(2.0 / 60, deck.Sequence[2].Pull!.Speed!.Value, 1e-15);
        Assert.Equal(new EdgePoint(double.NaN, 150), deck.Keep!.Gauges!["crown lift"].ToAt);
        Assert.Equal(10, deck.Keep.Fields.Points);
    }

    [Fact]
    public void A_later_problem_is_shown_at_its_place_or_at_the_block_above()
    {
        DeckReading reading = DeckReader.ReadText(RoofText(), "roof.yaml");

        Assert.Equal("roof.yaml:32:127 joints.left strip.starter crack.length: \"10 mm\" is longer than the joint", reading.Describe(new DeckProblem("joints.left strip.starter crack.length", "is longer than the joint")).ToString());
        Assert.Equal("roof.yaml:33:3 joints.right strip.element length: is too long", reading.Describe(new DeckProblem("joints.right strip.element length", "is too long")).ToString());
        Assert.Equal("roof.yaml:45:5 sequence.3.pull: goes nowhere", reading.Describe(new DeckProblem("sequence.3.pull", "goes nowhere")).ToString());
        Assert.Equal("roof.yaml:37:15 grips.crown.on: \"crown of hat\" is too short", reading.Describe(new DeckProblem("grips.crown.on", "is too short")).ToString());
        Assert.Equal("roof.yaml:1:1 march.control: is odd", reading.Describe(new DeckProblem("march.control", "is odd")).ToString());
    }

    [Fact]
    public void Every_value_shown_in_a_message_stands_at_its_place()
    {
        int seen = 0;
        foreach (string file in Directory.EnumerateFiles(BadDeckTests.Folder(), "*.yaml"))
        {
            DeckReading reading = DeckReader.Read(file);
            foreach (ReadProblem problem in reading.Problems.Concat(reading.Warnings).Where(p => p.Place.Line > 0 && p.Written is { Length: > 0 } && !p.Written.StartsWith('[') && !p.Written.StartsWith("tag:", StringComparison.Ordinal)))
            {
                string rest = File.ReadAllLines(problem.Place.File)[problem.Place.Line - 1].TrimStart('\uFEFF')[(problem.Place.Column - 1)..];
                string shown = problem.Written!.Split('\n')[0];
                Assert.True(rest.TrimStart('"', '\'').Replace("\\\\", "\\", StringComparison.Ordinal).StartsWith(shown, StringComparison.Ordinal) || rest.StartsWith('|'), $"{problem}: there stands {rest}");
                seen++;
            }
        }
        Assert.True(seen > 100, $"only {seen} values seen");
    }

    [Fact]
    public void No_change_of_a_good_deck_makes_the_reader_throw()
    {
        string[] lines = RoofText().Split('\n');
        string[] tokens = ["", "[", "]", "{", "}", ":", ": ", "- ", "\"", "'", "#", "&a", "*a", "<<: ", "!x", "|", ">", "%", "@", "~", ".nan", "1e999", "-1", "0", "mm", "°C", "\t", "---", "...", "? ", ",", "\0", "\u2028", "yes", "[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[", "title", "x: y"];
        Gen<(int Kind, int Line, int Column, int Token)[]> edits = Gen.Select(Gen.Int[0, 5], Gen.Int[0, lines.Length - 1], Gen.Int[0, 60], Gen.Int[0, tokens.Length - 1]).Array[1, 4];
        edits.Sample(
            changes =>
            {
                List<string> text = [.. lines];
                foreach ((int kind, int line, int column, int token) in changes)
                {
                    int at = line % text.Count;
                    int cut = Math.Min(column, text[at].Length);
                    switch (kind)
                    {
                        case 0: text.RemoveAt(at); break;
                        case 1: text.Insert(at, text[at]); break;
                        case 2: text[at] = text[at].Insert(cut, tokens[token]); break;
                        case 3: text[at] = text[at][..cut] + tokens[token]; break;
                        case 4: text[at] = text[at][cut..]; break;
                        default: (text[at], text[(at + column) % text.Count]) = (text[(at + column) % text.Count], text[at]); break;
                    }
                    if (text.Count == 0)
                        text.Add("");
                }
                DeckReading reading = DeckReader.ReadText(string.Join('\n', text), "changed.yaml");
                if (reading.Deck is null)
                    Assert.NotEmpty(reading.Problems);
                else
                    Assert.Empty(DeckReader.ReadText(DeckWriter.Write(reading.Deck), "written.yaml").Problems);
                Assert.All(reading.Problems, p => Assert.True(p.Place.Line >= 1 && p.Place.Column >= 1 && p.Message.Length > 0 && !p.ToString().Contains('\n', StringComparison.Ordinal), p.ToString()));
            },
            iter: 4000);
    }

    [Fact]
    public void Deep_and_wide_text_is_refused_quickly()
    {
        foreach (string text in (string[])[new string('[', 1_000_000), string.Concat(Enumerable.Repeat("{a: ", 300_000)), string.Concat(Enumerable.Repeat("- ", 500_000)), new string('x', 5_000_000), "title: \"" + new string('\\', 999_999)])
            Assert.NotEmpty(DeckReader.ReadText(text, "large.yaml").Problems);
        string manyKeys = string.Concat(Enumerable.Range(0, 100_000).Select(i => "k" + i.ToString(System.Globalization.CultureInfo.InvariantCulture) + ": 1\n"));
        Assert.InRange(DeckReader.ReadText(manyKeys, "wide.yaml").Problems.Count, 100, 400);
    }

    [Fact]
    public void Places_that_are_no_deck_file_are_named()
    {
        string folder = Directory.CreateTempSubdirectory("deck").FullName;
        try
        {
            string large = Path.Combine(folder, "large.yaml");
            using (FileStream stream = File.Create(large))
                stream.SetLength(5 * 1024 * 1024);
            File.WriteAllText(Path.Combine(folder, "roof.yaml"), "title: x");

            Assert.Equal($"{folder}: is a folder; a deck is a file, for example deck.yaml in it", Assert.Single(DeckReader.Read(folder).Problems).ToString());
            Assert.Equal($"{large}: is larger than 4 MB and is not read; a deck is a short text", Assert.Single(DeckReader.Read(large).Problems).ToString());
            string missing = Path.Combine(folder, "rof.yaml");
            Assert.Equal($"{missing}: there is no such file; nearest file roof.yaml", Assert.Single(DeckReader.Read(missing).Problems).ToString());
            Assert.Single(DeckReader.Read("a\0b").Problems);
        }
        finally
        {
            Directory.Delete(folder, true);
        }
    }
}
