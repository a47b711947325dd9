namespace InterfaceFE.Cli;

/// <summary>Where a command writes, and what asks it to stop.</summary>
/// <param name="Output">Results.</param>
/// <param name="Error">Progress and errors.</param>
/// <param name="Cancellation">Asks for an orderly end.</param>
internal sealed record Terminal(TextWriter Output, TextWriter Error, CancellationToken Cancellation)
{
    /// <summary>Takes lines of progress: to the error writer, or nowhere.</summary>
    public Action<string> Progress(bool quiet) => quiet ? _ => { } : Error.WriteLine;
}
