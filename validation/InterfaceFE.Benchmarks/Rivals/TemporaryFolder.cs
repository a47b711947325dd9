namespace InterfaceFE.Benchmarks.Rivals;

/// <summary>A folder for files that go from one program to another; gone when disposed.</summary>
public sealed class TemporaryFolder : IDisposable
{
    private readonly DirectoryInfo _folder = Directory.CreateTempSubdirectory("interfacefe-benchmarks-");

    /// <summary>A file of the folder; line breaks cannot occur in its path.</summary>
    public string File(string name) => Path.Combine(_folder.FullName, name);

    /// <inheritdoc/>
    public void Dispose() => _folder.Delete(recursive: true);
}
