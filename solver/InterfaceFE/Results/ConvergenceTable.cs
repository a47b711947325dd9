namespace InterfaceFE.Results;

/// <summary>convergence.csv: one row per iteration of the march, enough to replay the run.</summary>
public sealed class ConvergenceTable : IDisposable
{
    internal static readonly string[] Header =
    [
        "stage", "point", "retries", "iteration", "control", "stride", "progress", "load factor", "root", "out of balance [N]", "relative", "correction [mm]",
        "unstable directions", "changed elements", "reason", "guess",
    ];

    private readonly CsvTable _table;

    /// <summary>Creates the file and writes its header.</summary>
    /// <param name="path">File; its folder must exist.</param>
    public ConvergenceTable(string path) => _table = new CsvTable(path, Header);

    /// <summary>Writes to a writer, which is closed with the table.</summary>
    internal ConvergenceTable(TextWriter writer) => _table = new CsvTable(writer, Header);

    /// <summary>Writes an iteration.</summary>
    public void Write(IterationRow row)
    {
        ArgumentNullException.ThrowIfNull(row);
        _table.Add(row.Stage).Add(row.Point).Add(row.Retries).Add(row.Iteration)
            .Add(row.Control).Add(row.Stride).Add(row.Progress).Add(row.LoadFactor).Add(row.Root)
            .Add(row.OutOfBalance).Add(row.Relative).Add(row.Correction)
            .Add(row.UnstableDirections).Add(row.ChangedElements).Add(row.Reason).Add(row.Guess)
            .EndRow();
    }

    /// <inheritdoc/>
    public void Dispose() => _table.Dispose();
}
