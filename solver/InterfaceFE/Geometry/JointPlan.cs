using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>A face of a joint: a straight run parallel to x and the side of it.</summary>
internal readonly record struct JointFace(Strip Strip, int RunIndex, Side Side)
{
    public Run Run => Strip.Runs[RunIndex];

    /// <summary>+1 when the face looks up, -1 when it looks down.</summary>
    public int Facing => Side == Side.Upper ? Run.Heading : -Run.Heading;

    public double Y => Run.Y + Facing * Strip.Thickness / 2;

    public double Low => Math.Min(Run.Start, Run.End);

    public double High => Math.Max(Run.Start, Run.End);
}

/// <summary>A stretch along x [mm].</summary>
internal readonly record struct Span(double From, double To);

/// <summary>A joint with its faces found and its stretches as x.</summary>
internal sealed class JointPlan
{
    public required string Name { get; init; }

    public required JointDeck Deck { get; init; }

    public required double Width { get; init; }

    public required JointFace Upper { get; init; }

    public required JointFace Lower { get; init; }

    public required double Start { get; init; }

    public required double End { get; init; }

    public required double Tolerance { get; init; }

    /// <summary>Distance of the faces [mm]; 0 where they lie on each other.</summary>
    public required double DrawnThickness { get; init; }

    /// <summary>Stretches without bond, ascending, not touching each other.</summary>
    public required IReadOnlyList<Span> Unbonded { get; init; }

    /// <summary>Stretches with bond, ascending.</summary>
    public required IReadOnlyList<Span> Bonded { get; init; }

    public required JointLength Length { get; init; }

    public string Path => "joints." + Name;

    /// <summary>Element length wanted along the longest bonded stretch [mm].</summary>
    public double Wanted => Deck.ElementLength ?? Length.Default;

    /// <summary>Element length wanted along a bonded stretch [mm].</summary>
    public double WantedOn(Span bonded, ElementKind kind) => Deck.ElementLength ?? Math.Min(Length.Default, JointLength.LargestOn(bonded.To - bonded.From, kind));

    public bool IsBonded(double x) => !Unbonded.Any(u => u.From < x && x < u.To);
}
