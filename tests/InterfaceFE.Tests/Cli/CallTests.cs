using InterfaceFE.Runs;
using Xunit;

namespace InterfaceFE.Tests.Cli;

public class CallTests
{
    private static readonly string[] Commands = ["check", "run", "variants", "schema", "deck-reference"];

    [Fact]
    public void Each_help_shows_an_example_exit_codes_and_the_caution()
    {
        foreach (string[] call in Commands.Select(c => new[] { c, "--help" }).Append(["--help"]))
        {
            Call help = Call.Of(call);
            Assert.Equal(ExitCode.Done, help.Code);
            Assert.Contains($"interfacefe {(call.Length == 2 ? call[0] : "run")}", help.Output[help.Output.IndexOf("Example:", StringComparison.Ordinal)..], StringComparison.Ordinal);
            Assert.Contains("130 interrupted", help.Output, StringComparison.Ordinal);
            Assert.Contains("no proof of strength", help.Output, StringComparison.Ordinal);
            Assert.Contains("qualified", help.Output, StringComparison.Ordinal);
            Assert.Empty(help.Error);
        }
    }

    [Theory]
    [InlineData("there is no command rnu; did you mean run?", "rnu", "deck.yaml")]
    [InlineData("there is no command plan", "plan", "deck.yaml")]
    [InlineData("there is no option --intoo of run; did you mean --into?", "run", "deck.yaml", "--intoo", "x")]
    [InlineData("there is no option --resume of run", "run", "deck.yaml", "--resume")]
    [InlineData("DECK is missing", "run")]
    [InlineData("a command is missing", new string[0])]
    [InlineData("\"b.yaml\" is one word too many for run", "run", "a.yaml", "b.yaml")]
    [InlineData("--into is empty", "run", "a.yaml", "--into", "")]
    [InlineData("DECK is empty", "check", "")]
    public void Wrong_calls_are_refused_in_words(string expected, params string[] args)
    {
        Call call = Call.Of(args);
        Assert.Equal(ExitCode.WrongDeckOrCall, call.Code);
        Assert.StartsWith(expected, call.ErrorLines[0], StringComparison.Ordinal);
        Assert.Equal(2, call.ErrorLines.Length);
        Assert.Empty(call.Output);
    }

    [Fact]
    public void Schema_and_reference_are_printed()
    {
        Assert.StartsWith("{", Call.Of("schema").Output, StringComparison.Ordinal);
        Assert.StartsWith("# Deck reference", Call.Of("deck-reference").Output, StringComparison.Ordinal);
    }

    [Fact]
    public void Reference_replaces_an_older_one_and_no_other_file()
    {
        using Results.TemporaryFolder temporary = new();
        string file = temporary.File("README.md"), other = temporary.File("deck.yaml");
        File.WriteAllText(file, "# Deck reference\n\nolder\n");
        File.WriteAllText(other, TinyDeck.Text());
        Assert.Equal(ExitCode.Done, Call.Of("deck-reference", "--into", file).Code);
        Assert.Equal(Call.Of("deck-reference").Output, File.ReadAllText(file));
        Assert.Equal(ExitCode.WrongDeckOrCall, Call.Of("deck-reference", "--into", other).Code);
        Assert.Equal(TinyDeck.Text(), File.ReadAllText(other));
    }
}
