using System.Globalization;
using System.Text.Json;
using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Results;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Replays;

/// <summary>
/// The verbs `record DIR` and `replay DIR`: keep the tables of all shipped decks, and later, with changed code, make the same points again and say by how much any number of any table has changed.
/// </summary>
/// <param name="output">Takes the lines.</param>
/// <param name="progress">Takes lines of progress and errors.</param>
public sealed class ReplayVerbs(TextWriter output, TextWriter progress)
{
    /// <summary>Largest difference that counts as none, relative to the scale of the column.</summary>
    public const double Gate = 1e-9;

    private static readonly string[] Phases = ["meshing", "plan", "elements", "factorisation", "solves", "march", "recording", "writing"];
    private static readonly string[] Counts = ["unknowns", "points", "iterations", "factorisations", "solves", "changed elements"];

    private const int MoreCorrections = 2;
    private const string SummaryOfReplay = "replay.json";

    private int _hold, _differ;

    /// <summary>Runs all shipped decks into folders below a folder, and replays each at once: a replay must give the same bytes.</summary>
    /// <param name="root">Root folder of the repository.</param>
    /// <param name="folder">The folder; results that are in it are replaced.</param>
    /// <param name="deep">
    /// Whether each search is carried on by two corrections, until rounding alone is left: for comparing methods that do not iterate alike. The tables are then not those of the plain run.
    /// </param>
    /// <returns>Exit code: 0, or 2 where a replay differs.</returns>
    public int Record(string root, string folder, bool deep)
    {
        foreach ((string name, string file) in ShippedDecks.In(root))
        {
            string into = Path.Combine(folder, Path.ChangeExtension(name, null));
            progress.WriteLine($"{name}: recording");
            try
            {
                Deck deck = Read(file);
                TableFolder.Make(deck, into, replay: null);
                if (deep)
                    TableFolder.Make(deck, into, ReplayReader.Read(File.ReadAllText(Path.Combine(into, "convergence.csv"))).Deeper(MoreCorrections));
            }
            catch (Exception e) when (e is DeckException or InvalidOperationException)
            {
                Judge($"{name} was not recorded", new TableDifference(double.PositiveInfinity, e.Message), Gate);
                continue;
            }
            Compare(into, name, isRecording: true);
        }
        return End();
    }

    /// <summary>Replays every recorded run below a folder and compares all tables. A run is a folder with convergence.csv and deck.yaml.</summary>
    /// <param name="folder">The folder.</param>
    /// <returns>Exit code: 0; 1 where there is nothing to replay; 2 where a table differs by more than the gate.</returns>
    public int Replay(string folder)
    {
        string[] runs = Directory.Exists(folder) ? [.. Directory.EnumerateFiles(folder, "convergence.csv", SearchOption.AllDirectories).Select(f => Path.GetDirectoryName(f)!).Order(StringComparer.Ordinal)] : [];
        if (runs.Length == 0)
        {
            progress.WriteLine($"{folder}: there is no convergence.csv in it or below; `record {folder}` makes them");
            return 1;
        }
        foreach (string run in runs)
            Compare(run, Path.GetRelativePath(folder, run).Replace('\\', '/'), isRecording: false);
        return End();
    }

    private void Compare(string recorded, string name, bool isRecording)
    {
        string replayed = Path.Combine(Path.GetTempPath(), Path.GetRandomFileName());
        try
        {
            progress.WriteLine($"{name}: replaying");
            Deck deck = Read(Path.Combine(recorded, "deck.yaml"));
            string convergence = File.ReadAllText(Path.Combine(recorded, "convergence.csv"));
            RunSummary summary = TableFolder.Make(deck, replayed, ReplayReader.Read(convergence));
            output.WriteLine(Text($"{name}: kernel width {summary.KernelWidth} bit; {SummaryWords.Of(summary.Status)}{(summary.Cause.Length > 0 ? ": " + summary.Cause : "")}"));
            double carried = TableComparison.Carried(convergence);
            foreach (string table in TableComparison.Tables)
            {
                TableDifference difference = TableComparison.Compare(table, File.ReadAllText(Path.Combine(recorded, table)), File.ReadAllText(Path.Combine(replayed, table)), carried);
                Judge(table, difference, isRecording ? 0 : Gate);
            }
            string before = Path.Combine(recorded, SummaryOfReplay), now = Path.Combine(replayed, "summary.json");
            // Times are compared with those of the first replay: a march that chooses for itself does more.
            if (isRecording)
                File.Copy(now, before, overwrite: true);
            Tell(File.Exists(before) ? before : Path.Combine(recorded, "summary.json"), now);
        }
        catch (Exception e) when (e is ReplayException or DeckException or InvalidOperationException or IOException)
        {
            Judge($"{name} was not replayed", new TableDifference(double.PositiveInfinity, e.Message), Gate);
        }
        finally
        {
            if (Directory.Exists(replayed))
                Directory.Delete(replayed, recursive: true);
        }
    }

    /// <exception cref="InvalidOperationException">The deck has errors; the message lists them.</exception>
    private static Deck Read(string file)
    {
        DeckReading reading = DeckReader.Read(file);
        return reading.Deck is { } deck ? deck : throw new InvalidOperationException(string.Join("; ", reading.Problems));
    }

    private void Judge(string what, TableDifference difference, double gate)
    {
        bool holds = difference.Relative <= gate;
        (_hold, _differ) = holds ? (_hold + 1, _differ) : (_hold, _differ + 1);
        output.WriteLine(Text($"  {(holds ? "HOLD" : "DOES NOT HOLD"),-13} {what,-16} {difference.Relative,10:0.0e0}  {difference.Where}").TrimEnd());
    }

    /// <summary>Time by phase and counts, recorded and now, one row each.</summary>
    private void Tell(string recorded, string replayed)
    {
        output.WriteLine(Text($"  {"",-10} {string.Join(" ", Phases.Select(p => p.PadLeft(13)))} [s]   {string.Join(", ", Counts)}"));
        foreach ((string when, string file) in ((string, string)[])[("recorded", recorded), ("replayed", replayed)])
        {
            if (!File.Exists(file))
                continue;
            using JsonDocument summary = JsonDocument.Parse(File.ReadAllText(file));
            string Value(string group, string key, string format) => summary.RootElement.TryGetProperty(group, out JsonElement g) && g.TryGetProperty(key, out JsonElement value)
                ? value.GetDouble().ToString(format, CultureInfo.InvariantCulture) : "-";
            output.WriteLine($"  {when,-10} {string.Join(" ", Phases.Select(p => Value("timings [s]", p, "0.000").PadLeft(13)))}       {string.Join(", ", Counts.Select(c => Value("counts", c, "0")))}");
        }
    }

    private int End()
    {
        output.WriteLine(Text($"{_hold} hold, {_differ} do not"));
        return _differ == 0 ? 0 : 2;
    }

    private static string Text(FormattableString text) => FormattableString.Invariant(text);
}
