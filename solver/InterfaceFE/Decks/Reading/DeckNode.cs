namespace InterfaceFE.Decks.Reading;

/// <summary>A place in a deck file. Line and column count from 1; line 0 stands for the file as a whole.</summary>
/// <param name="File">File as named by the caller, or as found for an included one.</param>
/// <param name="Line">Line from 1.</param>
/// <param name="Column">Column from 1, in UTF-16 units.</param>
public readonly record struct TextPlace(string File, int Line, int Column)
{
    /// <summary>file:line:column, or the file alone.</summary>
    public override string ToString() => Line == 0 ? File : string.Create(System.Globalization.CultureInfo.InvariantCulture, $"{File}:{Line}:{Column}");
}

/// <summary>A node of the text of a deck.</summary>
/// <param name="Place">Where it starts.</param>
internal abstract record DeckNode(TextPlace Place);

/// <summary>A single value, still as text.</summary>
/// <param name="Text">The value, quotes taken off.</param>
/// <param name="IsPlain">Whether it was written without quotes.</param>
/// <param name="Place">Where it starts.</param>
internal sealed record TextNode(string Text, bool IsPlain, TextPlace Place) : DeckNode(Place)
{
    /// <summary>Whether what is written was refused already; the text is then empty.</summary>
    public bool IsRefused { get; init; }

    /// <summary>Whether nothing is written: no text, or one of the words that mean "nothing" without quotes.</summary>
    public bool IsEmpty => string.IsNullOrWhiteSpace(Text) || (IsPlain && Text is "~" or "null" or "Null" or "NULL");
}

/// <summary>A list.</summary>
/// <param name="Items">Entries in order.</param>
/// <param name="Place">Where it starts.</param>
internal sealed record ListNode(List<DeckNode> Items, TextPlace Place) : DeckNode(Place);

/// <summary>Keys with values, as written: a key may stand twice.</summary>
/// <param name="Entries">Entries in order.</param>
/// <param name="Place">Where it starts.</param>
internal sealed record MapNode(List<MapEntry> Entries, TextPlace Place) : DeckNode(Place)
{
    /// <summary>The first entry of a key, or null.</summary>
    public MapEntry? Find(string key) => Entries.Find(e => e.Key.Text == key);
}

/// <summary>A key and its value.</summary>
/// <param name="Key">The key.</param>
/// <param name="Value">The value.</param>
internal sealed record MapEntry(TextNode Key, DeckNode Value);
