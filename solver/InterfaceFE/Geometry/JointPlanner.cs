using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>Finds the faces of joints, their overlap and stretches, and chooses element lengths.</summary>
internal sealed class JointPlanner
{
    private readonly Deck _deck;
    private readonly Dictionary<string, Strip> _byName;

    public JointPlanner(Deck deck, Strip[] strips)
    {
        _deck = deck;
        _byName = strips.ToDictionary(s => s.Name);
    }

    /// <summary>All joints in deck order.</summary>
    /// <exception cref="DeckException">All faults found, one a joint at most.</exception>
    public JointPlan[] Plan()
    {
        List<DeckProblem> problems = [];
        List<JointPlan> plans = [];
        foreach ((string name, JointDeck joint) in _deck.Joints ?? new Dictionary<string, JointDeck>())
        {
            try
            {
                plans.Add(Plan(name, joint));
            }
            catch (DeckException fault)
            {
                problems.AddRange(fault.Problems);
            }
        }
        for (int i = 0; i < plans.Count; i++)
            for (int j = 0; j < i; j++)
                if (SharesFace(plans[j], plans[i]))
                    problems.Add(new DeckProblem(plans[i].Path, $"it lies on a face that joint \"{plans[j].Name}\" already bonds at the same x: a face can be bonded once"));
        if (problems.Count > 0)
            throw new DeckException([.. problems.Distinct()]);
        return [.. plans];
    }

    private static bool SharesFace(JointPlan a, JointPlan b)
    {
        if (Math.Min(a.End, b.End) - Math.Max(a.Start, b.Start) <= Math.Max(a.Tolerance, b.Tolerance))
            return false;
        return a.Upper == b.Upper || a.Lower == b.Lower || a.Upper == b.Lower || a.Lower == b.Upper;
    }

    private JointPlan Plan(string name, JointDeck joint)
    {
        string path = "joints." + name;
        JointFace upper = Face(joint.Upper, path + ".upper", -1);
        JointFace lower = Face(joint.Lower, path + ".lower", 1);
        if (upper.Strip == lower.Strip)
            throw new DeckException(path, $"both edges belong to \"{upper.Strip.Name}\": a joint bonds two adherends");
        double tolerance = 1e-6 * Math.Min(upper.Strip.Thickness, lower.Strip.Thickness);
        double roundOff = 4e-16 * Math.Max(Math.Max(Math.Abs(upper.Y), Math.Abs(lower.Y)), Math.Max(Math.Abs(upper.Low), Math.Abs(upper.High)));
        tolerance = Math.Max(tolerance, 4 * roundOff);
        CheckFacing(path, joint, upper, lower);
        double start = Math.Max(upper.Low, lower.Low);
        double end = Math.Min(upper.High, lower.High);
        CheckTouch(path, joint, upper, lower, start, end, tolerance);
        List<Span> unbonded = Unbonded(path, joint, start, end, tolerance);
        List<Span> bonded = Bonded(unbonded, start, end, tolerance);
        if (bonded.Count == 0)
            throw new DeckException(path, Text.Of($"nothing is bonded: starter crack and unbonded stretches take the whole joint of {end - start:G6} mm"));
        if (_deck.Layers == null || !_deck.Layers.TryGetValue(joint.Layer, out LayerDeck? layer))
            throw new DeckException(path + ".layer", $"there is no layer \"{joint.Layer}\"; there are: {string.Join(", ", _deck.Layers?.Keys ?? [])}");
        if (joint.ElementLength is { } given && !(given > 0))
            throw new DeckException(path + ".element length", "must be greater than 0 mm");
        double width = joint.Width ?? _deck.Model.Width;
        foreach (Strip strip in (ReadOnlySpan<Strip>)[upper.Strip, lower.Strip])
            if (width > strip.Width * (1 + 1e-9))
                throw new DeckException(path + ".width", Text.Of($"the bond, {width:G6} mm wide, is wider than \"{strip.Name}\", {strip.Width:G6} mm{(joint.Width == null ? "; left out, its width is the model's" : "")}"));
        bool held = _deck.Model.OutOfPlane != OutOfPlane.Free;
        return new JointPlan
        {
            Name = name,
            Deck = joint,
            Width = width,
            Upper = upper,
            Lower = lower,
            Start = start,
            End = end,
            Tolerance = tolerance,
            DrawnThickness = joint.Drawn == DrawnThickness.True ? layer.Thickness : 0,
            Unbonded = unbonded,
            Bonded = bonded,
            Length = JointLength.Choose(CurveNumbers.OfPeel(joint.Layer, layer, held), CurveNumbers.OfShear(joint.Layer, layer), ArmOf(upper.Strip), ArmOf(lower.Strip),
                width, bonded.Max(b => b.To - b.From), _deck.Model.Elements,
                ReleaseShare(layer)),
        };
    }

    /// <summary>
    /// Share of the final separation on which tractions fall steeply at fracture. A bilinear curve has come down far by then and falls on in much the same slope, so that four times the release
    /// length is taken for it; other curves still carry most of their strength.
    /// </summary>
    private static double ReleaseShare(LayerDeck layer) =>
        layer.Mixing != Mixing.IndependentModes ? 0 : layer is { Peel.Law: CurveShape.Bilinear, Shear.Law: CurveShape.Bilinear } ? 4 * layer.ReleaseLength : layer.ReleaseLength;

    private Arm ArmOf(Strip strip)
    {
        if (!_deck.Materials.TryGetValue(strip.Deck.Of, out MaterialDeck? material))
            throw new DeckException(strip.Path + ".of", $"there is no material \"{strip.Deck.Of}\"; there are: {string.Join(", ", _deck.Materials.Keys)}");
        double modulus = material.Young.X;
        bool isHeld = _deck.Model.OutOfPlane != OutOfPlane.Free;
        if (isHeld)
        {
            // Plane strain along x: Ex/(1 - ν_xz ν_zx) with ν_zx = ν_xz Ez/Ex.
            double held = 1 - material.Poisson.Xz * material.Poisson.Xz * material.Young.Z / material.Young.X;
            modulus = held > 0 ? modulus / held : modulus;
        }
        if (strip.Deck.Plies is not null)
            modulus = PlyStack.BendingModulus(strip, _deck.Materials);
        return new Arm(modulus, strip.Thickness, strip.Width) { Tip = CrackTipModulus.Of(material, isHeld) };
    }

    private JointFace Face(string text, string path, int facing)
    {
        EdgeName name = EdgeName.Parse(text, path);
        if (!_byName.TryGetValue(name.Adherend, out Strip? strip))
            throw EdgeName.NoAdherend(text, path, name.Adherend, _byName.Keys);
        if (!strip.Edges.TryGetValue(name.Edge, out EdgeSpan edge))
            throw EdgeName.NoEdge(text, path, name.Edge, name.Adherend, strip.Edges.Keys);
        if (edge.IsEnd)
            throw new DeckException(path, $"\"{text}\" is an end: a joint lies along x, between a top or upper face and a bottom or lower face");
        if (edge.FirstRun != edge.LastRun)
            throw new DeckException(path, $"\"{text}\" is bent or has several runs: name the straight run in `stretches` of the sheet and join that");
        Run run = strip.Runs[edge.FirstRun];
        if (run.Heading == 0)
        {
            (double x0, double y0) = run.Point(run.Start, 0);
            (double x1, double y1) = run.Point(run.End, 0);
            throw new DeckException(path, Text.Of($"\"{text}\" runs from [{x0:G6} mm, {y0:G6} mm] to [{x1:G6} mm, {y1:G6} mm]: joints must lie along x in this version"));
        }
        Side side = edge.Side;
        if (strip.Stretches.ContainsKey(name.Edge))
            side = run.Heading == facing ? Side.Upper : Side.Lower;
        return new JointFace(strip, edge.FirstRun, side);
    }

    private static void CheckFacing(string path, JointDeck joint, JointFace upper, JointFace lower)
    {
        if (upper.Facing < 0 && lower.Facing > 0)
            return;
        if (upper.Facing > 0 && lower.Facing < 0)
            throw new DeckException(path, $"\"{joint.Upper}\" looks up and \"{joint.Lower}\" looks down: exchange `upper` and `lower`");
        string found = upper.Facing > 0 ? $"`upper` is the underside of the body above, and \"{joint.Upper}\" looks up" : $"`lower` is the upper side of the body below, and \"{joint.Lower}\" looks down";
        throw new DeckException(path, found + ": the two edges must face each other");
    }

    private void CheckTouch(string path, JointDeck joint, JointFace upper, JointFace lower, double start, double end, double tolerance)
    {
        double gap = upper.Y - lower.Y, apart = 0;
        double thickness = _deck.Layers != null && _deck.Layers.TryGetValue(joint.Layer, out LayerDeck? layer) ? layer.Thickness : double.NaN;
        if (joint.Drawn == DrawnThickness.True)
            apart = thickness;
        if (end - start <= tolerance)
            throw new DeckException(path, Text.Of($"the edges do not overlap along x: \"{joint.Upper}\" lies from {upper.Low:G7} to {upper.High:G7} mm, \"{joint.Lower}\" from {lower.Low:G7} to {lower.High:G7} mm, with {start - end:G6} mm between them along x and {gap:G6} mm along y"));
        if (Math.Abs(gap - apart) <= tolerance || double.IsNaN(apart))
            return;
        string where = Text.Of($"\"{joint.Upper}\" lies at y = {upper.Y:G9} mm, \"{joint.Lower}\" at y = {lower.Y:G9} mm");
        if (gap < 0)
            throw new DeckException(path, where + Text.Of($": the upper edge lies {-gap:G6} mm below the lower one; move \"{upper.Strip.Name}\" up by that, or exchange the edges"));
        if (apart > 0)
            throw new DeckException(path, where + Text.Of($": with `drawn: true thickness` they must lie the thickness of \"{joint.Layer}\" apart, {apart:G6} mm; move \"{upper.Strip.Name}\" {(gap > apart ? "down" : "up")} by {Math.Abs(gap - apart):G6} mm"));
        string drawn = Math.Abs(gap - thickness) <= 1e-3 * thickness ? "they lie the layer's thickness apart: use `drawn: true thickness`, or " : "faces must coincide (the layer's thickness counts by its law), or lie its thickness apart with `drawn: true thickness`: ";
        throw new DeckException(path, where + Text.Of($": {drawn}move \"{upper.Strip.Name}\" down by {gap:G6} mm"));
    }

    private static List<Span> Unbonded(string path, JointDeck joint, double start, double end, double tolerance)
    {
        double length = end - start;
        List<Span> found = [];
        if (joint.StarterCrack is { } crack)
        {
            if (!(crack.Length > tolerance) || crack.Length >= length - tolerance)
                throw new DeckException(path + ".starter crack.length", Text.Of($"{crack.Length:G6} mm must lie between 0 and the length of the joint, {length:G6} mm"));
            found.Add(crack.From == JointEnd.Start ? new Span(start, start + crack.Length) : new Span(end - crack.Length, end));
        }
        for (int i = 0; i < (joint.Unbonded?.Count ?? 0); i++)
        {
            StretchDeck stretch = joint.Unbonded![i];
            if (!(stretch.From >= 0) || !(stretch.To > stretch.From + tolerance) || stretch.To > length + tolerance)
                throw new DeckException(Text.Of($"{path}.unbonded.{i + 1}"), Text.Of($"from {stretch.From:G6} mm to {stretch.To:G6} mm: a stretch must run forward within the joint, 0 to {length:G6} mm"));
            found.Add(new Span(start + stretch.From, stretch.To >= length - tolerance ? end : start + stretch.To));
        }
        found.Sort((a, b) => a.From.CompareTo(b.From));
        List<Span> merged = [];
        foreach (Span span in found)
        {
            if (merged.Count > 0 && span.From <= merged[^1].To + tolerance)
                merged[^1] = new Span(merged[^1].From, Math.Max(merged[^1].To, span.To));
            else
                merged.Add(span.From <= start + tolerance ? new Span(start, span.To) : span);
        }
        return merged;
    }

    private static List<Span> Bonded(List<Span> unbonded, double start, double end, double tolerance)
    {
        List<Span> bonded = [];
        double at = start;
        foreach (Span gap in unbonded)
        {
            if (gap.From - at > tolerance)
                bonded.Add(new Span(at, gap.From));
            at = gap.To;
        }
        if (end - at > tolerance)
            bonded.Add(new Span(at, end));
        return bonded;
    }
}
