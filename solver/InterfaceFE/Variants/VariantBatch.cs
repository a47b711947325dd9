using System.Globalization;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Reports;
using InterfaceFE.Results;
using InterfaceFE.Runs;

namespace InterfaceFE.Variants;

/// <summary>What came of a batch.</summary>
/// <param name="Code">The highest code of its decks, or why it did not start.</param>
/// <param name="Messages">What is wrong with the call, one line each.</param>
/// <param name="Rows">A row per deck that had its turn.</param>
public sealed record BatchOutcome(ExitCode Code, IReadOnlyList<string> Messages, IReadOnlyList<VariantRow> Rows);

/// <summary>
/// Runs all decks of a folder one after another, each into its own folder of results. A bad deck leaves its problems and the batch goes on; the table is written after
/// each deck, so an interrupted batch keeps its rows.
/// </summary>
public sealed class VariantBatch
{
    private readonly string _into;
    private readonly Action<string> _progress;
    private readonly List<VariantRow> _rows = [];
    private readonly List<OverlayCurve> _curves = [];

    private VariantBatch(string into, Action<string> progress)
    {
        _into = into;
        _progress = progress;
    }

    /// <summary>Runs the decks (*.yaml, not in folders below) of a folder.</summary>
    /// <param name="folder">Folder of the decks.</param>
    /// <param name="into">Folder of the results: variants.csv, overlay figure, and a folder per deck.</param>
    /// <param name="overwrite">Whether results that are there are replaced.</param>
    /// <param name="progress">Takes lines of progress.</param>
    /// <param name="cancellation">Stops the batch; what was found is written all the same.</param>
    public static BatchOutcome Execute(string folder, string into, bool overwrite, Action<string> progress, CancellationToken cancellation)
    {
        ArgumentException.ThrowIfNullOrEmpty(folder);
        ArgumentException.ThrowIfNullOrEmpty(into);
        ArgumentNullException.ThrowIfNull(progress);
        VariantBatch batch = new(into, progress);
        try
        {
            return batch.Run(folder, overwrite, cancellation);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            return batch.Refuse($"{into}: cannot be written: {e.Message.ReplaceLineEndings(" ")}");
        }
    }

    private BatchOutcome Refuse(string message) => new(ExitCode.WrongDeckOrCall, [message], _rows);

    private BatchOutcome Run(string folder, bool overwrite, CancellationToken cancellation)
    {
        if (File.Exists(folder))
            return Refuse($"{folder} is a file; variants takes a folder with decks (for one deck: run {folder})");
        if (!Directory.Exists(folder))
            return Refuse($"{folder}: there is no such folder");
        if (RunFolder.Refusal(_into, overwrite, []) is { } refusal)
            return Refuse(refusal);
        List<string> decks = Decks(folder);
        if (decks.Count == 0)
            return Refuse($"{folder} holds no deck (*.yaml with more in it than materials and layers)");
        Directory.CreateDirectory(_into);
        for (int i = 0; i < decks.Count && !cancellation.IsCancellationRequested; i++)
        {
            string name = Path.GetFileNameWithoutExtension(decks[i]);
            _progress(string.Create(CultureInfo.InvariantCulture, $"deck {i + 1} of {decks.Count}: {name}"));
            VariantRow row = RunOne(decks[i], name, cancellation);
            _rows.Add(row);
            VariantTable.Write(Path.Join(_into, "variants.csv"), _rows);
            _progress(string.Create(CultureInfo.InvariantCulture, $"deck {i + 1} of {decks.Count}: {row.Words()}"));
        }
        if (_curves.Count > 0)
            FigureWriter.WriteOverlay(_curves, folder, _into, _progress);
        ExitCode code = _rows.Select(row => row.Code).Append(cancellation.IsCancellationRequested ? ExitCode.Interrupted : ExitCode.Done).Max();
        return new BatchOutcome(code, [], _rows);
    }

    private List<string> Decks(string folder)
    {
        List<string> decks = [];
        foreach (string file in Directory.EnumerateFiles(folder, "*.yaml").Order(StringComparer.Ordinal))
        {
            if (DeckKind.HoldsOnlyParts(file))
                _progress($"{Path.GetFileName(file)}: holds only materials or layers, skipped");
            else
                decks.Add(file);
        }
        return decks;
    }

    private VariantRow RunOne(string deck, string name, CancellationToken cancellation)
    {
        string folder = Path.Join(_into, name);
        FileRunOutcome outcome = DeckFileRun.Execute(deck, folder, overwrite: true, replayFile: null, line => _progress($"{name}: {line}"), cancellation);
        if (outcome.Result is null && outcome.Code == ExitCode.WrongDeckOrCall)
            KeepProblems(folder, outcome.Messages);
        VariantRow row = VariantRow.Of(name, outcome);
        if (outcome.Result is { History: { } history } && row.Grip is { PeakForce: not null } grip)
        {
            int index = history.Grips.ToList().FindIndex(g => g.Name == grip.Name);
            _curves.Add(new OverlayCurve(name, [.. history.Points.Select(p => p.Grips[index].Displacement)], [.. history.Points.Select(p => p.Grips[index].Force)]));
        }
        return row;
    }

    /// <summary>Leaves the problems in place of results; those of an earlier batch would be taken for this one's.</summary>
    private void KeepProblems(string folder, IReadOnlyList<string> problems)
    {
        try
        {
            RunFolder.Clear(folder);
            Directory.CreateDirectory(folder);
            WholeFile.Write(Path.Join(folder, "problems.txt"), string.Join('\n', problems) + "\n");
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            _progress($"{folder}: problems.txt cannot be written: {e.Message.ReplaceLineEndings(" ")}");
        }
    }
}
