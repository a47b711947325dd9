using InterfaceFE.Cli;
using InterfaceFE.Runs;

namespace InterfaceFE.Tests.Cli;

/// <summary>A call of the command line within the test's process, with what it printed.</summary>
/// <param name="Code">Exit code.</param>
/// <param name="Output">Text of the output.</param>
/// <param name="Error">Text of progress and errors.</param>
internal sealed record Call(ExitCode Code, string Output, string Error)
{
    /// <summary>Lines of the error text.</summary>
    public string[] ErrorLines => Error.ReplaceLineEndings("\n").Split('\n', StringSplitOptions.RemoveEmptyEntries);

    public static Call Of(params string[] args) => Of(CancellationToken.None, args);

    public static Call Of(CancellationToken cancellation, params string[] args)
    {
        using StringWriter output = new(), error = new();
        int code = CommandLine.Run(args, output, error, cancellation);
        return new Call((ExitCode)code, output.ToString(), error.ToString());
    }

    /// <summary>A call that is asked to stop once a line of progress starts with the given words.</summary>
    public static Call StoppedAt(string words, params string[] args)
    {
        using CancellationTokenSource stop = new();
        using StringWriter output = new();
        using Watcher error = new(words, stop);
        int code = CommandLine.Run(args, output, error, stop.Token);
        return new Call((ExitCode)code, output.ToString(), error.ToString());
    }

    private sealed class Watcher(string words, CancellationTokenSource stop) : StringWriter
    {
        public override void WriteLine(string? value)
        {
            base.WriteLine(value);
            if (value is not null && value.Contains(words, StringComparison.Ordinal))
                stop.Cancel();
        }
    }
}
