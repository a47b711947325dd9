using System.CommandLine;
using InterfaceFE.Runs;
using InterfaceFE.Variants;

namespace InterfaceFE.Cli;

/// <summary>`variants FOLDER`.</summary>
internal static class VariantsCommand
{
    public static Command Make(Terminal terminal)
    {
        var command = new ExampleCommand("variants", "Run all decks of a folder one after another, past bad ones; ends with the highest exit code of its decks.", """
              interfacefe variants inputs/coupons --into results/coupons
            """);
        Argument<string> folder = CommonOptions.Path("FOLDER", "Folder with decks (*.yaml; folders below it are left out).");
        Option<string> into = CommonOptions.Into("Folder of the results: variants.csv, overlay.png and .svg, and a folder for each deck; left out: results/FOLDERNAME.");
        Option<bool> overwrite = CommonOptions.Overwrite(), quiet = CommonOptions.Quiet();
        command.Add(folder);
        command.Add(into);
        command.Add(overwrite);
        command.Add(quiet);
        command.SetAction(parsed => (int)Execute(terminal, parsed.GetRequiredValue(folder), parsed.GetValue(into), parsed.GetValue(overwrite), parsed.GetValue(quiet)));
        return command;
    }

    private static ExitCode Execute(Terminal terminal, string folder, string? into, bool overwrite, bool quiet)
    {
        into ??= Path.Join("results", Path.GetFileName(Path.TrimEndingDirectorySeparator(Path.GetFullPath(folder))));
        BatchOutcome outcome = VariantBatch.Execute(folder, into, overwrite, terminal.Progress(quiet), terminal.Cancellation);
        foreach (VariantRow row in outcome.Rows)
            terminal.Output.WriteLine(row.Words());
        if (outcome.Messages.Count > 0)
            return terminal.Fail(outcome.Code, outcome.Messages);
        terminal.Output.WriteLine($"Results are in {into}, all rows in {Path.Join(into, "variants.csv")}");
        return outcome.Code;
    }
}
