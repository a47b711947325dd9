namespace InterfaceFE.Decks;

/// <summary>An edge as decks name it: <c>EDGE of ADHEREND</c>.</summary>
/// <param name="Edge">Name of the edge or of a stretch of a sheet.</param>
/// <param name="Adherend">Name of the adherend.</param>
public readonly record struct EdgeText(string Edge, string Adherend)
{
    private const string Between = " of ";

    /// <summary>Edges of a rectangle.</summary>
    public static IReadOnlyList<string> RectangleEdges { get; } = ["top", "bottom", "left end", "right end"];

    /// <summary>Edges of a sheet; its named stretches come on top.</summary>
    public static IReadOnlyList<string> SheetEdges { get; } = ["upper face", "lower face", "left end", "right end"];

    /// <summary>Splits at the first " of "; false when there is none or a part is empty.</summary>
    public static bool TryParse(string text, out EdgeText edge)
    {
        ArgumentNullException.ThrowIfNull(text);
        int at = text.IndexOf(Between, StringComparison.Ordinal);
        edge = at <= 0 ? default : new EdgeText(text[..at].Trim(), text[(at + Between.Length)..].Trim());
        return at > 0 && edge.Edge.Length > 0 && edge.Adherend.Length > 0;
    }

    /// <summary>Names of all edges of an adherend; empty when its shape is not known.</summary>
    public static IReadOnlyList<string> EdgesOf(AdherendDeck adherend)
    {
        ArgumentNullException.ThrowIfNull(adherend);
        return adherend switch
        {
            { Rectangle: not null, Sheet: null } => RectangleEdges,
            { Sheet: not null, Rectangle: null } => [.. SheetEdges, .. adherend.Sheet.Stretches?.Keys ?? []],
            _ => [],
        };
    }

    /// <summary>EDGE of ADHEREND.</summary>
    public override string ToString() => Edge + Between + Adherend;
}
