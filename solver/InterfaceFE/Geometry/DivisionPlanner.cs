using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>
/// Divides all runs along. Runs that joints connect form a group with one division by x, so that facing faces are paired; places that must have a line (ends, crack
/// tips, grips, gauges) cut it into segments, each with a wanted element length; <see cref="Grading"/> does the rest.
/// </summary>
internal sealed class DivisionPlanner
{
    private readonly Deck _deck;
    private readonly Strip[] _strips;
    private readonly JointPlan[] _joints;
    private readonly PlacesOnEdges _places;
    private readonly Dictionary<Run, RunGroup> _groupOf = [];
    private readonly List<RunGroup> _groups = [];
    private readonly List<string> _notes;
    private readonly List<string> _warnings;

    public DivisionPlanner(Deck deck, Strip[] strips, JointPlan[] joints, PlacesOnEdges places, List<string> notes, List<string> warnings)
    {
        (_deck, _strips, _joints, _places) = (deck, strips, joints, places);
        (_notes, _warnings) = (notes, warnings);
    }

    /// <summary>Division points q of each run in walking order.</summary>
    /// <exception cref="DeckException">When given numbers along contradict each other or too many elements are needed.</exception>
    public Dictionary<Run, double[]> Divide()
    {
        MakeGroups();
        CollectBreakpoints();
        foreach (RunGroup group in _groups)
        {
            double thinnest = group.Runs.Min(r => _strips[r.Strip].Thickness);
            double farthest = group.Runs.Max(r => Math.Max(Math.Abs(r.Start), Math.Abs(r.End)));
            group.Settle(Math.Max(1e-6 * thinnest, 4e-16 * farthest));
            SetWanted(group);
        }
        SetJointLengths();
        SetFiner();
        SetGivenNumbers();
        List<Segment> segments = [.. _groups.SelectMany(g => g.Segments)];
        if (!Grading.Divide(segments, Meetings()))
            _warnings.Add("lengths of neighbouring elements differ by more than the growth ratio at some places: it is too close to 1 for the given places");
        return _strips.SelectMany(s => s.Runs).ToDictionary(r => r, r => _groupOf[r].PointsOf(r));
    }

    /// <summary>The division lines at which a joint starts and ends: its own ends, or places within the tolerance of them.</summary>
    public Span EndsOf(JointPlan joint)
    {
        RunGroup group = _groupOf[joint.Lower.Run];
        return new Span(group.Places[group.PlaceNear(joint.Start)], group.Places[group.PlaceNear(joint.End)]);
    }

    /// <summary>Longest element of a joint's bonded stretches [mm].</summary>
    public double LongestBonded(JointPlan joint)
    {
        double longest = 0;
        foreach (Segment segment in SegmentsOf(joint, joint.Bonded))
            for (int i = 1; i < segment.Points.Length; i++)
                longest = Math.Max(longest, segment.Points[i] - segment.Points[i - 1]);
        return longest;
    }

    private void MakeGroups()
    {
        foreach (Strip strip in _strips)
            foreach (Run run in strip.Runs)
            {
                RunGroup group = new();
                group.Runs.Add(run);
                _groupOf[run] = group;
            }
        foreach (JointPlan joint in _joints)
        {
            RunGroup kept = _groupOf[joint.Lower.Run];
            RunGroup merged = _groupOf[joint.Upper.Run];
            if (kept == merged)
                continue;
            kept.Runs.AddRange(merged.Runs);
            foreach (Run run in merged.Runs)
                _groupOf[run] = kept;
        }
        _groups.AddRange(_strips.SelectMany(s => s.Runs).Select(r => _groupOf[r]).Distinct());
    }

    private void CollectBreakpoints()
    {
        foreach (RunGroup group in _groups)
            foreach (Run run in group.Runs)
            {
                group.Breakpoints.Add(new Breakpoint(run.Start, Firmness.RunEnd, 0));
                group.Breakpoints.Add(new Breakpoint(run.End, Firmness.RunEnd, 0));
            }
        foreach (JointPlan joint in _joints)
            foreach (Span bonded in joint.Bonded)
            {
                _groupOf[joint.Lower.Run].Breakpoints.Add(new Breakpoint(bonded.From, Firmness.Joint, 0));
                _groupOf[joint.Lower.Run].Breakpoints.Add(new Breakpoint(bonded.To, Firmness.Joint, 0));
            }
        foreach ((Run run, double q, Firmness firmness) in _places.OnFaces)
            _groupOf[run].Breakpoints.Add(new Breakpoint(q, firmness, PlacesOnEdges.Slack * _strips[run.Strip].Thickness));
        foreach ((Run run, double from, double to, double length) in FinerSpans())
        {
            _groupOf[run].Breakpoints.Add(new Breakpoint(from, Firmness.Finer, length / 4));
            _groupOf[run].Breakpoints.Add(new Breakpoint(to, Firmness.Finer, length / 4));
        }
    }

    private IEnumerable<(Run Run, double From, double To, double Length)> FinerSpans()
    {
        foreach (Strip strip in _strips)
            for (int i = 0; i < (strip.Deck.Elements?.Finer?.Count ?? 0); i++)
            {
                FinerDeck finer = strip.Deck.Elements!.Finer![i];
                if (finer.To > strip.Length * (1 + 1e-9))
                    throw new DeckException(Text.Of($"{strip.Path}.elements.finer.{i + 1}.to"), Text.Of($"{finer.To:G6} mm lies beyond the adherend, which is {strip.Length:G6} mm long along its mid-line"));
                foreach (Run run in strip.Runs)
                {
                    double from = Math.Max(finer.From - run.StartArc, 0);
                    double to = Math.Min(finer.To - run.StartArc, run.Length);
                    if (to > from)
                        yield return (run, run.At(from), run.At(to), finer.Length);
                }
            }
    }

    /// <summary>Lengths away from joints: of the order of the thickness, and fine enough in bends.</summary>
    private void SetWanted(RunGroup group)
    {
        foreach (Run run in group.Runs)
        {
            Strip strip = _strips[run.Strip];
            double wanted = LargestAlong(strip);
            if (run.IsBend)
                wanted = Math.Min(wanted, run.Radius * Math.PI / 2 / (_deck.Model.Elements == ElementKind.EightNode ? 8 : 16));
            (int first, int past) = group.Covered(run.Start, run.End);
            for (int i = first; i < past; i++)
            {
                Segment segment = group.Segments[i];
                segment.Wanted = Math.Min(segment.Wanted, wanted);
                segment.Growth = Math.Min(segment.Growth, strip.Growth);
                segment.Owner ??= strip;
            }
        }
    }

    /// <summary>Largest element length of a strip away from joints [mm]: of the order of the thickness, or as long as the deck asks for along its joints.</summary>
    private double LargestAlong(Strip strip)
    {
        if (strip.Deck.Elements?.Length is { } given)
            return given;
        bool eight = _deck.Model.Elements == ElementKind.EightNode;
        double largest = (eight ? 1.5 : 0.75) * strip.Thickness;
        foreach (JointPlan joint in _joints)
            if (joint.Upper.Strip == strip || joint.Lower.Strip == strip)
                largest = Math.Max(largest, joint.Deck.ElementLength ?? 0);
        return Math.Min(largest, strip.Length / (eight ? 2 : 4));
    }

    private IEnumerable<Segment> SegmentsOf(JointPlan joint, IEnumerable<Span> spans)
    {
        RunGroup group = _groupOf[joint.Lower.Run];
        foreach (Span span in spans)
        {
            (int first, int past) = group.Covered(span.From, span.To);
            for (int i = first; i < past; i++)
                yield return group.Segments[i];
        }
    }

    private void SetJointLengths()
    {
        // A length given for a joint replaces those of the bodies; where joints lie above each other the shortest holds.
        foreach (Segment segment in _joints.Where(j => j.Deck.ElementLength != null).SelectMany(j => SegmentsOf(j, j.Bonded)))
            segment.Wanted = double.PositiveInfinity;
        foreach (JointPlan joint in _joints)
            foreach (Span bonded in joint.Bonded)
                foreach (Segment segment in SegmentsOf(joint, [bonded]))
                    (segment.IsBond, segment.Wanted) = (true, Math.Min(segment.Wanted, joint.WantedOn(bonded, _deck.Model.Elements)));
    }

    private void SetFiner()
    {
        foreach ((Run run, double from, double to, double length) in FinerSpans())
        {
            double low = Math.Min(from, to);
            double high = Math.Max(from, to);
            foreach (Segment segment in _groupOf[run].Segments)
            {
                double shared = Math.Min(high, segment.To) - Math.Max(low, segment.From);
                if (shared > 0.5 * Math.Min(segment.Length, high - low))
                    segment.Wanted = Math.Min(segment.Wanted, length);
            }
        }
    }

    private void SetGivenNumbers()
    {
        foreach (Strip strip in _strips)
        {
            if (strip.Deck.Elements?.Along is not { } along)
                continue;
            if (along < strip.Runs.Count)
                throw new DeckException(strip.Path + ".elements.along", $"{along} is too few: the sheet has {strip.Runs.Count} straight runs and bends, each needs one element at least");
            int[] shares = Shares(strip, along);
            for (int i = 0; i < strip.Runs.Count; i++)
                SetGivenNumber(strip, strip.Runs[i], shares[i], along);
        }
    }

    /// <summary>Numbers of elements of the runs: by length, at least one each, the rest to the largest remainders.</summary>
    private static int[] Shares(Strip strip, int along)
    {
        int count = strip.Runs.Count;
        int[] shares = new int[count];
        double[] left = new double[count];
        for (int i = 0; i < count; i++)
        {
            double share = along * strip.Runs[i].Length / strip.Length;
            shares[i] = Math.Max(1, (int)Math.Floor(share + 1e-9));
            left[i] = share - shares[i];
        }
        for (int sum = shares.Sum(); sum != along; sum += Math.Sign(along - sum))
        {
            int sign = Math.Sign(along - sum);
            int best = -1;
            for (int i = 0; i < count; i++)
                if ((sign > 0 || shares[i] > 1) && (best < 0 || sign * left[i] > sign * left[best]))
                    best = i;
            shares[best] += sign;
            left[best] -= sign;
        }
        return shares;
    }

    private void SetGivenNumber(Strip strip, Run run, int number, int along)
    {
        RunGroup group = _groupOf[run];
        (int first, int past) = group.Covered(run.Start, run.End);
        ReadOnlySpan<double> places = group.Places.AsSpan(first, past - first + 1);
        int[]? counts = EvenDivision.Counts(places, number);
        string path = strip.Path + ".elements.along";
        if (counts == null)
        {
            double shortest = double.PositiveInfinity;
            for (int i = 1; i < places.Length; i++)
                shortest = Math.Min(shortest, places[i] - places[i - 1]);
            throw new DeckException(path, Text.Of($"{along} elements are too few to have a line at each joint end, crack tip, grip and gauge, the nearest of which are {shortest:G6} mm apart: take about {Math.Ceiling(along * run.Length / shortest / number):F0}, or leave `along` out"));
        }
        double move = EvenDivision.LargestMove(places, counts);
        if (move > 1e-6)
            _notes.Add(Text.Of($"{strip.Name}: lines of the even division moved by up to {move * run.Length / number:G4} mm to meet joint ends, crack tips, grips and gauges"));
        for (int i = first; i < past; i++)
        {
            Segment segment = group.Segments[i];
            if (segment.CountBy != null && segment.Count != counts[i - first])
                throw new DeckException(path, Text.Of($"between x = {segment.From:G6} and {segment.To:G6} mm \"{strip.Name}\" would have {counts[i - first]} elements and \"{segment.CountBy.Name}\", which joints connect with it, {segment.Count}: facing edges need equal divisions; take {Math.Ceiling((double)along * segment.Count / counts[i - first]):F0} here, or leave `along` out in one of them"));
            (segment.Count, segment.CountBy) = (counts[i - first], strip);
        }
        foreach (JointPlan joint in _joints.Where(j => j.Deck.ElementLength != null && (j.Upper.Run == run || j.Lower.Run == run)))
            foreach (Segment segment in SegmentsOf(joint, joint.Bonded))
                if (segment.CountBy == strip && segment.Length / segment.Count > joint.Deck.ElementLength * (1 + 1e-6))
                    throw new DeckException(path, Text.Of($"{along} elements are {segment.Length / segment.Count:G4} mm long along joint \"{joint.Name}\", which asks for an `element length` of {joint.Deck.ElementLength:G4} mm: leave out one of the two"));
    }

    private List<Meeting> Meetings()
    {
        List<Meeting> meetings = [];
        foreach (RunGroup group in _groups)
            for (int i = 1; i < group.Segments.Length; i++)
                meetings.Add(new Meeting(group.Segments[i - 1], 1, group.Segments[i], 0));
        foreach (Strip strip in _strips)
            for (int i = 1; i < strip.Runs.Count; i++)
            {
                (Segment before, int endBefore) = EndOf(strip.Runs[i - 1], true);
                (Segment after, int endAfter) = EndOf(strip.Runs[i], false);
                meetings.Add(new Meeting(before, endBefore, after, endAfter));
            }
        return meetings;
    }

    private (Segment Segment, int End) EndOf(Run run, bool last)
    {
        RunGroup group = _groupOf[run];
        (int first, int past) = group.Covered(run.Start, run.End);
        bool high = last == (run.Heading >= 0);
        return high ? (group.Segments[past - 1], 1) : (group.Segments[first], 0);
    }
}
