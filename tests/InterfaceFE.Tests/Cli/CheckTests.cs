using System.Text.Json;
using InterfaceFE.Runs;
using InterfaceFE.Tests.Results;
using Xunit;

namespace InterfaceFE.Tests.Cli;

[Collection(DiskCollection.Name)]
public class CheckTests
{
    [Fact]
    public void Check_tells_sizes_and_draws_the_model_without_taking_the_folder()
    {
        using TemporaryFolder temporary = new();
        string deck = Write(temporary, TinyDeck.Text()), into = temporary.File("out");
        Call check = Call.Of("check", deck, "--into", into);
        Assert.Equal(ExitCode.Done, check.Code);
        // 2 by 2 eight-node elements: 21 nodes each, and two rigid grips take the 5 nodes of an end each: 2·(21 - 5)·2 + 2·3.
        Assert.Contains("unknowns 70, nodes 42, elements 8, layer elements 2", check.Output, StringComparison.Ordinal);
        Assert.True(File.Exists(Path.Join(into, "figures", "model.png")));
        Assert.False(RunFolder.IsTaken(into));
    }

    [Fact]
    public void Expanded_deck_is_a_deck_with_the_same_expansion()
    {
        using TemporaryFolder temporary = new();
        Call first = Call.Of("check", Write(temporary, TinyDeck.Text()), "--expand");
        string again = temporary.File("again.yaml");
        File.WriteAllText(again, first.Output);
        Assert.Equal(first.Output, Call.Of("check", again, "--expand", "--quiet").Output);
    }

    [Fact]
    public void Json_report_holds_the_counts()
    {
        using TemporaryFolder temporary = new();
        using JsonDocument report = JsonDocument.Parse(Call.Of("check", Write(temporary, TinyDeck.Text()), "--json").Output);
        Assert.Equal(70, report.RootElement.GetProperty("counts").GetProperty("unknowns").GetInt32());
    }

    [Fact]
    public void Narrow_isotropic_arm_that_is_held_out_of_plane_gets_advice_with_its_size()
    {
        using TemporaryFolder temporary = new();
        string held = TinyDeck.Text().Replace("out of plane: free", "out of plane: held", StringComparison.Ordinal).Replace("poisson: 0", "poisson: 0.3", StringComparison.Ordinal);
        // 1/(1 - 0.3²) - 1 = 9.9 %; ν² = 9 %.
        Assert.Contains("bends 9.9 % stiffer, and toughness from load and modulus comes out 9 % lower", Call.Of("check", Write(temporary, held)).Output, StringComparison.Ordinal);
        Assert.DoesNotContain("stiffer", Call.Of("check", Write(temporary, held.Replace("width: 2.5 mm", "width: 50 mm", StringComparison.Ordinal))).Output, StringComparison.Ordinal);
        Assert.DoesNotContain("stiffer", Call.Of("check", Write(temporary, TinyDeck.Text())).Output, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("base: [x], head: [x]", "it can slide along y")]
    [InlineData("base: [x, y]", "it can turn about (2 mm, 0 mm)")]
    [InlineData("base: [x], head: [y]", "it can turn about (2 mm, 0 mm)")]
    [InlineData("base: [y], head: [x]", "it can turn about (2 mm, 10 mm)")]
    [InlineData("base: [y, rotation]", "it can slide along x")]
    [InlineData("head: [rotation]", "it is held in one direction only")]
    public void Specimen_that_can_still_move_freely_is_refused_at_its_stage(string fix, string motion)
    {
        using TemporaryFolder temporary = new();
        string deck = Write(temporary, Fixed(fix));
        foreach (string command in (string[])["check", "run"])
        {
            Call call = Call.Of(command, deck, "--into", temporary.File("out"), "--quiet");
            Assert.Equal(ExitCode.WrongDeckOrCall, call.Code);
            Assert.StartsWith($"{deck}:18:", Assert.Single(call.ErrorLines), StringComparison.Ordinal);
            Assert.Contains($"lower with upper can still move freely: {motion}", call.Error, StringComparison.Ordinal);
            Assert.False(Directory.Exists(temporary.File("out")));
        }
    }

    [Theory]
    [InlineData("base: [x, y, rotation]")]
    [InlineData("base: [x, y], head: [x]")]
    [InlineData("base: [y, rotation], head: [x]")]
    public void Specimen_that_is_held_in_three_independent_directions_is_accepted(string fix)
    {
        using TemporaryFolder temporary = new();
        Assert.Equal(ExitCode.Done, Call.Of("check", Write(temporary, Fixed(fix))).Code);
    }

    [Fact]
    public void Adherend_that_no_bond_holds_is_named()
    {
        using TemporaryFolder temporary = new();
        Call check = Call.Of("check", Write(temporary, TinyDeck.Text().Replace("joints:\n", "  spare: {of: stuff, rectangle: {corner: [50 mm, 0 mm], size: [8 mm, 4 mm]}}\njoints:\n", StringComparison.Ordinal)));
        Assert.Contains("spare can still move freely: nothing holds it", check.Error, StringComparison.Ordinal);
    }

    private static string Fixed(string fix) => TinyDeck.Text().Replace("base: [x, y, rotation], head: [x, rotation]", fix, StringComparison.Ordinal)
        .Replace("pull: {grip: head, along: +y, travel: 0.1 mm}", "cool to: 0 °C", StringComparison.Ordinal);

    private static string Write(TemporaryFolder temporary, string text)
    {
        string deck = temporary.File("deck.yaml");
        File.WriteAllText(deck, text);
        return deck;
    }
}
