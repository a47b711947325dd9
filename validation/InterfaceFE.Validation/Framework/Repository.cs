namespace InterfaceFE.Validation.Framework;

/// <summary>The repository's root folder.</summary>
public static class Repository
{
    /// <summary>The folder that holds InterfaceFE.sln, from a folder upwards; null: none.</summary>
    public static string? RootAbove(string folder)
    {
        for (DirectoryInfo? at = new(folder); at is not null; at = at.Parent)
            if (File.Exists(Path.Combine(at.FullName, "InterfaceFE.sln")))
                return at.FullName;
        return null;
    }
}
