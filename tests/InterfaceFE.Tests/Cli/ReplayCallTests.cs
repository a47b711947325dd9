using System.Diagnostics;
using InterfaceFE.Cli;
using InterfaceFE.Runs;
using InterfaceFE.Sparse;
using InterfaceFE.Tests.Results;
using InterfaceFE.Validation.Replays;
using Xunit;

namespace InterfaceFE.Tests.Cli;

/// <summary>`run --replay` as a user calls it.</summary>
[Collection(DiskCollection.Name)]
public class ReplayCallTests(TinyRun tiny) : IClassFixture<TinyRun>
{
    private string Record => Path.Join(tiny.Folder, "convergence.csv");

    [Fact]
    public void Replay_of_a_run_gives_the_same_tables_and_the_log_names_it()
    {
        using TemporaryFolder temporary = new();
        string into = temporary.File("again");
        Call call = Call.Of("run", tiny.DeckFile, "--replay", Record, "--into", into);
        Assert.Equal(ExitCode.Done, call.Code);
        foreach (string table in (string[])["grips.csv", "front.csv", "energy.csv"])
            Assert.Equal(File.ReadAllText(Path.Join(tiny.Folder, table)), File.ReadAllText(Path.Join(into, table)));
        Assert.Contains("replay of " + Record, File.ReadAllText(Path.Join(into, "run.log")), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("EnableAVX512", 256)]
    [InlineData("EnableHWIntrinsic", 64)]
    public async Task Replay_with_other_kernels_stays_within_a_billionth(string knob, int width)
    {
        Assert.SkipWhen(DenseKernels.WidthBits <= width, "This processor has no wider kernels to compare with.");
        using TemporaryFolder temporary = new();
        string into = temporary.File("narrow");
        ProcessStartInfo start = new("dotnet") { RedirectStandardError = true, RedirectStandardOutput = true, Environment = { ["DOTNET_" + knob] = "0" } };
        foreach (string arg in (string[])[typeof(CommandLine).Assembly.Location, "run", tiny.DeckFile, "--replay", Record, "--into", into])
            start.ArgumentList.Add(arg);
        using Process process = Process.Start(start)!;
        Task<string> error = process.StandardError.ReadToEndAsync(TestContext.Current.CancellationToken);
        await process.StandardOutput.ReadToEndAsync(TestContext.Current.CancellationToken);
        await process.WaitForExitAsync(TestContext.Current.CancellationToken);
        Assert.True(process.ExitCode == 0, await error);
        Assert.Contains($"\"kernel width [bit]\": {width}", await File.ReadAllTextAsync(Path.Join(into, "summary.json"), TestContext.Current.CancellationToken), StringComparison.Ordinal);
        double carried = TableComparison.Carried(await File.ReadAllTextAsync(Record, TestContext.Current.CancellationToken));
        foreach (string table in TableComparison.Tables)
        {
            TableDifference difference = TableComparison.Compare(table, await File.ReadAllTextAsync(Path.Join(tiny.Folder, table), TestContext.Current.CancellationToken), await File.ReadAllTextAsync(Path.Join(into, table), TestContext.Current.CancellationToken), carried);
            Assert.True(difference.Relative <= ReplayVerbs.Gate, $"{table}: {difference}");
        }
    }

    [Fact]
    public void What_cannot_be_replayed_gives_one_line_and_costs_no_earlier_results()
    {
        using TemporaryFolder temporary = new();
        string into = temporary.File("out"), deck = temporary.File("other.yaml"), alone = temporary.File("alone.csv"), text = File.ReadAllText(Record);
        Directory.CreateDirectory(into);
        File.WriteAllText(Path.Join(into, "grips.csv"), "older");
        File.WriteAllText(deck, TinyDeck.Text().Replace("travel: 0.1 mm", "travel: 0.2 mm", StringComparison.Ordinal));
        File.WriteAllText(alone, text.Replace("\n2,", "\n3,", StringComparison.Ordinal));
        foreach ((string[] args, string words) in ((string[], string)[])[
            ([tiny.DeckFile, "--replay", temporary.File("none.csv")], "cannot be read"),
            ([tiny.DeckFile, "--replay", temporary.Folder], "cannot be read"),
            ([tiny.DeckFile, "--replay", Path.Join(tiny.Folder, "grips.csv")], "no convergence.csv"),
            ([deck, "--replay", Record], "it is of another deck"),
            ([tiny.DeckFile, "--replay", alone], "its points belong to stages 3, those of this deck to stages 2")])
        {
            Call call = Call.Of(["run", .. args, "--into", into, "--overwrite", "--quiet"]);
            Assert.Equal(ExitCode.WrongDeckOrCall, call.Code);
            Assert.Contains(words, Assert.Single(call.ErrorLines), StringComparison.Ordinal);
            Assert.Equal("older", File.ReadAllText(Path.Join(into, "grips.csv")));
        }
        Call lost = Call.Of("run", tiny.DeckFile, "--replay", Record, "--into", tiny.Folder, "--overwrite", "--quiet");
        Assert.Contains("would be replaced by its results", Assert.Single(lost.ErrorLines), StringComparison.Ordinal);
        Assert.Equal(text, File.ReadAllText(Record));
    }

    [Fact]
    public void Record_on_its_own_is_followed_with_a_changed_deck()
    {
        using TemporaryFolder temporary = new();
        string deck = temporary.File("other.yaml"), alone = temporary.File("convergence.csv");
        File.WriteAllText(deck, TinyDeck.Text().Replace("young: 1000 MPa", "young: 1000.001 MPa", StringComparison.Ordinal));
        File.Copy(Record, alone);
        Assert.Equal(ExitCode.Done, Call.Of("run", deck, "--replay", alone, "--into", temporary.File("out"), "--quiet").Code);
        Assert.Equal(File.ReadLines(Path.Join(tiny.Folder, "grips.csv")).Count(), File.ReadLines(temporary.File("out/grips.csv")).Count());
    }
}
