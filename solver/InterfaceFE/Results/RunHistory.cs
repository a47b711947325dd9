using InterfaceFE.Geometry;

namespace InterfaceFE.Results;

/// <summary>
/// Everything that a run has to tell, in internal units (mm, N, MPa, s, K, rad) unless a member says otherwise. Made by the observers, read by the writers and the figures.
/// A value that has no meaning at a point is null, never 0.
/// </summary>
public sealed class RunHistory
{
    /// <summary>Title of the deck.</summary>
    public required string Title { get; init; }

    /// <summary>The mesh.</summary>
    public required Mesh Mesh { get; init; }

    /// <summary>Grips in deck order.</summary>
    public required IReadOnlyList<GripInfo> Grips { get; init; }

    /// <summary>Names of grips whose curves are drawn; the first is the main one.</summary>
    public required IReadOnlyList<string> CurvesOf { get; init; }

    /// <summary>Gauges in deck order.</summary>
    public required IReadOnlyList<GaugeInfo> Gauges { get; init; }

    /// <summary>One line of words per stage, from stage 1, for example "cool to -40 °C".</summary>
    public required IReadOnlyList<string> Stages { get; init; }

    /// <summary>Accepted points, point 0 (the start) first.</summary>
    public List<PointRow> Points { get; } = [];

    /// <summary>Fronts at each point.</summary>
    public List<FrontRow> Fronts { get; } = [];

    /// <summary>Energies at each point.</summary>
    public List<EnergyRow> Energies { get; } = [];

    /// <summary>Iterations of the march.</summary>
    public List<IterationRow> Iterations { get; } = [];

    /// <summary>Damage along each joint at every point.</summary>
    public List<DamageRow> Damage { get; } = [];

    /// <summary>Fields at the points where they were kept.</summary>
    public List<FieldSnapshot> Snapshots { get; } = [];
}

/// <summary>A grip as results know it.</summary>
/// <param name="Name">Name in the deck.</param>
/// <param name="Moved">Whether a stage pulls, pushes, turns or loads it; else it is only fixed and reports forces along x and y.</param>
/// <param name="DirectionX">x of the unit vector along its (first) pull; 0 for a grip that is only turned.</param>
/// <param name="DirectionY">y of that vector.</param>
/// <param name="Turned">Whether a stage turns it: its curve is moment against rotation.</param>
/// <param name="X">x of its pin [mm].</param>
/// <param name="Y">y of its pin [mm].</param>
public sealed record GripInfo(string Name, bool Moved, double DirectionX, double DirectionY, bool Turned, double X, double Y)
{
    /// <summary>Whether a load train stands between it and the crosshead.</summary>
    public bool HasLoadTrain { get; init; }
}

/// <summary>A gauge as results know it.</summary>
/// <param name="Name">Name in the deck.</param>
/// <param name="Unit">Unit of its reading: mm, rad or -.</param>
public sealed record GaugeInfo(string Name, string Unit);

/// <summary>State of a grip at a point.</summary>
/// <param name="Displacement">Displacement of the pin along the pull [mm].</param>
/// <param name="Force">Force on the specimen along the pull [N].</param>
/// <param name="Rotation">Rotation [rad]; null for a pin, which has none.</param>
/// <param name="Moment">Moment on the specimen about the pin [N·mm]; null for a pin.</param>
/// <param name="ForceX">Force on the specimen along x [N].</param>
/// <param name="ForceY">Force on the specimen along y [N].</param>
public sealed record GripReading(double Displacement, double Force, double? Rotation, double? Moment, double ForceX, double ForceY)
{
    /// <summary>Displacement of the crosshead along the pull [mm]; null without a load train.</summary>
    public double? Crosshead { get; init; }
}

/// <summary>An accepted point.</summary>
public sealed record PointRow
{
    /// <summary>Number of the point, from 0.</summary>
    public required int Point { get; init; }

    /// <summary>Stage, from 1; 0 for the start.</summary>
    public required int Stage { get; init; }

    /// <summary>Share of the stage's target; it may fall.</summary>
    public required double Progress { get; init; }

    /// <summary>Time [s].</summary>
    public required double Time { get; init; }

    /// <summary>Temperature [K].</summary>
    public required double Temperature { get; init; }

    /// <summary>Load factor of a stage by force; equal to the progress otherwise.</summary>
    public required double LoadFactor { get; init; }

    /// <summary>Whether the equilibrium is stable under the stage's own control.</summary>
    public required bool Stable { get; init; }

    /// <summary>Readings of the grips, in order.</summary>
    public required IReadOnlyList<GripReading> Grips { get; init; }

    /// <summary>Readings of the gauges, in order.</summary>
    public required IReadOnlyList<double> Gauges { get; init; }
}

/// <summary>A front of a joint at a point. A bonded strip has a front at each end.</summary>
public sealed record FrontRow
{
    /// <summary>Joint.</summary>
    public required string Joint { get; init; }

    /// <summary>Front within the joint, from 1 in order of position.</summary>
    public required int Front { get; init; }

    /// <summary>Point.</summary>
    public required int Point { get; init; }

    /// <summary>Where damage reaches 1 [mm along the joint]; the starter tip before growth.</summary>
    public required double? CrackTip { get; init; }

    /// <summary>Where the traction has its first maximum ahead of the tip [mm along the joint].</summary>
    public required double? ProcessZoneStart { get; init; }

    /// <summary>Length of the process zone [mm].</summary>
    public required double? ProcessZone { get; init; }

    /// <summary>Opening at the starter tip [mm].</summary>
    public required double? Opening { get; init; }

    /// <summary>Sliding at the starter tip [mm].</summary>
    public required double? Sliding { get; init; }

    /// <summary>J by the path (domain) integral [N/mm].</summary>
    public required double? JPath { get; init; }

    /// <summary>J from loads and rotations [N/mm].</summary>
    public required double? JRotation { get; init; }

    /// <summary>Work of the law at the starter tip [N/mm].</summary>
    public required double? JUnderLaw { get; init; }

    /// <summary>Mode mix at the moving front, atan sqrt(G_II/G_I) [deg].</summary>
    public required double? ModeMixDegrees { get; init; }

    /// <summary>Largest peel traction of the joint [MPa].</summary>
    public required double? LargestPeel { get; init; }

    /// <summary>Largest shear traction of the joint [MPa].</summary>
    public required double? LargestShear { get; init; }
}

/// <summary>Energies at a point [mJ = N·mm], of the whole specimen.</summary>
public sealed record EnergyRow
{
    /// <summary>Point.</summary>
    public required int Point { get; init; }

    /// <summary>Stage.</summary>
    public required int Stage { get; init; }

    /// <summary>Work of grips and loads.</summary>
    public required double PutIn { get; init; }

    /// <summary>Elastic energy of the adherends.</summary>
    public required double StoredInAdherends { get; init; }

    /// <summary>Elastic energy of the load trains; null when there are none.</summary>
    public double? StoredInLoadTrains { get; init; }

    /// <summary>Elastic energy of the layers.</summary>
    public required double StoredInLayers { get; init; }

    /// <summary>Dissipated by the layers.</summary>
    public required double SpentInLayers { get; init; }

    /// <summary>Dissipated by yielding.</summary>
    public required double SpentInYielding { get; init; }

    /// <summary>Dissipated by friction.</summary>
    public required double SpentInFriction { get; init; }

    /// <summary>Put in by change of temperature.</summary>
    public required double Thermal { get; init; }

    /// <summary>Released in jumps.</summary>
    public required double ReleasedInJumps { get; init; }

    /// <summary>Virtual work of both sides with the same quadrature, relative difference.</summary>
    public required double Balance { get; init; }

    /// <summary>External work against the laws' own energies, relative.</summary>
    public required double PathError { get; init; }
}

/// <summary>One iteration of the march.</summary>
public sealed record IterationRow
{
    /// <summary>Stage, from 1.</summary>
    public required int Stage { get; init; }

    /// <summary>Point that is sought.</summary>
    public required int Point { get; init; }

    /// <summary>How often its stride was shortened.</summary>
    public required int Retries { get; init; }

    /// <summary>Iteration, from 0 (the prediction).</summary>
    public required int Iteration { get; init; }

    /// <summary>Control in words.</summary>
    public required string Control { get; init; }

    /// <summary>Stride in the control's own measure.</summary>
    public required double Stride { get; init; }

    /// <summary>Progress of the stage.</summary>
    public required double Progress { get; init; }

    /// <summary>Load factor.</summary>
    public required double LoadFactor { get; init; }

    /// <summary>Which root of the control equation was taken; 0 where it has one.</summary>
    public required int Root { get; init; }

    /// <summary>Largest force out of balance [N].</summary>
    public required double OutOfBalance { get; init; }

    /// <summary>The same relative to the reference force.</summary>
    public required double Relative { get; init; }

    /// <summary>Largest correction [mm].</summary>
    public required double Correction { get; init; }

    /// <summary>Negative directions of the matrix with the grips held.</summary>
    public required int UnstableDirections { get; init; }

    /// <summary>Elements whose tangent changed.</summary>
    public required int ChangedElements { get; init; }

    /// <summary>How it stands: predicted, corrected, stalled, not finite, or as the last row of a search says of its point (see <see cref="Marching.IterationReason"/>).</summary>
    public required string Reason { get; init; }

    /// <summary>Share of the way that the first guess carried on: of the last stride, or of the search before where that passed the stage's end. 0: from the accepted point.</summary>
    public required double Guess { get; init; }
}

/// <summary>Damage along a joint at a point: one value per layer element (its largest), 1 where it was never bonded is NaN.</summary>
/// <param name="Point">Point.</param>
/// <param name="Joint">Index of the joint.</param>
/// <param name="Damage">Damage per element, 0 to 1; NaN where not bonded from the start.</param>
public sealed record DamageRow(int Point, int Joint, float[] Damage);

/// <summary>Fields at a point. Node arrays have one entry per mesh node; stresses are averaged at nodes within each adherend [MPa].</summary>
public sealed record FieldSnapshot
{
    /// <summary>Point.</summary>
    public required int Point { get; init; }

    /// <summary>Stage.</summary>
    public required int Stage { get; init; }

    /// <summary>Time [s].</summary>
    public required double Time { get; init; }

    /// <summary>Temperature [K].</summary>
    public required double Temperature { get; init; }

    /// <summary>Displacement along x [mm].</summary>
    public required double[] DisplacementX { get; init; }

    /// <summary>Displacement along y [mm].</summary>
    public required double[] DisplacementY { get; init; }

    /// <summary>Stress xx.</summary>
    public required double[] StressXx { get; init; }

    /// <summary>Stress yy.</summary>
    public required double[] StressYy { get; init; }

    /// <summary>Stress zz.</summary>
    public required double[] StressZz { get; init; }

    /// <summary>Stress xy.</summary>
    public required double[] StressXy { get; init; }

    /// <summary>Equivalent (von Mises) stress.</summary>
    public required double[] EquivalentStress { get; init; }

    /// <summary>Equivalent plastic strain.</summary>
    public required double[] PlasticStrain { get; init; }

    /// <summary>Layers, in joint order.</summary>
    public required IReadOnlyList<LayerField> Layers { get; init; }
}

/// <summary>
/// State along a joint at the stations of its elements: <see cref="Mesh.NodesPerFace"/> per element, element after element, so that neighbours repeat their shared station.
/// </summary>
public sealed record LayerField
{
    /// <summary>Index of the joint.</summary>
    public required int Joint { get; init; }

    /// <summary>Position along the joint [mm].</summary>
    public required double[] Position { get; init; }

    /// <summary>Opening [mm], positive apart.</summary>
    public required double[] Opening { get; init; }

    /// <summary>Sliding [mm].</summary>
    public required double[] Sliding { get; init; }

    /// <summary>Peel traction [MPa]; 0 where not bonded.</summary>
    public required double[] Peel { get; init; }

    /// <summary>Shear traction [MPa]; 0 where not bonded.</summary>
    public required double[] Shear { get; init; }

    /// <summary>Damage 0 to 1; 1 where not bonded.</summary>
    public required double[] Damage { get; init; }
}
