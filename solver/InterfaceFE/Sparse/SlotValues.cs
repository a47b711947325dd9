namespace InterfaceFE.Sparse;

/// <summary>
/// The numbers of all slots, as lower triangles in elimination order (one triangle where the matrices are symmetric, a second one with the transposed upper part where they
/// are not), with the true matrix's products. Entries that are not finite are noticed on the way in.
/// </summary>
internal sealed unsafe class SlotValues
{
    private const double RowShare = 1e-4;

    private readonly SparsePlan _plan;
    private readonly SlotMap _map;
    private readonly AlignedBuffer[] _triangles;
    private readonly int[] _faultyUnknown;
    private readonly double[] _gathered;
    private readonly double[] _summed;
    private readonly double[] _magnitude;
    private int _faults;

    /// <summary>Makes room; all matrices are zero.</summary>
    public SlotValues(SparsePlan plan, bool isSymmetric)
    {
        _plan = plan;
        _map = plan.Slots;
        _triangles = new AlignedBuffer[isSymmetric ? 1 : 2];
        for (int half = 0; half < _triangles.Length; half++)
            _triangles[half] = new AlignedBuffer(_map.ValueCount);
        Scales = new UnknownScales(plan);
        _faultyUnknown = new int[plan.Pattern.SlotCount];
        Array.Fill(_faultyUnknown, -1);
        _gathered = new double[_map.LargestSlot];
        _summed = new double[_map.LargestSlot];
        _magnitude = new double[_map.LargestSlot];
    }

    private bool IsSymmetric => _triangles.Length == 1;

    /// <summary>Scales of the unknowns.</summary>
    public UnknownScales Scales { get; }

    /// <summary>Lower triangles (half 0) or transposed upper ones (half 1).</summary>
    public double* Triangle(int half) => _triangles[half].Start;

    /// <summary>First slot with an entry that is not finite, and the entry's row; (-1, -1) when all are finite.</summary>
    public (int Slot, int Unknown) FirstFault()
    {
        if (_faults == 0)
            return (-1, -1);
        int slot = Array.FindIndex(_faultyUnknown, unknown => unknown >= 0);
        return (slot, _faultyUnknown[slot]);
    }

    /// <summary>Replaces the matrix of a slot. Returns whether any number that the factor depends on changed.</summary>
    public bool Replace(int slot, ReadOnlySpan<double> matrix)
    {
        SlotPattern pattern = _plan.Pattern;
        if ((uint)slot >= (uint)pattern.SlotCount)
            throw new ArgumentOutOfRangeException(nameof(slot), slot, $"There are {pattern.SlotCount} slots.");
        int start = pattern.SlotStart[slot], count = pattern.SlotStart[slot + 1] - start;
        if (matrix.Length != count * count)
            throw new ArgumentException($"Slot {slot} has {count} unknowns: its matrix has {count * count} entries, not {matrix.Length}.", nameof(matrix));
        ReadOnlySpan<int> sequence = _map.Sequence.AsSpan(start, count);
        double* lower = _triangles[0].Start + _map.ValueStart[slot], upper = IsSymmetric ? lower : _triangles[1].Start + _map.ValueStart[slot];
        double sum = 0;
        bool hasChanged = false;
        for (int c = 0; c < count; c++)
        {
            int column = sequence[c], skipped = c - _map.FirstRow(slot, c);
            lower += skipped;
            upper += skipped;
            for (int r = c; r < count; r++)
            {
                double below = matrix[sequence[r] * count + column], above = matrix[column * count + sequence[r]];
                sum += Math.Abs(below) + Math.Abs(above);
                // The mean makes the factor independent of the elimination order when symmetry holds to round-off only.
                if (IsSymmetric && below != above)
                    below = above = 0.5 * below + 0.5 * above;
                hasChanged |= *lower != below || *upper != above;
                (*lower++, *upper++) = (below, above);
            }
        }
        // A sum of finite entries may overflow: only then each is looked at.
        NoteFault(slot, matrix, count, double.IsFinite(sum));
        // A scale can move alone where a matrix is symmetric to round-off only.
        for (int k = 0; k < count; k++)
            hasChanged |= Scales.Take(start + k, RowScale(matrix.Slice(sequence[k] * count, count), sequence[k]));
        return hasChanged;
    }

    /// <summary>product = K x.</summary>
    public void Multiply(ReadOnlySpan<double> x, Span<double> product)
    {
        product.Clear();
        foreach (int slot in _map.OfFront)
        {
            int start = _plan.Pattern.SlotStart[slot], count = _plan.Pattern.SlotStart[slot + 1] - start;
            Gather(x, start, count);
            Product(slot, count);
            for (int k = 0; k < count; k++)
                product[_plan.OldOf[_map.Place[start + k]]] += _summed[k];
        }
    }

    /// <summary>residual = b - K x and size = |b| + |K| |x|, entry by entry, with the magnitudes of the slots' entries.</summary>
    public void Residual(ReadOnlySpan<double> b, ReadOnlySpan<double> x, Span<double> residual, Span<double> size)
    {
        for (int i = 0; i < b.Length; i++)
        {
            residual[i] = b[i];
            size[i] = Math.Abs(b[i]);
        }
        foreach (int slot in _map.OfFront)
        {
            int start = _plan.Pattern.SlotStart[slot], count = _plan.Pattern.SlotStart[slot + 1] - start;
            Gather(x, start, count);
            Product(slot, count);
            Magnitudes(slot, count);
            for (int k = 0; k < count; k++)
            {
                int unknown = _plan.OldOf[_map.Place[start + k]];
                residual[unknown] -= _summed[k];
                size[unknown] += _magnitude[k];
            }
        }
    }

    private void Gather(ReadOnlySpan<double> x, int start, int count)
    {
        for (int k = 0; k < count; k++)
            _gathered[k] = x[_plan.OldOf[_map.Place[start + k]]];
        _summed.AsSpan(0, count).Clear();
    }

    private void Product(int slot, int count)
    {
        double* lower = _triangles[0].Start + _map.ValueStart[slot], upper = _triangles[^1].Start + _map.ValueStart[slot];
        fixed (double* x = _gathered, y = _summed)
            for (int c = 0; c < count; c++)
            {
                int skipped = c - _map.FirstRow(slot, c);
                lower += skipped;
                upper += skipped;
                double sum = y[c] + *lower++ * x[c], value = x[c];
                upper++;
                for (int r = c + 1; r < count; r++)
                {
                    y[r] += *lower++ * value;
                    sum += *upper++ * x[r];
                }
                y[c] = sum;
            }
    }

    private void Magnitudes(int slot, int count)
    {
        _magnitude.AsSpan(0, count).Clear();
        double* lower = _triangles[0].Start + _map.ValueStart[slot], upper = _triangles[^1].Start + _map.ValueStart[slot];
        for (int c = 0; c < count; c++)
        {
            int skipped = c - _map.FirstRow(slot, c);
            lower += skipped;
            upper += skipped;
            _magnitude[c] += Math.Abs(*lower++ * _gathered[c]);
            upper++;
            for (int r = c + 1; r < count; r++)
            {
                _magnitude[r] += Math.Abs(*lower++ * _gathered[c]);
                _magnitude[c] += Math.Abs(*upper++ * _gathered[r]);
            }
        }
    }

    private static double RowScale(ReadOnlySpan<double> row, int diagonal)
    {
        double largest = 0;
        foreach (double entry in row)
            largest = Math.Max(largest, Math.Abs(entry));
        return Math.Max(Math.Abs(row[diagonal]), RowShare * largest);
    }

    private void NoteFault(int slot, ReadOnlySpan<double> matrix, int count, bool isFinite)
    {
        int unknown = -1;
        for (int k = 0; k < matrix.Length && !isFinite && unknown < 0; k++)
            if (!double.IsFinite(matrix[k]))
                unknown = _plan.Pattern.Unknowns(slot)[k / count];
        _faults += (unknown >= 0 ? 1 : 0) - (_faultyUnknown[slot] >= 0 ? 1 : 0);
        _faultyUnknown[slot] = unknown;
    }
}
