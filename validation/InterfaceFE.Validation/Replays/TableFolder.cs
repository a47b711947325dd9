using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Marching;
using InterfaceFE.Results;
using InterfaceFE.Runs;

namespace InterfaceFE.Validation.Replays;

/// <summary>A folder with the tables, the resolved deck and the summary of a run, without fields and figures.</summary>
public static class TableFolder
{
    /// <summary>Runs a deck, or replays a run of it, into a folder.</summary>
    /// <param name="deck">The deck.</param>
    /// <param name="folder">The folder; made if there is none, its files of these names replaced.</param>
    /// <param name="replay">Choices to follow; null: the march chooses for itself.</param>
    /// <exception cref="DeckException">The deck cannot be built.</exception>
    /// <exception cref="ReplayException">The choices are those of another deck.</exception>
    public static RunSummary Make(Deck deck, string folder, ReplayPlan? replay)
    {
        ArgumentNullException.ThrowIfNull(deck);
        Deck plain = deck with { Keep = (deck.Keep ?? new KeepDeck()) with { Fields = new FieldInterval(0) } };
        using var sink = new Sink(folder);
        RunSummary summary = DeckRun.Execute(plain, sink.Open, replay, new PhaseClock(), CancellationToken.None).Summary;
        File.WriteAllText(Path.Combine(folder, "deck.yaml"), DeckWriter.Write(deck));
        SummaryWriter.Write(Path.Combine(folder, "summary.json"), summary);
        return summary;
    }

    private sealed class Sink(string folder) : IRecordSink, IDisposable
    {
        private ResultFolder? _files;

        public Sink Open(RunHistory history)
        {
            _files = new ResultFolder(folder, history);
            return this;
        }

        public void Write(PointRow point, IReadOnlyList<FrontRow> fronts, EnergyRow energy)
        {
            _files!.Write(point);
            foreach (FrontRow front in fronts)
                _files.Write(front);
            _files.Write(energy);
        }

        public void Write(IterationRow iteration) => _files!.Write(iteration);

        public void Write(FieldSnapshot fields)
        {
        }

        public void Say(string line)
        {
        }

        public void Dispose() => _files?.Dispose();
    }
}
