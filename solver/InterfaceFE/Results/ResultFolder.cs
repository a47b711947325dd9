namespace InterfaceFE.Results;

/// <summary>
/// The data files of a run in its folder: grips.csv, front.csv, energy.csv, convergence.csv, fields/ with fields.pvd. Each row is in its file when the call returns.
/// Existing files of these names are replaced. Not safe for several threads.
/// </summary>
public sealed class ResultFolder : IDisposable
{
    private readonly GripTable _grips;
    private readonly FrontTable _fronts;
    private readonly EnergyTable _energies;
    private readonly ConvergenceTable _iterations;
    private readonly FieldSeries _fields;

    /// <summary>Makes the folder if there is none, and the files with their headers.</summary>
    /// <param name="folder">Folder of the run.</param>
    /// <param name="history">What the run is about; rows that it holds already are written.</param>
    /// <exception cref="IOException">The folder or a file cannot be written.</exception>
    /// <exception cref="UnauthorizedAccessException">The folder or a file must not be written.</exception>
    public ResultFolder(string folder, RunHistory history)
    {
        ArgumentNullException.ThrowIfNull(history);
        Directory.CreateDirectory(folder);
        List<IDisposable> opened = [];
        try
        {
            opened.Add(_grips = new GripTable(Path.Combine(folder, "grips.csv"), history.Grips, history.Gauges));
            opened.Add(_fronts = new FrontTable(Path.Combine(folder, "front.csv")));
            opened.Add(_energies = new EnergyTable(Path.Combine(folder, "energy.csv"), history.Grips.Any(g => g.HasLoadTrain)));
            opened.Add(_iterations = new ConvergenceTable(Path.Combine(folder, "convergence.csv")));
            _fields = new FieldSeries(folder, history.Mesh);
            history.Points.ForEach(Write);
            history.Fronts.ForEach(Write);
            history.Energies.ForEach(Write);
            history.Iterations.ForEach(Write);
            history.Snapshots.ForEach(Write);
        }
        catch
        {
            opened.ForEach(table => table.Dispose());
            throw;
        }
    }

    /// <summary>Writes an accepted point to grips.csv.</summary>
    public void Write(PointRow row) => _grips.Write(row);

    /// <summary>Writes a front to front.csv.</summary>
    public void Write(FrontRow row) => _fronts.Write(row);

    /// <summary>Writes energies to energy.csv.</summary>
    public void Write(EnergyRow row) => _energies.Write(row);

    /// <summary>Writes an iteration to convergence.csv.</summary>
    public void Write(IterationRow row) => _iterations.Write(row);

    /// <summary>Writes the fields of a point.</summary>
    public void Write(FieldSnapshot fields) => _fields.Write(fields);

    /// <inheritdoc/>
    public void Dispose()
    {
        _grips.Dispose();
        _fronts.Dispose();
        _energies.Dispose();
        _iterations.Dispose();
    }
}
