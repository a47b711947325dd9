using System.CommandLine;
using InterfaceFE.Results;
using InterfaceFE.Runs;

namespace InterfaceFE.Cli;

/// <summary>`run DECK`.</summary>
internal static class RunCommand
{
    public static Command Make(Terminal terminal)
    {
        var command = new ExampleCommand("run", "Run a deck and write curves, fields, figures, summary and log into a folder.", """
              interfacefe run inputs/coupons/peel-epoxy.yaml --into results/peel-epoxy
            """);
        Argument<string> deck = CommonOptions.Deck();
        Option<string> into = CommonOptions.Into("Folder of the results; left out: results/DECKNAME.");
        Option<string> replay = CommonOptions.File("--replay", "convergence.csv of an earlier run of the deck: follow its strides, controls and roots point by point, to compare two ways of computing.");
        Option<bool> overwrite = CommonOptions.Overwrite(), quiet = CommonOptions.Quiet(), json = CommonOptions.Json("the summary");
        command.Add(deck);
        command.Add(into);
        command.Add(replay);
        command.Add(overwrite);
        command.Add(quiet);
        command.Add(json);
        command.SetAction(parsed => (int)Execute(terminal, parsed.GetRequiredValue(deck), parsed.GetValue(into), parsed.GetValue(replay), parsed.GetValue(overwrite), parsed.GetValue(quiet), parsed.GetValue(json)));
        return command;
    }

    private static ExitCode Execute(Terminal terminal, string deck, string? into, string? replay, bool overwrite, bool quiet, bool json)
    {
        string folder = into ?? RunFolder.DefaultFor(deck);
        FileRunOutcome outcome = DeckFileRun.Execute(deck, folder, overwrite, replay, terminal.Progress(quiet), terminal.Cancellation);
        if (outcome.Result is not { } result)
            return terminal.Fail(outcome.Code, outcome.Messages);
        if (json)
        {
            terminal.Print(stream => SummaryWriter.Write(stream, result.Summary));
            return outcome.Code;
        }
        SummaryText.Write(result.Summary, terminal.Output);
        terminal.Output.WriteLine($"Results are in {folder}");
        return outcome.Code;
    }
}
