using System.CommandLine;
using InterfaceFE.Runs;

namespace InterfaceFE.Cli;

/// <summary>`check DECK`.</summary>
internal static class CheckCommand
{
    public static Command Make(Terminal terminal)
    {
        var command = new ExampleCommand("check", "Check a deck without running it: all that is wrong, and how large its model is.", """
              interfacefe check inputs/coupons/peel-epoxy.yaml --into results/peel-epoxy
              interfacefe check inputs/coupons/peel-epoxy.yaml --expand > resolved.yaml
            """);
        Argument<string> deck = CommonOptions.Deck();
        Option<string> into = CommonOptions.Into("Draw the model into DIR/figures.");
        Option<bool> expand = new("--expand") { Description = "Print the deck as resolved, with includes brought in and defaults spelt out; itself a deck." };
        Option<bool> json = CommonOptions.Json("the report"), quiet = CommonOptions.Quiet();
        command.Add(deck);
        command.Add(into);
        command.Add(expand);
        command.Add(quiet);
        command.Add(json);
        command.SetAction(parsed => (int)Execute(terminal, parsed.GetRequiredValue(deck), parsed.GetValue(into), parsed.GetValue(expand), parsed.GetValue(quiet), parsed.GetValue(json)));
        return command;
    }

    private static ExitCode Execute(Terminal terminal, string deck, string? into, bool expand, bool quiet, bool json)
    {
        CheckOutcome outcome = DeckCheck.Execute(deck, into, terminal.Progress(quiet));
        if (outcome.Report is not { } report)
            return terminal.Fail(outcome.Code, outcome.Messages);
        if (json)
            terminal.Print(stream => report.WriteJson(stream, expand));
        else if (expand)
            terminal.Output.Write(report.ResolvedDeck);
        else
            report.WriteText(terminal.Output);
        // The deck alone belongs on the output, so that it can be kept as a file; the report is told beside it.
        if (expand && !json && !quiet)
            report.WriteText(terminal.Error);
        return outcome.Code;
    }
}
