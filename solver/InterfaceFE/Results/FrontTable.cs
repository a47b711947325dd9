namespace InterfaceFE.Results;

/// <summary>front.csv: one row per joint, point and front. A value that has no meaning there is an empty field.</summary>
public sealed class FrontTable : IDisposable
{
    private static readonly string[] Header =
    [
        "joint", "front", "point", "crack tip [mm]", "process zone start [mm]", "process zone [mm]", "opening at starter tip [mm]", "sliding at starter tip [mm]",
        "J path [N/mm]", "J rotation [N/mm]", "J under law [N/mm]", "mode mix [deg]", "largest peel [MPa]", "largest shear [MPa]",
    ];

    private readonly CsvTable _table;

    /// <summary>Creates the file and writes its header.</summary>
    /// <param name="path">File; its folder must exist.</param>
    public FrontTable(string path) => _table = new CsvTable(path, Header);

    /// <summary>Writes to a writer, which is closed with the table.</summary>
    internal FrontTable(TextWriter writer) => _table = new CsvTable(writer, Header);

    /// <summary>Writes a front at a point.</summary>
    public void Write(FrontRow row)
    {
        ArgumentNullException.ThrowIfNull(row);
        _table.Add(row.Joint).Add(row.Front).Add(row.Point)
            .Add(row.CrackTip).Add(row.ProcessZoneStart).Add(row.ProcessZone)
            .Add(row.Opening).Add(row.Sliding)
            .Add(row.JPath).Add(row.JRotation).Add(row.JUnderLaw)
            .Add(row.ModeMixDegrees).Add(row.LargestPeel).Add(row.LargestShear)
            .EndRow();
    }

    /// <inheritdoc/>
    public void Dispose() => _table.Dispose();
}
