using System.Globalization;
using System.Text;
using InterfaceFE.Reports;

namespace InterfaceFE.Validation.Framework;

/// <summary>Writes validation/REPORT.md and its figures.</summary>
public static class Report
{
    /// <summary>Writes report and figures.</summary>
    /// <param name="root">Root folder of the repository.</param>
    /// <param name="outcomes">Outcomes of all cases.</param>
    /// <param name="version">Version of the library.</param>
    /// <param name="date">Date of the run.</param>
    public static void Write(string root, IReadOnlyList<CaseOutcome> outcomes, string version, DateOnly date)
    {
        ArgumentNullException.ThrowIfNull(outcomes);
        string folder = Path.Combine(root, "validation", "figures");
        Directory.CreateDirectory(folder);
        foreach (CaseFigure figure in outcomes.SelectMany(o => o.Figures))
            File.WriteAllBytes(Path.Combine(folder, figure.FileName + ".png"), Plotting.Png(Drawn(figure)));
        File.WriteAllText(Path.Combine(root, "validation", "REPORT.md"), Text(outcomes, version, date), new UTF8Encoding(false));
    }

    /// <summary>The report's text.</summary>
    public static string Text(IReadOnlyList<CaseOutcome> outcomes, string version, DateOnly date)
    {
        ArgumentNullException.ThrowIfNull(outcomes);
        CaseLine[] all = [.. outcomes.SelectMany(o => o.Lines)];
        StringBuilder text = new();
        text.Append("# Validation report\n\n")
            .Append(CultureInfo.InvariantCulture, $"Version {version}, {date:yyyy-MM-dd}. {all.Count(l => l.IsJudged && l.Holds)} hold, {all.Count(l => l.IsJudged && !l.Holds)} do not.\n\n")
            .Append("Made by `dotnet run -c Release --project validation/InterfaceFE.Validation -- all`. A tolerance is relative to the expected value (absolute where that is 0). ")
            .Append("\"Reported\" values are shown, not judged. A simulation that agrees with a formula is no proof that a joint is strong enough: laws scatter, and designs are verified by test.\n");
        foreach (IGrouping<string, CaseOutcome> group in outcomes.GroupBy(o => o.Case.Group))
        {
            text.Append(CultureInfo.InvariantCulture, $"\n## {Cell(group.Key)}\n");
            foreach (CaseOutcome outcome in group)
                Append(text, outcome);
        }
        return text.ToString();
    }

    private static void Append(StringBuilder text, CaseOutcome outcome)
    {
        text.Append(CultureInfo.InvariantCulture, $"\n### {Cell(outcome.Case.Name)}\n\n");
        text.Append("| what | expected | got | unit | difference | tolerance | verdict | source |\n|---|---|---|---|---|---|---|---|\n");
        foreach (CaseLine line in outcome.Lines)
            text.Append(CultureInfo.InvariantCulture,
                $"| {Cell(line.What)} | {CaseLine.Number(line.Expected)} | {CaseLine.Number(line.Got)} | {line.Unit} | {line.DifferenceText()} | {line.ToleranceText()} | {line.Verdict} | {Cell(line.Source)} |\n");
        foreach (CaseFigure figure in outcome.Figures)
            text.Append(CultureInfo.InvariantCulture, $"\n![{Cell(figure.Title)}](figures/{figure.FileName}.png)\n");
    }

    private static string Cell(string text) => text.Replace("|", "\\|", StringComparison.Ordinal).ReplaceLineEndings(" ");

    private static Figure Drawn(CaseFigure figure) => new()
    {
        Title = figure.Title,
        Subtitles = [figure.Subtitle],
        Panels =
        [
            new Panel
            {
                XTitle = figure.XTitle,
                YTitle = figure.YTitle,
                Curves = [.. figure.Curves.Select((c, i) => new Curve(c.Name, [.. c.X], [.. c.Y], i) { Marking = c.Points ? Marking.Hollow : Marking.None })],
            },
        ],
    };
}
