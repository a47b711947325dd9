using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>Division of a strip through its thickness.</summary>
internal static class ThroughDivision
{
    private const int MostTries = 64;

    /// <summary>
    /// Eight-node elements through a strip that yields: with them moment and springback of a bar bent far beyond yield come within 1 % (measured against 24), and first yield, seen at the outermost
    /// integration points, comes 7 % late (they lie 0.4226/6 of half the thickness below the face).
    /// </summary>
    private const int WhereItYields = 6;

    /// <summary>Most rows that one bonded face adds.</summary>
    private const int MostHalvings = 10;

    /// <summary>Shares of the thickness from the lower side, 0 to 1, at the lines between elements.</summary>
    /// <param name="strip">The strip.</param>
    /// <param name="kind">Kind of element.</param>
    /// <param name="bonded">Shortest element length along the strip's joints [mm]; infinity without joints.</param>
    /// <param name="zones">Shortest process zones estimated at the joints of the lower and the upper face [mm]; infinity without joints.</param>
    /// <param name="shares">Shares at which a line must be.</param>
    /// <param name="yields">Whether the material has a yield curve.</param>
    /// <exception cref="DeckException">When the given number is too small for the places.</exception>
    public static double[] Choose(Strip strip, ElementKind kind, double bonded, (double Lower, double Upper) zones, IEnumerable<double> shares, bool yields)
    {
        List<double> places = [0, 1];
        foreach (double share in PlyStack.Of(strip).Skip(1).SkipLast(1).Concat(shares))
            if (places.TrueForAll(p => Math.Abs(p - share) > PlacesOnEdges.Slack))
                places.Add(share);
        places.Sort();
        ReadOnlySpan<double> sorted = places.ToArray();
        if (strip.Deck.Plies is not null)
            return LowAtFaces(Lines(sorted, InPlies(sorted, strip, DefaultNumber(strip, kind, bonded))), strip.Thickness, kind, zones, strip.Deck.Elements?.Through is not null);
        if (strip.Deck.Elements?.Through is { } given)
            return Lines(sorted, EvenDivision.Counts(sorted, given) ?? throw new DeckException(strip.Path + ".elements.through",
                $"{given} elements are too few to have a line at each grip and gauge on the ends: take more, or leave `through` out"));
        int number = Math.Max(DefaultNumber(strip, kind, bonded), yields ? WhereItYields : 0);
        for (int i = 0; i < MostTries; i++)
            if (EvenDivision.Counts(sorted, number * (i + 1)) is { } counts)
                return LowAtFaces(Lines(sorted, counts), strip.Thickness, kind, zones);
        throw new DeckException(strip.Path, "places of grips and gauges on an end lie too close to each other for a line at each");
    }

    /// <summary>
    /// Two eight-node or four four-node elements; up to twice as many where elements along joints are much shorter than high; more in an adherend that is higher than long.
    /// Always even, so that the middle of an end is a node of both kinds.
    /// </summary>
    private static int DefaultNumber(Strip strip, ElementKind kind, double bonded)
    {
        bool eight = kind == ElementKind.EightNode;
        int least = eight ? 2 : 4;
        double shape = Math.Clamp(strip.Thickness / (4 * bonded), least, 2 * least);
        double stocky = Math.Clamp(strip.Thickness / ((eight ? 0.75 : 0.375) * strip.Length), 0, 1000);
        return 2 * (int)Math.Ceiling(Math.Max(shape, stocky) * (1 - 1e-9) / 2);
    }

    /// <summary>
    /// Halves the rows at bonded faces until they are no higher than the process zone (half of it with four-node elements), whose field does not reach deeper: each row is then at most
    /// twice as high as the next one towards the face. Measured on flexure of carbon/PEEK arms: rows of 1.3 zones leave 0.1 % error of the peak, of 3 zones 0.3 %, of 6 zones over 2 %.
    /// </summary>
    private static double[] LowAtFaces(double[] lines, double thickness, ElementKind kind, (double Lower, double Upper) zones, bool given = false)
    {
        if (given)
            return lines;
        double share = kind == ElementKind.FourNode ? 0.5 : 1;
        List<double> result = [.. lines];
        double low = lines[1], high = 1 - lines[^2];
        for (int i = 0; i < MostHalvings && low * thickness > share * zones.Lower; i++)
            result.Insert(1, low /= 2);
        for (int i = 0; i < MostHalvings && high * thickness > share * zones.Upper; i++)
            result.Insert(result.Count - 1, 1 - (high /= 2));
        return [.. result];
    }

    /// <summary>Rows in each ply, or in the parts that places on the ends cut from it: at least one, and as many as its share of the number; a given number is met exactly.</summary>
    private static int[] InPlies(ReadOnlySpan<double> places, Strip strip, int number)
    {
        int[] counts = new int[places.Length - 1];
        int? given = strip.Deck.Elements?.Through;
        if (given < counts.Length)
            throw new DeckException(strip.Path + ".elements.through", $"{given} elements are too few for the plies and the places of grips and gauges on the ends, which need {counts.Length}: take more, or leave `through` out");
        for (int i = 0; i < counts.Length; i++)
            counts[i] = given is null ? Math.Max(1, (int)Math.Ceiling(number * (places[i + 1] - places[i]) - 1e-9)) : 1;
        for (int rest = (given ?? 0) - counts.Length; rest > 0; rest--)
        {
            int highest = 0;
            for (int i = 1; i < counts.Length; i++)
                if ((places[i + 1] - places[i]) / counts[i] > (places[highest + 1] - places[highest]) / counts[highest] * (1 + 1e-9))
                    highest = i;
            counts[highest]++;
        }
        return counts;
    }

    private static double[] Lines(ReadOnlySpan<double> places, int[] counts)
    {
        List<double> lines = [0];
        for (int i = 0; i < counts.Length; i++)
            lines.AddRange(EvenDivision.Points(places[i], places[i + 1], counts[i]).AsSpan(1));
        return [.. lines];
    }
}
