using System.Globalization;

namespace InterfaceFE.Results;

/// <summary>The short summary for the terminal: plain lines, labels aligned, numbers to four significant digits with their units.</summary>
public static class SummaryText
{
    private const int LeastLabelWidth = 14;
    private const int LargestLabelWidth = 30;

    /// <summary>Writes the summary.</summary>
    public static void Write(RunSummary summary, TextWriter to)
    {
        ArgumentNullException.ThrowIfNull(summary);
        ArgumentNullException.ThrowIfNull(to);
        List<(string Label, string Text)> lines = [];
        Collect(summary, (label, text) => lines.Add((label, text)));
        int width = Math.Clamp(lines.Max(line => line.Label.Length), LeastLabelWidth, LargestLabelWidth);
        to.WriteLine(summary.Title);
        foreach ((string label, string text) in lines)
            to.WriteLine($"  {label.PadRight(width)}  {text}".TrimEnd());
    }

    private static void Collect(RunSummary summary, Action<string, string> line)
    {
        line("ended", SummaryWords.Of(summary.Status) + (summary.Cause.Length > 0 ? $": {summary.Cause}" : ""));
        SelfCheck check = summary.SelfCheck;
        line("self-check", $"{SummaryWords.Of(check.Verdict)} (balance {Number(check.Balance)}, path error {Number(check.PathError)})");
        foreach (string reason in check.Reasons)
            line("", reason);
        foreach (GripSummary grip in summary.Grips)
            if (Words(grip) is { Length: > 0 } words)
                line(grip.Name, words);
        if (summary.FirstDamage is { } damage)
            line("first damage", Words(damage));
        if (summary.FirstYield is { } yield)
            line("first yield", Words(yield));
        foreach (JointSummary joint in summary.Joints)
            line(joint.Name, Words(joint));
        foreach (AdherendSummary adherend in summary.Adherends)
            line(adherend.Name, Words(adherend));
        foreach (string remark in summary.Remarks)
            line("remark", remark);
        foreach (string warning in summary.Warnings)
            line("warning", warning);
        if (summary.Counts.Count > 0)
            line("counts", string.Join(", ", summary.Counts.Select(count => string.Create(CultureInfo.InvariantCulture, $"{count.Key} {count.Value}"))));
        if (summary.WallSeconds.Count > 0)
            line("timings", string.Join(", ", summary.WallSeconds.Select(phase => string.Create(CultureInfo.InvariantCulture, $"{phase.Key} {phase.Value:0.00} s"))));
    }

    /// <summary>A number to four significant digits in the invariant culture; a value that is missing is a dash.</summary>
    internal static string Number(double? value)
    {
        if (value is not { } number || !double.IsFinite(number))
            return "–";
        double size = Math.Abs(number);
        if (size != 0 && (size < 1e-3 || size >= 1e6))
            return number.ToString("0.###e0", CultureInfo.InvariantCulture);
        int decimals = size == 0 ? 0 : Math.Clamp(3 - (int)Math.Floor(Math.Log10(size)), 0, 6);
        return (Math.Round(number, decimals) + 0.0).ToString("0.######", CultureInfo.InvariantCulture);
    }

    private static string Words(GripSummary grip)
    {
        List<string> words = [];
        if (grip.PeakForce is not null)
            words.Add($"peak force {Number(grip.PeakForce)} N at {Number(grip.DisplacementAtPeak)} mm");
        if (grip.LargestStableForce is not null)
            words.Add($"largest stable force {Number(grip.LargestStableForce)} N at {Number(grip.DisplacementAtLargestStable)} mm");
        if (grip.PeakMoment is not null)
            words.Add($"peak moment {Number(grip.PeakMoment)} N·mm at {Number(grip.RotationAtPeak)} rad");
        if (grip.FinalForce is not null)
            words.Add($"final force {Number(grip.FinalForce)} N at {Number(grip.FinalDisplacement)} mm");
        if (grip.FinalMoment is not null)
            words.Add($"final moment {Number(grip.FinalMoment)} N·mm at {Number(grip.FinalRotation)} rad");
        return string.Join(", ", words);
    }

    private static string Words(JointSummary joint) =>
        $"opening {Number(joint.LargestOpening)} mm, sliding {Number(joint.LargestSliding)} mm, peel {Number(joint.LargestPeel)} MPa, "
        + $"shear {Number(joint.LargestShear)} MPa, damage {Number(joint.LargestDamage)}, separated {Number(joint.SeparatedLength)} mm";

    private static string Words(AdherendSummary adherend) =>
        $"equivalent stress {Number(adherend.LargestEquivalentStress)} MPa at x {Number(adherend.X)} mm, y {Number(adherend.Y)} mm, "
        + $"plastic strain {Number(adherend.LargestPlasticStrain)}";

    private static string Words(EventSummary happened) =>
        string.Create(CultureInfo.InvariantCulture, $"{happened.Where}, point {happened.Point}, stage {happened.Stage} at {100 * happened.Progress:0.#} %");
}
