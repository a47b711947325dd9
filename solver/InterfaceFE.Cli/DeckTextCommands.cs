using System.CommandLine;
using System.Text;
using InterfaceFE.Decks;
using InterfaceFE.Runs;

namespace InterfaceFE.Cli;

/// <summary>`schema` and `deck-reference`: texts made from the records of the deck.</summary>
internal static class DeckTextCommands
{
    private const string FirstLine = "# Deck reference";

    public static Command MakeSchema(Terminal terminal)
    {
        var command = new ExampleCommand("schema", "Print the JSON Schema of decks, for editors that complete and check YAML.", """
              interfacefe schema > deck-schema.json
            """);
        command.SetAction(_ => terminal.Output.Write(DeckSchema.Write()));
        return command;
    }

    public static Command MakeReference(Terminal terminal)
    {
        var command = new ExampleCommand("deck-reference", "Print the deck reference: a worked example and all keys (Markdown).", """
              interfacefe deck-reference --into inputs/README.md
            """);
        Option<string> into = CommonOptions.Into("Write it to FILE instead; an older deck reference there is replaced, no other file.", "FILE");
        command.Add(into);
        command.SetAction(parsed => (int)WriteReference(terminal, parsed.GetValue(into)));
        return command;
    }

    private static ExitCode WriteReference(Terminal terminal, string? file)
    {
        string text = DeckReference.Write();
        if (file is null)
        {
            terminal.Output.Write(text);
            return ExitCode.Done;
        }
        try
        {
            if (Directory.Exists(file))
                return terminal.Fail(ExitCode.WrongDeckOrCall, [$"{file} is a folder; here --into names a file, for example {Path.Join(file, "README.md")}"]);
            if (File.Exists(file) && !string.Equals(File.ReadLines(file).FirstOrDefault(), FirstLine, StringComparison.Ordinal))
                return terminal.Fail(ExitCode.WrongDeckOrCall, [$"{file} holds something else than a deck reference and is left as it is: name another file"]);
            File.WriteAllText(file, text, new UTF8Encoding(false));
            return ExitCode.Done;
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            return terminal.Fail(ExitCode.WrongDeckOrCall, [$"{file}: cannot be written: {e.Message.ReplaceLineEndings(" ")}"]);
        }
    }
}
