using System.CommandLine;
using System.CommandLine.Parsing;
using InterfaceFE.Units;

namespace InterfaceFE.Cli;

/// <summary>Says in plain lines what is wrong with a call, with the nearest word that would be right.</summary>
internal static class CallErrors
{
    /// <summary>Writes the lines.</summary>
    public static void Write(ParseResult parsed, TextWriter error)
    {
        Command command = parsed.CommandResult.Command;
        bool isRoot = command is RootCommand;
        string name = isRoot ? "interfacefe" : $"interfacefe {command.Name}";
        foreach (string line in Lines(parsed, command, isRoot).Distinct())
            error.WriteLine(line);
        error.WriteLine($"`{name} --help` shows how it is called");
    }

    private static IEnumerable<string> Lines(ParseResult parsed, Command command, bool isRoot)
    {
        string[] options = [.. parsed.UnmatchedTokens.Where(token => token.StartsWith('-') && token.Length > 1)];
        foreach (string option in options)
            yield return $"there is no option {option}{(isRoot ? "" : $" of {command.Name}")}{Near(option, OptionNames(command))}";
        // What follows an unknown option is mostly its value.
        if (options.Length > 0)
            yield break;
        if (isRoot)
        {
            yield return parsed.UnmatchedTokens.Count > 0
                ? $"there is no command {parsed.UnmatchedTokens[0]}{Near(parsed.UnmatchedTokens[0], command.Subcommands.Select(c => c.Name))}"
                : $"a command is missing: {string.Join(", ", command.Subcommands.Select(c => c.Name))}";
            yield break;
        }
        foreach (string token in parsed.UnmatchedTokens)
            yield return $"\"{token}\" is one word too many for {command.Name} (quote names that hold spaces)";
        foreach (ParseError fault in parsed.Errors.Where(e => !parsed.UnmatchedTokens.Any(token => e.Message.Contains(token, StringComparison.Ordinal))))
            yield return Missing(parsed, command) is { } missing && fault.SymbolResult is ArgumentResult or CommandResult ? missing : fault.Message.TrimEnd('.');
    }

    private static string? Missing(ParseResult parsed, Command command) =>
        command.Arguments.FirstOrDefault(a => a.Arity.MinimumNumberOfValues > 0 && parsed.GetResult(a) is not { Tokens.Count: > 0 }) is { } argument
            ? $"{argument.Name} is missing: {argument.Description}"
            : null;

    private static IEnumerable<string> OptionNames(Command command) => command.Options.Select(o => o.Name).Append("--help");

    private static string Near(string written, IEnumerable<string> known) => NearestText.Find(written, known) is { } near ? $"; did you mean {near}?" : "";
}
