using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Marching;
using InterfaceFE.Results;

namespace InterfaceFE.Runs;

/// <summary>What came of a run from a deck file.</summary>
/// <param name="Code">How it ended.</param>
/// <param name="Messages">What is wrong, one line each; empty when there is a result.</param>
/// <param name="Result">Records and summary; null when the run did not come about.</param>
public sealed record FileRunOutcome(ExitCode Code, IReadOnlyList<string> Messages, RunResult? Result);

/// <summary>A run from a deck file to a folder of results, with every fault turned into words and an exit code. Throws nothing for what decks, disks and folders may hold.</summary>
public static class DeckFileRun
{
    /// <summary>Reads the deck and runs it.</summary>
    /// <param name="deckFile">The deck.</param>
    /// <param name="folder">Folder of the results.</param>
    /// <param name="overwrite">Whether results that are there are replaced.</param>
    /// <param name="replayFile">convergence.csv of an earlier run whose strides, controls and roots are followed; null: none.</param>
    /// <param name="progress">Takes lines of progress.</param>
    /// <param name="cancellation">Stops the march; what was found is written all the same.</param>
    public static FileRunOutcome Execute(string deckFile, string folder, bool overwrite, string? replayFile, Action<string> progress, CancellationToken cancellation)
    {
        ArgumentException.ThrowIfNullOrEmpty(deckFile);
        ArgumentException.ThrowIfNullOrEmpty(folder);
        ArgumentNullException.ThrowIfNull(progress);
        var clock = new PhaseClock();
        DeckReading reading;
        using (clock.In(Phase.Reading))
            reading = DeckReader.Read(deckFile);
        return Faults.Guard(reading, folder, () =>
        {
            if (reading.Deck is null)
                return Wrong([.. reading.Problems.Select(p => p.ToString())]);
            if (RunFolder.Refusal(folder, overwrite, [deckFile, .. reading.IncludedFiles, .. replayFile is null ? (string[])[] : [replayFile]]) is { } refusal)
                return Wrong([refusal]);
            string[] warnings = [.. reading.Warnings.Select(p => p.ToString())];
            foreach (string warning in warnings)
                progress("warning: " + warning);
            RunResult result = new FolderRun(folder, progress) { Clock = clock }.Execute(reading.Deck, warnings, replayFile, cancellation);
            return new FileRunOutcome(CodeOf(result.Summary), [], result);
        }, (code, messages) => new FileRunOutcome(code, messages, null));
    }

    /// <summary>Exit code of a run: a finished run whose numbers do not hold fell short of its self-check.</summary>
    public static ExitCode CodeOf(RunSummary summary) => summary.Status switch
    {
        RunStatus.Finished or RunStatus.Severed => summary.SelfCheck.Verdict == Verdict.DoNotHold ? ExitCode.FellShort : ExitCode.Done,
        RunStatus.Interrupted => ExitCode.Interrupted,
        _ => ExitCode.StoppedEarly,
    };

    private static FileRunOutcome Wrong(IReadOnlyList<string> messages) => new(ExitCode.WrongDeckOrCall, messages, null);
}
