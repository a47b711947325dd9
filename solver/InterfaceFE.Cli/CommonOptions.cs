using System.CommandLine;
using System.CommandLine.Parsing;

namespace InterfaceFE.Cli;

/// <summary>Arguments and options that several commands share.</summary>
internal static class CommonOptions
{
    public static Argument<string> Deck() => Path("DECK", "Deck file (YAML).");

    public static Argument<string> Path(string name, string description)
    {
        Argument<string> argument = new(name) { Description = description };
        argument.Validators.Add(result => RefuseEmpty(result, $"{name} is empty"));
        return argument;
    }

    public static Option<string> Into(string description, string name = "DIR")
    {
        Option<string> option = new("--into") { Description = description, HelpName = name };
        option.Validators.Add(result => RefuseEmpty(result, "--into is empty"));
        return option;
    }

    public static Option<string> File(string name, string description)
    {
        Option<string> option = new(name) { Description = description, HelpName = "FILE" };
        option.Validators.Add(result => RefuseEmpty(result, $"{name} is empty"));
        return option;
    }

    public static Option<bool> Overwrite() => new("--overwrite") { Description = "Replace results that are in the folder already; other files there stay." };

    public static Option<bool> Quiet() => new("--quiet") { Description = "Tell no progress." };

    public static Option<bool> Json(string what) => new("--json") { Description = $"Print {what} as JSON instead of text." };

    private static void RefuseEmpty(SymbolResult result, string message)
    {
        if (result.Tokens.Any(token => string.IsNullOrWhiteSpace(token.Value)))
            result.AddError(message);
    }
}
