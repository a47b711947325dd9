using System.CommandLine;

namespace InterfaceFE.Cli;

/// <summary>Arguments and options that several commands share.</summary>
internal static class CommonOptions
{
    public static Argument<string> Deck() => new("DECK") { Description = "Deck file (YAML)." };

    public static Option<string> Into(string description) => new("--into") { Description = description, HelpName = "DIR" };

    public static Option<bool> Overwrite() => new("--overwrite") { Description = "Replace results that are in the folder already; other files there stay." };

    public static Option<bool> Quiet() => new("--quiet") { Description = "Tell no progress." };

    public static Option<bool> Json(string what) => new("--json") { Description = $"Print {what} as JSON instead of text." };
}
