using System.Globalization;
using InterfaceFE.Results;

namespace InterfaceFE.Reports;

/// <summary>What figures are drawn against: travel or rotation of the main grip, or the point's number where no grip moves.</summary>
internal sealed class MainGrip
{
    private readonly RunHistory _history;
    private readonly int _grip;
    private readonly Dictionary<int, PointRow> _points = [];

    public MainGrip(RunHistory history)
    {
        _history = history;
        foreach (PointRow point in history.Points)
            _points[point.Point] = point;
        _grip = -1;
        if (history.CurvesOf.Count > 0)
            _grip = IndexOf(history, history.CurvesOf[0]);
        for (int i = 0; i < history.Grips.Count && _grip < 0; i++)
            if (history.Grips[i].Moved)
                _grip = i;
    }

    /// <summary>Title of the axis.</summary>
    public string Title => _grip < 0 ? "Point" : Turned ? $"Rotation of {Name} (degrees)" : $"Travel of {Name} (mm)";

    /// <summary>Points by number.</summary>
    public IReadOnlyDictionary<int, PointRow> Points => _points;

    private string Name => _history.Grips[_grip].Name;

    private bool Turned => _grip >= 0 && _history.Grips[_grip].Turned;

    /// <summary>Index of a grip by name; -1 when there is none.</summary>
    public static int IndexOf(RunHistory history, string name)
    {
        for (int i = 0; i < history.Grips.Count; i++)
            if (history.Grips[i].Name == name)
                return i;
        return -1;
    }

    /// <summary>Value at a point; NaN for a point that is not in the history.</summary>
    public double At(int point) => !_points.TryGetValue(point, out PointRow? row) ? double.NaN : _grip < 0 ? point : Turned ? Degrees(row.Grips[_grip].Rotation) : row.Grips[_grip].Displacement;

    /// <summary>Whether the travel comes back by more than a hundredth of its range, so that curves against it would lie over each other.</summary>
    public bool TurnsBack()
    {
        double[] values = [.. _history.Points.Select(row => At(row.Point)).Where(double.IsFinite)];
        double highest = double.NegativeInfinity, back = 0;
        foreach (double value in values)
        {
            highest = Math.Max(highest, value);
            back = Math.Max(back, highest - value);
        }
        return values.Length > 0 && back > 0.01 * (values.Max() - values.Min()) && values[^1] > values[0];
    }

    /// <summary>Point number and travel in words.</summary>
    public string Words(int point)
    {
        double value = At(point);
        string where = _grip < 0 || !double.IsFinite(value) ? "" : Turned ? $", {Name} turned {SummaryText.Number(value)}°" : $", {Name} at {SummaryText.Number(value)} mm";
        return string.Create(CultureInfo.InvariantCulture, $"point {point}") + where;
    }

    /// <summary>Point of the largest force (moment) of the main grip; null when no grip moves.</summary>
    public int? PeakPoint()
    {
        int? best = null;
        double largest = double.NegativeInfinity;
        foreach (PointRow row in _history.Points)
        {
            double load = _grip < 0 ? double.NaN : Turned ? row.Grips[_grip].Moment ?? double.NaN : row.Grips[_grip].Force;
            if (load > largest)
                (largest, best) = (load, row.Point);
        }
        return best;
    }

    /// <summary>Degrees of radians; NaN for null.</summary>
    public static double Degrees(double? radians) => radians is { } value ? value * 180 / Math.PI : double.NaN;
}
