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

/// <summary>
/// Newton-Raphson's method with the consistent tangent and a backtracking line search on the force out of balance. Nothing is damped: the equations stay those of equilibrium.
/// </summary>
/// <param name="tolerance">Force out of balance over reference that counts as converged.</param>
/// <param name="controlTolerance">Error of the control equation over its stride that counts as converged.</param>
/// <param name="mostIterations">Corrections before the search gives up.</param>
public sealed class Newton(double tolerance, double controlTolerance = 1e-7, int mostIterations = 16)
{
    private const double WorkTolerance = 1e-10;
    private const int MostPolishing = 2;

    private static readonly double[] Shares = [0.5, 0.25, 0.1];

    private double[] _gradient = [];

    /// <summary>Searches from the tentative point of the equilibrium.</summary>
    /// <param name="equilibrium">Equilibrium with a first guess in place.</param>
    /// <param name="control">Control of the stride.</param>
    /// <param name="report">Told of each iteration.</param>
    public NewtonOutcome Search(IEquilibrium equilibrium, IControl control, Action<NewtonIteration> report)
    {
        if (_gradient.Length != equilibrium.Displacement.Length)
            _gradient = new double[equilibrium.Displacement.Length];
        ResidualReport residual = equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate);
        double correction = 0, previous = double.PositiveInfinity;
        int singular = -1, slow = 0, polishing = 0;
        for (int iteration = 0; ; iteration++)
        {
            if (!residual.Finite)
            {
                report(new NewtonIteration(iteration, residual.OutOfBalance, residual.Relative, correction, residual.ChangedElements, "not finite"));
                return new NewtonOutcome(NewtonStatus.NotFinite, iteration, singular, residual.Relative);
            }
            double controlError = Math.Abs(control.Equation(equilibrium, _gradient, out _)) / control.Stride;
            slow = residual.OutOfBalance > 0.5 * previous ? slow + 1 : 0;
            bool controlled = control.FixesProgress || controlError <= controlTolerance;
            bool balanced = residual.Relative <= tolerance && residual.HeldInPlace;
            bool atFloor = !balanced && residual.HeldInPlace && controlled && slow >= 1 && residual.OutOfBalance <= equilibrium.ResidualFloor();
            // In a slender part small forces out of balance may go with a travel whose error the account of energy would show: such a point is corrected once or twice more.
            bool polishes = balanced && residual.WorkShare > WorkTolerance && polishing < MostPolishing && iteration < mostIterations;
            if (controlled && (balanced || atFloor) && !polishes)
            {
                report(new NewtonIteration(iteration, residual.OutOfBalance, residual.Relative, correction, residual.ChangedElements, atFloor ? "converged at the floor" : "converged"));
                return new NewtonOutcome(atFloor ? NewtonStatus.AtFloor : NewtonStatus.Converged, iteration, singular, residual.Relative);
            }
            if (controlled && polishes)
                polishing++;
            if (iteration >= mostIterations || (slow >= 6 && !polishes))
            {
                report(new NewtonIteration(iteration, residual.OutOfBalance, residual.Relative, correction, residual.ChangedElements, "stalled"));
                return new NewtonOutcome(NewtonStatus.Stalled, iteration, singular, residual.Relative);
            }
            report(new NewtonIteration(iteration, residual.OutOfBalance, residual.Relative, correction, residual.ChangedElements, iteration == 0 ? "predicted" : "corrected"));
            previous = residual.OutOfBalance;
            Correction solved = equilibrium.Solve(control);
            singular = solved.Singular;
            if (!solved.Finite)
                return new NewtonOutcome(NewtonStatus.NotFinite, iteration, singular, residual.Relative);
            correction = solved.Largest;
            equilibrium.Move(1);
            residual = equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate);
            if (iteration > 0 && previous > 0 && !(residual.OutOfBalance <= 1.5 * previous))
                residual = Backtrack(equilibrium, residual);
        }
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
        return equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate);
    }
}
