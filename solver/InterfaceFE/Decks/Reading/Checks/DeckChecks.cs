using System.Globalization;
using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>Checks of a deck's values against each other. They bear parts that could not be read: those are NaN or null and already reported.</summary>
internal static class DeckChecks
{
    /// <summary>Runs all checks.</summary>
    public static void Run(Deck deck, ReadContext context)
    {
        foreach ((string name, MaterialDeck material) in Entries(deck.Materials))
        {
            MaterialChecks.Run(material, $"materials.{name}", context);
            if (material.YieldCurve is { } curve)
                YieldChecks.Run(deck, name, material, curve, context);
        }
        foreach ((string name, LayerDeck layer) in Entries(deck.Layers))
            LayerChecks.Run(layer, $"layers.{name}", context);
        foreach ((string name, AdherendDeck adherend) in Entries(deck.Adherends))
            AdherendChecks.Run(deck, adherend, $"adherends.{name}", context);
        foreach ((string name, JointDeck joint) in Entries(deck.Joints))
            JointChecks.Run(deck, joint, $"joints.{name}", context);
        foreach ((string name, GripDeck grip) in Entries(deck.Grips))
            GripChecks.Run(deck, grip, $"grips.{name}", context);
        if (deck.Model is { Rotation: RotationSetting.Finite, Elements: ElementKind.FourNode })
            context.Fail("model.elements", "finite rotation needs eight-node elements: leave `elements` out, or use `rotation: small`");
        if (deck.Model is { Rotation: RotationSetting.Finite, OutOfPlane: OutOfPlane.UniformStrain })
            context.Fail("model.out of plane", "is built for small rotation only: with `rotation: finite` use `held` or `free`");
        if (deck.Model is { StrainOutOfPlane: not null, OutOfPlane: not OutOfPlane.UniformStrain } && context.IsSound("model.strain out of plane"))
            context.Fail("model.strain out of plane", "applies to `out of plane: uniform strain` only");
        SequenceChecks.Run(deck, context);
        KeepChecks.Run(deck, context);
        // In a deck with errors a name may seem unused only because of them.
        if (context.Problems.IsEmpty)
            UnusedChecks.Run(deck, context);
        if (deck.March is { } march && march.FirstStride > march.LargestStride)
            context.Fail(context.IsGiven("march.first stride") ? "march.first stride" : "march.largest stride",
                string.Create(CultureInfo.InvariantCulture, $"the first stride ({march.FirstStride}) must not exceed the largest stride ({march.LargestStride})"));
    }

    /// <summary>The entries of a map that may be missing; entries that could not be read are left out.</summary>
    public static IEnumerable<KeyValuePair<string, T>> Entries<T>(IReadOnlyDictionary<string, T>? map) => map?.Where(e => e.Value is not null) ?? [];

    /// <summary>Whether the name is among the entries; else it is an error that offers the nearest.</summary>
    /// <param name="name">The name; null when it could not be read.</param>
    /// <param name="entries">The entries; null when the block is missing or could not be read.</param>
    /// <param name="block">The key under which they stand.</param>
    /// <param name="path">Where the name stands.</param>
    /// <param name="context">Where problems go.</param>
    public static bool NameExists<T>(string? name, IReadOnlyDictionary<string, T>? entries, string block, string path, ReadContext context)
    {
        if (name is null)
            return false;
        if (entries is not null && entries.ContainsKey(name))
            return true;
        // A block that could not be read has been reported; every name into it would be reported again.
        if (context.IsGiven(ReadContext.Join(block, name)) || (entries is null && context.IsGiven(block)))
            return false;
        string? near = NearestText.Find(name, entries?.Keys ?? []);
        string known = near is not null ? $"; nearest name {near}"
            : entries is null || entries.Count == 0 ? $"; the deck has no `{block}`"
            : $"; there {(entries.Count == 1 ? "is" : "are")} {string.Join(", ", entries.Keys.Take(8))}{(entries.Count > 8 ? ", …" : "")}";
        context.Fail(path, $"no entry of `{block}` has this name{known}");
        return false;
    }

    /// <summary>Checks the text of an edge: the adherend exists and its shape has that edge. Null when not, or when it cannot be told.</summary>
    public static EdgeText? Edge(string? text, Deck deck, string path, ReadContext context)
    {
        if (text is null || !context.IsSound(path))
            return null;
        if (!EdgeText.TryParse(text, out EdgeText edge))
        {
            context.Fail(path, "is no edge; an edge is written EDGE of ADHEREND, for example " + ExampleEdge(deck));
            return null;
        }
        if (!NameExists(edge.Adherend, deck.Adherends, "adherends", path, context))
            return null;
        IReadOnlyList<string> edges = EdgeText.EdgesOf(deck.Adherends[edge.Adherend]);
        if (edges.Count == 0)
            return null;
        if (edges.Contains(edge.Edge))
            return edge;
        string? near = NearestText.Find(edge.Edge, edges) ?? (edge.Edge, edges.Contains("upper face")) switch
        {
            ("top", true) => "upper face",
            ("bottom", true) => "lower face",
            ("upper face", false) => "top",
            ("lower face", false) => "bottom",
            _ => null,
        };
        context.Fail(path, $"{edge.Adherend} has no edge \"{edge.Edge}\"; {(near is null ? "" : $"nearest edge {near}; ")}its edges are {string.Join(", ", edges)}");
        return null;
    }

    /// <summary>Checks that a stretch runs upwards.</summary>
    public static void Rises(double? from, double? to, string path, ReadContext context)
    {
        if (from >= to)
            context.Fail(ReadContext.Join(path, "to"), $"must lie beyond `from` ({QuantityText.Write(from.Value, Dimension.Length)})");
    }

    private static string ExampleEdge(Deck deck)
    {
        foreach ((string name, AdherendDeck adherend) in Entries(deck.Adherends))
            if (EdgeText.EdgesOf(adherend) is [var first, ..])
                return new EdgeText(first, name).ToString();
        return "top of panel";
    }
}
