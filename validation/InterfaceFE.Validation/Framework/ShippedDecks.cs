namespace InterfaceFE.Validation.Framework;

/// <summary>The decks of the folder inputs.</summary>
public static class ShippedDecks
{
    /// <summary>Names (path within inputs) and files, in order. A file of materials, a folder of variants or a record has no sequence of its own and is left out.</summary>
    /// <param name="root">Root folder of the repository.</param>
    public static IEnumerable<(string Name, string File)> In(string root)
    {
        string inputs = Path.Combine(root, "inputs");
        foreach (string file in Directory.EnumerateFiles(inputs, "*.yaml", SearchOption.AllDirectories).Order(StringComparer.Ordinal))
            if (File.ReadLines(file).Any(line => line.StartsWith("sequence:", StringComparison.Ordinal) || line.StartsWith("coupon:", StringComparison.Ordinal)))
                yield return (Path.GetRelativePath(inputs, file).Replace('\\', '/'), file);
    }
}
