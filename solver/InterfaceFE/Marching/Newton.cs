using InterfaceFE.Model;

namespace InterfaceFE.Marching;

/// <summary>How a search for a point ended.</summary>
public enum NewtonStatus
{
    /// <summary>Force and control are within tolerance.</summary>
    Converged,

    /// <summary>The force out of balance stands at the floor that rounding sets: as good as converged.</summary>
    AtFloor,

    /// <summary>Too many iterations, or the force out of balance grows.</summary>
    Stalled,

    /// <summary>A number became infinite or not a number.</summary>
    NotFinite,
}

/// <summary>Outcome of a search.</summary>
/// <param name="Status">How it ended.</param>
/// <param name="Iterations">Corrections that were solved.</param>
/// <param name="Singular">Unknown of a pivot that was numerically zero in the last factorisation; -1 when none.</param>
/// <param name="Relative">Last force out of balance over the reference.</param>
public readonly record struct NewtonOutcome(NewtonStatus Status, int Iterations, int Singular, double Relative)
{
    /// <summary>Element and place that had no finite answer on the way, in words; null when all had. A shorter correction may have got by.</summary>
    public string? Fault { get; init; }

    /// <summary>Whether the point may be used.</summary>
    public bool Usable => Status is NewtonStatus.Converged or NewtonStatus.AtFloor;
}

/// <summary>What a search reports of each iteration.</summary>
/// <param name="Iteration">Iteration from 0.</param>
/// <param name="OutOfBalance">Largest force out of balance [N].</param>
/// <param name="Relative">The same over the reference.</param>
/// <param name="Correction">Largest change of the correction that led here [mm].</param>
/// <param name="ChangedElements">Elements whose tangent changed.</param>
/// <param name="Reason">What was done next, in words.</param>
public readonly record struct NewtonIteration(int Iteration, double OutOfBalance, double Relative, double Correction, int ChangedElements, string Reason);

/// <summary>Where a search of an earlier run ended.</summary>
/// <param name="Iterations">Corrections that it took.</param>
/// <param name="Relative">Force out of balance over the reference there.</param>
public readonly record struct RecordedEnd(int Iterations, double Relative);

/// <summary>
/// Newton-Raphson's method with the consistent tangent and a backtracking line search on the force out of balance. Faces that lie on each other may open and close in turn, place by
/// place, with next to no energy in it; then corrections are shortened to where the force out of balance does no more work along them, and the search is given longer.
/// Nothing is damped: the equations stay those of equilibrium.
/// </summary>
/// <param name="tolerance">Force out of balance over reference that counts as converged.</param>
/// <param name="controlTolerance">Error of the control equation over its stride that counts as converged.</param>
/// <param name="mostIterations">Corrections before the search gives up.</param>
public sealed class Newton(double tolerance, double controlTolerance = 1e-7, int mostIterations = 16)
{
    private const Wanted Everything = Wanted.Force | Wanted.Tangent | Wanted.LoadRate | Wanted.Dissipation;

    private const int SlowBeforeShortening = 2;
    private const int SlowBeforeStall = 6;
    private const int MostChatter = 100;

    /// <summary>Changes of the potential, relative, up to which a slow search without growth of damage is chatter of faces in contact.</summary>
    private const double Chatter = 1e-6;

    /// <summary>A replayed search has come as far as the recorded one when it is at most this many times as far off.</summary>
    private const double Nearly = 10;

    private const double WorkTolerance = 1e-10;
    private const int MostPolishing = 2;

    private static readonly double[] Shares = [0.5, 0.25, 0.1];

    private double[] _gradient = [];

    /// <summary>Searches from the tentative point of the equilibrium.</summary>
    /// <param name="equilibrium">Equilibrium with a first guess in place.</param>
    /// <param name="control">Control of the stride.</param>
    /// <param name="report">Told of each iteration.</param>
    /// <param name="recorded">
    /// End of the search that is replayed; null: none is. The replay makes as many corrections and goes on until it is about as close, so that the same method ends at the same iterate, and
    /// another one no worse; two points within one tolerance may lie further apart than rounding.
    /// </param>
    public NewtonOutcome Search(IEquilibrium equilibrium, IControl control, Action<NewtonIteration> report, RecordedEnd? recorded = null)
    {
        if (_gradient.Length != equilibrium.Displacement.Length)
            _gradient = new double[equilibrium.Displacement.Length];
        ResidualReport residual = equilibrium.Evaluate(Everything);
        double correction = 0, previous = double.PositiveInfinity, potential = double.PositiveInfinity;
        int singular = -1, slow = 0, polishing = 0;
        string? fault = null;
        bool shortens = false;
        for (int iteration = 0; ; iteration++)
        {
            if (!residual.Finite)
            {
                report(new NewtonIteration(iteration, residual.OutOfBalance, residual.Relative, correction, residual.ChangedElements, "not finite"));
                return new NewtonOutcome(NewtonStatus.NotFinite, iteration, singular, residual.Relative);
            }
            double controlError = Math.Abs(control.Equation(equilibrium, _gradient, out _)) / control.Stride;
            slow = residual.OutOfBalance > 0.5 * previous ? slow + 1 : 0;
            double before = potential;
            potential = equilibrium.Potential;
            bool chatters = control.FixesProgress && equilibrium.GrowingElements == 0 && Math.Abs(potential - before) <= Chatter * Math.Abs(potential);
            shortens |= chatters && slow >= SlowBeforeShortening;
            bool controlled = control.FixesProgress || controlError <= controlTolerance;
            bool balanced = residual.Relative <= tolerance && residual.HeldInPlace;
            bool atFloor = !balanced && residual.HeldInPlace && controlled && slow >= 1 && residual.OutOfBalance <= equilibrium.ResidualFloor();
            // In a slender part small forces out of balance may go with a travel whose error the account of energy would show: such a point is corrected once or twice more.
            bool polishes = balanced && residual.WorkShare > WorkTolerance && polishing < MostPolishing && iteration < mostIterations;
            bool converged = controlled && (balanced || atFloor) && !polishes;
            bool exhausted = iteration >= (chatters && shortens ? MostChatter : mostIterations) || (slow >= SlowBeforeStall && !(chatters && shortens) && !polishes);
            if (recorded is { } end)
            {
                exhausted = iteration >= end.Iterations + mostIterations;
                converged = iteration >= end.Iterations && (exhausted ? converged : IsAsClose(equilibrium, residual, control.FixesProgress ? 0 : controlError, end));
            }
            if (converged)
            {
                report(new NewtonIteration(iteration, residual.OutOfBalance, residual.Relative, correction, residual.ChangedElements, atFloor ? IterationReason.AtFloor : IterationReason.Converged));
                return new NewtonOutcome(atFloor ? NewtonStatus.AtFloor : NewtonStatus.Converged, iteration, singular, residual.Relative);
            }
            if (controlled && polishes)
                polishing++;
            if (exhausted)
            {
                report(new NewtonIteration(iteration, residual.OutOfBalance, residual.Relative, correction, residual.ChangedElements, "stalled"));
                return new NewtonOutcome(NewtonStatus.Stalled, iteration, singular, residual.Relative) { Fault = fault };
            }
            report(new NewtonIteration(iteration, residual.OutOfBalance, residual.Relative, correction, residual.ChangedElements, iteration == 0 ? "predicted" : "corrected"));
            previous = residual.OutOfBalance;
            Correction solved = equilibrium.Solve(control);
            singular = solved.Singular;
            if (!solved.Finite)
                return new NewtonOutcome(NewtonStatus.NotFinite, iteration, singular, residual.Relative);
            correction = solved.Largest;
            double work = shortens ? equilibrium.WorkAlongCorrection() : 0;
            equilibrium.Move(1);
            residual = equilibrium.Evaluate(Everything);
            if (!residual.Finite)
                fault ??= equilibrium.Fault();
            if (shortens)
                residual = Shorten(equilibrium, residual, work);
            // Within tolerance what grows is rounding: a correction for the control's sake would be shortened by chance.
            else if ((iteration > 0 || !residual.Finite) && previous > 0 && !(residual.OutOfBalance <= 1.5 * previous) && !(residual.Relative <= tolerance))
                residual = Backtrack(equilibrium, residual);
        }
    }

    private bool IsAsClose(IEquilibrium equilibrium, in ResidualReport residual, double controlError, RecordedEnd end) =>
        residual.HeldInPlace && controlError <= Nearly * controlTolerance
        && (residual.Relative <= Nearly * end.Relative || residual.OutOfBalance <= equilibrium.ResidualFloor());

    /// <summary>Shortens the correction, by false position (Illinois), to where the force out of balance does no work along it, if it is passed there.</summary>
    private static ResidualReport Shorten(IEquilibrium equilibrium, ResidualReport full, double workAtStart)
    {
        double workAtEnd = equilibrium.WorkAlongCorrection();
        if (!full.Finite || !(workAtStart * workAtEnd < 0) || Math.Abs(workAtEnd) < 0.2 * Math.Abs(workAtStart))
            return full;
        double left = 0, right = 1, atLeft = workAtStart, atRight = workAtEnd;
        for (int trial = 0; trial < 8; trial++)
        {
            double share = (left * atRight - right * atLeft) / (atRight - atLeft);
            equilibrium.Move(share);
            equilibrium.Evaluate(Wanted.Force);
            double work = equilibrium.WorkAlongCorrection();
            if (!(Math.Abs(work) > 0.1 * Math.Abs(workAtStart)))
                break;
            if (work * workAtStart > 0)
                (left, atLeft, atRight) = (share, work, 0.5 * atRight);
            else
                (right, atRight, atLeft) = (share, work, 0.5 * atLeft);
        }
        return equilibrium.Evaluate(Everything);
    }

    private static ResidualReport Backtrack(IEquilibrium equilibrium, ResidualReport full)
    {
        double best = full.Finite ? full.OutOfBalance : double.PositiveInfinity, bestShare = 1;
        foreach (double share in Shares)
        {
            equilibrium.Move(share);
            ResidualReport tried = equilibrium.Evaluate(Wanted.Force);
            if (!tried.Finite || tried.OutOfBalance >= best)
                continue;
            best = tried.OutOfBalance;
            bestShare = share;
        }
        equilibrium.Move(bestShare);
        return equilibrium.Evaluate(Everything);
    }
}
