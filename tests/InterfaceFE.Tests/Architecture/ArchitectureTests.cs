using InterfaceFE.Cli;
using InterfaceFE.Runs;
using Xunit;

namespace InterfaceFE.Tests.Architecture;

public class ArchitectureTests
{
    private const string Root = "InterfaceFE";

    /// <summary>Dependencies run up this list only, and not all of them.</summary>
    private static readonly Dictionary<string, string[]> Library = new()
    {
        ["Units"] = [],
        ["Decks"] = ["Units"],
        ["Decks.Reading"] = ["Decks", "Units"],
        ["Geometry"] = ["Decks", "Units"],
        ["Mechanics"] = ["Units"],
        ["Model"] = ["Decks", "Geometry", "Mechanics", "Units"],
        ["Sparse"] = [],
        ["Marching"] = ["Model", "Sparse", "Mechanics", "Geometry"],
        ["Results"] = ["Marching", "Model", "Mechanics", "Geometry", "Decks"],
        ["Reports"] = ["Results", "Geometry"],
        ["Runs"] = ["Decks", "Decks.Reading", "Geometry", "Mechanics", "Model", "Sparse", "Marching", "Results", "Reports", "Units"],
        ["Variants"] = ["Runs", "Results", "Reports", "Decks", "Decks.Reading"],
    };

    /// <summary>Packages and the namespaces that may use them.</summary>
    private static readonly Dictionary<string, string> Packages = new()
    {
        ["YamlDotNet"] = "InterfaceFE.Decks.Reading",
        ["ScottPlot"] = "InterfaceFE.Reports",
        ["SkiaSharp"] = "InterfaceFE.Reports",
    };

    private static readonly string[] MayTouchFiles = ["InterfaceFE.Decks.Reading", "InterfaceFE.Results", "InterfaceFE.Reports", "InterfaceFE.Runs", "InterfaceFE.Variants"];
    private static readonly string[] FileTypes = ["File", "FileInfo", "FileStream", "Directory", "DirectoryInfo", "Path", "StreamReader", "StreamWriter"];

    private static readonly IReadOnlyCollection<TypeUse> Uses = AssemblyUses.Read(typeof(DeckRun).Assembly.Location);

    [Fact]
    public void Each_namespace_of_the_library_uses_what_its_table_allows() => Assert.Empty(new LayerTable(Root, Library).Violations(Uses));

    [Fact]
    public void Command_line_uses_runs_and_their_results_and_no_mechanics()
    {
        Dictionary<string, string[]> table = Library.Keys.ToDictionary(entry => entry, _ => Array.Empty<string>());
        table["Cli"] = ["Units", "Decks", "Results", "Runs", "Variants"];
        Assert.Empty(new LayerTable(Root, table).Violations(AssemblyUses.Read(typeof(CommandLine).Assembly.Location)));
    }

    [Fact]
    public void Each_package_is_used_from_its_own_namespace_alone()
    {
        IEnumerable<string> wrong = Uses
            .Where(use => use.UsedAssembly.Length > 0 && !use.UsedAssembly.StartsWith("System.", StringComparison.Ordinal) && use.UsedAssembly != "System")
            .Where(use => !Packages.TryGetValue(use.UsedAssembly, out string? space) || use.UserNamespace != space)
            .Select(use => $"{use.User} uses {use.Used} of {use.UsedAssembly}");
        Assert.Empty(wrong.Distinct());
    }

    [Fact]
    public void Only_reading_results_reports_runs_and_variants_touch_files()
    {
        Assert.Empty(Uses
            .Where(use => use.UsedNamespace == "System.IO" && FileTypes.Contains(use.Used["System.IO.".Length..]) && !MayTouchFiles.Contains(use.UserNamespace))
            .Select(use => $"{use.User} uses {use.Used}"));
    }

    [Fact]
    public void Library_never_writes_to_the_terminal_itself() =>
        Assert.Empty(Uses.Where(use => use.Used == "System.Console").Select(use => use.User));

    [Fact]
    public void Checker_finds_a_forbidden_use_that_stands_in_a_method_body_alone()
    {
        // DeckRun asks the kernels for their width inside a method; no field, parameter or base type of it is of that namespace.
        Dictionary<string, string[]> narrow = new(Library) { ["Runs"] = [.. Library["Runs"].Where(entry => entry != "Sparse")] };
        Assert.Contains(new LayerTable(Root, narrow).Violations(Uses), line => line.StartsWith("InterfaceFE.Runs.DeckRun uses InterfaceFE.Sparse.DenseKernels,", StringComparison.Ordinal));
    }

    [Fact]
    public void Checker_finds_a_namespace_that_the_table_does_not_know()
    {
        Dictionary<string, string[]> shorter = Library.Where(entry => entry.Key != "Variants").ToDictionary();
        Assert.Equal("InterfaceFE.Variants is not in the table: say there what it may use", Assert.Single(new LayerTable(Root, shorter).Violations(Uses)));
    }

    [Theory]
    [InlineData("Base", typeof(UsesByBase))]
    [InlineData("Field", typeof(UsesByField))]
    [InlineData("Parameter", typeof(UsesByParameter))]
    [InlineData("Local", typeof(UsesByLocal))]
    [InlineData("Closure", typeof(UsesByClosure))]
    [InlineData("TypeArgument", typeof(UsesByTypeArgument))]
    [InlineData("AfterSwitch", typeof(UsesAfterSwitch))]
    public void Checker_sees_each_kind_of_use(string kind, Type user)
    {
        IReadOnlyCollection<TypeUse> own = AssemblyUses.Read(user.Assembly.Location);
        Assert.Contains(own, use => use.User == user.FullName && use.Used == "System.Text.StringBuilder" || use.User == user.FullName && kind == "Base" && use.Used == "System.IO.StringWriter");
    }
}
