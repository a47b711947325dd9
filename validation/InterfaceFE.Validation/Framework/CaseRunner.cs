using System.Diagnostics;
using System.Globalization;
using InterfaceFE.Decks;

namespace InterfaceFE.Validation.Framework;

/// <summary>Lines, figures and time of one case.</summary>
/// <param name="Case">The case.</param>
/// <param name="Lines">Its lines.</param>
/// <param name="Figures">Its figures.</param>
/// <param name="Seconds">Wall-clock time [s].</param>
public sealed record CaseOutcome(ICase Case, IReadOnlyList<CaseLine> Lines, IReadOnlyList<CaseFigure> Figures, double Seconds);

/// <summary>Runs cases one after the other and prints their lines. A case that breaks leaves a line that does not hold and stops no other.</summary>
/// <param name="output">Takes the lines.</param>
/// <param name="progress">Takes lines of progress.</param>
/// <param name="root">Root folder of the repository.</param>
/// <param name="quick">Whether the run is a quick one.</param>
public sealed class CaseRunner(TextWriter output, TextWriter progress, string root, bool quick)
{
    private readonly List<CaseOutcome> _outcomes = [];

    /// <summary>Outcomes so far.</summary>
    public IReadOnlyList<CaseOutcome> Outcomes => _outcomes;

    /// <summary>Number of judged lines that hold.</summary>
    public int Holding => _outcomes.SelectMany(o => o.Lines).Count(l => l.IsJudged && l.Holds);

    /// <summary>Number of judged lines that do not.</summary>
    public int NotHolding => _outcomes.SelectMany(o => o.Lines).Count(l => l.IsJudged && !l.Holds);

    /// <summary>Runs one case.</summary>
    public void Run(ICase one)
    {
        ArgumentNullException.ThrowIfNull(one);
        progress.WriteLine($"{one.Name}: running");
        long start = Stopwatch.GetTimestamp();
        CaseContext context = new(quick, root, progress.WriteLine);
        List<CaseLine> lines = [];
        output.WriteLine($"{one.Group}: {one.Name}");
        try
        {
            foreach (CaseLine line in one.Run(context))
            {
                lines.Add(line);
                output.WriteLine(Text(line));
            }
            if (lines.Count == 0)
                throw new InvalidOperationException("the case has no line");
        }
        // A case runs the whole program: whatever goes wrong in it belongs into its lines, beside the other cases' results.
        catch (Exception fault)
        {
            CaseLine broken = CaseLine.Broken(one.Name + " broke off", $"{fault.GetType().Name}: {fault.Message}".ReplaceLineEndings(" "));
            lines.Add(broken);
            output.WriteLine(Text(broken));
            if (fault is not (DeckException or InvalidOperationException))
                progress.WriteLine(fault);
        }
        double seconds = Stopwatch.GetElapsedTime(start).TotalSeconds;
        progress.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{one.Name}: {seconds:0.0} s"));
        _outcomes.Add(new CaseOutcome(one, lines, context.Figures, seconds));
    }

    private static string Text(CaseLine line)
    {
        string limit = line.Kind == LineKind.AtMost ? "at most" : line.Kind == LineKind.Reported ? "" : line.Kind == LineKind.Close ? "expected" : "";
        string numbers = line.Kind == LineKind.Skipped || (double.IsNaN(line.Expected) && double.IsNaN(line.Got)) ? line.Source
            : $"got {CaseLine.Number(line.Got),12} {limit,8} {CaseLine.Number(line.Expected),12} {line.Unit,-7} {line.DifferenceText(),12} {(line.Kind == LineKind.Close ? "of " + line.ToleranceText() : "")}";
        return $"  {line.Verdict,-13} {line.What,-100} {numbers}".TrimEnd();
    }
}
