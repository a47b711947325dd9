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
/// <param name="replay">Choices of an earlier run, which are followed; null: the march chooses for itself. Of the settings the tolerance alone counts then.</param>
public sealed class March(FullEquilibrium equilibrium, MarchSettings settings, IMarchObserver observer, ReplayPlan? replay = null)
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
            var points = new StagePoints(equilibrium, settings.Tolerance, observer, _ledger!, stage, _point, _time, _bodiesAtStart);
            MarchOutcome outcome = replay is null ? new StageMarch(points, settings, observer).Run(cancellation) : new StageReplay(points, replay).Run(cancellation);
            _point = points.Point;
            _time += stage.Duration;
            if (outcome.Status != MarchStatus.Finished)
                return outcome;
        }
        return new MarchOutcome(MarchStatus.Finished, "");
    }

    /// <summary>Words for a model whose numbers are not finite before anything has moved.</summary>
    internal static string NotFinite(FullEquilibrium equilibrium) =>
        "the stiffness of the model is not finite at the start: look for extreme numbers in the deck" + (equilibrium.Fault() is { } fault ? $" ({fault})" : "");

    private string? Start()
    {
        ResidualReport residual = equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate);
        if (!residual.Finite)
            return NotFinite(equilibrium);
        (int negative, int singular) = equilibrium.Stability();
        if (equilibrium.FactorOverflows)
            return NotFinite(equilibrium);
        if (singular >= 0)
            return LoosePart.Describe(equilibrium, singular);
        equilibrium.Accept();
        _ledger = new EnergyLedger(equilibrium);
        _bodiesAtStart = equilibrium.Bonds.Connections().Bodies;
        observer.PointAccepted(new MarchPoint(0, 0, true, 0, 0, equilibrium.Temperature, negative == 0, _ledger.Account()));
        return null;
    }
}
