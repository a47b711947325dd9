using System.CommandLine;
using System.CommandLine.Help;
using System.CommandLine.Invocation;
using InterfaceFE.Runs;

namespace InterfaceFE.Cli;

/// <summary>The command line: parses, calls the library, prints. Results go to the output, progress and errors to the other writer.</summary>
public static class CommandLine
{
    /// <summary>Runs a command. Never throws.</summary>
    /// <param name="args">Arguments without the program's name.</param>
    /// <param name="output">Takes results.</param>
    /// <param name="error">Takes progress and errors.</param>
    /// <param name="cancellation">Asks for an orderly end.</param>
    /// <returns>Exit code, as <see cref="ExitCode"/>.</returns>
    public static int Run(IReadOnlyList<string> args, TextWriter output, TextWriter error, CancellationToken cancellation)
    {
        ArgumentNullException.ThrowIfNull(args);
        ArgumentNullException.ThrowIfNull(output);
        ArgumentNullException.ThrowIfNull(error);
        try
        {
            // A file name may start with @: no response files.
            ParseResult parsed = Root(new Terminal(output, error, cancellation)).Parse(args, new ParserConfiguration { ResponseFileTokenReplacer = null });
            if (parsed.Action is ParseErrorAction || (parsed.Errors.Count > 0 && parsed.Action is null))
            {
                CallErrors.Write(parsed, error);
                return (int)ExitCode.WrongDeckOrCall;
            }
            return parsed.Invoke(new InvocationConfiguration { Output = output, Error = error, EnableDefaultExceptionHandler = false, ProcessTerminationTimeout = null });
        }
        catch (Exception e)
        {
            error.WriteLine($"this is an error in the program: {e.Message.ReplaceLineEndings(" ")} ({e.GetType().Name})");
            return (int)ExitCode.ProgramError;
        }
    }

    private static RootCommand Root(Terminal terminal)
    {
        var root = new RootCommand("Calculates bonded joints with layers that soften and come apart: from a deck in YAML to curves, fields and figures.");
        root.Add(CheckCommand.Make(terminal));
        root.Add(RunCommand.Make(terminal));
        root.Add(VariantsCommand.Make(terminal));
        root.Add(DeckTextCommands.MakeSchema(terminal));
        root.Add(DeckTextCommands.MakeReference(terminal));
        HelpOption help = root.Options.OfType<HelpOption>().Single();
        help.Description = "Show what a command does, its options and an example.";
        help.Action = new HelpWithExample((HelpAction)help.Action!);
        root.Options.OfType<VersionOption>().Single().Description = "Show the version.";
        return root;
    }
}
