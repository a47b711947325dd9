using InterfaceFE.Geometry;

namespace InterfaceFE.Model;

/// <summary>What the march sees: unknowns, element blocks, grips, stages.</summary>
public sealed class SpecimenModel
{
    /// <summary>The mesh.</summary>
    public required Mesh Mesh { get; init; }

    /// <summary>Nodal displacements from unknowns.</summary>
    public required UnknownMap Unknowns { get; init; }

    /// <summary>Blocks of the adherends, in order.</summary>
    public required IReadOnlyList<SolidBlock> Solids { get; init; }

    /// <summary>Springs of the load trains: one block, or none.</summary>
    public IReadOnlyList<LoadTrainBlock> LoadTrains { get; init; } = [];

    /// <summary>Unbonded stretches of the joints, which can close; joints without any are left out.</summary>
    public required IReadOnlyList<LayerBlock> OpenFaces { get; init; }

    /// <summary>Pressures on edges.</summary>
    public IReadOnlyList<PressureBlock> Pressures { get; init; } = [];

    /// <summary>Bonded parts of the joints, in order.</summary>
    public required IReadOnlyList<LayerBlock> Layers { get; init; }

    /// <summary>Grips in deck order.</summary>
    public required IReadOnlyList<Grip> Grips { get; init; }

    /// <summary>Stages in order.</summary>
    public required IReadOnlyList<LoadStage> Stages { get; init; }

    /// <summary>Stress-free temperature [K].</summary>
    public required double StressFreeTemperature { get; init; }

    /// <summary>All blocks: solids, load trains, open faces, pressures, layers.</summary>
    public IReadOnlyList<IElementBlock> Blocks => [.. Solids, .. LoadTrains, .. OpenFaces, .. Pressures, .. Layers];
}
