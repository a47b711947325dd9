namespace InterfaceFE.Results;

/// <summary>energy.csv: where the work has gone, one row per accepted point, of the whole specimen [mJ].</summary>
public sealed class EnergyTable : IDisposable
{
    private static readonly string[] Header =
    [
        "point", "stage", "put in [mJ]", "stored in adherends [mJ]", "stored in layers [mJ]", "spent in layers [mJ]", "spent in yielding [mJ]",
        "spent in friction [mJ]", "thermal [mJ]", "released in jumps [mJ]", "balance", "path error",
    ];

    private const string LoadTrains = "stored in load trains [mJ]";

    private readonly CsvTable _table;
    private readonly bool _loadTrains;

    /// <summary>Creates the file and writes its header.</summary>
    /// <param name="path">File; its folder must exist.</param>
    /// <param name="loadTrains">Whether there are load trains, whose energy then has a column, the last one.</param>
    public EnergyTable(string path, bool loadTrains)
    {
        _loadTrains = loadTrains;
        _table = new CsvTable(path, loadTrains ? [.. Header, LoadTrains] : Header);
    }

    /// <summary>Writes to a writer, which is closed with the table.</summary>
    internal EnergyTable(TextWriter writer) => _table = new CsvTable(writer, Header);

    /// <summary>Writes a point.</summary>
    public void Write(EnergyRow row)
    {
        ArgumentNullException.ThrowIfNull(row);
        _table.Add(row.Point).Add(row.Stage)
            .Add(row.PutIn).Add(row.StoredInAdherends).Add(row.StoredInLayers)
            .Add(row.SpentInLayers).Add(row.SpentInYielding).Add(row.SpentInFriction)
            .Add(row.Thermal).Add(row.ReleasedInJumps)
            .Add(row.Balance).Add(row.PathError);
        if (_loadTrains)
            _table.Add(row.StoredInLoadTrains);
        _table.EndRow();
    }

    /// <inheritdoc/>
    public void Dispose() => _table.Dispose();
}
