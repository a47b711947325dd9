using System.Globalization;
using System.Text;
using InterfaceFE.Results;

namespace InterfaceFE.Runs;

/// <summary>
/// Puts the records of a run on disk as they come, and tells its progress. When the disk refuses a file, the first reason is kept and the run is asked to stop; what was
/// written before stays. The log is the least of the files: when it cannot be written, the run goes on without.
/// </summary>
internal sealed class FolderSink : IRecordSink, IDisposable
{
    private readonly string _folder;
    private readonly bool _isNew;
    private readonly ResultFolder _files;
    private readonly RunHistory _history;
    private readonly Action<string> _progress;
    private readonly CancellationTokenSource _stop;
    private readonly int _mainGrip;
    private StreamWriter? _log;
    private int _stage = -1;
    private double _told;

    /// <summary>Clears and makes the folder, and opens its files; when that fails, nothing new is left behind.</summary>
    /// <exception cref="IOException">The folder cannot be written.</exception>
    /// <exception cref="UnauthorizedAccessException">The folder must not be written.</exception>
    public FolderSink(string folder, string resolvedDeck, RunHistory history, Action<string> progress, CancellationTokenSource stop)
    {
        _folder = folder;
        _history = history;
        _progress = progress;
        _stop = stop;
        _mainGrip = history.CurvesOf.Count == 0 ? -1 : history.Grips.ToList().FindIndex(g => g.Name == history.CurvesOf[0]);
        _isNew = !Directory.Exists(folder);
        try
        {
            RunFolder.Clear(folder);
            Directory.CreateDirectory(folder);
            File.WriteAllText(Path.Join(folder, "deck.yaml"), resolvedDeck);
            _log = new StreamWriter(Path.Join(folder, "run.log"), append: false, new UTF8Encoding(false)) { NewLine = "\n", AutoFlush = true };
            _files = new ResultFolder(folder, history);
        }
        catch
        {
            Discard();
            throw;
        }
    }

    /// <summary>Why a file could not be written; null while all went well.</summary>
    public string? Fault { get; private set; }

    public void Write(PointRow point, IReadOnlyList<FrontRow> fronts, EnergyRow energy)
    {
        Put(() =>
        {
            _files.Write(point);
            foreach (FrontRow front in fronts)
                _files.Write(front);
            _files.Write(energy);
        });
        if (point.Stage == _stage && Math.Abs(point.Progress - _told) < 0.1 && point.Progress < 1 && point.Point % 10 != 0)
            return;
        _stage = point.Stage;
        _told = point.Progress;
        _progress(point.Stage == 0 ? "start: no load" : string.Create(CultureInfo.InvariantCulture, $"stage {point.Stage}, point {point.Point}: {100 * point.Progress:0.0} %{Load(point)}"));
    }

    public void Write(IterationRow i)
    {
        Put(() => _files.Write(i));
        Log(string.Create(CultureInfo.InvariantCulture,
            $"{i.Stage,3} {i.Point,5} {i.Retries,3} {i.Iteration,3}  {i.Control,-10} {i.OutOfBalance,11:0.000e+00} N {i.Relative,10:0.00e+00} {i.Correction,11:0.000e+00} mm {i.UnstableDirections,3} {i.ChangedElements,6}  {i.Reason}"));
    }

    public void Write(FieldSnapshot fields) => Put(() => _files.Write(fields));

    public void Say(string line)
    {
        Log(line);
        _progress(line);
    }

    /// <summary>A line for the log alone.</summary>
    public void Log(string line) => Log(log => log.WriteLine(line));

    /// <summary>Writes to the log.</summary>
    public void Log(Action<TextWriter> write)
    {
        if (_log is null)
            return;
        try
        {
            write(_log);
        }
        catch (IOException e)
        {
            _progress("run.log ends here: " + e.Message);
            StreamWriter log = _log;
            _log = null;
            Quietly(log.Dispose);
        }
    }

    /// <summary>Does a piece of writing, a small one that is worth a try even on a disk that refused another; a refusal is kept, and the run is asked to stop.</summary>
    public void Try(Action write)
    {
        try
        {
            write();
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            string reason = e.Message.ReplaceLineEndings(" ");
            Fault ??= reason;
            Say("a file of the results could not be written: " + reason);
            _stop.Cancel();
        }
    }

    /// <summary>Removes what this run has put into the folder, and the folder if it was made for it.</summary>
    public void Discard()
    {
        Dispose();
        Quietly(() => RunFolder.Clear(_folder));
        if (_isNew)
            Quietly(() => Directory.Delete(_folder));
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        // Null when the constructor fails. Closing flushes: on a full disk that fails once more, which was told already.
        if (_files is { } files)
            Quietly(files.Dispose);
        if (_log is { } log)
            Quietly(log.Dispose);
    }

    private void Put(Action write)
    {
        if (Fault is null)
            Try(write);
    }

    private static void Quietly(Action action)
    {
        try
        {
            action();
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            // Clearing up: the fault that matters has been told.
        }
    }

    private string Load(PointRow point)
    {
        if (_mainGrip < 0)
            return "";
        GripReading r = point.Grips[_mainGrip];
        GripInfo grip = _history.Grips[_mainGrip];
        return grip.Turned && r.Moment is { } moment
            ? string.Create(CultureInfo.InvariantCulture, $", {grip.Name} {moment:G5} N mm at {r.Rotation:G5} rad")
            : string.Create(CultureInfo.InvariantCulture, $", {grip.Name} {r.Force:G5} N at {r.Displacement:G5} mm");
    }
}
