using InterfaceFE.Results;

namespace InterfaceFE.Reports;

/// <summary>Force against displacement of a grip, or moment against rotation of a turned one, with its peak and the stretches where the equilibrium is unstable.</summary>
internal static class LoadFigure
{
    /// <summary>Makes the figure.</summary>
    /// <exception cref="NoDataException">There is no such grip or no reading of it.</exception>
    public static Figure Of(RunHistory history, RunSummary summary, string name)
    {
        int index = MainGrip.IndexOf(history, name);
        if (index < 0)
            throw new NoDataException($"there is no grip {name}");
        GripInfo grip = history.Grips[index];
        int n = history.Points.Count;
        double[] x = new double[n], y = new double[n];
        bool[] stable = new bool[n];
        for (int i = 0; i < n; i++)
        {
            GripReading reading = history.Points[i].Grips[index];
            x[i] = grip.Turned ? MainGrip.Degrees(reading.Rotation) : reading.Displacement;
            y[i] = grip.Turned ? reading.Moment ?? double.NaN : reading.Force;
            stable[i] = history.Points[i].Stable;
        }
        double largest = y.Where((value, i) => double.IsFinite(value) && double.IsFinite(x[i])).Select(Math.Abs).DefaultIfEmpty(double.NaN).Max();
        if (double.IsNaN(largest))
            throw new NoDataException($"{name} has no finite reading");
        string unit = grip.Turned ? "N·mm" : "N";
        double scale = 1;
        if (largest >= 2e4)
            (scale, unit) = (1e-3, grip.Turned ? "N·m" : "kN");
        for (int i = 0; i < n; i++)
            y[i] *= scale;
        return new Figure
        {
            Title = grip.Turned ? $"Moment against rotation of {name}" : $"Force against displacement of {name}",
            Subtitles = [history.Title, .. EndWords(summary)],
            Panels =
            [
                new Panel
                {
                    XTitle = grip.Turned ? $"Rotation of {name} (degrees)" : $"Displacement of {name} (mm)",
                    YTitle = grip.Turned ? $"Moment ({unit})" : $"Force ({unit})",
                    Curves = [.. Curves(x, y, stable, grip.Turned ? "moment" : "force"), .. grip.HasLoadTrain && !grip.Turned ? [Crosshead(history, index, y)] : (Curve[])[]],
                    Notes = Peak(summary, grip, x, y, scale, unit),
                },
            ],
        };
    }

    /// <summary>How the run ended when it did not simply finish.</summary>
    internal static IEnumerable<string> EndWords(RunSummary summary)
    {
        if (summary.Status != RunStatus.Finished)
            yield return $"The run {(summary.Status == RunStatus.StoppedEarly ? "stopped early" : summary.Status == RunStatus.Severed ? "ended with the specimen severed" : "was interrupted")}"
                + (summary.Cause.Length > 0 ? $": {summary.Cause}" : "");
    }

    private static List<Curve> Curves(double[] x, double[] y, bool[] stable, string what)
    {
        int n = x.Length;
        bool anyUnstable = stable.Contains(false);
        double[] steady = [.. y], lost = new double[n], points = new double[n];
        Array.Fill(lost, double.NaN);
        Array.Fill(points, double.NaN);
        for (int i = 0; i < n; i++)
        {
            if (stable[i])
                continue;
            steady[i] = double.NaN;
            points[i] = y[i];
            for (int k = Math.Max(0, i - 1); k <= Math.Min(n - 1, i + 1); k++)
                lost[k] = y[k];
        }
        List<Curve> curves = [new Curve(anyUnstable ? $"{what}, stable equilibrium" : what, x, steady, 0)];
        if (anyUnstable)
        {
            // The dotted line joins the unstable points to their stable neighbours; hollow markers stand at the unstable points alone.
            curves.Add(new Curve("", x, lost, 0) { Marking = Marking.None, Dotted = true });
            curves.Add(new Curve($"{what}, unstable equilibrium", [.. x], points, 0) { Marking = Marking.Hollow, Dotted = true });
        }
        return curves;
    }

    private static Curve Crosshead(RunHistory history, int index, double[] y) =>
        new("force against travel of the crosshead", [.. history.Points.Select(p => p.Grips[index].Crosshead ?? double.NaN)], y, 1);

    private static List<Note> Peak(RunSummary summary, GripInfo grip, double[] x, double[] y, double scale, string unit)
    {
        GripSummary? told = summary.Grips.Find(one => one.Name == grip.Name);
        double? atX = grip.Turned && told?.RotationAtPeak is { } rotation ? MainGrip.Degrees(rotation) : grip.Turned ? null : told?.DisplacementAtPeak;
        double? atY = scale * (grip.Turned ? told?.PeakMoment : told?.PeakForce);
        if (atX is null || atY is null || !double.IsFinite(atX.Value) || !double.IsFinite(atY.Value))
        {
            int best = -1;
            for (int i = 0; i < x.Length; i++)
                if (double.IsFinite(x[i]) && double.IsFinite(y[i]) && (best < 0 || y[i] > y[best]))
                    best = i;
            if (best < 0)
                return [];
            (atX, atY) = (x[best], y[best]);
        }
        return [new Note(atX.Value, atY.Value, $"peak {SummaryText.Number(atY)} {unit} at {SummaryText.Number(atX)}{(grip.Turned ? "°" : " mm")}", 0)];
    }
}
