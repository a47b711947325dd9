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
    /// <summary>Progress from a place where an element had no answer within which the march is stopped by it.</summary>
    private const double NearFault = 0.02;

    private const double LeastStride = 1e-9;
    private const double Shorter = 0.4;
    private const double ShorterRound = 0.03;
    private const double FairPart = 0.2;
    private const double AllowedOverAim = 3;
    private const double NoDissipation = 1e-12;
    private const int CalmAtFirst = 3;
    private const int CalmAtMost = 48;

    private readonly StagePoints _points;
    private readonly FullEquilibrium _equilibrium;
    private readonly LastWay _way;
    private readonly MarchSettings _settings;
    private readonly IMarchObserver _observer;
    private double _ownStride, _share = 1, _faultProgress;
    private string? _fault;
    private bool _onPath;
    private int _calmPoints, _calmNeeded = CalmAtFirst, _retry;

    public StageMarch(StagePoints points, MarchSettings settings, IMarchObserver observer)
    {
        _points = points;
        _equilibrium = points.Equilibrium;
        _way = points.Way;
        _settings = settings;
        _observer = observer;
        _ownStride = Math.Min(settings.FirstStride, settings.LargestStride);
    }

    /// <summary>Softening layers and turning sheets have limit points; what neither softens nor turns has none.</summary>
    private bool PathCanTakeOver => _settings.Path != PathControl.None && (_equilibrium.Model.Layers.Count > 0 || Turns) && _way.Exists;

    private bool Turns => _equilibrium.Model.Unknowns.Turns;

    public MarchOutcome Run(CancellationToken cancellation)
    {
        if (_points.Start() is { } cause)
            return Stop(cause);
        for (int points = 0; _equilibrium.AcceptedProgress < 1; points++)
        {
            if (points >= _settings.MostPoints)
                return Stop(string.Create(CultureInfo.InvariantCulture, $"stage {_points.Stage.Number} took {points} points without reaching its end (progress {_equilibrium.AcceptedProgress:G4})"));
            if (Next(cancellation) is { } outcome)
                return outcome;
            if (_points.Severed())
                return _points.CameApart();
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
                    if (_points.Cancelled(cancellation) is { } cancelled)
                        return cancelled;
                    Attempt attempt = TryOwn(stride);
                    if (attempt.Good)
                    {
                        Leave("no measure of the path finds a way on");
                        Accept(attempt);
                        return null;
                    }
                    failure = attempt.Failure;
                    Note(attempt.Fault);
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
                    if (_points.Cancelled(cancellation) is { } cancelled)
                        return cancelled;
                    if (_way.Continue(measure, tried, _equilibrium, _points.Accepted) is not { } control)
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
                    Note(attempt.Fault);
                    _retry++;
                    // Too long for the energy account: another measure would be as long.
                    if (attempt.Error > 0)
                        break;
                }
            }
        }
        return GiveUp(failure);
    }

    private MarchOutcome GiveUp(string failure)
    {
        _equilibrium.RollBack();
        if (_fault is { } fault && Math.Abs(_faultProgress - _equilibrium.AcceptedProgress) <= NearFault)
            return Stop(fault);
        if (_points.LastOfTheBond() is { } severed)
            return severed;
        return Stop(string.Create(CultureInfo.InvariantCulture, $"no equilibrium was found beyond progress {_equilibrium.AcceptedProgress:G6} of stage {_points.Stage.Number} ({_points.Stage.Words}), however short the stride")
            + (failure.StartsWith(StagePoints.Overflow, StringComparison.Ordinal) ? ": " + failure : "")
            + (_settings.Path == PathControl.None ? "; a limit point needs `control: automatic`" : "")
            + (_equilibrium.Energy.SpentInYielding > 0 ? "; an adherend has yielded: if this is its limit load, drive the grip by travel or angle instead" : ""));
    }

    /// <summary>Keeps where an element had no answer: shorter strides may lead up to that place, but not past it.</summary>
    private void Note(string? fault)
    {
        if (fault is not null)
            (_fault, _faultProgress) = (fault, _equilibrium.AcceptedProgress);
    }

    private Attempt TryOwn(double stride)
    {
        double start = _equilibrium.AcceptedProgress, target = start + stride;
        if (target > 1 - 0.2 * stride)
            target = 1;
        double guess = _way.Exists && Extrapolates() && _way.Progress > 0 ? Math.Min((target - start) / _way.Progress, 2) : 0;
        _points.Guess(guess);
        _equilibrium.Progress = target;
        return Search(new OwnControl(target, target - start), guess);
    }

    private Attempt TryPath(IControl control, double share)
    {
        double guess = Extrapolates() && share <= 2.5 ? share : 0;
        _points.Guess(guess);
        Attempt attempt = Search(control, guess);
        if (attempt.Good && GoesBack())
        {
            _points.Refuse(IterationReason.WentBack);
            return attempt with { Good = false, Error = 0, Failure = "the stride went back the way it came" };
        }
        if (!attempt.Good || _equilibrium.Progress <= 1)
            return attempt;
        // The stride passed the stage's end: find the end itself from the straight line between the two points.
        _points.Refuse(IterationReason.PastEnd);
        double start = _equilibrium.AcceptedProgress, between = (1 - start) / (_equilibrium.Progress - start);
        _points.GuessBetween(between, 1);
        return Search(new OwnControl(1, 1 - start), between);
    }

    /// <summary>
    /// Whether nothing is dissipated while the load falls: unloading, which fulfils the equation of arc length as well as going on does. What turns may snap through and back without
    /// dissipation: it goes back where it moves against its last way.
    /// </summary>
    private bool GoesBack() =>
        (Turns ? _way.Opposes(_equilibrium) : _equilibrium.Progress < _equilibrium.AcceptedProgress)
        && _equilibrium.Energy.Spent - _points.Accepted.Spent <= NoDissipation * Math.Max(_way.Dissipation, _points.Accepted.Spent);

    private Attempt Search(IControl control, double guess)
    {
        NewtonOutcome outcome = _points.Search(control, guess, _retry);
        if (!outcome.Usable)
            return new Attempt(false, outcome.Iterations, 0, _points.Failure, control) { Fault = _points.Fault };
        double error = _points.Ledger.StrideError() / _settings.PathError;
        if (error <= AllowedOverAim)
            return new Attempt(true, outcome.Iterations, error, "", control);
        _points.Refuse(IterationReason.TooLong);
        return new Attempt(false, outcome.Iterations, error, "energy error of the stride too large", control);
    }

    private void Accept(Attempt attempt)
    {
        _points.Accept();
        _share = Factor(attempt);
        if (Math.Max(_way.LayerWork, _way.Dissipation) is var work && work * _share > _settings.LargestLayerWork)
            _share = _settings.LargestLayerWork / work;
        if (_way.Progress > 0)
            _ownStride = Math.Min(_way.Progress * _share, _settings.LargestStride);
        if (!_onPath)
        {
            if (_points.Unstable > 0 && PathCanTakeOver && _way.Continue(Measures()[0], 1, _equilibrium, _points.Accepted) is { } control)
                TakePath(control.Name, "the equilibrium is unstable under the stage's own control");
            return;
        }
        _calmPoints = _points.Unstable == 0 && _way.Progress > 0 ? _calmPoints + 1 : 0;
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

    private static MarchOutcome Stop(string cause) => new(MarchStatus.StoppedEarly, cause);

    private readonly record struct Attempt(bool Good, int Iterations, double Error, string Failure, IControl Control)
    {
        /// <summary>What no shorter stride will mend, in words; null when it may.</summary>
        public string? Fault { get; init; }
    }
}
