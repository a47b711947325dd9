using InterfaceFE.Runs;
using InterfaceFE.Tests.Cli;
using InterfaceFE.Tests.Results;
using Xunit;

namespace InterfaceFE.Tests.Variants;

[Collection(DiskCollection.Name)]
public class VariantBatchTests
{
    [Fact]
    public void Batch_goes_past_a_bad_deck_skips_materials_and_ends_with_the_highest_code()
    {
        using TemporaryFolder temporary = new();
        string decks = temporary.File("decks"), into = temporary.File("out");
        Directory.CreateDirectory(Path.Join(decks, "below"));
        File.WriteAllText(Path.Join(decks, "a-bad.yaml"), TinyDeck.Text().Replace("width:", "widht:", StringComparison.Ordinal));
        File.WriteAllText(Path.Join(decks, "b-good.yaml"), TinyDeck.Text());
        File.WriteAllText(Path.Join(decks, "c-renamed.yaml"), TinyDeck.Text().Replace("lower", "base plate", StringComparison.Ordinal).Replace("base plate: top", "lower: top", StringComparison.Ordinal));
        File.WriteAllText(Path.Join(decks, "materials.yaml"), "materials: {stuff: {young: 1 GPa, poisson: 0.3}}\n");
        File.WriteAllText(Path.Join(decks, "below", "d.yaml"), TinyDeck.Text());
        Call call = Call.Of("variants", decks, "--into", into);
        Assert.Equal(ExitCode.WrongDeckOrCall, call.Code);
        Assert.Contains("deck 3 of 3: c-renamed", call.Error, StringComparison.Ordinal);
        Assert.Contains("materials.yaml: holds only materials or layers, skipped", call.Error, StringComparison.Ordinal);
        string[] table = File.ReadAllLines(Path.Join(into, "variants.csv"));
        Assert.Equal(4, table.Length);
        Assert.EndsWith("points,lower highest equivalent stress [MPa],upper highest equivalent stress [MPa],base plate highest equivalent stress [MPa]", table[0], StringComparison.Ordinal);
        Assert.StartsWith("a-bad,not run,", table[1], StringComparison.Ordinal);
        Assert.StartsWith("b-good,severed,", table[2], StringComparison.Ordinal);
        Assert.Contains("widht", File.ReadAllText(Path.Join(into, "a-bad", "problems.txt")), StringComparison.Ordinal);
        Assert.True(File.Exists(Path.Join(into, "b-good", "summary.json")));
        Assert.True(File.Exists(Path.Join(into, "overlay.png")));
        Assert.Equal(ExitCode.WrongDeckOrCall, Call.Of("variants", decks, "--into", into).Code);
        Assert.Equal(table, File.ReadAllLines(Path.Join(into, "variants.csv")));
    }

    [Fact]
    public void Interrupted_batch_keeps_its_rows()
    {
        using TemporaryFolder temporary = new();
        string decks = temporary.File("decks"), into = temporary.File("out");
        Directory.CreateDirectory(decks);
        foreach (string name in (string[])["a", "b", "c"])
            File.WriteAllText(Path.Join(decks, name + ".yaml"), TinyDeck.Text());
        Call call = Call.StoppedAt("b: stage 2, point 1:", "variants", decks, "--into", into);
        Assert.Equal(ExitCode.Interrupted, call.Code);
        string[] table = File.ReadAllLines(Path.Join(into, "variants.csv"));
        Assert.Equal(3, table.Length);
        Assert.StartsWith("a,severed,", table[1], StringComparison.Ordinal);
        Assert.StartsWith("b,interrupted,", table[2], StringComparison.Ordinal);
        Assert.False(Directory.Exists(Path.Join(into, "c")));
    }
}
