namespace InterfaceFE.Decks.Reading;

/// <summary>Tells decks from files that only hold materials and layers for others.</summary>
public static class DeckKind
{
    /// <summary>Whether a file holds nothing but what a deck may include (materials, layers). False for a file that cannot be read: reading it as a deck says why.</summary>
    public static bool HoldsOnlyParts(string path)
    {
        ProblemList problems = new();
        return DeckFile.Load(path, path, problems) is { } text
            && YamlText.Read(text, path, problems) is MapNode { Entries.Count: > 0 } map
            && map.Entries.All(entry => DeckShape.Of(typeof(Deck)).Find(entry.Key.Text) is { Key.MayBeIncluded: true });
    }
}
