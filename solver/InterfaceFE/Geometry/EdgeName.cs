using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>An edge as a deck names it: <c>EDGE of ADHEREND</c>. The adherend is what follows the last " of ", so edge names may hold spaces.</summary>
/// <param name="Edge">Name of the edge.</param>
/// <param name="Adherend">Name of the adherend.</param>
public readonly record struct EdgeName(string Edge, string Adherend)
{
    private const string Between = " of ";

    /// <summary>Takes a text apart.</summary>
    /// <param name="text">For example <c>left foot of hat</c>.</param>
    /// <param name="path">Key path for the error.</param>
    /// <exception cref="DeckException">When there is no " of ".</exception>
    public static EdgeName Parse(string text, string path)
    {
        int at = text.LastIndexOf(Between, StringComparison.Ordinal);
        if (at <= 0 || at + Between.Length >= text.Length)
            throw new DeckException(path, $"\"{text}\": an edge is named as `EDGE of ADHEREND`, for example \"top of panel\"");
        return new EdgeName(text[..at].Trim(), text[(at + Between.Length)..].Trim());
    }

    /// <summary>The error for an adherend that is not in the deck.</summary>
    internal static DeckException NoAdherend(string text, string path, string adherend, IEnumerable<string> names) =>
        new(path, $"\"{text}\": there is no adherend \"{adherend}\"; there are: {string.Join(", ", names)}");

    /// <summary>The error for an edge that the adherend does not have.</summary>
    internal static DeckException NoEdge(string text, string path, string edge, string adherend, IEnumerable<string> names) =>
        new(path, $"\"{text}\": \"{adherend}\" has no edge \"{edge}\"; it has: {string.Join(", ", names)}");
}
