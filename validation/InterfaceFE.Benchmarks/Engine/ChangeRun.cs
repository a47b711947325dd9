using InterfaceFE.Benchmarks.Models;
using InterfaceFE.Benchmarks.Timing;
using InterfaceFE.Sparse;

namespace InterfaceFE.Benchmarks.Engine;

/// <summary>Measures one kind of change at several places.</summary>
public sealed class ChangeRun
{
    private readonly EngineUnderTest _engine;
    private readonly ElementChange[] _places;
    private readonly FrontPath[] _paths;
    private readonly double[][] _rightSides;
    private readonly double[] _x;
    private readonly double _size;
    private readonly Samples _replace = new(), _factor = new(), _solve = new();
    private readonly Samples[] _totalAt;
    private readonly double[] _flops;
    private long _allocated;
    private bool _partialIsWhole = true;
    private int _next;

    /// <summary>Prepares the paths and right sides of the places.</summary>
    /// <param name="engine">The engine.</param>
    /// <param name="model">Its model.</param>
    /// <param name="size">Number of layer elements, or width of a patch [mm].</param>
    /// <param name="places">The change at each place.</param>
    public ChangeRun(EngineUnderTest engine, BenchmarkModel model, double size, ElementChange[] places)
    {
        ArgumentNullException.ThrowIfNull(engine);
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(places);
        _engine = engine;
        _size = size;
        _places = places;
        _x = new double[model.Pattern.UnknownCount];
        _paths = new FrontPath[places.Length];
        _rightSides = new double[places.Length][];
        _totalAt = [.. places.Select(_ => new Samples())];
        _flops = new double[places.Length];
        double[] b = model.RightSide();
        for (int p = 0; p < places.Length; p++)
        {
            int[] unknowns = places[p].Unknowns(model);
            _paths[p] = engine.Plan.PathOf(unknowns);
            _rightSides[p] = new double[b.Length];
            foreach (int unknown in unknowns)
                _rightSides[p][unknown] = b[unknown];
        }
    }

    /// <summary>Goes to each place, changes its elements a few times, and puts the model's own matrices back.</summary>
    /// <param name="repeats">Measured changes at each place, after one that is not.</param>
    public void Round(int repeats)
    {
        for (int p = 0; p < _places.Length; p++)
        {
            for (int repeat = 0; repeat <= repeats; repeat++)
                Iterate(p, measured: repeat > 0);
            _engine.Restore(_places[p].Slots);
        }
    }

    /// <summary>Compares at each place the values along the path with those of a whole factorisation and solve.</summary>
    public void Check()
    {
        for (int p = 0; p < _places.Length; p++)
        {
            Array.Clear(_x);
            _engine.Replace(_places[p].Slots, _places[p].Matrices[0]);
            _engine.FactorChanges();
            _engine.Solve(_rightSides[p], _x, _paths[p]);
            double[] whole = new double[_x.Length];
            _engine.FactorWhole();
            _engine.Solve(_rightSides[p], whole);
            // Values off the path were left at zero.
            for (int i = 0; i < _x.Length; i++)
                _partialIsWhole &= _x[i] == 0 || _x[i] == whole[i];
            foreach (int unknown in PlacesWithLoad(p))
                _partialIsWhole &= _x[unknown] == whole[unknown];
            _engine.Restore(_places[p].Slots);
        }
    }

    /// <summary>The medians so far.</summary>
    public ChangeTimes Times() => new(
        _size,
        (int)Math.Round(_places.Average(place => place.Slots.Length)),
        _replace.Median,
        _factor.Median,
        _solve.Median,
        _totalAt.Max(samples => samples.Median),
        _flops.Average(),
        _paths.Average(_engine.PathBytes),
        _allocated,
        _partialIsWhole);

    private IEnumerable<int> PlacesWithLoad(int place) => Enumerable.Range(0, _x.Length).Where(i => _rightSides[place][i] != 0);

    private void Iterate(int place, bool measured)
    {
        ElementChange change = _places[place];
        double[][] matrices = change.Matrices[_next++ % change.Matrices.Length];
        long allocated = GC.GetAllocatedBytesForCurrentThread();
        double start = ThreadClock.Milliseconds();
        _engine.Replace(change.Slots, matrices);
        double replaced = ThreadClock.Milliseconds();
        _engine.FactorChanges();
        double factored = ThreadClock.Milliseconds();
        _engine.Solve(_rightSides[place], _x, _paths[place]);
        double solved = ThreadClock.Milliseconds();
        allocated = GC.GetAllocatedBytesForCurrentThread() - allocated;
        if (!measured)
            return;
        _allocated = Math.Max(_allocated, allocated);
        _replace.Add(replaced - start);
        _factor.Add(factored - replaced);
        _solve.Add(solved - factored);
        _totalAt[place].Add(solved - start);
        _flops[place] = _engine.LastFlops;
    }
}
