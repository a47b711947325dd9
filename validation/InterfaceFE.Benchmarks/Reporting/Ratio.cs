using System.Globalization;

namespace InterfaceFE.Benchmarks.Reporting;

/// <summary>One figure: how many times one thing is another in the same run.</summary>
/// <param name="Name">Name: model, quantity, what it is compared with, and the narrower kernels where it is theirs.</param>
/// <param name="Value">Value.</param>
public readonly record struct Ratio(string Name, double Value)
{
    /// <summary>The line that is printed.</summary>
    public override string ToString() => string.Create(CultureInfo.InvariantCulture, $"ratio {Name} {Value:G4}");
}

/// <summary>What a figure ought to reach.</summary>
/// <param name="Name">Name of the figure.</param>
/// <param name="Limit">Limit.</param>
/// <param name="IsCeiling">Whether the figure must stay below the limit; else it must reach it.</param>
public sealed record Target(string Name, double Limit, bool IsCeiling = false)
{
    /// <summary>The project's targets.</summary>
    public static IReadOnlyList<Target> All { get; } =
    [
        new("strip-104k.full.cholmod", 4),
        new("strip-104k.changed-50.cholmod", 400),
        new("strip-104k.changed-50.cholmod.vector256", 250),
        new("hat-170k.changed-50.cholmod", 200),
        new("strip-80k-eight-node.changed-50.cholmod", 200),
        .. Models.MeshCatalogue.All.Select(entry => new Target(entry.Name + ".order-flops.metis", 1.2, IsCeiling: true)),
    ];

    /// <summary>Whether a value holds it.</summary>
    public bool Holds(double value) => IsCeiling ? value <= Limit : value >= Limit;
}
