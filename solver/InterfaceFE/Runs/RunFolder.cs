namespace InterfaceFE.Runs;

/// <summary>The folder of a run's results: whether it is free, and clearing it for another run.</summary>
public static class RunFolder
{
    private static readonly string[] Files = ["summary.json", "grips.csv", "front.csv", "energy.csv", "convergence.csv", "fields.pvd", "deck.yaml", "run.log", "problems.txt"];
    private static readonly (string Folder, string Pattern)[] Series = [("fields", "solids-*.vtu"), ("fields", "layers-*.vtu"), ("figures", "*.png"), ("figures", "*.svg")];

    /// <summary>Folder of a deck's results when none is named: results/DECKNAME.</summary>
    public static string DefaultFor(string deckFile) => Path.Join("results", Path.GetFileNameWithoutExtension(deckFile));

    /// <summary>Whether a folder holds results or anything else that a run would mix with. A drawing of the model alone, as a check leaves it, does not count.</summary>
    /// <exception cref="UnauthorizedAccessException">The folder must not be read.</exception>
    public static bool IsTaken(string folder)
    {
        if (File.Exists(folder))
            return true;
        if (!Directory.Exists(folder))
            return false;
        foreach (string entry in Directory.EnumerateFileSystemEntries(folder))
            if (Path.GetFileName(entry) != "figures" || !Directory.Exists(entry) || Directory.EnumerateFileSystemEntries(entry).Any(f => Path.GetFileNameWithoutExtension(f) != "model"))
                return true;
        return false;
    }

    /// <summary>Why a run must not write into a folder, in one line; null when it may.</summary>
    /// <param name="folder">The folder.</param>
    /// <param name="overwrite">Whether results that are there may be replaced.</param>
    /// <param name="inputs">Files that the run reads; none of them may be replaced by a result.</param>
    /// <exception cref="UnauthorizedAccessException">The folder must not be read.</exception>
    public static string? Refusal(string folder, bool overwrite, IEnumerable<string> inputs)
    {
        if (File.Exists(folder))
            return $"{folder} is a file; --into names a folder";
        if (IsTaken(folder) && !overwrite)
            return $"{folder} holds results or other files already: give --overwrite to replace the results in it (other files stay), or another folder with --into";
        string[] results = [.. Files.Select(file => Path.GetFullPath(Path.Join(folder, file)))];
        return inputs.FirstOrDefault(input => results.Contains(Path.GetFullPath(input))) is { } lost
            ? $"{lost} is read by this run and would be replaced by its results: give another folder with --into"
            : null;
    }

    /// <summary>Removes the files of an earlier run; other files stay.</summary>
    /// <exception cref="IOException">A file cannot be removed.</exception>
    /// <exception cref="UnauthorizedAccessException">A file must not be removed.</exception>
    public static void Clear(string folder)
    {
        if (!Directory.Exists(folder))
            return;
        // The summary goes first: a folder without it is no finished run.
        foreach (string file in Files)
            File.Delete(Path.Join(folder, file));
        foreach ((string name, string pattern) in Series)
        {
            string part = Path.Join(folder, name);
            if (!Directory.Exists(part))
                continue;
            foreach (string file in Directory.EnumerateFiles(part, pattern))
                File.Delete(file);
            if (!Directory.EnumerateFileSystemEntries(part).Any())
                Directory.Delete(part);
        }
    }
}
