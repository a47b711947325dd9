namespace InterfaceFE.Results;

/// <summary>How a run ended.</summary>
public enum RunStatus
{
    /// <summary>All stages done.</summary>
    Finished,

    /// <summary>Stopped before the end; the cause says why.</summary>
    StoppedEarly,

    /// <summary>The specimen came apart: a finished answer.</summary>
    Severed,

    /// <summary>Interrupted from outside.</summary>
    Interrupted,
}

/// <summary>What summary.json holds. Units stand in the JSON keys that the writer makes (for example "peak force [N]").</summary>
public sealed class RunSummary
{
    /// <summary>Status.</summary>
    public required RunStatus Status { get; set; }

    /// <summary>Cause in words; empty when finished.</summary>
    public required string Cause { get; set; }

    /// <summary>Title of the deck.</summary>
    public required string Title { get; init; }

    /// <summary>Per grip: peak, final.</summary>
    public List<GripSummary> Grips { get; } = [];

    /// <summary>Per joint: maxima.</summary>
    public List<JointSummary> Joints { get; } = [];

    /// <summary>Per adherend: maxima.</summary>
    public List<AdherendSummary> Adherends { get; } = [];

    /// <summary>First damage: where and when; null when none.</summary>
    public EventSummary? FirstDamage { get; set; }

    /// <summary>First yield; null when none or when no adherend can yield.</summary>
    public EventSummary? FirstYield { get; set; }

    /// <summary>Self-check.</summary>
    public SelfCheck SelfCheck { get; set; } = new();

    /// <summary>Why columns are empty, and other remarks on the results.</summary>
    public List<string> Remarks { get; } = [];

    /// <summary>Warnings met on the way.</summary>
    public List<string> Warnings { get; } = [];

    /// <summary>Seconds of wall clock by phase, and in total.</summary>
    public Dictionary<string, double> WallSeconds { get; } = [];

    /// <summary>Counts: unknowns, elements, layer elements, points, iterations, factorisations, solves, changed elements (tangents that differed from those in the factor).</summary>
    public Dictionary<string, long> Counts { get; } = [];

    /// <summary>Vector width of the factorisation's kernels in bits.</summary>
    public int KernelWidth { get; set; }

    /// <summary>Version of the program.</summary>
    public string Version { get; set; } = "";

    /// <summary>SHA-256 of the resolved deck, hexadecimal.</summary>
    public string DeckHash { get; set; } = "";
}

/// <summary>Peak and end of a grip. Forces [N] along its pull, moments [N·mm] for a turned grip.</summary>
public sealed record GripSummary
{
    /// <summary>Name.</summary>
    public required string Name { get; init; }

    /// <summary>Largest force along the pull, interpolated by a parabola through the highest point and its neighbours where these belong to one smooth stretch of one stage [N].</summary>
    public double? PeakForce { get; init; }

    /// <summary>Displacement there [mm].</summary>
    public double? DisplacementAtPeak { get; init; }

    /// <summary>Nearest accepted point.</summary>
    public int? PeakPoint { get; init; }

    /// <summary>Largest force along the pull at a stable equilibrium [N]; null when every point is stable or the grip is only turned.</summary>
    public double? LargestStableForce { get; init; }

    /// <summary>Displacement there [mm].</summary>
    public double? DisplacementAtLargestStable { get; init; }

    /// <summary>Largest moment of a turned grip [N·mm].</summary>
    public double? PeakMoment { get; init; }

    /// <summary>Rotation there [rad].</summary>
    public double? RotationAtPeak { get; init; }

    /// <summary>Force at the end [N].</summary>
    public double? FinalForce { get; init; }

    /// <summary>Displacement at the end [mm].</summary>
    public double? FinalDisplacement { get; init; }

    /// <summary>Rotation at the end [rad].</summary>
    public double? FinalRotation { get; init; }

    /// <summary>Moment at the end [N·mm].</summary>
    public double? FinalMoment { get; init; }
}

/// <summary>Maxima of a joint over the run.</summary>
public sealed record JointSummary
{
    /// <summary>Name.</summary>
    public required string Name { get; init; }

    /// <summary>Largest opening [mm].</summary>
    public required double LargestOpening { get; init; }

    /// <summary>Largest sliding [mm], magnitude.</summary>
    public required double LargestSliding { get; init; }

    /// <summary>Largest opening over the layer's thickness [-].</summary>
    public required double LargestPeelStrain { get; init; }

    /// <summary>Largest sliding over the layer's thickness [-].</summary>
    public required double LargestShearStrain { get; init; }

    /// <summary>Largest damage [-].</summary>
    public required double LargestDamage { get; init; }

    /// <summary>Largest peel traction [MPa].</summary>
    public required double LargestPeel { get; init; }

    /// <summary>Largest shear traction [MPa], magnitude.</summary>
    public required double LargestShear { get; init; }

    /// <summary>Bonded length that came apart [mm].</summary>
    public required double SeparatedLength { get; init; }

    /// <summary>Element length along the bond [mm], the largest.</summary>
    public required double ElementLength { get; init; }

    /// <summary>Elements within the longest process zone behind a growing crack, or within the estimated one when none has grown.</summary>
    public required double ElementsPerProcessZone { get; init; }
}

/// <summary>Maxima of an adherend over the run.</summary>
public sealed record AdherendSummary
{
    /// <summary>Name.</summary>
    public required string Name { get; init; }

    /// <summary>Largest equivalent stress [MPa].</summary>
    public required double LargestEquivalentStress { get; init; }

    /// <summary>x of that place [mm].</summary>
    public required double X { get; init; }

    /// <summary>y of that place [mm].</summary>
    public required double Y { get; init; }

    /// <summary>Point at which it occurs.</summary>
    public required int Point { get; init; }

    /// <summary>Largest equivalent plastic strain [-].</summary>
    public required double LargestPlasticStrain { get; init; }
}

/// <summary>An event: where and when.</summary>
/// <param name="Where">Joint or adherend, and position in words.</param>
/// <param name="Point">Point.</param>
/// <param name="Stage">Stage, from 1.</param>
/// <param name="Progress">Progress of the stage.</param>
public sealed record EventSummary(string Where, int Point, int Stage, double Progress);

/// <summary>Verdict on the numbers, never on strength.</summary>
public enum Verdict
{
    /// <summary>Numbers hold.</summary>
    NumbersHold,

    /// <summary>Numbers hold with care.</summary>
    HoldWithCare,

    /// <summary>Numbers do not hold.</summary>
    DoNotHold,
}

/// <summary>Self-check of a run.</summary>
public sealed class SelfCheck
{
    /// <summary>Largest balance of all points.</summary>
    public double Balance { get; set; }

    /// <summary>Largest path error of all points.</summary>
    public double PathError { get; set; }

    /// <summary>Largest relative disagreement of the J values where two or more are valid; null when never.</summary>
    public double? JDisagreement { get; set; }

    /// <summary>Least number of elements per process zone.</summary>
    public double? ElementsPerProcessZone { get; set; }

    /// <summary>Number of points with an unstable equilibrium under the stage's own control.</summary>
    public int UnstablePoints { get; set; }

    /// <summary>Largest rotation of any grip or interior point [deg], against the setting of small rotations.</summary>
    public double LargestRotationDegrees { get; set; }

    /// <summary>Verdict.</summary>
    public Verdict Verdict { get; set; }

    /// <summary>Reasons for the verdict, one line each.</summary>
    public List<string> Reasons { get; } = [];
}
