using InterfaceFE.Benchmarks.Models;
using InterfaceFE.Benchmarks.Timing;
using InterfaceFE.Sparse;

namespace InterfaceFE.Benchmarks.Engine;

/// <summary>The engine on one model. The only file that touches the engine: what the benchmark needs of its inside is asked for here.</summary>
public sealed class EngineUnderTest
{
    private readonly BenchmarkModel _model;
    private readonly WorkingFactor _factor;

    /// <summary>Analyses a model and factors it once.</summary>
    /// <exception cref="InvalidOperationException">The factorisation met a zero pivot or a number that is not finite.</exception>
    public EngineUnderTest(BenchmarkModel model)
    {
        ArgumentNullException.ThrowIfNull(model);
        _model = model;
        double start = ThreadClock.Milliseconds();
        Plan = SparsePlan.Analyze(model.Pattern);
        AnalysisMs = ThreadClock.Milliseconds() - start;
        _factor = new WorkingFactor(Plan);
        for (int slot = 0; slot < model.Matrices.Length; slot++)
            _factor.Replace(slot, model.Matrices[slot]);
        if (_factor.Factor().Status != FactorStatus.Done)
            throw new InvalidOperationException($"{model.Mesh.Name}: the engine met a pivot that is zero or not finite");
    }

    /// <summary>The plan.</summary>
    public SparsePlan Plan { get; }

    /// <summary>Time of the analysis [ms].</summary>
    public double AnalysisMs { get; }

    /// <summary>Width of the kernels' vectors [bits].</summary>
    public static int KernelWidth => DenseKernels.WidthBits;

    /// <summary>Arithmetic of the last factorisation [flop].</summary>
    public double LastFlops => _factor.LastFlops;

    /// <summary>Negative eigenvalues with the grips held.</summary>
    public int Negatives => _factor.Inertia(_model.Held).Negative;

    /// <summary>Whether the last solve was refined.</summary>
    public bool WasRefined => _factor.RefinementSteps > 0;

    /// <summary>Threads of a factorisation.</summary>
    public int Threads
    {
        get => _factor.Threads;
        set => _factor.Threads = value;
    }

    /// <summary>
    /// Bytes that a whole factorisation must move at least once: element matrices read, factor written, contribution blocks written and read; padding and index lists left out.
    /// </summary>
    public double FactorBytes
    {
        get
        {
            double contributions = 0;
            for (int front = 0; front < Plan.FrontCount; front++)
                contributions += 0.5 * Plan.RowCount(front) * (Plan.RowCount(front) + 1);
            return sizeof(double) * (Plan.Slots.ValueCount + Plan.FactorNonZeros + 2 * contributions);
        }
    }

    /// <summary>Bytes that a factorisation along a path must move at least once.</summary>
    public double PathBytes(FrontPath path)
    {
        ArgumentNullException.ThrowIfNull(path);
        double numbers = 0;
        foreach (int front in path.Fronts)
        {
            double columns = Plan.Columns(front), rows = Plan.RowCount(front);
            numbers += 0.5 * columns * (columns + 1) + columns * rows + 0.5 * rows * (rows + 1);
            for (int c = Plan.ChildStart[front]; c < Plan.ChildStart[front + 1]; c++)
                numbers += 0.5 * Plan.RowCount(Plan.Children[c]) * (Plan.RowCount(Plan.Children[c]) + 1);
        }
        return sizeof(double) * numbers;
    }

    /// <summary>Rows of an assembled matrix in the engine's order of elimination.</summary>
    public static int[] OrderOf(SparsePlan plan, AssembledMatrix matrix)
    {
        ArgumentNullException.ThrowIfNull(plan);
        ArgumentNullException.ThrowIfNull(matrix);
        int[] rows = [.. Enumerable.Range(0, matrix.Size)];
        Array.Sort([.. matrix.Unknowns.Select(unknown => plan.NewOf[unknown])], rows);
        return rows;
    }

    /// <summary>Factors everything anew.</summary>
    public void FactorWhole()
    {
        _factor.ForgetFactor();
        _factor.Factor();
    }

    /// <summary>Replaces matrices; the next <see cref="FactorChanges"/> takes them in.</summary>
    public void Replace(int[] slots, double[][] matrices)
    {
        for (int i = 0; i < slots.Length; i++)
            _factor.Replace(slots[i], matrices[i]);
    }

    /// <summary>Puts the model's own matrices back.</summary>
    public void Restore(int[] slots)
    {
        foreach (int slot in slots)
            _factor.Replace(slot, _model.Matrices[slot]);
        _factor.Factor();
    }

    /// <summary>Factors along the paths of replaced slots.</summary>
    public void FactorChanges() => _factor.Factor();

    /// <summary>Solves for all unknowns, grips held at zero.</summary>
    public void Solve(double[] b, double[] x) => _factor.Solve(b, x, _model.Held);

    /// <summary>Solves for the unknowns on a path, grips held at zero.</summary>
    public void Solve(double[] b, double[] x, FrontPath path) => _factor.Solve(b, x, _model.Held, path);

    /// <summary>Arithmetic of the innermost loop with all its numbers in cache [flop/ms]: what the kernels can do at best.</summary>
    public static unsafe double PeakFlopsPerMillisecond()
    {
        const int rows = 96, depth = 96, columns = 8, repeats = 2000, batches = 15;
        using NumberBlock a = new(rows * depth), packed = new(columns * depth), c = new(rows * columns);
        double best = 0;
        for (int batch = 0; batch < batches; batch++)
        {
            double start = ThreadClock.Milliseconds();
            for (int i = 0; i < repeats; i++)
                DenseKernels.SubtractProduct(a.Start, rows, packed.Start, depth, c.Start, rows, rows, columns);
            double time = ThreadClock.Milliseconds() - start;
            if (time > 0)
                best = Math.Max(best, 2.0 * rows * depth * columns * repeats / time);
        }
        return best;
    }

    private sealed unsafe class NumberBlock : IDisposable
    {
        public NumberBlock(int count)
        {
            Start = (double*)System.Runtime.InteropServices.NativeMemory.AlignedAlloc((nuint)count * sizeof(double), 64);
            new Span<double>(Start, count).Fill(1e-3);
        }

        public double* Start { get; }

        public void Dispose() => System.Runtime.InteropServices.NativeMemory.AlignedFree(Start);
    }
}
