using InterfaceFE.Validation.Framework;
using Xunit;

namespace InterfaceFE.Tests.Validation;

public class CaseRunnerTests
{
    [Fact]
    public void A_case_that_breaks_keeps_its_lines_counts_as_not_holding_and_stops_no_other()
    {
        var output = new StringWriter();
        var runner = new CaseRunner(output, TextWriter.Null, ".", quick: true);
        runner.Run(new Made("breaks", Breaking()));
        runner.Run(new Made("empty", []));
        runner.Run(new Made("sound", [new CaseLine("a", 1, 1, 0, "", ""), CaseLine.Reported("b", 2, "", "")]));
        Assert.Equal((2, 2), (runner.Holding, runner.NotHolding));
        Assert.Equal([2, 1, 2], runner.Outcomes.Select(o => o.Lines.Count));
        Assert.Contains("DOES NOT HOLD breaks broke off", output.ToString(), StringComparison.Ordinal);
        Assert.Contains("no bond left", output.ToString(), StringComparison.Ordinal);

        static IEnumerable<CaseLine> Breaking()
        {
            yield return new CaseLine("first", 1, 1, 0, "", "");
            throw new InvalidOperationException("no bond left");
        }
    }

    [Fact]
    public void Cases_of_the_console_are_found_with_names_and_groups_of_their_own()
    {
        IReadOnlyList<ICase> cases = CaseFinder.In(typeof(ICase).Assembly);
        Assert.Contains(cases, c => c is { Name: "moment-even", Quick: true });
        Assert.All(cases, c => Assert.Matches("^[a-z0-9]+(-[a-z0-9]+)*$", c.Name));
        Assert.All(cases, c => Assert.False(string.IsNullOrWhiteSpace(c.Group)));
    }

    [Fact]
    public void The_report_has_a_row_for_each_line_with_its_source_and_counts_what_holds()
    {
        CaseOutcome outcome = new(new Made("sound", []), [new CaseLine("a | b", 100, 100.5, 0.01, "mm", "derived"), CaseLine.AtMost("limit", 1, 2, "", "common practice")], [], 0);
        string text = Report.Text([outcome], "1.2.3", new DateOnly(2026, 2, 3));
        Assert.Contains("Version 1.2.3, 2026-02-03. 1 hold, 1 do not.", text, StringComparison.Ordinal);
        Assert.Contains("| a \\| b | 100 | 100.5 | mm | +0.5 % | 1.0 % | HOLD | derived |", text, StringComparison.Ordinal);
        Assert.Contains("| limit | 1 | 2 |  |  | at most | DOES NOT HOLD | common practice |", text, StringComparison.Ordinal);
    }

    private sealed class Made(string name, IEnumerable<CaseLine> lines) : ICase
    {
        public string Name => name;

        public string Group => "Made up";

        public bool Quick => true;

        public IEnumerable<CaseLine> Run(CaseContext context) => lines;
    }
}
