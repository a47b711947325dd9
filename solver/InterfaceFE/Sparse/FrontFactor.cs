using System.Runtime.CompilerServices;

namespace InterfaceFE.Sparse;

/// <summary>
/// Numbers of the factor, front after front (multifrontal method: I. S. Duff and J. K. Reid, ACM Trans. Math. Softw. 9 (1983) 302). A general matrix is K = L D U with unit
/// triangles; its two halves, L and the transpose of U, are treated alike, and for a symmetric matrix they are one. Each front has a panel (pivot columns, all rows) and a
/// contribution block that is added to the parent. Pivots are taken in order, without permutation.
/// </summary>
internal sealed unsafe class FrontFactor
{
    private const int Block = SparsePlan.Padding;

    private readonly SparsePlan _plan;
    private readonly SlotValues _values;
    private readonly int _halves;
    private readonly AlignedBuffer[] _panels;
    private readonly AlignedBuffer[] _contributions;
    private readonly AlignedBuffer _diagonal;
    private readonly AlignedBuffer _inverse;
    private readonly AlignedBuffer _packed;
    private readonly AlignedBuffer _tail;
    private readonly AlignedBuffer _local;
    private readonly AlignedBuffer _sizes;
    private readonly double[] _scale;
    private readonly double[] _softScale;
    private readonly double[] _size;
    private readonly ProbeVectors _probes;

    /// <summary>Makes room for the factor.</summary>
    public FrontFactor(SparsePlan plan, SlotValues values, bool isSymmetric)
    {
        _plan = plan;
        _values = values;
        _halves = isSymmetric ? 1 : 2;
        _panels = new AlignedBuffer[_halves];
        _contributions = new AlignedBuffer[_halves];
        for (int half = 0; half < _halves; half++)
        {
            _panels[half] = new AlignedBuffer(plan.PanelStart[^1]);
            _contributions[half] = new AlignedBuffer(plan.ContributionLength);
        }
        int longest = 0, widest = 0;
        for (int front = 0; front <= plan.FrontCount; front++)
        {
            longest = Math.Max(longest, plan.PaddedColumns(front) + plan.PaddedRows(front));
            widest = Math.Max(widest, plan.PaddedColumns(front));
        }
        _diagonal = new AlignedBuffer(plan.UnknownCount);
        _inverse = new AlignedBuffer(plan.UnknownCount + Block);
        _packed = new AlignedBuffer((long)Block * widest);
        _tail = new AlignedBuffer((long)Block * longest);
        _local = new AlignedBuffer(longest);
        _sizes = new AlignedBuffer(longest);
        _scale = new double[plan.UnknownCount];
        _softScale = new double[plan.UnknownCount];
        _size = new double[plan.UnknownCount];
        _probes = new ProbeVectors(plan.UnknownCount);
    }

    /// <summary>Verdicts on the pivots of the last run.</summary>
    public PivotJudge Judge { get; } = new();

    /// <summary>Largest sum of magnitudes that went into a pivot, over the scale of its unknown; about 2 for a definite matrix.</summary>
    public double Growth { get; private set; }

    /// <summary>Column length of the root block.</summary>
    public int RootStride => _plan.PaddedColumns(_plan.FrontCount);

    /// <summary>Lower triangle of the root's Schur complement (half 0), or the transposed upper one (half 1), column-major.</summary>
    public double* Root(int half) => _panels[half].Start + _plan.PanelStart[_plan.FrontCount];

    /// <summary>Scale of an unknown by place; never zero.</summary>
    public double Scale(int place) => _scale[place];

    /// <summary>Factors with the slots' present numbers. Stops early at the first pivot that is not finite.</summary>
    public void Run()
    {
        Judge.Reset();
        Growth = 0;
        _values.SumScales(_scale, _softScale);
        _scale.CopyTo(_size, 0);
        for (int front = 0; front < _plan.FrontCount && Judge.FirstNotFinite < 0; front++)
        {
            Assemble(front);
            Eliminate(front);
        }
        if (Judge.FirstNotFinite < 0)
            Assemble(_plan.FrontCount);
    }

    private double* Panel(int half, int front) => _panels[half].Start + _plan.PanelStart[front];

    private double* Contribution(int half, int front) => _contributions[half].Start + _plan.ContributionStart[front];

    private void Assemble(int front)
    {
        int columns = _plan.Columns(front), padded = _plan.PaddedColumns(front), rows = _plan.PaddedRows(front), stride = padded + rows;
        for (int half = 0; half < _halves; half++)
        {
            double* panel = Panel(half, front), block = Contribution(half, front);
            Unsafe.InitBlock(panel, 0, checked((uint)((long)stride * columns * sizeof(double))));
            for (int j = 0; j < rows; j++)
            {
                int from = j / Block * Block;
                Unsafe.InitBlock(block + (long)j * rows + from, 0, (uint)((rows - from) * sizeof(double)));
            }
            AddSlots(front, half, panel, block, padded, stride, rows);
            for (int c = _plan.ChildStart[front]; c < _plan.ChildStart[front + 1]; c++)
                AddChild(_plan.Children[c], half, panel, block, padded, stride, rows);
        }
    }

    private void AddSlots(int front, int half, double* panel, double* block, int padded, int stride, int rows)
    {
        SlotMap map = _plan.Slots;
        int[] slotStart = _plan.Pattern.SlotStart;
        fixed (int* locals = map.Local)
            for (int s = map.FrontStart[front]; s < map.FrontStart[front + 1]; s++)
            {
                int slot = map.OfFront[s], count = slotStart[slot + 1] - slotStart[slot];
                double* value = _values.Triangle(half) + map.ValueStart[slot];
                int* local = locals + slotStart[slot];
                for (int c = 0; c < count; c++)
                {
                    double* column = Column(local[c], panel, block, padded, stride, rows);
                    for (int r = c; r < count; r++)
                        column[local[r]] += *value++;
                }
            }
    }

    private void AddChild(int child, int half, double* panel, double* block, int padded, int stride, int rows)
    {
        RunMap runs = _plan.Runs;
        double* from = Contribution(half, child);
        nint childRows = _plan.PaddedRows(child);
        int end = runs.End[child];
        fixed (int* source = runs.Source, target = runs.Target, length = runs.Length)
            for (int a = runs.Begin[child]; a < end; a++)
                for (int j = 0; j < length[a]; j++)
                {
                    double* column = Column(target[a] + j, panel, block, padded, stride, rows), childColumn = from + (source[a] + j) * childRows;
                    DenseKernels.Add(column + target[a] + j, childColumn + source[a] + j, length[a] - j);
                    for (int b = a + 1; b < end; b++)
                        DenseKernels.Add(column + target[b], childColumn + source[b], length[b]);
                }
    }

    /// <summary>Start of a column so that a local row number can be added to it, whether it lies in the panel or in the contribution block.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static double* Column(int local, double* panel, double* block, int padded, int stride, int rows) =>
        local < padded ? panel + (nint)local * stride : block + (nint)(local - padded) * rows - padded;

    private void Eliminate(int front)
    {
        int columns = _plan.Columns(front), padded = _plan.PaddedColumns(front), rows = _plan.PaddedRows(front), stride = padded + rows, first = _plan.First[front];
        double* size = _sizes.Start, inverse = _inverse.Start + first, diagonal = _diagonal.Start + first;
        LoadSizes(front, size, padded, rows);
        double* weight = stackalloc double[Block];
        for (int k = 0; k < columns; k += Block)
        {
            int width = Math.Min(Block, columns - k);
            for (int half = 0; half < _halves && k > 0; half++)
                UpdateColumns(Panel(half, front), Panel(_halves - 1 - half, front), stride, k, width, diagonal);
            double* p = Panel(0, front) + (nint)k * stride + k, q = Panel(_halves - 1, front) + (nint)k * stride + k;
            EliminateBlock(front, p, q, stride, k, width, size + k, weight);
            if (Judge.FirstNotFinite >= 0)
                return;
            nint below = stride - k - Block;
            DenseKernels.SolveTriangle(p + Block, stride, below, q, stride, inverse + k, width);
            if (_halves == 2)
                DenseKernels.SolveTriangle(q + Block, stride, below, p, stride, inverse + k, width);
            DenseKernels.AddAbsoluteProducts(size + k + Block, p + Block, q + Block, stride, weight, width, below);
        }
        for (int half = 0; half < _halves; half++)
        {
            double* mine = Panel(half, front) + padded, other = Panel(_halves - 1 - half, front) + padded, block = Contribution(half, front);
            for (int j = 0; j < rows; j += Block)
            {
                DenseKernels.Pack(other + j, stride, diagonal, columns, _packed.Start);
                DenseKernels.SubtractProduct(mine + j, stride, _packed.Start, columns, block + (nint)j * rows + j, rows, rows - j);
            }
        }
        StoreSizes(front, size, padded);
    }

    private void LoadSizes(int front, double* size, int padded, int rows)
    {
        int columns = _plan.Columns(front), first = _plan.First[front];
        for (int j = 0; j < columns; j++)
            size[j] = _size[first + j];
        for (int i = columns; i < padded + rows; i++)
            size[i] = 0;
    }

    private void StoreSizes(int front, double* size, int padded)
    {
        int start = _plan.RowStart[front], count = _plan.RowCount(front);
        for (int i = 0; i < count; i++)
            _size[_plan.Rows[start + i]] += size[padded + i];
    }

    /// <summary>Brings the columns k to k + width of one half up to date with the columns before them.</summary>
    private void UpdateColumns(double* mine, double* other, nint stride, int k, int width, double* diagonal)
    {
        DenseKernels.Pack(other + k, stride, diagonal, k, _packed.Start);
        double* target = mine + k * stride + k;
        nint length = stride - k;
        if (width == Block)
        {
            DenseKernels.SubtractProduct(mine + k, stride, _packed.Start, k, target, stride, length);
            return;
        }
        // The kernel writes whole blocks of columns: the last few are worked on aside.
        for (int j = 0; j < Block; j++)
        {
            Span<double> aside = new(_tail.Start + j * length, (int)length);
            if (j < width)
                new ReadOnlySpan<double>(target + j * stride, (int)length).CopyTo(aside);
            else
                aside.Clear();
        }
        DenseKernels.SubtractProduct(mine + k, stride, _packed.Start, k, _tail.Start, length, length);
        for (int j = 0; j < width; j++)
            new ReadOnlySpan<double>(_tail.Start + j * length, (int)length).CopyTo(new Span<double>(target + j * stride, (int)length));
    }

    /// <summary>Takes the pivots of a diagonal block one after the other and updates the rest of the block.</summary>
    private void EliminateBlock(int front, double* p, double* q, nint stride, int k0, int width, double* size, double* weight)
    {
        int first = _plan.First[front] + k0;
        for (int k = 0; k < width; k++)
        {
            int place = first + k;
            double computed = p[k * stride + k], scale = _scale[place], soft = _softScale[place];
            double growth = 0, noise = 0;
            if (PivotJudge.IsSmall(computed, soft))
            {
                growth = ColumnGrowth(front, p, q, stride, k0, k, width, computed);
                noise = PivotNoise(front, k0 + k, size - k0);
            }
            double pivot = Judge.Take(place, computed, scale, soft, noise, growth), inverse = 1 / pivot;
            _diagonal.Start[place] = pivot;
            _inverse.Start[place] = inverse;
            Growth = Math.Max(Growth, size[k] / scale);
            weight[k] = Math.Abs(pivot);
            for (int j = k + 1; j < width; j++)
            {
                double above = q[k * stride + j] * inverse;
                for (int i = j; i < width; i++)
                    p[j * stride + i] -= p[k * stride + i] * above;
                if (_halves == 1)
                    continue;
                double left = p[k * stride + j] * inverse;
                for (int i = j; i < width; i++)
                    q[j * stride + i] -= q[k * stride + i] * left;
            }
            for (int i = k + 1; i < width; i++)
            {
                p[k * stride + i] *= inverse;
                if (_halves == 2)
                    q[k * stride + i] *= inverse;
                size[i] += Math.Abs(p[k * stride + i] * q[k * stride + i]) * weight[k];
            }
        }
    }

    /// <summary>
    /// Largest |l u / d| over scale that column k of a block would bring to the diagonals below. For small pivots only, hence plain: the rows below the block have not yet
    /// seen the block's earlier columns, so that update is done here for each row alone.
    /// </summary>
    private double ColumnGrowth(int front, double* p, double* q, nint stride, int k0, int k, int width, double pivot)
    {
        int columns = _plan.Columns(front), padded = _plan.PaddedColumns(front), first = _plan.First[front], rows = _plan.RowCount(front);
        double largest = 0;
        for (int i = k0 + k + 1; i < padded + rows; i++)
        {
            if (i >= columns && i < padded)
                continue;
            bool isInBlock = i < k0 + width;
            double low = isInBlock ? p[k * stride + i - k0] : Updated(p, q, stride, k, i - k0);
            double high = _halves == 1 ? low : isInBlock ? q[k * stride + i - k0] : Updated(q, p, stride, k, i - k0);
            int place = i < columns ? first + i : _plan.Rows[_plan.RowStart[front] + i - padded];
            largest = Math.Max(largest, Math.Abs(low * high / pivot) / Scale(place));
        }
        return largest;

        static double Updated(double* mine, double* other, nint length, int column, int row)
        {
            double* done = stackalloc double[Block];
            for (int c = 0; c <= column; c++)
            {
                done[c] = mine[c * length + row];
                for (int j = 0; j < c; j++)
                    done[c] -= done[j] * other[j * length + c];
            }
            return done[column];
        }
    }

    /// <summary>Forward substitution through all fronts; x by place. Root places then have the right side of the Schur complement.</summary>
    public void Forward(double* x)
    {
        double* local = _local.Start;
        for (int front = 0; front < _plan.FrontCount; front++)
        {
            int columns = _plan.Columns(front), padded = _plan.PaddedColumns(front), stride = padded + _plan.PaddedRows(front), start = _plan.RowStart[front], rows = _plan.RowCount(front);
            double* panel = Panel(0, front), own = x + _plan.First[front];
            for (int j = 0; j < stride; j++)
                local[j] = j < columns ? own[j] : 0;
            for (int k = 0; k < columns; k += Block)
            {
                int width = Math.Min(Block, columns - k);
                double* block = panel + (nint)k * stride + k, y = local + k;
                for (int c = 0; c < width; c++)
                    for (int i = c + 1; i < width; i++)
                        y[i] -= block[(nint)c * stride + i] * y[c];
                DenseKernels.SubtractColumns(y + Block, block + Block, stride, y, width, stride - k - Block);
            }
            for (int j = 0; j < columns; j++)
                own[j] = local[j];
            fixed (int* row = _plan.Rows)
                for (int i = 0; i < rows; i++)
                    x[row[start + i]] += local[padded + i];
        }
    }

    /// <summary>Division by the pivots and backward substitution through all fronts; root places must have their solution.</summary>
    public void Backward(double* x)
    {
        double* inverse = _inverse.Start;
        for (int i = 0; i < _plan.InteriorUnknownCount; i++)
            x[i] *= inverse[i];
        for (int front = _plan.FrontCount - 1; front >= 0; front--)
            BackwardFront(front, _halves - 1, x);
    }

    private void BackwardFront(int front, int half, double* x)
    {
        double* local = _local.Start;
        int columns = _plan.Columns(front), padded = _plan.PaddedColumns(front), stride = padded + _plan.PaddedRows(front), start = _plan.RowStart[front], rows = _plan.RowCount(front);
        double* panel = Panel(half, front), own = x + _plan.First[front];
        for (int j = 0; j < padded; j++)
            local[j] = j < columns ? own[j] : 0;
        fixed (int* row = _plan.Rows)
            for (int i = 0; i < rows; i++)
                local[padded + i] = x[row[start + i]];
        for (int i = padded + rows; i < stride; i++)
            local[i] = 0;
        for (int k = (columns - 1) / Block * Block; k >= 0; k -= Block)
        {
            int width = Math.Min(Block, columns - k);
            double* block = panel + (nint)k * stride + k, y = local + k;
            DenseKernels.SubtractDots(y, block + Block, stride, y + Block, width, stride - k - Block);
            for (int c = width - 1; c >= 0; c--)
                for (int i = c + 1; i < width; i++)
                    y[c] -= block[(nint)c * stride + i] * y[i];
        }
        for (int j = 0; j < columns; j++)
            own[j] = local[j];
    }

    /// <summary>
    /// Round-off that a pivot may carry. With v the vector that the pivot is the energy of (1 at its unknown, 0 at later ones, in balance at earlier ones), an error e in the
    /// diagonal of unknown i shows as e v²; each diagonal's own error is a unit round-off of the magnitudes that went into it, and errors of many unknowns add as squares.
    /// First-order analysis of the factor's backward error, derived here.
    /// </summary>
    private double PivotNoise(int front, int column, double* size)
    {
        int first = _plan.First[front], from = _plan.FirstDescendant[front], start = _plan.First[from], end = first + column + 1;
        for (int half = 0; half < _halves; half++)
        {
            double* v = _probes.Start(half), panel = Panel(half, front);
            nint stride = _plan.PaddedColumns(front) + _plan.PaddedRows(front);
            v[first + column] = 1;
            for (int c = column - 1; c >= 0; c--)
                for (int i = c + 1; i <= column; i++)
                    v[first + c] -= panel[c * stride + i] * v[first + i];
            for (int descendant = front - 1; descendant >= from; descendant--)
                BackwardFront(descendant, half, v);
        }
        double sum = 0;
        for (int i = start; i < end; i++)
            sum += Square(_probes.Start(0)[i] * _probes.Start(_halves - 1)[i] * (i < first ? _size[i] : size[i - first]));
        _probes.Clear(start, end);
        return PivotJudge.RoundOff * Math.Sqrt(sum);
    }

    /// <summary>The same for a pivot of the root block: <paramref name="left"/> and <paramref name="right"/> give its vectors at the root unknowns.</summary>
    public double RootNoise(ReadOnlySpan<double> left, ReadOnlySpan<double> right)
    {
        int interior = _plan.InteriorUnknownCount;
        left.CopyTo(new Span<double>(_probes.Start(0) + interior, left.Length));
        right.CopyTo(new Span<double>(_probes.Start(1) + interior, right.Length));
        for (int half = 0; half < _halves; half++)
            for (int front = _plan.FrontCount - 1; front >= 0; front--)
                BackwardFront(front, half, _probes.Start(half));
        double sum = 0;
        for (int i = 0; i < _plan.UnknownCount; i++)
            sum += Square(_probes.Start(0)[i] * _probes.Start(_halves - 1)[i] * _size[i]);
        _probes.Clear(0, _plan.UnknownCount);
        return PivotJudge.RoundOff * Math.Sqrt(sum);
    }

    private static double Square(double value) => value * value;

    /// <summary>Two vectors that are zero between uses, by place.</summary>
    private sealed class ProbeVectors(int count)
    {
        private readonly AlignedBuffer _left = new(count);
        private readonly AlignedBuffer _right = new(count);

        public double* Start(int half) => half == 0 ? _left.Start : _right.Start;

        public void Clear(int start, int end)
        {
            new Span<double>(_left.Start + start, end - start).Clear();
            new Span<double>(_right.Start + start, end - start).Clear();
        }
    }
}
