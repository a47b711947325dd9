using System.Text;
using InterfaceFE.Runs;

namespace InterfaceFE.Cli;

/// <summary>Where a command writes, and what asks it to stop.</summary>
/// <param name="Output">Results.</param>
/// <param name="Error">Progress and errors.</param>
/// <param name="Cancellation">Asks for an orderly end.</param>
internal sealed record Terminal(TextWriter Output, TextWriter Error, CancellationToken Cancellation)
{
    /// <summary>Takes lines of progress: to the error writer, or nowhere.</summary>
    public Action<string> Progress(bool quiet) => quiet ? _ => { } : Error.WriteLine;

    /// <summary>Tells what is wrong, a line each.</summary>
    public ExitCode Fail(ExitCode code, IReadOnlyList<string> messages)
    {
        foreach (string message in messages)
            Error.WriteLine(message);
        return code;
    }

    /// <summary>Prints what a library writer writes as UTF-8.</summary>
    public void Print(Action<Stream> write)
    {
        using MemoryStream bytes = new();
        write(bytes);
        Output.Write(Encoding.UTF8.GetString(bytes.ToArray()));
    }
}
