namespace InterfaceFE.Sparse;

/// <summary>
/// Sparse vectors over the unknowns, eight in a bundle, each bundle carried forward along its own path: V' = L⁻¹ V with the part that arrives at the root. Buffers are kept
/// from one use to the next.
/// </summary>
internal sealed unsafe class BorderVectors
{
    private const int Lanes = LaneSolver.Lanes;

    private readonly SparsePlan _plan;
    private readonly FrontStore _store;
    private readonly LaneSolver _solver;
    private readonly AlignedBuffer _work;
    private readonly AlignedBuffer _packed;
    private readonly bool[] _isMarked;
    private readonly List<int> _start = [0];
    private readonly List<int> _unknowns = [];
    private readonly List<double> _values = [];
    private readonly List<Bundle> _bundles = [];
    private double[] _products = [];

    /// <summary>Makes room for one bundle.</summary>
    public BorderVectors(SparsePlan plan, FrontStore store)
    {
        _plan = plan;
        _store = store;
        _solver = new LaneSolver(plan, store);
        _work = new AlignedBuffer((long)Lanes * plan.UnknownCount);
        _packed = new AlignedBuffer((long)Lanes * plan.LongestPanel);
        _isMarked = new bool[plan.FrontCount];
    }

    /// <summary>Number of vectors.</summary>
    public int Count => _start.Count - 1;

    /// <summary>Unknowns of a vector.</summary>
    public ReadOnlySpan<int> Unknowns(int vector) => System.Runtime.InteropServices.CollectionsMarshal.AsSpan(_unknowns)[_start[vector].._start[vector + 1]];

    /// <summary>Values of a vector at its unknowns.</summary>
    public ReadOnlySpan<double> Values(int vector) => System.Runtime.InteropServices.CollectionsMarshal.AsSpan(_values)[_start[vector].._start[vector + 1]];

    /// <summary>Takes all vectors away.</summary>
    public void Clear()
    {
        _start.Clear();
        _start.Add(0);
        _unknowns.Clear();
        _values.Clear();
    }

    /// <summary>Adds a vector and returns its number.</summary>
    public int Add(ReadOnlySpan<int> unknowns, ReadOnlySpan<double> values)
    {
        _unknowns.AddRange(unknowns);
        _values.AddRange(values);
        _start.Add(_unknowns.Count);
        return Count - 1;
    }

    /// <summary>Adds a vector with a value for each unknown, zeros left out, and returns its number.</summary>
    public int Add(ReadOnlySpan<double> values)
    {
        for (int i = 0; i < values.Length; i++)
            if (values[i] != 0)
            {
                _unknowns.Add(i);
                _values.Add(values[i]);
            }
        _start.Add(_unknowns.Count);
        return Count - 1;
    }

    /// <summary>Carries all vectors forward and makes the products V'ᵀ D⁻¹ V' over the unknowns outside the root.</summary>
    public void Forward()
    {
        int bundles = (Count + Lanes - 1) / Lanes;
        while (_bundles.Count < bundles)
            _bundles.Add(new Bundle(_plan.RootUnknownCount));
        for (int b = 0; b < bundles; b++)
            Carry(b, _bundles[b]);
        int padded = bundles * Lanes;
        if (_products.Length < padded * padded)
            _products = new double[padded * padded];
        for (int a = 0; a < bundles; a++)
            for (int b = 0; b <= a; b++)
                Multiply(_bundles[a], a, _bundles[b], b, padded);
    }

    /// <summary>Entry of V'ᵀ D⁻¹ V' over the unknowns outside the root.</summary>
    public double Product(int a, int b)
    {
        int padded = (Count + Lanes - 1) / Lanes * Lanes;
        return a >= b ? _products[a * padded + b] : _products[b * padded + a];
    }

    /// <summary>What arrives of a vector at a root unknown.</summary>
    public double AtRoot(int vector, int root) => _bundles[vector / Lanes].Root[Lanes * root + vector % Lanes];

    /// <summary>result[k] = V'_kᵀ D⁻¹ x over the unknowns outside the root, x by place.</summary>
    public void Dot(double* x, Span<double> result)
    {
        Span<double> sum = stackalloc double[Lanes];
        for (int b = 0; b * Lanes < Count; b++)
        {
            Bundle bundle = _bundles[b];
            sum.Clear();
            int at = 0;
            for (int f = 0; f < bundle.FrontCount; f++)
                for (int i = _plan.First[bundle.Fronts[f]]; i < _plan.First[bundle.Fronts[f] + 1]; i++, at += Lanes)
                {
                    double value = x[i] * _store.Inverse[i];
                    for (int lane = 0; lane < Lanes; lane++)
                        sum[lane] += bundle.Values[at + lane] * value;
                }
            for (int lane = 0; lane < Lanes && b * Lanes + lane < Count; lane++)
                result[b * Lanes + lane] = sum[lane];
        }
    }

    /// <summary>x -= Σ V'_k share[k] over the unknowns outside the root, x by place.</summary>
    public void Subtract(double* x, ReadOnlySpan<double> share)
    {
        Span<double> shares = stackalloc double[Lanes];
        for (int b = 0; b * Lanes < Count; b++)
        {
            Bundle bundle = _bundles[b];
            for (int lane = 0; lane < Lanes; lane++)
                shares[lane] = b * Lanes + lane < Count ? share[b * Lanes + lane] : 0;
            int at = 0;
            for (int f = 0; f < bundle.FrontCount; f++)
                for (int i = _plan.First[bundle.Fronts[f]]; i < _plan.First[bundle.Fronts[f] + 1]; i++, at += Lanes)
                {
                    double sum = 0;
                    for (int lane = 0; lane < Lanes; lane++)
                        sum += bundle.Values[at + lane] * shares[lane];
                    x[i] -= sum;
                }
        }
    }

    private void Carry(int number, Bundle bundle)
    {
        int from = number * Lanes, end = Math.Min(Count, from + Lanes), interior = _plan.InteriorUnknownCount;
        Array.Clear(_isMarked);
        _plan.MarkPath(System.Runtime.InteropServices.CollectionsMarshal.AsSpan(_unknowns)[_start[from].._start[end]], _isMarked);
        bundle.Mark(_plan, _isMarked);
        double* work = _work.Start;
        for (int f = 0; f < bundle.FrontCount; f++)
            new Span<double>(work + (nint)Lanes * _plan.First[bundle.Fronts[f]], Lanes * _plan.Columns(bundle.Fronts[f])).Clear();
        new Span<double>(work + (nint)Lanes * interior, Lanes * _plan.RootUnknownCount).Clear();
        for (int vector = from; vector < end; vector++)
        {
            ReadOnlySpan<int> unknowns = Unknowns(vector);
            ReadOnlySpan<double> values = Values(vector);
            for (int i = 0; i < unknowns.Length; i++)
                work[(nint)Lanes * _plan.NewOf[unknowns[i]] + vector - from] += values[i];
        }
        _solver.Forward(work, bundle.Fronts.AsSpan(0, bundle.FrontCount), 0);
        int at = 0;
        for (int f = 0; f < bundle.FrontCount; f++)
        {
            int length = Lanes * _plan.Columns(bundle.Fronts[f]);
            new ReadOnlySpan<double>(work + (nint)Lanes * _plan.First[bundle.Fronts[f]], length).CopyTo(bundle.Values.AsSpan(at, length));
            at += length;
        }
        new ReadOnlySpan<double>(work + (nint)Lanes * interior, Lanes * _plan.RootUnknownCount).CopyTo(bundle.Root);
    }

    private void Multiply(Bundle left, int a, Bundle right, int b, int padded)
    {
        double* sum = stackalloc double[Lanes * Lanes];
        new Span<double>(sum, Lanes * Lanes).Clear();
        int i = 0, j = 0, atLeft = 0, atRight = 0;
        fixed (double* leftValues = left.Values, rightValues = right.Values)
            while (i < left.FrontCount && j < right.FrontCount)
            {
                int front = left.Fronts[i], other = right.Fronts[j];
                if (front == other)
                    Accumulate(front, leftValues + atLeft, rightValues + atRight, sum);
                if (front <= other)
                {
                    atLeft += Lanes * _plan.Columns(front);
                    i++;
                }
                if (other <= front)
                {
                    atRight += Lanes * _plan.Columns(other);
                    j++;
                }
            }
        for (int k = 0; k < Lanes; k++)
            for (int l = 0; l < Lanes; l++)
                _products[(Lanes * a + k) * padded + Lanes * b + l] = -sum[Lanes * k + l];
    }

    /// <summary>sum[k, l] -= Σ left[i, k] · right[i, l] / pivot[i].</summary>
    private void Accumulate(int front, double* left, double* right, double* sum)
    {
        int columns = _plan.Columns(front);
        double* inverse = _store.Inverse + _plan.First[front];
        for (int k = 0; k < Lanes; k++)
            for (int i = 0; i < columns; i++)
                _packed.Start[k * columns + i] = left[Lanes * i + k] * inverse[i];
        DenseKernels.SubtractLaneDots(sum, _packed.Start, columns, right, Lanes, columns);
    }

    /// <summary>Eight vectors along one path.</summary>
    private sealed class Bundle(int rootCount)
    {
        public int[] Fronts { get; private set; } = [];

        public int FrontCount { get; private set; }

        public double[] Values { get; private set; } = [];

        public double[] Root { get; } = new double[Lanes * rootCount];

        public void Mark(SparsePlan plan, ReadOnlySpan<bool> isMarked)
        {
            int fronts = isMarked.Count(true), length = 0;
            if (Fronts.Length < fronts)
                Fronts = new int[fronts];
            FrontCount = 0;
            for (int front = 0; front < isMarked.Length; front++)
            {
                if (!isMarked[front])
                    continue;
                Fronts[FrontCount++] = front;
                length += Lanes * plan.Columns(front);
            }
            if (Values.Length < length)
                Values = new double[length];
        }
    }
}
