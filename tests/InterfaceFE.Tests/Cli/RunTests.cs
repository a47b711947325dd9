using System.Globalization;
using System.Text.Json;
using InterfaceFE.Runs;
using InterfaceFE.Tests.Results;
using Xunit;

namespace InterfaceFE.Tests.Cli;

/// <summary>The tiny deck, run once for all tests that only look at the results.</summary>
public sealed class TinyRun : IDisposable
{
    private readonly TemporaryFolder _temporary = new();

    public TinyRun()
    {
        File.WriteAllText(_temporary.File("deck.yaml"), TinyDeck.Text());
        Call = Cli.Call.Of("run", _temporary.File("deck.yaml"), "--into", Folder);
    }

    public string DeckFile => _temporary.File("deck.yaml");

    public string Folder => _temporary.File("out");

    internal Call Call { get; }

    public void Dispose() => _temporary.Dispose();
}

[Collection(DiskCollection.Name)]
public class RunTests(TinyRun tiny) : IClassFixture<TinyRun>
{
    [Theory]
    [InlineData("grips.csv", "point,stage,progress,time [s],temperature [°C],base force x [N],base force y [N],head displacement [mm],head force [N],head rotation [rad],", "load factor,stable")]
    [InlineData("front.csv", "joint,front,point,crack tip [mm],process zone start [mm],process zone [mm],opening at starter tip [mm],sliding at starter tip [mm],J path [N/mm],J rotation [N/mm],J under law [N/mm],mode mix [deg],largest peel [MPa],largest shear [MPa]", "")]
    [InlineData("energy.csv", "point,stage,put in [mJ],stored in adherends [mJ],stored in layers [mJ],spent in layers [mJ],", "balance,path error")]
    [InlineData("convergence.csv", "stage,point,retries,iteration,control,stride,progress,load factor,root,out of balance [N],relative,correction [mm],unstable directions,changed elements,reason", "")]
    public void Tables_have_the_headers_of_the_contract(string file, string start, string end)
    {
        string header = File.ReadLines(Path.Join(tiny.Folder, file)).First();
        Assert.StartsWith(start, header, StringComparison.Ordinal);
        Assert.EndsWith(end, header, StringComparison.Ordinal);
    }

    [Fact]
    public void Folder_holds_the_files_of_the_contract()
    {
        Assert.Equal(ExitCode.Done, tiny.Call.Code);
        foreach (string file in (string[])["summary.json", "grips.csv", "front.csv", "energy.csv", "convergence.csv", "fields.pvd", "deck.yaml", "run.log", "fields/solids-0000.vtu", "fields/layers-0000.vtu", "figures/force-displacement-head.png", "figures/force-displacement-head.svg"])
            Assert.True(new FileInfo(Path.Join(tiny.Folder, file)) is { Exists: true, Length: > 0 }, file);
        using JsonDocument summary = JsonDocument.Parse(File.ReadAllText(Path.Join(tiny.Folder, "summary.json")));
        Assert.Equal("severed", summary.RootElement.GetProperty("status").GetString());
        // Traction is uniform: peak force = strength · length · width.
        Close.To(5 * 4 * 2.5, summary.RootElement.GetProperty("grips").GetProperty("head").GetProperty("peak force [N]").GetDouble(), 0.02, 0);
        Assert.Contains("peak force", tiny.Call.Output, StringComparison.Ordinal);
        Assert.Contains("stage 2", tiny.Call.Error, StringComparison.Ordinal);
    }

    [Fact]
    public void Second_run_and_a_culture_with_decimal_commas_give_the_same_bytes()
    {
        using TemporaryFolder temporary = new();
        Assert.Equal(ExitCode.Done, Call.Of("run", tiny.DeckFile, "--into", temporary.File("again"), "--quiet").Code);
        CultureInfo before = CultureInfo.CurrentCulture;
        CultureInfo commas = (CultureInfo)CultureInfo.InvariantCulture.Clone();
        commas.NumberFormat.NumberDecimalSeparator = ",";
        commas.NumberFormat.NumberGroupSeparator = ".";
        commas.NumberFormat.NegativeSign = "−";
        try
        {
            CultureInfo.CurrentCulture = commas;
            Assert.Equal(ExitCode.Done, Call.Of("run", tiny.DeckFile, "--into", temporary.File("commas"), "--quiet").Code);
        }
        finally
        {
            CultureInfo.CurrentCulture = before;
        }
        string[] data = [.. Directory.EnumerateFiles(tiny.Folder, "*", SearchOption.AllDirectories).Where(f => Path.GetExtension(f) is ".csv" or ".vtu" or ".pvd" or ".yaml").Select(f => Path.GetRelativePath(tiny.Folder, f))];
        Assert.True(data.Length > 8);
        foreach (string other in (string[])["again", "commas"])
            foreach (string file in data)
                Assert.True(File.ReadAllBytes(Path.Join(tiny.Folder, file)).AsSpan().SequenceEqual(File.ReadAllBytes(Path.Join(temporary.File(other), file))), $"{other}: {file}");
    }

    [Fact]
    public void Taken_folder_is_left_alone_unless_overwrite_is_given_and_other_files_stay_always()
    {
        using TemporaryFolder temporary = new();
        string into = temporary.File("out"), note = Path.Join(into, "figures", "note.txt"), older = Path.Join(into, "grips.csv");
        Directory.CreateDirectory(Path.Join(into, "figures"));
        File.WriteAllText(note, "mine");
        File.WriteAllText(older, "older");
        Call refused = Call.Of("run", tiny.DeckFile, "--into", into);
        Assert.Equal(ExitCode.WrongDeckOrCall, refused.Code);
        Assert.Contains("--overwrite", Assert.Single(refused.ErrorLines), StringComparison.Ordinal);
        Assert.Equal("older", File.ReadAllText(older));
        Call replaced = Call.Of("run", tiny.DeckFile, "--into", into, "--overwrite", "--quiet", "--json");
        Assert.Equal(ExitCode.Done, replaced.Code);
        Assert.Empty(replaced.Error);
        Assert.Equal("mine", File.ReadAllText(note));
        Assert.NotEqual("older", File.ReadAllText(older));
        using JsonDocument summary = JsonDocument.Parse(replaced.Output);
        Assert.Equal("severed", summary.RootElement.GetProperty("status").GetString());
    }

    [Fact]
    public void Deck_that_would_be_replaced_by_its_own_results_is_refused()
    {
        Call call = Call.Of("run", Path.Join(tiny.Folder, "deck.yaml"), "--into", tiny.Folder, "--overwrite");
        Assert.Equal(ExitCode.WrongDeckOrCall, call.Code);
        Assert.Contains("would be replaced", Assert.Single(call.ErrorLines), StringComparison.Ordinal);
    }

    [Fact]
    public void Bad_deck_gives_all_its_problems_a_line_each_and_makes_no_folder()
    {
        using TemporaryFolder temporary = new();
        string deck = temporary.File("deck.yaml"), into = temporary.File("out");
        File.WriteAllText(deck, TinyDeck.Text().Replace("rotation: small", "rotations: small", StringComparison.Ordinal).Replace("strength: 5 MPa", "strength: -5 MPa", StringComparison.Ordinal));
        Call call = Call.Of("run", deck, "--into", into);
        Assert.Equal(ExitCode.WrongDeckOrCall, call.Code);
        Assert.True(call.ErrorLines.Length >= 3);
        Assert.All(call.ErrorLines, line => Assert.StartsWith(deck + ":", line, StringComparison.Ordinal));
        Assert.Contains(call.ErrorLines, line => line.StartsWith(deck + ":7:", StringComparison.Ordinal));
        Assert.False(Directory.Exists(into));
        Assert.Empty(call.Output);
    }

    [Fact]
    public void Deck_that_cannot_be_meshed_names_its_place_and_costs_no_earlier_results()
    {
        using TemporaryFolder temporary = new();
        string deck = temporary.File("deck.yaml"), into = temporary.File("out");
        File.WriteAllText(deck, TinyDeck.Text(starterCrack: "from: start, length: 400 mm"));
        Directory.CreateDirectory(into);
        File.WriteAllText(Path.Join(into, "grips.csv"), "older");
        Call call = Call.Of("run", deck, "--into", into, "--overwrite");
        Assert.Equal(ExitCode.WrongDeckOrCall, call.Code);
        Assert.StartsWith(deck + ":14:", Assert.Single(call.ErrorLines), StringComparison.Ordinal);
        Assert.Equal("older", File.ReadAllText(Path.Join(into, "grips.csv")));
        Assert.Equal(ExitCode.WrongDeckOrCall, Call.Of("run", deck, "--into", temporary.File("fresh")).Code);
        Assert.False(Directory.Exists(temporary.File("fresh")));
    }

    [Fact]
    public void Missing_deck_folder_as_deck_and_file_as_folder_give_one_line_each()
    {
        using TemporaryFolder temporary = new();
        foreach (string[] args in (string[][])[["run", temporary.File("no.yaml")], ["run", temporary.Folder], ["check", temporary.Folder], ["run", tiny.DeckFile, "--into", tiny.DeckFile], ["run", tiny.DeckFile, "--into", Path.Join(tiny.DeckFile, "below")], ["variants", temporary.File("none")], ["variants", tiny.DeckFile]])
        {
            Call call = Call.Of([.. args, "--quiet"]);
            Assert.Equal(ExitCode.WrongDeckOrCall, call.Code);
            Assert.Single(call.ErrorLines);
            Assert.DoesNotContain("   at ", call.Error, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void Run_that_finds_no_way_on_ends_with_three_and_keeps_its_points()
    {
        using TemporaryFolder temporary = new();
        string deck = temporary.File("deck.yaml"), into = temporary.File("out");
        File.WriteAllText(deck, TinyDeck.Text("control: own", height: 50).Replace("travel: 0.1 mm", "travel: 0.7 mm", StringComparison.Ordinal));
        Call call = Call.Of("run", deck, "--into", into, "--quiet");
        Assert.Equal(ExitCode.StoppedEarly, call.Code);
        Assert.Contains("stopped early", call.Output, StringComparison.Ordinal);
        Assert.True(File.ReadLines(Path.Join(into, "grips.csv")).Count() > 3);
    }

    [Fact]
    public void Interrupted_run_ends_with_130_and_keeps_what_it_found()
    {
        using TemporaryFolder temporary = new();
        string deck = temporary.File("deck.yaml"), into = temporary.File("out");
        File.WriteAllText(deck, TinyDeck.Text("first stride: 0.001, largest stride: 0.001"));
        Call call = Call.StoppedAt("point 10:", "run", deck, "--into", into);
        Assert.Equal(ExitCode.Interrupted, call.Code);
        using JsonDocument summary = JsonDocument.Parse(File.ReadAllText(Path.Join(into, "summary.json")));
        Assert.Equal("interrupted", summary.RootElement.GetProperty("status").GetString());
        // Header, the start, points 1 to 10.
        Assert.Equal(12, File.ReadLines(Path.Join(into, "grips.csv")).Count());
        Assert.Equal(12, File.ReadLines(Path.Join(into, "energy.csv")).Count());
        Assert.True(File.Exists(Path.Join(into, "fields", "solids-0010.vtu")));
    }
}
