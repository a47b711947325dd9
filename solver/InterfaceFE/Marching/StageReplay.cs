using InterfaceFE.Model;

namespace InterfaceFE.Marching;

/// <summary>Follows the recorded points of one stage: the same controls, strides, first guesses and numbers of iterations. Nothing is tried a second time.</summary>
/// <param name="points">Points of the stage.</param>
/// <param name="plan">The whole plan.</param>
internal sealed class StageReplay(StagePoints points, ReplayPlan plan)
{
    private readonly FullEquilibrium _equilibrium = points.Equilibrium;

    public MarchOutcome Run(CancellationToken cancellation)
    {
        if (points.Start() is { } cause)
            return Stop(cause);
        bool severed = false;
        foreach (RecordedPoint recorded in plan.Of(points.Stage.Number))
        {
            if (points.Cancelled(cancellation) is { } cancelled)
                return cancelled;
            if (Follow(recorded) is { } difference)
            {
                _equilibrium.RollBack();
                return Stop(difference);
            }
            // Where the specimen comes apart by rounding alone, the record knows whether the run went on.
            severed = points.Severed();
        }
        if (points.Point == plan.Points.Count && severed)
            return points.CameApart();
        if (_equilibrium.AcceptedProgress >= 1)
            return new MarchOutcome(MarchStatus.Finished, "");
        return points.LastOfTheBond()
            ?? Stop(FormattableString.Invariant($"the record that is replayed ends here, at progress {_equilibrium.AcceptedProgress:G6} of stage {points.Stage.Number} ({points.Stage.Words})"));
    }

    /// <summary>Makes a recorded point; returns what differs where it is not reached, else null.</summary>
    private string? Follow(RecordedPoint recorded)
    {
        for (int i = 0; i < recorded.Searches.Count; i++)
        {
            RecordedSearch search = recorded.Searches[i];
            if (i == 0)
                points.Guess(search.Guess);
            else
                points.GuessBetween(search.Guess, search.Progress);
            IControl control;
            if (search.Control == OwnControl.Label)
            {
                control = new OwnControl(search.Progress, search.Stride);
                _equilibrium.Progress = search.Progress;
            }
            else
                control = points.Way.Control(MeasureOf(search.Control), search.Stride, _equilibrium, points.Accepted);
            NewtonOutcome outcome = points.Search(control, search.Guess, recorded.Retries, new RecordedEnd(search.Iterations, search.Relative));
            if (!outcome.Usable)
                return Difference(recorded, search, outcome);
            if (i + 1 < recorded.Searches.Count)
                points.Refuse(IterationReason.PastEnd);
        }
        points.Accept();
        return null;
    }

    private static PathMeasure MeasureOf(string control) => control switch
    {
        LayerWorkControl.Label => PathMeasure.LayerWork,
        DissipationControl.Label => PathMeasure.Dissipation,
        _ => PathMeasure.ArcLength,
    };

    private string Difference(RecordedPoint recorded, RecordedSearch search, NewtonOutcome outcome) => FormattableString.Invariant(
        $"point {recorded.Number} of the record is not reached (stage {recorded.Stage}, control {search.Control}, stride {search.Stride:G6}): {points.Failure}; the force out of balance over the reference is {outcome.Relative:G3} after {outcome.Iterations} iterations, where the recorded run came to {search.Relative:G3} after {search.Iterations}");

    private static MarchOutcome Stop(string cause) => new(MarchStatus.StoppedEarly, cause);
}
