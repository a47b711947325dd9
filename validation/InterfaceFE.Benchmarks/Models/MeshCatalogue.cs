namespace InterfaceFE.Benchmarks.Models;

/// <summary>A benchmark mesh by name, built when asked for.</summary>
/// <param name="Name">Short name.</param>
/// <param name="Description">What it is, in a few words.</param>
/// <param name="IsQuick">Whether the short run takes it.</param>
/// <param name="Build">Builds it.</param>
public sealed record CatalogueEntry(string Name, string Description, bool IsQuick, Func<BenchmarkMesh> Build);

/// <summary>The meshes of the benchmark set. Sizes are invented; they span what a joint's model takes.</summary>
public static class MeshCatalogue
{
    /// <summary>Length of a strip [mm].</summary>
    public const double StripLength = 100;

    private const double ArmThickness = 3;

    /// <summary>All meshes, smallest first.</summary>
    public static IReadOnlyList<CatalogueEntry> All { get; } =
    [
        new("strip-28k", "two arms of 1000×6 four-node elements", true, () => Strip("strip-28k", 4, 1000, 6)),
        new("strip-80k-eight-node", "two arms of 1000×6 eight-node elements", false, () => Strip("strip-80k-eight-node", 8, 1000, 6)),
        new("strip-104k", "two arms of 2000×12 four-node elements", true, () => Strip("strip-104k", 4, 2000, 12)),
        new("hat-170k", "skin, doubler and hat, three interfaces, four-node elements of 1/8 mm", false, () => Hat("hat-170k", 8)),
        new("strip-400k", "two arms of 4000×24 four-node elements", false, () => Strip("strip-400k", 4, 4000, 24)),
    ];

    /// <summary>
    /// Two arms of 100 × 3 mm, one on the other; the first 30 mm are a starter crack. The far end is supported, the outer corners of the near end are gripped.
    /// </summary>
    /// <param name="name">Short name.</param>
    /// <param name="nodesPerSolid">4 or 8.</param>
    /// <param name="along">Elements along an arm; a multiple of 10.</param>
    /// <param name="through">Elements through an arm.</param>
    public static BenchmarkMesh Strip(string name, int nodesPerSolid, int along, int through)
    {
        MeshBuilder builder = new(nodesPerSolid);
        builder.AddPatch(0, [new(0, -ArmThickness), new(StripLength, -ArmThickness), new(StripLength, 0), new(0, 0)], along, through);
        builder.AddPatch(1, [new(0, 0), new(StripLength, 0), new(StripLength, ArmThickness), new(0, ArmThickness)], along, through);
        builder.AddJoint(0, 1, new(0, 0), StripLength, along, unbonded: 3 * along / 10);
        builder.SupportAt(StripLength);
        builder.Grip(0, new(0, -ArmThickness));
        builder.Grip(1, new(0, ArmThickness));
        return builder.Build(name);
    }

    /// <summary>
    /// A skin of 200 × 3 mm, on it a doubler of 160 × 2 mm, on that a hat sheet of 2 mm: two flanges of 40 mm, leaning webs, a crown. Both ends of the skin are supported, the
    /// crown is gripped in its middle.
    /// </summary>
    /// <param name="name">Short name.</param>
    /// <param name="density">Elements per millimetre along the sheets and through them.</param>
    public static BenchmarkMesh Hat(string name, int density)
    {
        const double flange = 2, flangeTop = 4, crown = 30, crownTop = 32;
        MeshBuilder builder = new(4);
        builder.AddPatch(0, [new(0, -3), new(200, -3), new(200, 0), new(0, 0)], 200 * density, 3 * density);
        builder.AddPatch(1, [new(20, 0), new(180, 0), new(180, flange), new(20, flange)], 160 * density, 2 * density);
        builder.AddPatch(2, [new(30, flange), new(70, flange), new(70, flangeTop), new(30, flangeTop)], 40 * density, 2 * density);
        builder.AddPatch(2, [new(70, flange), new(86, crown), new(85, crownTop), new(70, flangeTop)], 30 * density, 2 * density);
        builder.AddPatch(2, [new(86, crown), new(114, crown), new(115, crownTop), new(85, crownTop)], 30 * density, 2 * density);
        builder.AddPatch(2, [new(114, crown), new(130, flange), new(130, flangeTop), new(115, crownTop)], 30 * density, 2 * density);
        builder.AddPatch(2, [new(130, flange), new(170, flange), new(170, flangeTop), new(130, flangeTop)], 40 * density, 2 * density);
        builder.AddJoint(0, 1, new(20, 0), 160, 160 * density, unbonded: 0);
        builder.AddJoint(1, 2, new(30, flange), 40, 40 * density, unbonded: 0);
        builder.AddJoint(1, 2, new(130, flange), 40, 40 * density, unbonded: 0);
        builder.SupportAt(0);
        builder.SupportAt(200);
        builder.Grip(2, new(100, crownTop));
        return builder.Build(name);
    }
}
