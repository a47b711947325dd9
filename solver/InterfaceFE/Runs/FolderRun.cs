using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Reports;
using InterfaceFE.Results;

namespace InterfaceFE.Runs;

/// <summary>A run from a deck file to a folder of results: CSV, VTU, summary, figures, log.</summary>
public sealed class FolderRun
{
    private readonly string _folder;
    private readonly Action<string> _progress;

    /// <summary>Prepares a run.</summary>
    /// <param name="folder">Folder of the results; made if there is none.</param>
    /// <param name="progress">Takes lines of progress.</param>
    public FolderRun(string folder, Action<string> progress)
    {
        _folder = folder;
        _progress = progress;
    }

    /// <summary>Whether a folder holds results or anything else that a run would mix with.</summary>
    public static bool IsTaken(string folder) => File.Exists(folder) || (Directory.Exists(folder) && Directory.EnumerateFileSystemEntries(folder).Any());

    /// <summary>Removes the files of an earlier run from a folder; other files stay.</summary>
    public static void Clear(string folder)
    {
        if (!Directory.Exists(folder))
            return;
        foreach (string name in (ReadOnlySpan<string>)["summary.json", "grips.csv", "front.csv", "energy.csv", "convergence.csv", "fields.pvd", "deck.yaml", "run.log"])
            File.Delete(Path.Combine(folder, name));
        foreach (string name in (ReadOnlySpan<string>)["fields", "figures"])
            if (Directory.Exists(Path.Combine(folder, name)))
                Directory.Delete(Path.Combine(folder, name), recursive: true);
    }

    /// <summary>Runs a deck that was read without problems.</summary>
    /// <param name="deck">The deck.</param>
    /// <param name="warnings">Warnings of the reading, for log and summary.</param>
    /// <param name="cancellation">Stops the march; what was found is written all the same.</param>
    /// <exception cref="DeckException">The deck cannot be built.</exception>
    /// <exception cref="IOException">The folder cannot be written.</exception>
    public RunResult Execute(Deck deck, IReadOnlyList<string> warnings, CancellationToken cancellation)
    {
        Directory.CreateDirectory(_folder);
        string resolved = DeckWriter.Write(deck);
        File.WriteAllText(Path.Combine(_folder, "deck.yaml"), resolved);
        using var log = new StreamWriter(Path.Combine(_folder, "run.log"), append: false, new UTF8Encoding(false)) { NewLine = "\n" };
        Sink? sink = null;
        try
        {
            foreach (string warning in warnings)
                log.WriteLine("warning: " + warning);
            RunResult result = DeckRun.Execute(deck, history => sink = new Sink(_folder, history, log, _progress), cancellation);
            result.Summary.DeckHash = Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(resolved)));
            result.Summary.Warnings.InsertRange(0, warnings);
            long start = System.Diagnostics.Stopwatch.GetTimestamp();
            if (result.History.Points.Count > 1)
                foreach (string message in FigureWriter.WriteAll(result.History, result.Summary, Path.Combine(_folder, "figures"), _progress).Messages)
                    log.WriteLine("figure: " + message);
            result.Summary.WallSeconds["figures"] = System.Diagnostics.Stopwatch.GetElapsedTime(start).TotalSeconds;
            SummaryWriter.Write(Path.Combine(_folder, "summary.json"), result.Summary);
            SummaryText.Write(result.Summary, log);
            return result;
        }
        finally
        {
            sink?.Dispose();
        }
    }

    private sealed class Sink : IRecordSink, IDisposable
    {
        private readonly ResultFolder _files;
        private readonly StreamWriter _log;
        private readonly Action<string> _progress;
        private readonly RunHistory _history;
        private int _stage = -1;
        private double _told;

        public Sink(string folder, RunHistory history, StreamWriter log, Action<string> progress)
        {
            _files = new ResultFolder(folder, history);
            _log = log;
            _progress = progress;
            _history = history;
        }

        public void Write(PointRow point, IReadOnlyList<FrontRow> fronts, EnergyRow energy)
        {
            _files.Write(point);
            foreach (FrontRow front in fronts)
                _files.Write(front);
            _files.Write(energy);
            if (point.Stage != _stage || Math.Abs(point.Progress - _told) >= 0.1 || point.Progress >= 1 || point.Point % 10 == 0)
            {
                _stage = point.Stage;
                _told = point.Progress;
                _progress(string.Create(CultureInfo.InvariantCulture, $"stage {point.Stage}, point {point.Point}: {100 * point.Progress:0.0} %{Load(point)}"));
            }
        }

        public void Write(IterationRow i)
        {
            _files.Write(i);
            _log.WriteLine(string.Create(CultureInfo.InvariantCulture,
                $"{i.Stage,3} {i.Point,5} {i.Retries,3} {i.Iteration,3}  {i.Control,-10} {i.OutOfBalance,11:0.000e+00} N {i.Relative,10:0.00e+00} {i.Correction,11:0.000e+00} mm {i.UnstableDirections,3} {i.ChangedElements,6}  {i.Reason}"));
        }

        public void Write(FieldSnapshot fields) => _files.Write(fields);

        public void Say(string line)
        {
            _log.WriteLine(line);
            _progress(line);
        }

        public void Dispose() => _files.Dispose();

        private string Load(PointRow point)
        {
            int main = _history.CurvesOf.Count == 0 ? -1 : _history.Grips.ToList().FindIndex(g => g.Name == _history.CurvesOf[0]);
            if (main < 0)
                return "";
            GripReading r = point.Grips[main];
            return _history.Grips[main].Turned && r.Moment is { } moment
                ? string.Create(CultureInfo.InvariantCulture, $", {_history.Grips[main].Name} {moment:G5} N mm at {r.Rotation:G5} rad")
                : string.Create(CultureInfo.InvariantCulture, $", {_history.Grips[main].Name} {r.Force:G5} N at {r.Displacement:G5} mm");
        }
    }
}
