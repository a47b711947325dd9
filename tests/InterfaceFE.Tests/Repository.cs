namespace InterfaceFE.Tests;

/// <summary>Folders of the repository, found upwards from the test assembly (source paths are mapped in deterministic builds).</summary>
internal static class Repository
{
    /// <summary>Folder that holds InterfaceFE.sln.</summary>
    public static string Root { get; } = Find();

    /// <summary>A path below the root.</summary>
    public static string Path(params string[] parts) => System.IO.Path.Combine([Root, .. parts]);

    private static string Find()
    {
        for (DirectoryInfo? folder = new(AppContext.BaseDirectory); folder is not null; folder = folder.Parent)
            if (File.Exists(System.IO.Path.Combine(folder.FullName, "InterfaceFE.sln")))
                return folder.FullName;
        throw new DirectoryNotFoundException($"no folder above {AppContext.BaseDirectory} holds InterfaceFE.sln");
    }
}
