using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace InterfaceFE.Sparse;

/// <summary>
/// Works on one front at a time (multifrontal method: I. S. Duff and J. K. Reid, ACM Trans. Math. Softw. 9 (1983) 302): sums slots and children's contribution blocks in index
/// order, takes the pivots in order without permutation, and leaves the front's own contribution block. One for each thread.
/// </summary>
internal sealed unsafe class FrontWorker
{
    private const int Block = SparsePlan.Padding;
    private const int SmallBlock = 48;

    private readonly SparsePlan _plan;
    private readonly SlotValues _values;
    private readonly UnknownScales _scales;
    private readonly FrontStore _store;
    private readonly SubtreeInfluence _influence;
    private readonly PivotLook _look;
    private readonly AlignedBuffer[] _arenas;
    private readonly AlignedBuffer _packed;
    private readonly AlignedBuffer _sizes;
    private PivotTally _tally;
    private int _notFinite;

    /// <summary>Makes room for one front.</summary>
    public FrontWorker(SparsePlan plan, SlotValues values, FrontStore store, SubtreeInfluence influence)
    {
        _plan = plan;
        _values = values;
        _scales = values.Scales;
        _store = store;
        _influence = influence;
        _look = new PivotLook(plan, store, influence);
        _arenas = new AlignedBuffer[store.Halves];
        for (int half = 0; half < store.Halves; half++)
            _arenas[half] = new AlignedBuffer(plan.Contributions.ArenaLength);
        int widest = 0;
        for (int front = 0; front <= plan.FrontCount; front++)
            widest = Math.Max(widest, plan.PaddedColumns(front));
        _packed = new AlignedBuffer((long)Block * widest);
        _sizes = new AlignedBuffer(plan.LongestPanel);
    }

    /// <summary>Sums and eliminates a front. Returns the place of a pivot that is not finite, -1 when all are.</summary>
    public int Process(int front)
    {
        _influence.Spoil(front);
        Assemble(front, _sizes.Start);
        _tally = PivotTally.Empty;
        _notFinite = -1;
        _store.HasLooked[front] = false;
        Eliminate(front, _sizes.Start);
        for (int c = _plan.ChildStart[front]; c < _plan.ChildStart[front + 1]; c++)
            _tally.Join(_store.Tallies[_plan.Children[c]]);
        _store.Tallies[front] = _tally;
        return _notFinite;
    }

    /// <summary>Sums the root's dense block.</summary>
    public void AssembleRoot()
    {
        double* size = _sizes.Start;
        Assemble(_plan.FrontCount, size);
        int count = _plan.RootUnknownCount;
        new ReadOnlySpan<double>(size, count).CopyTo(new Span<double>(_store.Sizes + _plan.InteriorUnknownCount, count));
    }

    private double* Contribution(int half, int front)
    {
        double* kept = _store.Block(half, front);
        return kept != null ? kept : _arenas[half].Start + _plan.Contributions.Place[front];
    }

    private void Assemble(int front, double* size)
    {
        int columns = _plan.Columns(front), padded = _plan.PaddedColumns(front), rows = _plan.PaddedRows(front), stride = padded + rows;
        for (int half = 0; half < _store.Halves; half++)
        {
            double* panel = _store.Panel(half, front), block = rows > 0 ? Contribution(half, front) : null;
            Unsafe.InitBlock(panel, 0, checked((uint)((long)stride * columns * sizeof(double))));
            ClearLower(block, rows);
            AddSlots(front, half, panel, block, padded, stride, rows);
            for (int c = _plan.ChildStart[front]; c < _plan.ChildStart[front + 1]; c++)
                AddChild(_plan.Children[c], half, panel, block, padded, stride, rows);
        }
        AddSizes(front, size, columns, stride);
    }

    /// <summary>Zeroes a contribution block, above the diagonal only where that costs less than many small calls.</summary>
    private static void ClearLower(double* block, int rows)
    {
        if (rows <= SmallBlock)
        {
            Unsafe.InitBlock(block, 0, (uint)(rows * rows * sizeof(double)));
            return;
        }
        for (int j = 0; j < rows; j++)
        {
            int from = j / Block * Block;
            Unsafe.InitBlock(block + (long)j * rows + from, 0, (uint)((rows - from) * sizeof(double)));
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
                bool isPaired = map.IsPaired[slot];
                for (int c = 0; c < count; c++)
                {
                    double* column = Column(local[c], panel, block, padded, stride, rows);
                    if (!isPaired)
                        for (int r = c; r < count; r++)
                            column[local[r]] += *value++;
                    else
                        for (int r = c & ~1; r < count; r += 2, value += 2)
                            (Vector128.Load(column + local[r]) + Vector128.Load(value)).Store(column + local[r]);
                }
            }
    }

    private void AddChild(int child, int half, double* panel, double* block, int padded, int stride, int rows)
    {
        RunMap runs = _plan.Runs;
        int begin = runs.Begin[child], end = runs.End[child];
        if (begin == end)
            return;
        double* from = Contribution(half, child);
        nint childRows = _plan.PaddedRows(child);
        fixed (int* source = runs.Source, target = runs.Target, length = runs.Length)
            for (int a = begin; a < end; a++)
            {
                nint columnStride = target[a] < padded ? stride : rows;
                double* column = Column(target[a], panel, block, padded, stride, rows), childColumn = from + source[a] * childRows;
                for (int j = 0; j < length[a]; j++)
                    DenseKernels.Add(column + j * columnStride + target[a] + j, childColumn + j * childRows + source[a] + j, length[a] - j);
                for (int b = a + 1; b < end; b++)
                    DenseKernels.AddRectangle(column + target[b], columnStride, childColumn + source[b], childRows, length[b], length[a]);
            }
    }

    /// <summary>Start of a column so that a local row number can be added to it, whether it lies in the panel or in the contribution block.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static double* Column(int local, double* panel, double* block, int padded, int stride, int rows) =>
        local < padded ? panel + (nint)local * stride : block + (nint)(local - padded) * rows - padded;

    /// <summary>Sums of magnitudes: the scales of the pivots, and what the children add.</summary>
    private void AddSizes(int front, double* size, int columns, int stride)
    {
        int first = _plan.First[front];
        for (int j = 0; j < columns; j++)
            size[j] = _scales[first + j];
        for (int i = columns; i < stride; i++)
            size[i] = 0;
        RunMap runs = _plan.Runs;
        for (int c = _plan.ChildStart[front]; c < _plan.ChildStart[front + 1]; c++)
        {
            int child = _plan.Children[c];
            double* from = _store.RowSizes + _plan.RowStart[child];
            for (int a = runs.Begin[child]; a < runs.End[child]; a++)
                DenseKernels.Add(size + runs.Target[a], from + runs.Source[a], runs.Length[a]);
        }
    }

    private void Eliminate(int front, double* size)
    {
        int columns = _plan.Columns(front), padded = _plan.PaddedColumns(front), rows = _plan.PaddedRows(front), stride = padded + rows, first = _plan.First[front], halves = _store.Halves;
        double* inverse = _store.Inverse + first, diagonal = _store.Diagonal + first;
        double* weight = stackalloc double[Block];
        for (int k = 0; k < columns; k += Block)
        {
            int width = Math.Min(Block, columns - k);
            for (int half = 0; half < halves && k > 0; half++)
                UpdateColumns(_store.Panel(half, front), _store.Panel(halves - 1 - half, front), stride, k, width, diagonal);
            double* p = _store.Panel(0, front) + (nint)k * stride + k, q = _store.Panel(halves - 1, front) + (nint)k * stride + k;
            EliminateBlock(front, p, q, stride, k, width, size, weight);
            if (_notFinite >= 0)
                return;
            nint below = stride - k - Block;
            DenseKernels.SolveTriangle(p + Block, stride, below, q, stride, inverse + k, width);
            if (halves == 2)
                DenseKernels.SolveTriangle(q + Block, stride, below, p, stride, inverse + k, width);
            DenseKernels.AddAbsoluteProducts(size + k + Block, p + Block, q + Block, stride, weight, width, below);
        }
        for (int half = 0; half < halves && rows > 0; half++)
        {
            double* mine = _store.Panel(half, front) + padded, other = _store.Panel(halves - 1 - half, front) + padded, block = Contribution(half, front);
            for (int j = 0; j < rows; j += Block)
            {
                DenseKernels.Pack(other + j, stride, diagonal, columns, _packed.Start);
                DenseKernels.SubtractProduct(mine + j, stride, _packed.Start, columns, block + (nint)j * rows + j, rows, rows - j, Block);
            }
        }
        new ReadOnlySpan<double>(size, columns).CopyTo(new Span<double>(_store.Sizes + first, columns));
        int count = _plan.RowCount(front);
        new ReadOnlySpan<double>(size + padded, count).CopyTo(new Span<double>(_store.RowSizes + _plan.RowStart[front], count));
    }

    /// <summary>Brings the columns k to k + width of one half up to date with the columns before them.</summary>
    private void UpdateColumns(double* mine, double* other, nint stride, int k, int width, double* diagonal)
    {
        DenseKernels.Pack(other + k, stride, diagonal, k, _packed.Start);
        DenseKernels.SubtractProduct(mine + k, stride, _packed.Start, k, mine + k * stride + k, stride, stride - k, width);
    }

    /// <summary>Takes the pivots of a diagonal block one after the other and updates the rest of the block.</summary>
    private void EliminateBlock(int front, double* p, double* q, nint stride, int k0, int width, double* size, double* weight)
    {
        int first = _plan.First[front] + k0, halves = _store.Halves;
        double* own = size + k0;
        for (int k = 0; k < width; k++)
        {
            int place = first + k;
            double computed = p[k * stride + k], scale = _scales[place], soft = _scales.Soft(place);
            double growth = 0, noise = 0;
            if (!double.IsFinite(computed))
            {
                _notFinite = place;
                return;
            }
            if (PivotJudge.IsSmall(computed, soft))
            {
                growth = ColumnGrowth(front, p, q, stride, k0, k, width, computed);
                Mirror(p, stride, k + 1);
                if (halves == 2)
                    Mirror(q, stride, k + 1);
                noise = _look.Noise(front, k0 + k, size);
                _store.HasLooked[front] = true;
            }
            double pivot = PivotJudge.Take(ref _tally, place, computed, scale, soft, noise, growth), inverse = 1 / pivot;
            if (!double.IsFinite(pivot) || !double.IsFinite(inverse))
            {
                _notFinite = place;
                return;
            }
            _store.Diagonal[place] = pivot;
            _store.Inverse[place] = inverse;
            _tally.Growth = Math.Max(_tally.Growth, own[k] / scale);
            weight[k] = Math.Abs(pivot);
            // Whole columns of the block: what this does above the diagonal is overwritten in the end.
            for (int j = k + 1; j < width; j++)
            {
                double above = q[k * stride + j] * inverse, left = p[k * stride + j] * inverse;
                DenseKernels.SubtractScaled(p + j * stride, p + k * stride, above);
                if (halves == 2)
                    DenseKernels.SubtractScaled(q + j * stride, q + k * stride, left);
            }
            for (int i = k + 1; i < width; i++)
            {
                p[k * stride + i] *= inverse;
                if (halves == 2)
                    q[k * stride + i] *= inverse;
                own[i] += Math.Abs(p[k * stride + i] * q[k * stride + i]) * weight[k];
            }
        }
        Mirror(p, stride, width);
        if (halves == 2)
            Mirror(q, stride, width);
    }

    /// <summary>Copies the lower triangle of a block's first columns above the diagonal, where substitutions look for it.</summary>
    private static void Mirror(double* block, nint stride, int width)
    {
        for (int c = 0; c < width; c++)
            for (int i = c + 1; i < width; i++)
                block[i * stride + c] = block[c * stride + i];
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
            double high = _store.Halves == 1 ? low : isInBlock ? q[k * stride + i - k0] : Updated(q, p, stride, k, i - k0);
            int place = i < columns ? first + i : _plan.Rows[_plan.RowStart[front] + i - padded];
            // Two ratios: their product overflows only where the growth itself is beyond bounds.
            largest = Math.Max(largest, Math.Abs(low / _scales[place] * (high / pivot)));
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
}
