using System.Text.Json;
using InterfaceFE.Marching;
using InterfaceFE.Results;

namespace InterfaceFE.Runs;

/// <summary>The convergence.csv of an earlier run, and whether it is of the same deck.</summary>
internal static class ReplayFile
{
    /// <summary>
    /// Reads the choices of an earlier run. Where its summary.json lies beside it, the deck must be the same; a convergence.csv on its own goes with any deck that has its stages.
    /// </summary>
    /// <param name="file">convergence.csv.</param>
    /// <param name="deckHash">Hash of the resolved deck that is run.</param>
    /// <exception cref="ReplayException">The file cannot be read, is none of its kind, or is of another deck; the message starts with its name.</exception>
    public static ReplayPlan Read(string file, string deckHash)
    {
        try
        {
            ReplayPlan plan = ReplayReader.Read(File.ReadAllText(file));
            if (HashBeside(file) is { Length: > 0 } recorded && recorded != deckHash)
                throw new ReplayException("it is of another deck: the summary.json beside it tells another deck hash. Replay with the deck.yaml of that folder, or, to follow its strides with a changed deck, with a copy of the file in a folder of its own");
            return plan;
        }
        catch (ReplayException e)
        {
            throw new ReplayException($"{file} cannot be replayed: {e.Message}");
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw new ReplayException($"{file} cannot be read: {e.Message}");
        }
    }

    private static string? HashBeside(string file)
    {
        string summary = Path.Join(Path.GetDirectoryName(Path.GetFullPath(file)), "summary.json");
        if (!File.Exists(summary))
            return null;
        try
        {
            using JsonDocument document = JsonDocument.Parse(File.ReadAllText(summary));
            return document.RootElement.GetProperty("deck hash").GetString();
        }
        catch (Exception e) when (e is JsonException or KeyNotFoundException or InvalidOperationException)
        {
            throw new ReplayException("the summary.json beside it cannot be read");
        }
    }
}
