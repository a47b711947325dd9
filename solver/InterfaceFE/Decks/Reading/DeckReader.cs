using InterfaceFE.Decks.Reading.Checks;

namespace InterfaceFE.Decks.Reading;

/// <summary>
/// Reads a deck from YAML text. Every key is checked by the records' attributes and every name and number against the others; all problems come in one read, with file,
/// line and column. Never throws for anything a file may hold.
/// </summary>
public static class DeckReader
{
    /// <summary>Reads a deck file, with the files it includes.</summary>
    /// <param name="path">The file; messages name it as it is given here.</param>
    public static DeckReading Read(string path)
    {
        ArgumentException.ThrowIfNullOrEmpty(path);
        ReadContext context = new(path);
        return DeckFile.Load(path, path, context.Problems) is { } text
            ? ReadText(text, context, Path.GetDirectoryName(path) ?? "")
            : new DeckReading(null, context, []);
    }

    /// <summary>Reads a deck from text in memory.</summary>
    /// <param name="text">The text.</param>
    /// <param name="name">What messages call it.</param>
    /// <param name="folder">Folder in which included files are looked for.</param>
    public static DeckReading ReadText(string text, string name, string folder = "")
    {
        ArgumentNullException.ThrowIfNull(text);
        ReadContext context = new(name);
        // By way of bytes, so that text from memory meets the same checks as a file.
        string? good = text.Length > DeckFile.LargestSize ? null : DeckFile.Decode(System.Text.Encoding.UTF8.GetBytes(text), name, context.Problems);
        if (good is null && context.Problems.IsEmpty)
            context.Problems.Add(new TextPlace(name, 0, 0), "", null, "is too large; a deck is a short text");
        return good is null ? new DeckReading(null, context, []) : ReadText(good, context, folder);
    }

    private static DeckReading ReadText(string text, ReadContext context, string folder)
    {
        DeckNode? root = YamlText.Read(text, context.File, context.Problems);
        DeckIncludes includes = new(context, folder);
        if (root is not MapNode map)
        {
            if (root is not null)
                context.FailAt(root.Place, "", $"is {BlockReader.KindOf(root)}; a deck is made of keys such as title: and model:");
            return new DeckReading(null, context, []);
        }
        Deck written = (Deck)new BlockReader(context).ReadBlock(DeckShape.Of(typeof(Deck)), includes.Resolve(map), "")!;
        Deck deck = written with { Include = null };
        DeckChecks.Run(deck, context);
        return new DeckReading(deck, context, includes.Files);
    }
}
