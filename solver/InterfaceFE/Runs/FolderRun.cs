using System.Security.Cryptography;
using System.Text;
using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Marching;
using InterfaceFE.Reports;
using InterfaceFE.Results;

namespace InterfaceFE.Runs;

/// <summary>
/// A run from a deck to a folder of results: CSV, VTU, summary, figures, log. The folder is touched once mesh and model stand, so a deck that cannot be built costs
/// no earlier results and leaves no folder.
/// </summary>
public sealed class FolderRun
{
    private readonly string _folder;
    private readonly Action<string> _progress;

    /// <summary>Prepares a run.</summary>
    /// <param name="folder">Folder of the results; made if there is none. Files of an earlier run in it are replaced.</param>
    /// <param name="progress">Takes lines of progress.</param>
    public FolderRun(string folder, Action<string> progress)
    {
        _folder = folder;
        _progress = progress;
    }

    /// <summary>Takes the time by phase. One that ran while the deck was read has that time too.</summary>
    public PhaseClock Clock { get; init; } = new();

    /// <summary>Runs a deck that was read without problems.</summary>
    /// <param name="deck">The deck.</param>
    /// <param name="warnings">Warnings of the reading, for log and summary.</param>
    /// <param name="cancellation">Stops the march; what was found is written all the same.</param>
    /// <exception cref="DeckException">The deck cannot be built; nothing is left in the folder.</exception>
    /// <exception cref="IOException">The folder cannot be written. A disk that fills up later stops the run early instead.</exception>
    /// <exception cref="UnauthorizedAccessException">The folder must not be written.</exception>
    public RunResult Execute(Deck deck, IReadOnlyList<string> warnings, CancellationToken cancellation) => Execute(deck, warnings, null, cancellation);

    /// <summary>Runs a deck that was read without problems, or replays an earlier run of it.</summary>
    /// <param name="deck">The deck.</param>
    /// <param name="warnings">Warnings of the reading, for log and summary.</param>
    /// <param name="replayFile">convergence.csv of an earlier run whose choices are followed; null: none.</param>
    /// <param name="cancellation">Stops the march; what was found is written all the same.</param>
    /// <exception cref="ReplayException">The earlier run cannot be replayed with this deck; nothing is left in the folder.</exception>
    /// <exception cref="DeckException">The deck cannot be built; nothing is left in the folder.</exception>
    /// <exception cref="IOException">The folder cannot be written. A disk that fills up later stops the run early instead.</exception>
    /// <exception cref="UnauthorizedAccessException">The folder must not be written.</exception>
    public RunResult Execute(Deck deck, IReadOnlyList<string> warnings, string? replayFile, CancellationToken cancellation)
    {
        string resolved = DeckWriter.Write(deck), hash = Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(resolved)));
        ReplayPlan? replay = replayFile is null ? null : ReplayFile.Read(replayFile, hash);
        using var stop = CancellationTokenSource.CreateLinkedTokenSource(cancellation);
        FolderSink? sink = null;
        try
        {
            RunResult result = DeckRun.Execute(deck, history => sink = Open(resolved, warnings, replayFile, history, stop), replay, Clock, stop.Token);
            result.Summary.DeckHash = hash;
            result.Summary.Warnings.InsertRange(0, warnings);
            Complete(result, sink!);
            return result;
        }
        catch (Exception e) when (e is DeckException or ReplayException)
        {
            sink?.Discard();
            throw;
        }
        catch (Exception e)
        {
            sink?.Log($"an error in the program stopped the run: {e}");
            throw;
        }
        finally
        {
            sink?.Dispose();
        }
    }

    private FolderSink Open(string resolved, IReadOnlyList<string> warnings, string? replayFile, RunHistory history, CancellationTokenSource stop)
    {
        FolderSink sink = new(_folder, resolved, history, _progress, stop);
        foreach (string warning in warnings)
            sink.Log("warning: " + warning);
        if (replayFile is not null)
            sink.Say("replay of " + replayFile);
        return sink;
    }

    /// <summary>Summary first, figures after it, the summary once more with their time: whatever happens to the figures, the numbers are safe.</summary>
    private void Complete(RunResult result, FolderSink sink)
    {
        RunSummary summary = result.Summary;
        if (sink.Fault is { } fault)
        {
            summary.Status = RunStatus.StoppedEarly;
            summary.Cause = "a file of the results could not be written: " + fault;
        }
        string file = Path.Join(_folder, "summary.json");
        using (Clock.In(Phase.Writing))
            sink.Try(() => SummaryWriter.Write(file, summary));
        using (Clock.In(Phase.Figures))
        {
            if (result.History.Points.Count > 1)
            {
                _progress("figures");
                foreach (string message in FigureWriter.WriteAll(result.History, summary, Path.Join(_folder, "figures"), _progress).Messages)
                    sink.Log("figure: " + message);
            }
        }
        Timings.Fill(summary, Clock);
        sink.Try(() => SummaryWriter.Write(file, summary));
        sink.Log(log => SummaryText.Write(summary, log));
    }
}
