using InterfaceFE.Benchmarks.Models;
using InterfaceFE.Benchmarks.Timing;

namespace InterfaceFE.Benchmarks.Engine;

/// <summary>Measures the engine on one model, round by round, so that its runs can alternate with another solver's.</summary>
public sealed class EngineRun
{
    private static readonly int[] LayerCounts = [1, 10, 50, 100, 200];
    private static readonly double[] PatchWidths = [2.5, 5, 10, 20, 50];
    private static readonly double[] PatchMiddles = [0.55 * MeshCatalogue.StripLength, 0.65 * MeshCatalogue.StripLength];

    // A round gives each measurement about this long, so that small models get enough readings.
    private const double RoundMs = 60;

    private readonly BenchmarkModel _model;
    private readonly EngineUnderTest _engine;
    private readonly List<ChangeRun> _layers = [];
    private readonly List<ChangeRun> _patches = [];
    private readonly Samples _factor = new(), _solve = new(), _oneThread = new(), _twoThreads = new();
    private readonly double[] _b;
    private readonly double[] _x;
    private readonly int _wholeRepeats;
    private readonly bool _sameBits;
    private long _allocated;

    /// <summary>Analyses and factors the model, prepares the changes and makes unmeasured runs.</summary>
    /// <param name="model">The model.</param>
    /// <param name="isQuick">Whether to take few places.</param>
    /// <exception cref="InvalidOperationException">The engine met a pivot that is zero or not finite.</exception>
    public EngineRun(BenchmarkModel model, bool isQuick)
    {
        ArgumentNullException.ThrowIfNull(model);
        _model = model;
        _engine = new EngineUnderTest(model);
        _b = model.RightSide();
        _x = new double[_b.Length];
        bool isStrip = model.Mesh.Joints.Length == 1;
        foreach (int count in LayerCounts)
            _layers.Add(new ChangeRun(_engine, model, count, ElementChange.OfLayer(model, count, isQuick ? 5 : 9)));
        foreach (double width in isStrip ? PatchWidths : [])
            _patches.Add(new ChangeRun(_engine, model, width, [.. PatchMiddles.Select(middle => ElementChange.OfColumns(model, width, middle))]));
        double start = ThreadClock.Milliseconds();
        WholeRun(measured: false);
        _wholeRepeats = Math.Clamp((int)(RoundMs / (ThreadClock.Milliseconds() - start)), 1, 10);
        _sameBits = CompareThreads();
        foreach (ChangeRun run in _layers)
            run.Check();
        foreach (ChangeRun run in _patches)
            run.Check();
    }

    /// <summary>The engine.</summary>
    public EngineUnderTest Engine => _engine;

    /// <summary>Measures everything a few times.</summary>
    public void Round()
    {
        for (int i = 0; i < _wholeRepeats; i++)
            WholeRun(measured: true);
        for (int i = 0; i < _wholeRepeats; i++)
            foreach (int threads in (ReadOnlySpan<int>)[1, 2])
                (threads == 1 ? _oneThread : _twoThreads).Add(WallOf(threads));
        foreach (ChangeRun run in _layers)
            run.Round(repeats: 6);
        foreach (ChangeRun run in _patches)
            run.Round(repeats: 2);
    }

    /// <summary>Solution of the whole system, for a comparison.</summary>
    public double[] Solution()
    {
        var x = new double[_b.Length];
        _engine.FactorWhole();
        _engine.Solve(_b, x);
        return x;
    }

    /// <summary>The medians so far.</summary>
    public EngineTimes Times()
    {
        _engine.FactorWhole();
        double flops = _engine.LastFlops;
        _engine.Solve(_b, _x);
        return new EngineTimes(
            _model.Mesh.Name,
            _engine.Plan.UnknownCount,
            EngineUnderTest.KernelWidth,
            _engine.AnalysisMs,
            _factor.Median,
            _solve.Median,
            flops,
            _engine.FactorBytes,
            _engine.Plan.FactorNonZeros,
            _engine.Plan.LargestFront,
            _engine.Negatives,
            _engine.WasRefined,
            _allocated,
            [.. _layers.Select(run => run.Times())],
            [.. _patches.Select(run => run.Times())],
            new ThreadTimes(_oneThread.Median, _twoThreads.Median, _sameBits));
    }

    private void WholeRun(bool measured)
    {
        long allocated = GC.GetAllocatedBytesForCurrentThread();
        double start = ThreadClock.Milliseconds();
        _engine.FactorWhole();
        double factored = ThreadClock.Milliseconds();
        _engine.Solve(_b, _x);
        double solved = ThreadClock.Milliseconds();
        allocated = GC.GetAllocatedBytesForCurrentThread() - allocated;
        if (!measured)
            return;
        _allocated = Math.Max(_allocated, allocated);
        _factor.Add(factored - start);
        _solve.Add(solved - factored);
    }

    private double WallOf(int threads)
    {
        _engine.Threads = threads;
        double start = ThreadClock.WallMilliseconds();
        _engine.FactorWhole();
        double time = ThreadClock.WallMilliseconds() - start;
        _engine.Threads = 1;
        return time;
    }

    private bool CompareThreads()
    {
        double[] one = Solution();
        _engine.Threads = 2;
        double[] two = Solution();
        _engine.Threads = 1;
        return one.AsSpan().SequenceEqual(two);
    }
}
