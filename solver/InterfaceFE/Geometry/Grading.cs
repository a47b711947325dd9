using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>Divides segments so that neighbours differ by at most the growth ratio, across the places where segments meet as well.</summary>
internal static class Grading
{
    /// <summary>Most nodes of a mesh.</summary>
    public const int MostNodes = 2_000_000;

    private const int MostRounds = 400;

    /// <summary>Fills <see cref="Segment.Points"/>.</summary>
    /// <returns>Whether the growth ratio is kept wherever numbers of elements are not given.</returns>
    /// <exception cref="DeckException">When far too many elements would be needed.</exception>
    public static bool Divide(IReadOnlyList<Segment> segments, IReadOnlyList<Meeting> meetings)
    {
        Relax(segments, meetings);
        foreach (Segment segment in segments)
            Divide(segment);
        for (int round = 0; round < MostRounds; round++)
        {
            List<Segment> changed = [];
            foreach (Meeting meeting in meetings)
                Lower(meeting, changed);
            if (changed.Count == 0)
                return true;
            foreach (Segment segment in changed.Distinct())
                Divide(segment);
        }
        return false;
    }

    /// <summary>First estimate of the lengths at the ends: short neighbours and the slope ln(growth) limit them.</summary>
    private static void Relax(IReadOnlyList<Segment> segments, IReadOnlyList<Meeting> meetings)
    {
        foreach (Segment segment in segments)
            segment.AtEnds[0] = segment.AtEnds[1] = segment.Count > 0 ? segment.Length / segment.Count : Math.Min(segment.Wanted, segment.Length);
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

    /// <summary>Where two elements meet and one is too long for the other, lowers the length wanted at that end.</summary>
    private static void Lower(Meeting meeting, List<Segment> changed)
    {
        double a = meeting.A.EndElement(meeting.EndA);
        double b = meeting.B.EndElement(meeting.EndB);
        (Segment longer, int end, double least) = a > b ? (meeting.A, meeting.EndA, b) : (meeting.B, meeting.EndB, a);
        double growth = Math.Min(meeting.A.Growth, meeting.B.Growth);
        if (longer.Count > 0 || Math.Max(a, b) <= growth * least * (1 + 1e-9))
            return;
        // A first element that starts with length v on the slope ln r is v (r - 1)/ln r long.
        double wanted = growth * least * Math.Log(growth) / (growth - 1);
        longer.AtEnds[end] = Math.Min(longer.AtEnds[end] * 0.95, wanted);
        changed.Add(longer);
    }

    private static void Divide(Segment segment)
    {
        if (segment.Count > 0)
        {
            segment.Points = EvenDivision.Points(segment.From, segment.To, segment.Count);
            return;
        }
        double measure = GradedDivision.Measure(segment.Length, segment.Wanted, segment.AtEnds[0], segment.AtEnds[1], segment.Growth);
        if (!(measure < MostNodes))
            throw new DeckException(segment.Owner!.Path, Text.Of($"{measure:G4} elements would be needed along {segment.Length:G6} mm; a mesh holds {MostNodes} nodes at most: make lengths of elements longer"));
        segment.Points = GradedDivision.Points(segment.From, segment.To, segment.Wanted, segment.AtEnds[0], segment.AtEnds[1], segment.Growth);
    }
}
