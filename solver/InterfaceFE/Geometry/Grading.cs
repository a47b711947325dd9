using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>Divides segments so that neighbours differ by at most the growth ratio, across the places where segments meet as well.</summary>
internal static class Grading
{
    /// <summary>Most nodes of a mesh.</summary>
    public const int MostNodes = 2_000_000;

    private const int MostRounds = 2000;

    /// <summary>Fills <see cref="Segment.Points"/>.</summary>
    /// <returns>Whether the growth ratio is kept wherever numbers of elements are not given.</returns>
    /// <exception cref="DeckException">When far too many elements would be needed.</exception>
    public static bool Divide(IReadOnlyList<Segment> segments, IReadOnlyList<Meeting> meetings)
    {
        StartEven(segments, meetings);
        bool settled = false;
        for (int round = 0; !settled && round < MostRounds; round++)
        {
            Relax(segments, meetings);
            settled = true;
            foreach (Segment segment in segments)
                settled &= !LowerEnds(segment);
        }
        foreach (Segment segment in segments)
            segment.Points = segment.Count > 0 ? EvenDivision.Points(segment.From, segment.To, segment.Count) : FieldOf(segment).Points(segment.From, segment.To);
        return settled;
    }

    /// <summary>Starts from even segments; where a bond meets another segment, that one takes the bond's length if it may, so that the bond stays even.</summary>
    private static void StartEven(IReadOnlyList<Segment> segments, IReadOnlyList<Meeting> meetings)
    {
        foreach (Segment segment in segments)
            segment.AtEnds[0] = segment.AtEnds[1] = segment.Length / (segment.Count > 0 ? segment.Count : Math.Max(1, Math.Ceiling(segment.Length / segment.Wanted * (1 - 1e-9))));
        foreach (Meeting m in meetings)
        {
            if (m.A.IsBond == m.B.IsBond)
                continue;
            (Segment bond, Segment other, int end) = m.A.IsBond ? (m.A, m.B, m.EndB) : (m.B, m.A, m.EndA);
            if (other.Count == 0)
                other.AtEnds[end] = Math.Min(other.Wanted, Math.Max(other.AtEnds[end], bond.AtEnds[0]));
        }
    }

    /// <summary>Makes lengths equal where segments meet, and keeps the slope ln(growth) within each: the largest lengths that do.</summary>
    private static void Relax(IReadOnlyList<Segment> segments, IReadOnlyList<Meeting> meetings)
    {
        bool changed = true;
        for (int round = 0; changed && round <= 2 * segments.Count; round++)
        {
            changed = false;
            foreach (Meeting m in meetings)
            {
                double least = Math.Min(m.A.AtEnds[m.EndA], m.B.AtEnds[m.EndB]);
                changed |= LowerTo(m.A, m.EndA, least) | LowerTo(m.B, m.EndB, least);
            }
            foreach (Segment s in segments)
            {
                double reach = Math.Log(s.Growth) * s.Length;
                changed |= LowerTo(s, 0, s.AtEnds[1] + reach) | LowerTo(s, 1, s.AtEnds[0] + reach);
            }
        }
    }

    private static bool LowerTo(Segment segment, int end, double length)
    {
        if (segment.Count > 0 || segment.AtEnds[end] <= length * (1 + 1e-12))
            return false;
        segment.AtEnds[end] = length;
        return true;
    }

    /// <summary>Where a segment is too short to take up the fraction of an element within its slope, makes the lengths at its ends smaller.</summary>
    private static bool LowerEnds(Segment segment)
    {
        if (segment.Count > 0)
            return false;
        GradedDivision field = FieldOf(segment);
        double count = field.LeastCount;
        if (!(count < MostNodes))
            throw new DeckException(segment.Owner!.Path, Text.Of($"{count:G4} elements would be needed along {segment.Length:G6} mm; a mesh holds {MostNodes} nodes at most: make lengths of elements longer"));
        if (field.CanHold(count))
            return false;
        (segment.AtEnds[0], segment.AtEnds[1]) = field.EndsToHold(count);
        return true;
    }

    private static GradedDivision FieldOf(Segment segment) => new(segment.Length, segment.Wanted, segment.AtEnds[0], segment.AtEnds[1], Math.Log(segment.Growth));
}
