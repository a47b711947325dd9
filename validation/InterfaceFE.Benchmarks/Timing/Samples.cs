namespace InterfaceFE.Benchmarks.Timing;

/// <summary>Repeated readings of one quantity.</summary>
public sealed class Samples
{
    private readonly List<double> _values = new(1024);

    /// <summary>Number of readings.</summary>
    public int Count => _values.Count;

    /// <summary>Median; the mean of the middle two when their number is even; NaN without readings.</summary>
    public double Median
    {
        get
        {
            if (_values.Count == 0)
                return double.NaN;
            double[] sorted = [.. _values.Order()];
            int middle = sorted.Length / 2;
            return sorted.Length % 2 == 1 ? sorted[middle] : 0.5 * (sorted[middle - 1] + sorted[middle]);
        }
    }

    /// <summary>Adds a reading.</summary>
    public void Add(double value) => _values.Add(value);
}
