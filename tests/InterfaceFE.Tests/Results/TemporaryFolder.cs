namespace InterfaceFE.Tests.Results;

/// <summary>A folder of a test's own that is removed with all that is in it.</summary>
internal sealed class TemporaryFolder : IDisposable
{
    public TemporaryFolder() => Folder = Directory.CreateTempSubdirectory("interfacefe-").FullName;

    public string Folder { get; }

    public string File(string name) => Path.Combine(Folder, name);

    public void Dispose() => Directory.Delete(Folder, recursive: true);
}
