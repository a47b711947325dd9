namespace InterfaceFE.Results;

/// <summary>
/// grips.csv: one row per accepted point with the readings of all grips and gauges. A grip that is moved has displacement, force, rotation and moment (the last two
/// empty for a pin) and, behind a load train, the crosshead's displacement; one that is only fixed has its force along x and y.
/// </summary>
public sealed class GripTable : IDisposable
{
    private readonly IReadOnlyList<GripInfo> _grips;
    private readonly int _gauges;
    private readonly CsvTable _table;

    /// <summary>Creates the file and writes its header.</summary>
    /// <param name="path">File; its folder must exist.</param>
    /// <param name="grips">Grips in the order of <see cref="PointRow.Grips"/>.</param>
    /// <param name="gauges">Gauges in the order of <see cref="PointRow.Gauges"/>.</param>
    public GripTable(string path, IReadOnlyList<GripInfo> grips, IReadOnlyList<GaugeInfo> gauges)
        : this(grips, gauges, header => new CsvTable(path, header))
    {
    }

    /// <summary>Writes to a writer, which is closed with the table.</summary>
    internal GripTable(TextWriter writer, IReadOnlyList<GripInfo> grips, IReadOnlyList<GaugeInfo> gauges)
        : this(grips, gauges, header => new CsvTable(writer, header))
    {
    }

    private GripTable(IReadOnlyList<GripInfo> grips, IReadOnlyList<GaugeInfo> gauges, Func<List<string>, CsvTable> open)
    {
        _grips = grips;
        _gauges = gauges.Count;
        _table = open(Header(grips, gauges));
    }

    /// <summary>Writes a point.</summary>
    /// <exception cref="ArgumentException">The row has other numbers of grips or gauges than the table.</exception>
    public void Write(PointRow row)
    {
        ArgumentNullException.ThrowIfNull(row);
        if (row.Grips.Count != _grips.Count || row.Gauges.Count != _gauges)
            throw new ArgumentException($"the row has {row.Grips.Count} grips and {row.Gauges.Count} gauges, the table {_grips.Count} and {_gauges}", nameof(row));
        _table.Add(row.Point).Add(row.Stage).Add(row.Progress).Add(row.Time).Add(Celsius.From(row.Temperature));
        for (int i = 0; i < _grips.Count; i++)
        {
            GripReading reading = row.Grips[i];
            if (_grips[i].Moved)
            {
                _table.Add(reading.Displacement).Add(reading.Force).Add(reading.Rotation).Add(reading.Moment);
                if (_grips[i].HasLoadTrain)
                    _table.Add(reading.Crosshead);
            }
            else
                _table.Add(reading.ForceX).Add(reading.ForceY);
        }
        foreach (double gauge in row.Gauges)
            _table.Add(gauge);
        _table.Add(row.LoadFactor).Add(row.Stable ? "yes" : "no").EndRow();
    }

    /// <inheritdoc/>
    public void Dispose() => _table.Dispose();

    private static List<string> Header(IReadOnlyList<GripInfo> grips, IReadOnlyList<GaugeInfo> gauges)
    {
        List<string> header = ["point", "stage", "progress", "time [s]", "temperature [°C]"];
        foreach (GripInfo grip in grips)
        {
            header.AddRange(grip.Moved
                ? [$"{grip.Name} displacement [mm]", $"{grip.Name} force [N]", $"{grip.Name} rotation [rad]", $"{grip.Name} moment [N mm]"]
                : [$"{grip.Name} force x [N]", $"{grip.Name} force y [N]"]);
            if (grip.Moved && grip.HasLoadTrain)
                header.Add($"{grip.Name} crosshead [mm]");
        }
        foreach (GaugeInfo gauge in gauges)
            header.Add($"{gauge.Name} [{gauge.Unit}]");
        header.AddRange(["load factor", "stable"]);
        return header;
    }
}
