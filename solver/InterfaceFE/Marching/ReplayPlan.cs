using System.Globalization;
using InterfaceFE.Model;

namespace InterfaceFE.Marching;

/// <summary>A search of an earlier run, as much of it as a replay needs.</summary>
/// <param name="Control">Name of the control: one of <see cref="ReplayPlan.Controls"/>.</param>
/// <param name="Stride">Stride in the control's own measure.</param>
/// <param name="Guess">
/// Share of a way that was carried on as the first guess: of the way between the two points before, or, in a search for the end of a stage that another search passed, of the way to where
/// that one ended. 0: from the accepted point.
/// </param>
/// <param name="Progress">Progress where the search ended.</param>
/// <param name="Iterations">Corrections that were solved.</param>
/// <param name="Relative">Force out of balance over the reference where it ended.</param>
public readonly record struct RecordedSearch(string Control, double Stride, double Guess, double Progress, int Iterations, double Relative);

/// <summary>A point of an earlier run, and the searches that led to it.</summary>
/// <param name="Stage">Stage, from 1.</param>
/// <param name="Number">Number of the point, from 1.</param>
/// <param name="Retries">How many searches for it had failed before.</param>
/// <param name="Searches">One; or two, where the first one passed the end of the stage and the second one found the end itself.</param>
public sealed record RecordedPoint(int Stage, int Number, int Retries, IReadOnlyList<RecordedSearch> Searches);

/// <summary>
/// The choices of an earlier run: for each accepted point its control, stride and first guess, which fix the root. A march that follows them makes the same points, so that two ways of
/// computing them can be compared. The strides are what is fixed: each control goes on by the recorded stride from where the replay itself stands; progress is taken as recorded.
/// </summary>
public sealed class ReplayPlan
{
    /// <summary>Takes the points of a run in their order.</summary>
    /// <exception cref="ArgumentException">Numbers, stages or controls are not those of a run.</exception>
    public ReplayPlan(IReadOnlyList<RecordedPoint> points)
    {
        Points = points;
        for (int i = 0; i < points.Count; i++)
        {
            RecordedPoint point = points[i];
            if (point.Number != i + 1)
                throw new ArgumentException(Text($"point {i + 1} is missing; point {point.Number} stands in its place"));
            if (point.Stage < 1 || (i > 0 && point.Stage < points[i - 1].Stage))
                throw new ArgumentException(Text($"point {point.Number} belongs to stage {point.Stage}, out of order"));
            if (i > 0 && point.Stage > points[i - 1].Stage && End(points[i - 1]) is var end && !(end >= 1))
                throw new ArgumentException(Text($"stage {points[i - 1].Stage} ends at progress {end:G6}, and yet stage {point.Stage} follows"));
            foreach (RecordedSearch search in point.Searches)
                if (!Controls.Contains(search.Control) || !double.IsFinite(search.Stride) || search.Stride == 0 || !double.IsFinite(search.Guess) || !double.IsFinite(search.Progress) || !double.IsFinite(search.Relative) || search.Iterations < 0)
                    throw new ArgumentException(Text($"point {point.Number} has a search that cannot be followed: control '{search.Control}', stride {search.Stride:G6}, guess {search.Guess:G6}"));
            if (point.Searches.Count is not (1 or 2))
                throw new ArgumentException(Text($"point {point.Number} has {point.Searches.Count} searches"));
        }
    }

    /// <summary>Names of the controls.</summary>
    public static IReadOnlyList<string> Controls { get; } = [OwnControl.Label, LayerWorkControl.Label, DissipationControl.Label, ArcLengthControl.Label];

    /// <summary>All points, in order.</summary>
    public IReadOnlyList<RecordedPoint> Points { get; }

    /// <summary>
    /// The same choices, each search carried on by some corrections: what is left of the tolerances goes, and rounding alone stays. To be made and recorded where methods are compared that do
    /// not iterate alike.
    /// </summary>
    public ReplayPlan Deeper(int corrections) =>
        new([.. Points.Select(p => p with { Searches = [.. p.Searches.Select(s => s with { Iterations = s.Iterations + corrections })] })]);

    /// <summary>Points of a stage, in order.</summary>
    public IReadOnlyList<RecordedPoint> Of(int stage) => [.. Points.Where(p => p.Stage == stage)];

    /// <summary>Why the plan cannot be that of a model, in words; null when its stages fit.</summary>
    public string? Misfit(SpecimenModel model)
    {
        int[] march = [.. model.Stages.Where(s => s.Marches).Select(s => s.Number)], recorded = [.. Points.Select(p => p.Stage).Distinct()];
        for (int i = 0; i < recorded.Length; i++)
        {
            if (i >= march.Length || recorded[i] != march[i])
                return Text($"its points belong to stages {Words(recorded)}, those of this deck to stages {Words(march)}");
        }
        return null;
    }

    private static string Words(int[] stages) => stages.Length == 0 ? "(none)" : string.Join(", ", stages.Select(s => s.ToString(CultureInfo.InvariantCulture)));

    private static double End(RecordedPoint point) => point.Searches.Count == 0 ? double.NaN : point.Searches[^1].Progress;

    private static string Text(FormattableString text) => FormattableString.Invariant(text);
}
