using Xunit;

namespace InterfaceFE.Tests.Cli;

/// <summary>Tests that draw figures or time a process run one after another.</summary>
[CollectionDefinition(Name, DisableParallelization = true)]
#pragma warning disable CA1711 // The test framework calls it a collection.
public class DiskCollection
#pragma warning restore CA1711
{
    public const string Name = "runs on disk";
}
