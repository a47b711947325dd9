using InterfaceFE.Runs;
using InterfaceFE.Tests.Results;
using Xunit;

namespace InterfaceFE.Tests.Runs;

public class RunFolderTests
{
    [Fact]
    public void Clearing_removes_results_and_leaves_all_else()
    {
        using TemporaryFolder temporary = new();
        string[] results = ["summary.json", "grips.csv", "run.log", "fields/solids-0001.vtu", "fields/layers-0001.vtu", "figures/front-bond.svg"];
        string[] others = ["notes.txt", "grips.csv.bak", "fields/solids.txt", "more/grips.csv"];
        foreach (string file in results.Concat(others))
        {
            Directory.CreateDirectory(Path.GetDirectoryName(temporary.File(file))!);
            File.WriteAllText(temporary.File(file), "x");
        }
        RunFolder.Clear(temporary.Folder);
        Assert.DoesNotContain(results, file => File.Exists(temporary.File(file)));
        Assert.All(others, file => Assert.True(File.Exists(temporary.File(file)), file));
        Assert.False(Directory.Exists(temporary.File("figures")));
    }

    [Fact]
    public void Folder_is_taken_by_any_file_but_a_drawing_of_the_model()
    {
        using TemporaryFolder temporary = new();
        Assert.False(RunFolder.IsTaken(temporary.File("none")));
        Assert.False(RunFolder.IsTaken(temporary.Folder));
        Directory.CreateDirectory(temporary.File("figures"));
        File.WriteAllText(temporary.File("figures/model.png"), "x");
        Assert.False(RunFolder.IsTaken(temporary.Folder));
        File.WriteAllText(temporary.File("figures/front-bond.png"), "x");
        Assert.True(RunFolder.IsTaken(temporary.Folder));
        Assert.True(RunFolder.IsTaken(temporary.File("figures/model.png")));
    }

    [Theory]
    [InlineData("inputs/ferry-roof/cold-night.yaml", "cold-night")]
    [InlineData("a.b.yaml", "a.b")]
    public void Folder_left_out_is_named_after_the_deck(string deck, string name) => Assert.Equal(Path.Join("results", name), RunFolder.DefaultFor(deck));
}
