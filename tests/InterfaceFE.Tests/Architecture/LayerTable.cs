namespace InterfaceFE.Tests.Architecture;

/// <summary>What each namespace may use. An entry holds for its namespace and those below it, unless they have an entry of their own.</summary>
internal sealed class LayerTable(string root, IReadOnlyDictionary<string, string[]> allowed)
{
    /// <summary>Uses that the table forbids and namespaces that it does not know, one line each.</summary>
    public IReadOnlyList<string> Violations(IEnumerable<TypeUse> uses)
    {
        SortedSet<string> lines = new(StringComparer.Ordinal);
        foreach (TypeUse use in uses)
        {
            // The compiler's own helper types carry no namespace of the project.
            if (!Within(use.UserNamespace, root) || !Within(use.UsedNamespace, root))
                continue;
            string? user = EntryOf(use.UserNamespace), used = EntryOf(use.UsedNamespace);
            if (user is null)
                lines.Add($"{use.UserNamespace} is not in the table: say there what it may use");
            else if (used is null)
                lines.Add($"{use.UsedNamespace} is not in the table: say there what it may use");
            else if (user != used && !allowed[user].Contains(used))
                lines.Add($"{use.User} uses {use.Used}, but {user} may use {(allowed[user].Length == 0 ? "nothing" : string.Join(", ", allowed[user]))}");
        }
        return [.. lines];
    }

    private string? EntryOf(string space) => allowed.Keys.Where(entry => Within(space, $"{root}.{entry}")).MaxBy(entry => entry.Length);

    private static bool Within(string space, string above) => space == above || space.StartsWith(above + ".", StringComparison.Ordinal);
}
