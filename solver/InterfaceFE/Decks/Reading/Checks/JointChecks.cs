using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>Joints: names, edges, widths, unbonded stretches. Whether the edges face each other and how long they are is a matter of geometry.</summary>
internal static class JointChecks
{
    /// <summary>Checks a joint.</summary>
    public static void Run(Deck deck, JointDeck joint, string path, ReadContext context)
    {
        DeckChecks.NameExists(joint.Layer, deck.Layers, "layers", path + ".layer", context);
        EdgeText? upper = DeckChecks.Edge(joint.Upper, deck, path + ".upper", context);
        EdgeText? lower = DeckChecks.Edge(joint.Lower, deck, path + ".lower", context);
        if (upper is { } up && lower is { } down && up.Adherend == down.Adherend)
            context.Fail(path + ".lower", "a joint bonds two adherends; both edges are of " + up.Adherend);
        CheckEnd(upper, path + ".upper", context);
        CheckEnd(lower, path + ".lower", context);
        CheckWidth(deck, joint, upper, path, context);
        CheckWidth(deck, joint, lower, path, context);
        if (joint.Frame != FrameLine.MidLine && joint.Drawn == DrawnThickness.Zero && deck.Model is { Rotation: RotationSetting.Small })
            context.Fail(path + ".frame", "has no effect on a layer of zero thickness at small rotation: leave it out, or use `rotation: finite`");
        if (joint.Unbonded is not { } stretches)
            return;
        for (int i = 0; i < stretches.Count; i++)
            if (stretches[i] is { } stretch)
                DeckChecks.Rises(stretch.From, stretch.To, ReadContext.Join(path + ".unbonded", i + 1), context);
    }

    private static void CheckEnd(EdgeText? edge, string path, ReadContext context)
    {
        if (edge is { Edge: "left end" or "right end" })
            context.Fail(path, "a layer lies along a face, not on an end");
    }

    private static void CheckWidth(Deck deck, JointDeck joint, EdgeText? edge, string path, ReadContext context)
    {
        if (edge is not { } of || deck.Model is not { } model)
            return;
        double bond = joint.Width ?? model.Width;
        double adherend = deck.Adherends[of.Adherend].Width ?? model.Width;
        if (bond > adherend)
            context.Fail(context.IsGiven(path + ".width") ? path + ".width" : path, $"the bond is {QuantityText.Write(bond, Dimension.Length)} wide, but {of.Adherend} only {QuantityText.Write(adherend, Dimension.Length)}");
    }
}
