using System.Globalization;
using InterfaceFE.Model;

namespace InterfaceFE.Marching;

/// <summary>
/// Marches a model through its stages. Each stage is marched by its own control (displacement, force or temperature in proportion to the progress); where that fails or the
/// path turns back, layer work or arc length takes over, and is left again when the path has been stable and advancing for a while. Strides aim at an energy error, so that
/// the path is followed and never jumped. Nothing is damped.
/// </summary>
/// <param name="equilibrium">Equilibrium of the model.</param>
/// <param name="settings">Settings.</param>
/// <param name="observer">Told of points and iterations.</param>
public sealed class March(FullEquilibrium equilibrium, MarchSettings settings, IMarchObserver observer)
{
    private EnergyLedger? _ledger;
    private int _point;
    private double _time;
    private int _bodiesAtStart;

    /// <summary>Marches through all stages.</summary>
    /// <param name="cancellation">Stops the march after the current iteration; points so far are kept.</param>
    public MarchOutcome Run(CancellationToken cancellation = default)
    {
        bool started = false;
        foreach (LoadStage stage in equilibrium.Model.Stages)
        {
            equilibrium.StartStage(stage);
            if (!stage.Marches)
                continue;
            if (!started)
            {
                if (Start() is { } cause)
                    return new MarchOutcome(MarchStatus.StoppedEarly, cause);
                started = true;
            }
            observer.Said($"stage {stage.Number}: {stage.Words}");
            var march = new StageMarch(equilibrium, settings, observer, _ledger!, stage, _point, _time, _bodiesAtStart);
            MarchOutcome outcome = march.Run(cancellation);
            _point = march.Point;
            _time += stage.Duration;
            if (outcome.Status != MarchStatus.Finished)
                return outcome;
        }
        return new MarchOutcome(MarchStatus.Finished, "");
    }

    private string? Start()
    {
        ResidualReport residual = equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate);
        if (!residual.Finite)
            return "the stiffness of the model is not finite at the start: look for extreme numbers in the deck";
        (int negative, int singular) = equilibrium.Stability();
        if (singular >= 0)
            return StageMarch.CanStillMove(equilibrium, singular);
        equilibrium.Accept();
        _ledger = new EnergyLedger(equilibrium);
        _bodiesAtStart = equilibrium.Connections().Bodies;
        observer.PointAccepted(new MarchPoint(0, 0, true, 0, 0, equilibrium.Temperature, negative == 0, _ledger.Account()));
        return null;
    }
}

/// <summary>The march through one stage.</summary>
internal sealed class StageMarch
{
    private const int RetriesBeforeSwitch = 2;
    private const int RetriesBeforeArc = 3;
    private const int MostRetries = 14;
    private const double LeastStride = 1e-9;
    private const double Shorter = 0.4;
    private const double AllowedOverAim = 4;
    private const double LastBondShare = 0.03;
    private const double Thread = 1e-6;
    private const double AlmostSeparated = 1 - 1e-3;

    private readonly FullEquilibrium _equilibrium;
    private readonly MarchSettings _settings;
    private readonly IMarchObserver _observer;
    private readonly EnergyLedger _ledger;
    private readonly LoadStage _stage;
    private readonly Newton _newton;
    private readonly double _timeAtStart;
    private readonly int _bodiesAtStart;
    private readonly double[] _way;
    private double _wayProgress, _wayWork, _wayArc, _acceptedWork, _furthest, _largestLoad;
    private bool _hasWay;
    private bool _onPath;
    private double _ownStride, _pathStride;
    private int _calmPoints, _calmNeeded = 3, _unstable;

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
        _way = new double[equilibrium.Displacement.Length];
        _ownStride = Math.Min(settings.FirstStride, settings.LargestStride);
    }

    public int Point { get; private set; }

    private bool HasPathControl => _settings.Path != PathControl.None && _equilibrium.Model.Layers.Count > 0;

    public static string CanStillMove(FullEquilibrium equilibrium, int unknown) =>
        $"{equilibrium.Model.Unknowns.Describe(unknown)} can still move freely: nothing holds it. Usual causes: a grip that should be fixed (x, y or rotation) in the sequence, "
        + "an adherend that no joint connects, or a joint without bonded length";

    public MarchOutcome Run(CancellationToken cancellation)
    {
        // Bring residual, tangents and energies to the stage's start: held unknowns and forces may have changed hands.
        _equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate);
        _acceptedWork = ((IEquilibrium)_equilibrium).LayerWork;
        (_unstable, int loose) = _equilibrium.Stability();
        if (loose >= 0 && !Severed())
            return new MarchOutcome(MarchStatus.StoppedEarly, CanStillMove(_equilibrium, loose));
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

    private MarchOutcome? Next(CancellationToken cancellation)
    {
        int lastSingular = -1;
        bool switched = false;
        for (int retry = 0; retry <= MostRetries; retry++)
        {
            if (cancellation.IsCancellationRequested)
                return new MarchOutcome(MarchStatus.Interrupted, "interrupted from outside; points so far are kept");
            Attempt attempt = _onPath ? TryPath(retry) : TryOwn(retry, _ownStride);
            if (attempt.Accepted)
            {
                Accept(attempt);
                return null;
            }
            lastSingular = attempt.Singular;
            if (_onPath)
                _pathStride *= Shorter;
            else
                _ownStride *= Shorter;
            if (!_onPath && _ownStride < LeastStride && !(HasPathControl && PathCanTakeOver()))
                break;
            if (retry + 1 >= RetriesBeforeSwitch && !_onPath && HasPathControl && PathCanTakeOver())
                TakePath(attempt.Reason);
            else if (_onPath && !switched && retry >= MostRetries / 2)
            {
                switched = true;
                LeavePath("layer work finds no way on");
                _ownStride = Math.Min(_ownStride, 0.01 * _settings.LargestStride);
            }
        }
        _equilibrium.RollBack();
        double share = _equilibrium.Connections().CarryingShare;
        if (share <= LastBondShare)
            return new MarchOutcome(MarchStatus.Severed, string.Create(CultureInfo.InvariantCulture,
                $"the last {100 * share:G3} % of the bond gave way in stage {_stage.Number} at progress {_equilibrium.AcceptedProgress:G4}"));
        return Stop(lastSingular >= 0 && _equilibrium.AcceptedProgress == 0
            ? CanStillMove(_equilibrium, lastSingular)
            : string.Create(CultureInfo.InvariantCulture, $"no equilibrium was found beyond progress {_equilibrium.AcceptedProgress:G6} of stage {_stage.Number} ({_stage.Words}), however short the stride")
              + (_settings.Path == PathControl.None ? "; a limit point needs control: automatic" : ""));
    }

    private Attempt TryOwn(int retry, double stride)
    {
        double start = _equilibrium.AcceptedProgress, target = start + stride;
        if (target > 1 - 0.2 * stride)
            target = 1;
        if (_hasWay && Extrapolates(retry) && _wayProgress > 0)
            _equilibrium.Guess(_way, _wayProgress, Math.Min((target - start) / _wayProgress, 2));
        else
            _equilibrium.RollBack();
        _equilibrium.Progress = target;
        return Search(new OwnControl(target, target - start), retry);
    }

    private Attempt TryPath(int retry)
    {
        IControl control = MakePathControl(retry);
        double measure = control is LayerWorkControl ? _wayWork : _wayArc;
        if (_hasWay && Extrapolates(retry) && measure > 0 && _pathStride <= 2.5 * measure)
            _equilibrium.Guess(_way, _wayProgress, _pathStride / measure);
        else
            _equilibrium.RollBack();
        Attempt attempt = Search(control, retry);
        if (!attempt.Accepted || _equilibrium.Progress <= 1)
            return attempt;
        // The stride passed the stage's end: find the end itself from the straight line between the two points.
        double start = _equilibrium.AcceptedProgress, beyond = _equilibrium.Progress;
        double[] way = new double[_way.Length];
        for (int i = 0; i < way.Length; i++)
            way[i] = _equilibrium.Displacement[i] - _equilibrium.AcceptedDisplacement[i];
        _equilibrium.Guess(way, beyond - start, (1 - start) / (beyond - start));
        _equilibrium.Progress = 1;
        return Search(new OwnControl(1, 1 - start), retry);
    }

    /// <summary>
    /// Layer work cannot pass the point where a bond gives up its last work; there separations take over as arc length, which goes on growing.
    /// </summary>
    private IControl MakePathControl(int retry) => _settings.Path == PathControl.LayerWork && retry < RetriesBeforeArc
        ? new LayerWorkControl(_acceptedWork + _pathStride, _pathStride)
        : MakeArcLength(retry);

    private ArcLengthControl MakeArcLength(int retry)
    {
        IReadOnlyList<(int, int)> watched = _equilibrium.WatchedSeparations();
        double[] way = (double[])_way.Clone();
        if (_settings.Path == PathControl.ArcLength)
            return new ArcLengthControl(watched, way, _pathStride);
        double last = new ArcLengthControl(watched, way, 1).Length(way, []);
        return new ArcLengthControl(watched, way, last * Math.Pow(Shorter, retry - RetriesBeforeArc));
    }

    private Attempt Search(IControl control, int retry)
    {
        NewtonOutcome outcome = _newton.Search(_equilibrium, control, iteration => _observer.IterationMade(new MarchIteration(
            _stage.Number, Point + 1, retry, control.Name, control.Stride, _equilibrium.Progress, _unstable, iteration)));
        if (!outcome.Usable)
            return new Attempt(false, outcome.Iterations, 0, outcome.Singular, outcome.Status == NewtonStatus.NotFinite ? "numbers overflow" : "no convergence", control);
        double error = _ledger.StrideError() / _settings.PathError;
        if (error > AllowedOverAim && retry < MostRetries - 2)
            return new Attempt(false, outcome.Iterations, error, outcome.Singular, "energy error of the stride too large", control);
        return new Attempt(true, outcome.Iterations, error, outcome.Singular, "", control);
    }

    private void Accept(Attempt attempt)
    {
        double work = ((IEquilibrium)_equilibrium).LayerWork;
        _wayArc = attempt.Control is ArcLengthControl arcLength ? arcLength.Length(_equilibrium.Displacement, _equilibrium.AcceptedDisplacement) : 0;
        for (int i = 0; i < _way.Length; i++)
            _way[i] = _equilibrium.Displacement[i] - _equilibrium.AcceptedDisplacement[i];
        _wayProgress = _equilibrium.Progress - _equilibrium.AcceptedProgress;
        _wayWork = work - _acceptedWork;
        _acceptedWork = work;
        _hasWay = true;
        EnergyAccount account = _ledger.Book();
        _equilibrium.Accept();
        (_unstable, _) = _equilibrium.Stability();
        Point++;
        _furthest = Math.Max(_furthest, _equilibrium.AcceptedProgress);
        bool last = _equilibrium.AcceptedProgress >= 1;
        _observer.PointAccepted(new MarchPoint(Point, _stage.Number, last, _equilibrium.AcceptedProgress, _timeAtStart + _stage.Duration * _furthest,
            _equilibrium.AcceptedTemperature, _unstable == 0, account));
        double factor = Factor(attempt);
        if (_onPath)
        {
            if (_settings.Path == PathControl.LayerWork)
                _pathStride = Math.Min(attempt.Control is LayerWorkControl ? _pathStride * factor : Math.Max(_wayWork, _pathStride), _settings.LargestLayerWork);
            else if (!attempt.Control.FixesProgress)
                _pathStride *= factor;
            _calmPoints = _unstable == 0 && _wayProgress > 0 ? _calmPoints + 1 : 0;
            if (_calmPoints >= _calmNeeded)
            {
                LeavePath("the path is stable and advances again");
                _ownStride = Math.Min(_wayProgress, _settings.LargestStride);
                _calmNeeded = Math.Min(2 * _calmNeeded, 48);
            }
            return;
        }
        _ownStride = Math.Min(_wayProgress * factor, _settings.LargestStride);
        if (_wayWork > _settings.LargestLayerWork)
            _ownStride = Math.Min(_ownStride, _wayProgress * _settings.LargestLayerWork / _wayWork);
        if (_unstable > 0 && HasPathControl && PathCanTakeOver())
            TakePath("the equilibrium is unstable under the stage's own control");
    }

    /// <summary>
    /// The first guess carries the last way on, so that points that were unloading keep unloading; every third retry starts from the accepted point instead, with its tangent.
    /// </summary>
    private static bool Extrapolates(int retry) => retry % 3 != 2;

    private static double Factor(Attempt attempt)
    {
        double byIterations = attempt.Iterations switch { <= 4 => 1.6, <= 6 => 1.25, <= 8 => 1, _ => 0.6 };
        double byError = attempt.Error > 0 ? 0.9 / Math.Sqrt(attempt.Error) : 1.6;
        return Math.Clamp(Math.Min(byIterations, byError), 0.3, 1.6);
    }

    private bool PathCanTakeOver() => _hasWay && (_settings.Path == PathControl.ArcLength || _wayWork > 0);

    private void TakePath(string reason)
    {
        _onPath = true;
        _calmPoints = 0;
        if (_settings.Path == PathControl.LayerWork)
            _pathStride = Math.Min(0.5 * _wayWork, _settings.LargestLayerWork);
        else
        {
            _wayArc = new ArcLengthControl(_equilibrium.WatchedSeparations(), _way, 1).Length(_way, []);
            _pathStride = 0.5 * _wayArc;
        }
        _observer.Said(string.Create(CultureInfo.InvariantCulture, $"control: {(_settings.Path == PathControl.LayerWork ? "layer work" : "arc length")} takes over at progress {_equilibrium.AcceptedProgress:G4} ({reason})"));
    }

    private void LeavePath(string reason)
    {
        _onPath = false;
        _observer.Said(string.Create(CultureInfo.InvariantCulture, $"control: the stage's own at progress {_equilibrium.AcceptedProgress:G4} ({reason})"));
    }

    /// <summary>
    /// Whether the specimen came apart: by points that are separated, or hanging by a thread, points that carry less than a thousandth while the grips carry less than a millionth of
    /// what they did.
    /// </summary>
    private bool Severed()
    {
        if (_equilibrium.Connections().Bodies > _bodiesAtStart)
            return true;
        double load = 0;
        for (int i = 0; i < _way.Length; i++)
            if (_equilibrium.Model.Unknowns.IsRoot[_equilibrium.Model.Unknowns.VertexOfUnknown[i]])
                load = Math.Max(load, Math.Abs(_equilibrium.ExternalForce(i)));
        _largestLoad = Math.Max(_largestLoad, load);
        return load < Thread * _largestLoad && _equilibrium.Connections(AlmostSeparated).Bodies > _bodiesAtStart;
    }

    private static MarchOutcome Stop(string cause) => new(MarchStatus.StoppedEarly, cause);

    private readonly record struct Attempt(bool Accepted, int Iterations, double Error, int Singular, string Reason, IControl Control);
}
