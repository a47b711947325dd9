using InterfaceFE.Model;

namespace InterfaceFE.Marching;

/// <summary>
/// The points of one stage: makes first guesses, searches, accepts, keeps the energy account and tells the observer. Which control and stride to try is for others to say, the march or
/// the replay of an earlier one.
/// </summary>
internal sealed class StagePoints
{
    private const double Thread = 1e-6;
    private const int MostByThread = 3;
    private const double AlmostSeparated = 1 - 1e-3;

    private readonly IMarchObserver _observer;
    private readonly Newton _newton;
    private readonly double _timeAtStart;
    private readonly int _bodiesAtStart;
    private double _furthest, _largestLoad;
    private int _pointsByThread;
    private MarchIteration? _untold;

    public StagePoints(FullEquilibrium equilibrium, double tolerance, IMarchObserver observer, EnergyLedger ledger, LoadStage stage, int point, double time, int bodiesAtStart)
    {
        Equilibrium = equilibrium;
        Ledger = ledger;
        Stage = stage;
        Point = point;
        Way = new LastWay(equilibrium.Displacement.Length);
        _observer = observer;
        _newton = new Newton(tolerance);
        _timeAtStart = time;
        _bodiesAtStart = bodiesAtStart;
    }

    /// <summary>First words of <see cref="Failure"/> where numbers overflow.</summary>
    public const string Overflow = "numbers overflow";

    /// <summary>Why the last search failed, in words; empty when it did not.</summary>
    public string Failure { get; private set; } = "";

    /// <summary>An answer of an element that no shorter stride will mend, in words; null when there is none.</summary>
    public string? Fault { get; private set; }

    public FullEquilibrium Equilibrium { get; }

    public EnergyLedger Ledger { get; }

    public LoadStage Stage { get; }

    public LastWay Way { get; }

    /// <summary>Number of the last accepted point.</summary>
    public int Point { get; private set; }

    /// <summary>Energies at the accepted point.</summary>
    public EnergyState Accepted { get; private set; }

    /// <summary>Unstable directions at the accepted point.</summary>
    public int Unstable { get; private set; }

    /// <summary>
    /// Brings residual, tangents and energies to the stage's start, where held unknowns and forces may have changed hands. Returns the words of the stop where something is loose, else null.
    /// </summary>
    public string? Start()
    {
        if (!Equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate).Finite)
            return Beyond();
        Accepted = Equilibrium.Energy;
        (Unstable, int loose) = Equilibrium.Stability();
        return loose >= 0 && !Severed() ? LoosePart.Describe(Equilibrium, loose) : null;
    }

    /// <summary>Sets the first guess: a share of the last way carried on, or the accepted point for 0.</summary>
    public void Guess(double share)
    {
        if (share == 0)
            Equilibrium.RollBack();
        else
            Equilibrium.Guess(Way.Displacement, Way.Progress, share);
    }

    /// <summary>Sets the first guess on the straight way from the accepted to the tentative point, a share of it, and the progress.</summary>
    public void GuessBetween(double share, double progress)
    {
        double wayProgress = Equilibrium.Progress - Equilibrium.AcceptedProgress;
        var way = new double[Equilibrium.Displacement.Length];
        for (int i = 0; i < way.Length; i++)
            way[i] = Equilibrium.Displacement[i] - Equilibrium.AcceptedDisplacement[i];
        Equilibrium.Guess(way, wayProgress, share);
        Equilibrium.Progress = progress;
    }

    /// <summary>Searches from the guess. The last iteration is told when its fate is known: by <see cref="Refuse"/>, by <see cref="Accept"/>, or here if it fails.</summary>
    /// <param name="control">Control.</param>
    /// <param name="guess">Share that the guess was made with.</param>
    /// <param name="retry">Searches for this point that failed before.</param>
    /// <param name="recorded">End of the search that is replayed; null: none is.</param>
    public NewtonOutcome Search(IControl control, double guess, int retry, RecordedEnd? recorded = null)
    {
        Fault = null;
        NewtonOutcome outcome = _newton.Search(Equilibrium, control, iteration =>
        {
            Tell();
            _untold = new MarchIteration(Stage.Number, Point + 1, retry, control.Name, control.Stride, guess, Equilibrium.Progress, Unstable, iteration);
        }, recorded);
        if (!outcome.Usable)
            Tell();
        Failure = outcome.Usable ? "" : outcome.Status == NewtonStatus.NotFinite ? Beyond() : "no convergence";
        if (!outcome.Usable && outcome.Fault is { } fault)
            Fault ??= InWords(fault);
        return outcome;
    }

    /// <summary>Tells the last iteration of a search that converged and is not taken, with the reason.</summary>
    public void Refuse(string reason)
    {
        if (_untold is { } last)
            _untold = last with { Newton = last.Newton with { Reason = reason } };
        Tell();
    }

    /// <summary>Takes the tentative point.</summary>
    public void Accept()
    {
        Tell();
        Way.Take(Equilibrium, Accepted);
        Accepted = Equilibrium.Energy;
        EnergyAccount account = Ledger.Book();
        Equilibrium.Accept();
        (Unstable, _) = Equilibrium.Stability();
        Point++;
        _furthest = Math.Max(_furthest, Equilibrium.AcceptedProgress);
        _observer.PointAccepted(new MarchPoint(Point, Stage.Number, Equilibrium.AcceptedProgress >= 1, Equilibrium.AcceptedProgress, _timeAtStart + Stage.Duration * _furthest,
            Equilibrium.AcceptedTemperature, Unstable == 0, account));
    }

    /// <summary>
    /// Whether the specimen came apart: by points that are separated, or hanging by a thread for some points on end, where the bond carries less than a thousandth and the grips less than a
    /// millionth of what they did. To be asked once at each point.
    /// </summary>
    public bool Severed()
    {
        if (Equilibrium.Bonds.Connections().Bodies > _bodiesAtStart)
            return true;
        double load = 0;
        for (int i = 0; i < Equilibrium.Displacement.Length; i++)
            if (Equilibrium.Model.Unknowns.IsRoot[Equilibrium.Model.Unknowns.VertexOfUnknown[i]])
                load = Math.Max(load, Math.Abs(Equilibrium.ExternalForce(i)));
        _largestLoad = Math.Max(_largestLoad, load);
        bool thread = load < Thread * _largestLoad && Equilibrium.Bonds.Connections(AlmostSeparated).Bodies > _bodiesAtStart;
        _pointsByThread = thread ? _pointsByThread + 1 : 0;
        return _pointsByThread > MostByThread;
    }

    /// <summary>The outcome of a specimen that came apart.</summary>
    public MarchOutcome CameApart() => new(MarchStatus.Severed, FormattableString.Invariant($"the bond came apart in stage {Stage.Number} at progress {Equilibrium.AcceptedProgress:G4}")
        + (Equilibrium.Bonds.Parted() is { Count: > 0 } parted ? $": nothing is left of {string.Join(" and of ", parted)}" : ""));

    /// <summary>The outcome where the last of the bond gave way, so that no further point exists; null when more than that carries.</summary>
    public MarchOutcome? LastOfTheBond()
    {
        const double LastShare = 0.03;
        double share = Equilibrium.Bonds.Connections().CarryingShare;
        return share > LastShare ? null
            : new MarchOutcome(MarchStatus.Severed, FormattableString.Invariant($"the last {100 * share:G3} % of the bond gave way in stage {Stage.Number} at progress {Equilibrium.AcceptedProgress:G4}"));
    }

    /// <summary>The outcome when the run was asked to stop; null when it was not.</summary>
    public MarchOutcome? Cancelled(CancellationToken cancellation)
    {
        if (!cancellation.IsCancellationRequested)
            return null;
        Equilibrium.RollBack();
        return new MarchOutcome(MarchStatus.Interrupted, "interrupted from outside; points so far are kept");
    }

    /// <summary>Words for numbers that are not finite: the element that is at fault, or the place that has moved furthest.</summary>
    private string Beyond()
    {
        if (Equilibrium.Fault() is { } fault)
            return Fault = InWords(fault);
        ReadOnlySpan<double> u = Equilibrium.Displacement;
        int furthest = 0;
        for (int i = 1; i < u.Length; i++)
            if (!double.IsNaN(u[i]) && !(Math.Abs(u[i]) <= Math.Abs(u[furthest])))
                furthest = i;
        return FormattableString.Invariant($"{Overflow}: {Equilibrium.Model.Unknowns.Describe(furthest)}, would move by {Math.Abs(u[furthest]):G3} (mm or rad); look for a load beyond all measure, or for a part that next to nothing holds");
    }

    private string InWords(string fault) => FormattableString.Invariant($"an element has no answer in stage {Stage.Number}, at progress {Equilibrium.Progress:G4}: {fault}");

    private void Tell()
    {
        if (_untold is not { } last)
            return;
        _untold = null;
        _observer.IterationMade(last);
    }
}
