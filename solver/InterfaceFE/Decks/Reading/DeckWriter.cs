using System.Collections;
using System.Globalization;
using System.Text;
using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading;

/// <summary>
/// Writes a deck as YAML, as resolved: nothing included, defaults spelt out, values in the units of the calculation. Reading the text back gives an equal deck, and writing
/// that one the same text.
/// </summary>
public static class DeckWriter
{
    private const int LongestLine = 110;

    /// <summary>The deck as text, lines ended by \n.</summary>
    public static string Write(Deck deck)
    {
        ArgumentNullException.ThrowIfNull(deck);
        StringBuilder text = new();
        foreach ((string key, Piece piece) in BlockOf(deck, DeckShape.Of(typeof(Deck))).Entries!)
            Append(text, key, piece, 0);
        return text.ToString();
    }

    /// <summary>Part of the text: a single value, a list, or entries.</summary>
    private sealed record Piece(string? Value, List<Piece>? Items, List<(string Key, Piece Piece)>? Entries)
    {
        public static Piece Single(string value) => new(value, null, null);

        public string Flow() => Value
            ?? (Items is not null ? "[" + string.Join(", ", Items.Select(i => i.Flow())) + "]" : "{" + string.Join(", ", Entries!.Select(e => e.Key + ": " + e.Piece.Flow())) + "}");
    }

    private static void Append(StringBuilder text, string key, Piece piece, int indent)
    {
        text.Append(' ', indent).Append(key).Append(':');
        AppendValue(text, piece, indent, key.Length + 2);
    }

    private static void AppendValue(StringBuilder text, Piece piece, int indent, int used)
    {
        string flow = piece.Flow();
        // Named blocks of the top level stand on lines of their own; what is inside goes on one line where it fits.
        bool fits = indent > 0 && indent + used + flow.Length <= LongestLine;
        if (piece.Value is not null || fits || (piece.Items is not null && piece.Items.TrueForAll(i => i.Value is not null)))
        {
            text.Append(' ').Append(flow).Append('\n');
            return;
        }
        text.Append('\n');
        if (piece.Entries is not null)
            foreach ((string key, Piece inner) in piece.Entries)
                Append(text, key, inner, indent + 2);
        else
            foreach (Piece item in piece.Items!)
                AppendItem(text, item, indent + 2);
    }

    private static void AppendItem(StringBuilder text, Piece item, int indent)
    {
        if (item.Entries is null)
        {
            text.Append(' ', indent).Append("- ").Append(item.Flow()).Append('\n');
            return;
        }
        for (int i = 0; i < item.Entries.Count; i++)
        {
            text.Append(' ', indent).Append(i == 0 ? "- " : "  ").Append(item.Entries[i].Key).Append(':');
            AppendValue(text, item.Entries[i].Piece, indent + 2, item.Entries[i].Key.Length + 2);
        }
    }

    private static Piece BlockOf(object record, DeckShape shape)
    {
        List<(string, Piece)> entries = [];
        foreach (KeyShape key in shape.Keys)
            if (key.Property.GetValue(record) is { } value && Applicability.Applies(record, key.Name))
                entries.Add((key.Name, PieceOf(value, key.Value, key.Key.Dimension, record)));
        return new Piece(null, null, entries);
    }

    private static Piece PieceOf(object value, ValueShape shape, Dimension dimension, object owner) => shape.Kind switch
    {
        ValueKind.Text => Piece.Single(Quoted((string)value)),
        ValueKind.Number => Piece.Single(QuantityText.Write((double)value, dimension)),
        ValueKind.WholeNumber => Piece.Single(((int)value).ToString(CultureInfo.InvariantCulture)),
        ValueKind.Word => Piece.Single(Quoted(DeckShape.WordsOf(shape.Type).First(w => w.Value.Equals(value)).Text)),
        ValueKind.Block => BlockOf(value, DeckShape.Of(shape.Type)),
        ValueKind.List => ListOf((IEnumerable)value, shape, dimension, owner),
        ValueKind.Map => MapOf((IEnumerable)value, shape, dimension, owner),
        ValueKind.Directional => DirectionalOf((Directional)value, dimension, owner),
        ValueKind.PoissonRatios => RatiosOf((PoissonRatios)value, owner),
        ValueKind.EdgePoint => Piece.Single(EdgePointOf((EdgePoint)value)),
        _ => Piece.Single(FieldIntervalOf((FieldInterval)value)),
    };

    private static Piece ListOf(IEnumerable values, ValueShape shape, Dimension dimension, object owner)
    {
        List<Piece> items = [];
        foreach (object value in values)
            items.Add(PieceOf(value, shape.Entry!, dimension, owner));
        return items.Count == 1 && shape.Entry!.Kind == ValueKind.Text ? items[0] : new Piece(null, items, null);
    }

    private static Piece MapOf(IEnumerable values, ValueShape shape, Dimension dimension, object owner)
    {
        List<(string, Piece)> entries = [];
        foreach (object entry in values)
        {
            Type type = entry.GetType();
            string name = (string)type.GetProperty("Key")!.GetValue(entry)!;
            entries.Add((Quoted(name), PieceOf(type.GetProperty("Value")!.GetValue(entry)!, shape.Entry!, dimension, owner)));
        }
        return new Piece(null, null, entries);
    }

    private static Piece DirectionalOf(Directional value, Dimension dimension, object owner)
    {
        // Written by direction, a material is orthotropic, even when the three moduli are equal.
        bool byDirection = dimension == Dimension.Stress && owner is MaterialDeck { ShearModulus: not null };
        return value.X == value.Y && value.Y == value.Z && !byDirection
            ? Piece.Single(QuantityText.Write(value.X, dimension))
            : Parts(("x", value.X), ("y", value.Y), ("z", value.Z), dimension);
    }

    private static Piece RatiosOf(PoissonRatios value, object owner) => value.Xy == value.Xz && value.Xz == value.Zy && owner is not MaterialDeck { ShearModulus: not null }
        ? Piece.Single(NumberText.Write(value.Xy))
        : Parts(("xy", value.Xy), ("xz", value.Xz), ("zy", value.Zy), Dimension.None);

    private static Piece Parts((string Key, double Value) a, (string Key, double Value) b, (string Key, double Value) c, Dimension dimension) =>
        new(null, null, [.. new[] { a, b, c }.Select(p => (p.Key, Piece.Single(QuantityText.Write(p.Value, dimension))))]);

    private static string EdgePointOf(EdgePoint point) => point switch
    {
        _ when !double.IsNaN(point.Distance) => QuantityText.Write(point.Distance, Dimension.Length),
        { Share: 0 } => "start",
        { Share: 1 } => "end",
        { Share: 0.5 } => "middle",
        _ => throw new ArgumentException("A point on an edge is start, middle, end or a distance.", nameof(point)),
    };

    private static string FieldIntervalOf(FieldInterval interval) => interval.Points switch
    {
        0 => "none",
        _ => string.Create(CultureInfo.InvariantCulture, $"every {interval.Points} points"),
    };

    /// <summary>Text in double quotes unless it is of plain letters that YAML readers take as they stand.</summary>
    private static string Quoted(string text)
    {
        bool isPlain = text.Length > 0 && (char.IsLetter(text[0]) || text is "+x" or "-x" or "+y" or "-y") && !char.IsWhiteSpace(text[^1])
            && text.All(c => char.IsLetterOrDigit(c) || c is ' ' or '-' or '+' or '_' or '.' or '(' or ')')
            && text.ToUpperInvariant() is not ("NULL" or "TRUE" or "FALSE" or "YES" or "NO" or "ON" or "OFF" or "Y" or "N" or "NAN" or "INF");
        // The keys and words of decks ("on", "y") are read as text by this program; quotes would only make them hard to read.
        if (isPlain || text is "y")
            return text;
        StringBuilder quoted = new("\"");
        foreach (char c in text)
            quoted.Append(c switch
            {
                '"' => "\\\"",
                '\\' => "\\\\",
                _ when char.IsControl(c) || c is '\u2028' or '\u2029' or '\uFEFF' => string.Create(CultureInfo.InvariantCulture, $"\\u{(int)c:X4}"),
                _ => c.ToString(),
            });
        return quoted.Append('"').ToString();
    }
}
