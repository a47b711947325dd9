using System.Globalization;
using InterfaceFE.Model;

namespace InterfaceFE.Marching;

/// <summary>
/// The march through one stage. It starts under the stage's own control. When a stride fails twice, or an accepted equilibrium is unstable, a path control takes over: layer work, dissipated energy or arc length,
/// and where one fails the others in turn. It is left again after some calm points. Each stride is a share of the last way; the share follows iterations and energy error.
/// </summary>
internal sealed class StageMarch
{
    private const int OwnTries = 2;
    private const int TriesOfMeasure = 4;
    private const int Rounds = 3;
    private const double LeastStride = 1e-9;
    private const double Shorter = 0.4;
    private const double ShorterRound = 0.03;
    private const double FairPart = 0.2;
    private const double AllowedOverAim = 3;
    private const double LastBondShare = 0.03;
    private const double NoDissipation = 1e-12;
    private const double Thread = 1e-6;
    private const int MostByThread = 3;
    private const double AlmostSeparated = 1 - 1e-3;
    private const int CalmAtFirst = 3;
    private const int CalmAtMost = 48;

    private readonly FullEquilibrium _equilibrium;
    private readonly MarchSettings _settings;
    private readonly IMarchObserver _observer;
    private readonly EnergyLedger _ledger;
    private readonly LoadStage _stage;
    private readonly Newton _newton;
    private readonly double _timeAtStart;
    private readonly int _bodiesAtStart;
    private readonly LastWay _way;
    private EnergyState _accepted;
    private double _furthest, _largestLoad, _ownStride, _share = 1;
    private bool _onPath;
    private int _calmPoints, _calmNeeded = CalmAtFirst, _unstable, _retry, _pointsByThread;

    public StageMarch(FullEquilibrium equilibrium, MarchSettings settings, IMarchObserver observer, EnergyLedger ledger, LoadStage stage, int point, double time, int bodiesAtStart)
    {
        _equilibrium = equilibrium;
        _settings = settings;
        _observer = observer;
        _ledger = ledger;
        _stage = stage;
        _newton = new Newton(settings.Tolerance);
        Point = point;
        _timeAtStart = time;
        _bodiesAtStart = bodiesAtStart;
        _way = new LastWay(equilibrium.Displacement.Length);
        _ownStride = Math.Min(settings.FirstStride, settings.LargestStride);
    }

    public int Point { get; private set; }

    /// <summary>Softening layers and turning sheets have limit points; what neither softens nor turns has none.</summary>
    private bool PathCanTakeOver => _settings.Path != PathControl.None && (_equilibrium.Model.Layers.Count > 0 || Turns) && _way.Exists;

    private bool Turns => _equilibrium.Model.Unknowns.Turns;

    public static string CanStillMove(FullEquilibrium equilibrium, int unknown) =>
        $"{equilibrium.Model.Unknowns.Describe(unknown)} can still move freely: nothing holds it. Usual causes: a grip that should be fixed (x, y or rotation) in the sequence, "
        + "an adherend that no joint connects, or a joint without bonded length";

    public MarchOutcome Run(CancellationToken cancellation)
    {
        // Bring residual, tangents and energies to the stage's start: held unknowns and forces may have changed hands.
        _equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate);
        _accepted = _equilibrium.Energy;
        (_unstable, int loose) = _equilibrium.Stability();
        if (loose >= 0 && !Severed())
            return Stop(CanStillMove(_equilibrium, loose));
        for (int points = 0; _equilibrium.AcceptedProgress < 1; points++)
        {
            if (points >= _settings.MostPoints)
                return Stop(string.Create(CultureInfo.InvariantCulture, $"stage {_stage.Number} took {points} points without reaching its end (progress {_equilibrium.AcceptedProgress:G4})"));
            if (Next(cancellation) is { } outcome)
                return outcome;
            if (Severed())
                return new MarchOutcome(MarchStatus.Severed, string.Create(CultureInfo.InvariantCulture, $"the bond came apart in stage {_stage.Number} at progress {_equilibrium.AcceptedProgress:G4}"));
        }
        return new MarchOutcome(MarchStatus.Finished, "");
    }

    /// <summary>
    /// Measures to try, the best first. Layer work is the best while damage begins; it has turning points of its own where the rest of the bond gives back more than the front takes, so that
    /// dissipated energy, which never falls, is taken once it makes up a fair part of the layer work.
    /// </summary>
    private PathMeasure[] Measures()
    {
        if (_settings.Path == PathControl.ArcLength)
            return [PathMeasure.ArcLength, PathMeasure.Dissipation, PathMeasure.LayerWork];
        return _way.Dissipation > FairPart * Math.Abs(_way.LayerWork)
            ? [PathMeasure.Dissipation, PathMeasure.LayerWork, PathMeasure.ArcLength]
            : [PathMeasure.LayerWork, PathMeasure.Dissipation, PathMeasure.ArcLength];
    }

    /// <summary>Finds and accepts the next point; null when it did.</summary>
    private MarchOutcome? Next(CancellationToken cancellation)
    {
        _retry = 0;
        double share = _share, stride = _ownStride;
        string failure = "";
        for (int round = 0; round < Rounds; round++)
        {
            if (!_onPath || round > 0)
            {
                int tries = PathCanTakeOver ? OwnTries : Rounds * TriesOfMeasure;
                for (int i = 0; i < tries && stride >= LeastStride; i++, stride *= Shorter)
                {
                    if (Cancelled(cancellation) is { } cancelled)
                        return cancelled;
                    Attempt attempt = TryOwn(stride);
                    if (attempt.Good)
                    {
                        Leave("no measure of the path finds a way on");
                        Accept(attempt);
                        return null;
                    }
                    failure = attempt.Failure;
                    _retry++;
                }
                if (!PathCanTakeOver)
                    break;
            }
            double tried = share * Math.Pow(ShorterRound, round);
            for (int i = 0; i < TriesOfMeasure; i++, tried *= Shorter)
            {
                foreach (PathMeasure measure in Measures())
                {
                    if (Cancelled(cancellation) is { } cancelled)
                        return cancelled;
                    if (_way.Continue(measure, tried, _equilibrium, _accepted) is not { } control)
                        continue;
                    Attempt attempt = TryPath(control, tried);
                    if (attempt.Good)
                    {
                        if (!_onPath)
                            TakePath(control.Name, failure);
                        Accept(attempt);
                        return null;
                    }
                    failure = attempt.Failure;
                    _retry++;
                    // Too long for the energy account: another measure would be as long.
                    if (attempt.Error > 0)
                        break;
                }
            }
        }
        return GiveUp();
    }

    private MarchOutcome? Cancelled(CancellationToken cancellation)
    {
        if (!cancellation.IsCancellationRequested)
            return null;
        _equilibrium.RollBack();
        return new MarchOutcome(MarchStatus.Interrupted, "interrupted from outside; points so far are kept");
    }

    private MarchOutcome GiveUp()
    {
        _equilibrium.RollBack();
        double share = _equilibrium.Bonds.Connections().CarryingShare;
        if (share <= LastBondShare)
            return new MarchOutcome(MarchStatus.Severed, string.Create(CultureInfo.InvariantCulture,
                $"the last {100 * share:G3} % of the bond gave way in stage {_stage.Number} at progress {_equilibrium.AcceptedProgress:G4}"));
        return Stop(string.Create(CultureInfo.InvariantCulture, $"no equilibrium was found beyond progress {_equilibrium.AcceptedProgress:G6} of stage {_stage.Number} ({_stage.Words}), however short the stride")
            + (_settings.Path == PathControl.None ? "; a limit point needs `control: automatic`" : "")
            + (_equilibrium.Energy.SpentInYielding > 0 ? "; an adherend has yielded: if this is its limit load, drive the grip by travel or angle instead" : ""));
    }

    private Attempt TryOwn(double stride)
    {
        double start = _equilibrium.AcceptedProgress, target = start + stride;
        if (target > 1 - 0.2 * stride)
            target = 1;
        if (_way.Exists && Extrapolates() && _way.Progress > 0)
            _equilibrium.Guess(_way.Displacement, _way.Progress, Math.Min((target - start) / _way.Progress, 2));
        else
            _equilibrium.RollBack();
        _equilibrium.Progress = target;
        return Search(new OwnControl(target, target - start));
    }

    private Attempt TryPath(IControl control, double share)
    {
        if (Extrapolates() && share <= 2.5)
            _equilibrium.Guess(_way.Displacement, _way.Progress, share);
        else
            _equilibrium.RollBack();
        Attempt attempt = Search(control);
        if (attempt.Good && GoesBack())
            return attempt with { Good = false, Error = 0, Failure = "the stride went back the way it came" };
        if (!attempt.Good || _equilibrium.Progress <= 1)
            return attempt;
        // The stride passed the stage's end: find the end itself from the straight line between the two points.
        double start = _equilibrium.AcceptedProgress, beyond = _equilibrium.Progress;
        var way = new double[_equilibrium.Displacement.Length];
        for (int i = 0; i < way.Length; i++)
            way[i] = _equilibrium.Displacement[i] - _equilibrium.AcceptedDisplacement[i];
        _equilibrium.Guess(way, beyond - start, (1 - start) / (beyond - start));
        _equilibrium.Progress = 1;
        return Search(new OwnControl(1, 1 - start));
    }

    /// <summary>
    /// Whether nothing is dissipated while the load falls: unloading, which fulfils the equation of arc length as well as going on does. What turns may snap through and back without
    /// dissipation: it goes back where it moves against its last way.
    /// </summary>
    private bool GoesBack() =>
        (Turns ? _way.Opposes(_equilibrium) : _equilibrium.Progress < _equilibrium.AcceptedProgress)
        && _equilibrium.Energy.Spent - _accepted.Spent <= NoDissipation * Math.Max(_way.Dissipation, _accepted.Spent);

    private Attempt Search(IControl control)
    {
        NewtonOutcome outcome = _newton.Search(_equilibrium, control, iteration => _observer.IterationMade(new MarchIteration(
            _stage.Number, Point + 1, _retry, control.Name, control.Stride, _equilibrium.Progress, _unstable, iteration)));
        if (!outcome.Usable)
            return new Attempt(false, outcome.Iterations, 0, outcome.Status == NewtonStatus.NotFinite ? "numbers overflow" : "no convergence", control);
        double error = _ledger.StrideError() / _settings.PathError;
        return error > AllowedOverAim
            ? new Attempt(false, outcome.Iterations, error, "energy error of the stride too large", control)
            : new Attempt(true, outcome.Iterations, error, "", control);
    }

    private void Accept(Attempt attempt)
    {
        _way.Take(_equilibrium, _accepted);
        _accepted = _equilibrium.Energy;
        EnergyAccount account = _ledger.Book();
        _equilibrium.Accept();
        (_unstable, _) = _equilibrium.Stability();
        Point++;
        _furthest = Math.Max(_furthest, _equilibrium.AcceptedProgress);
        _observer.PointAccepted(new MarchPoint(Point, _stage.Number, _equilibrium.AcceptedProgress >= 1, _equilibrium.AcceptedProgress, _timeAtStart + _stage.Duration * _furthest,
            _equilibrium.AcceptedTemperature, _unstable == 0, account));
        _share = Factor(attempt);
        if (Math.Max(_way.LayerWork, _way.Dissipation) is var work && work * _share > _settings.LargestLayerWork)
            _share = _settings.LargestLayerWork / work;
        if (_way.Progress > 0)
            _ownStride = Math.Min(_way.Progress * _share, _settings.LargestStride);
        if (!_onPath)
        {
            if (_unstable > 0 && PathCanTakeOver && _way.Continue(Measures()[0], 1, _equilibrium, _accepted) is { } control)
                TakePath(control.Name, "the equilibrium is unstable under the stage's own control");
            return;
        }
        _calmPoints = _unstable == 0 && _way.Progress > 0 ? _calmPoints + 1 : 0;
        if (_calmPoints < _calmNeeded)
            return;
        Leave("the path is stable and advances again");
        _calmNeeded = Math.Min(2 * _calmNeeded, CalmAtMost);
    }

    private static double Factor(Attempt attempt)
    {
        double byIterations = attempt.Iterations switch { <= 4 => 1.6, <= 6 => 1.25, <= 8 => 1, _ => 0.6 };
        double byError = attempt.Error > 0 ? 0.9 / Math.Sqrt(attempt.Error) : 1.6;
        return Math.Clamp(Math.Min(byIterations, byError), 0.3, 1.6);
    }

    /// <summary>
    /// The first guess carries the last way on, so that points that were unloading keep unloading; every third retry starts from the accepted point instead, with its tangent.
    /// </summary>
    private bool Extrapolates() => _retry % 3 != 2;

    private void TakePath(string name, string reason)
    {
        _onPath = true;
        _calmPoints = 0;
        _observer.Said(string.Create(CultureInfo.InvariantCulture, $"control: {name} takes over at progress {_equilibrium.AcceptedProgress:G4} ({reason})"));
    }

    private void Leave(string reason)
    {
        if (!_onPath)
            return;
        _onPath = false;
        _observer.Said(string.Create(CultureInfo.InvariantCulture, $"control: the stage's own at progress {_equilibrium.AcceptedProgress:G4} ({reason})"));
    }

    /// <summary>
    /// Whether the specimen came apart: by points that are separated, or hanging by a thread for some points on end, where the bond carries less than a thousandth and the grips less than a
    /// millionth of what they did.
    /// </summary>
    private bool Severed()
    {
        if (_equilibrium.Bonds.Connections().Bodies > _bodiesAtStart)
            return true;
        double load = 0;
        for (int i = 0; i < _equilibrium.Displacement.Length; i++)
            if (_equilibrium.Model.Unknowns.IsRoot[_equilibrium.Model.Unknowns.VertexOfUnknown[i]])
                load = Math.Max(load, Math.Abs(_equilibrium.ExternalForce(i)));
        _largestLoad = Math.Max(_largestLoad, load);
        bool thread = load < Thread * _largestLoad && _equilibrium.Bonds.Connections(AlmostSeparated).Bodies > _bodiesAtStart;
        _pointsByThread = thread ? _pointsByThread + 1 : 0;
        return _pointsByThread > MostByThread;
    }

    private static MarchOutcome Stop(string cause) => new(MarchStatus.StoppedEarly, cause);

    private readonly record struct Attempt(bool Good, int Iterations, double Error, string Failure, IControl Control);
}
