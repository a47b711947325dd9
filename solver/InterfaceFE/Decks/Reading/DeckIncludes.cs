using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading;

/// <summary>
/// Brings the materials and layers of included files into a deck's text. A file is looked for in the deck's folder and, when that lies below a folder called
/// <c>inputs</c>, in the folders from there up to that one; nothing outside them is opened, also not through a link.
/// </summary>
internal sealed class DeckIncludes
{
    private const string InputsFolder = "inputs";
    private const int MostLinks = 32;
    private readonly ReadContext _context;
    private readonly List<string> _folders;

    /// <summary>Prepares for a deck.</summary>
    /// <param name="context">Where problems go.</param>
    /// <param name="deckFolder">Folder of the deck, as the caller named it.</param>
    public DeckIncludes(ReadContext context, string deckFolder)
    {
        _context = context;
        _folders = FoldersFor(deckFolder);
    }

    /// <summary>Files brought in, in order.</summary>
    public List<string> Files { get; } = [];

    /// <summary>The deck's text with the entries of its included files behind its own.</summary>
    public MapNode Resolve(MapNode deck)
    {
        if (deck.Find("include") is not { } include)
            return deck;
        List<(TextNode Name, string Path)> names = include.Value switch
        {
            TextNode single => [(single, "include")],
            ListNode list => [.. list.Items.Select((n, i) => (Node: n as TextNode, Path: ReadContext.Join("include", i + 1))).Where(n => n.Node is not null).Select(n => (n.Node!, n.Path))],
            _ => [],
        };
        MapNode result = new([.. deck.Entries], deck.Place);
        foreach ((TextNode name, string path) in names.Where(n => !n.Name.IsEmpty))
        {
            _context.Locate(path, name.Place, name);
            if (Find(name.Text.Trim(), path) is { } file)
                Bring(file, include.Key.Place, result);
        }
        return result;
    }

    private void Bring(string file, TextPlace includePlace, MapNode deck)
    {
        Files.Add(file);
        if (DeckFile.Load(file, file, _context.Problems) is not { } text || YamlText.Read(text, file, _context.Problems) is not { } root)
            return;
        if (root is not MapNode map)
        {
            _context.FailAt(root.Place, "", "an included file holds `materials` or `layers`, each with entries by name");
            return;
        }
        foreach (MapEntry entry in _context.UniqueEntries(map, ""))
        {
            string key = entry.Key.Text;
            if (DeckShape.Of(typeof(Deck)).Find(key) is not { Key.MayBeIncluded: true })
                _context.FailAt(entry.Key.Place, key, key == "include" ? "an included file cannot include others; name them all in the deck" : "an included file holds only `materials` and `layers`");
            else if (entry.Value is not MapNode added)
                _context.FailAt(entry.Value.Place, key, $"is {BlockReader.KindOf(entry.Value)}, but entries by name are due");
            else if (deck.Find(key) is not { } own)
                deck.Entries.Add(new MapEntry(new TextNode(key, true, includePlace), new MapNode([.. added.Entries], includePlace)));
            else if (own.Value is MapNode ownMap)
                deck.Entries[deck.Entries.IndexOf(own)] = own with { Value = new MapNode([.. ownMap.Entries, .. added.Entries], ownMap.Place) };
        }
    }

    private string? Find(string name, string path)
    {
        if (name.StartsWith('/') || name.Contains('\\', StringComparison.Ordinal) || name.Contains(':', StringComparison.Ordinal) || name.Split('/').Contains(".."))
        {
            _context.Fail(path, "must be a file in the deck's folder or in the `inputs` folder above it, named without \\, .. or a leading /, for example materials.yaml");
            return null;
        }
        foreach (string folder in _folders)
        {
            string file = Path.Join(folder, name);
            if (!File.Exists(file))
                continue;
            if (IsInside(file))
                return file;
            _context.Fail(path, "is a link that leads outside the deck's folder and the `inputs` folder above it; put the file itself there");
            return null;
        }
        string? near = NearestText.Find(name, _folders.Where(Directory.Exists).SelectMany(f => Directory.EnumerateFiles(f, "*.y*ml").Select(p => Path.GetFileName(p)!)).Take(1000).Order(StringComparer.Ordinal));
        _context.Fail(path, $"there is no such file in the deck's folder{(_folders.Count == 1 ? "" : " or in those above it up to `inputs`")}" + (near is null ? "" : $"; nearest file {near}"));
        return null;
    }

    private bool IsInside(string file)
    {
        string top = RealPath(Path.GetFullPath(_folders[^1].Length == 0 ? "." : _folders[^1]));
        return RealPath(Path.GetFullPath(file)).StartsWith(Path.EndsInDirectorySeparator(top) ? top : top + Path.DirectorySeparatorChar, StringComparison.Ordinal);
    }

    /// <summary>The path with all links followed, in folders too.</summary>
    private static string RealPath(string fullPath)
    {
        string root = Path.GetPathRoot(fullPath)!;
        Stack<string> ahead = new(fullPath[root.Length..].Split(Path.DirectorySeparatorChar, StringSplitOptions.RemoveEmptyEntries).Reverse());
        string at = root;
        for (int links = 0; ahead.Count > 0;)
        {
            string next = Path.Join(at, ahead.Pop());
            string? target = new FileInfo(next).LinkTarget;
            if (target is null)
            {
                at = next;
                continue;
            }
            if (++links > MostLinks)
                return root;
            string full = Path.GetFullPath(target, at);
            foreach (string part in full[Path.GetPathRoot(full)!.Length..].Split(Path.DirectorySeparatorChar, StringSplitOptions.RemoveEmptyEntries).Reverse())
                ahead.Push(part);
            at = Path.GetPathRoot(full)!;
        }
        return at;
    }

    private static List<string> FoldersFor(string deckFolder)
    {
        List<string> folders = [deckFolder];
        string full = Path.TrimEndingDirectorySeparator(Path.GetFullPath(deckFolder.Length == 0 ? "." : deckFolder));
        List<string> above = [];
        for (string? at = full; at is not null; at = Path.GetDirectoryName(at))
        {
            above.Add(at);
            if (Path.GetFileName(at) != InputsFolder)
                continue;
            for (int i = 1; i < above.Count; i++)
                folders.Add(Shown(above[i], deckFolder, full, i));
            break;
        }
        return folders;
    }

    /// <summary>A folder above the deck's in the caller's way of naming it where that is possible: a relative one stays relative.</summary>
    private static string Shown(string folder, string deckFolder, string fullDeckFolder, int levels)
    {
        string named = deckFolder;
        for (int i = 0; i < levels; i++)
            named = Path.GetDirectoryName(named) ?? "";
        return named.Length > 0 && Path.GetFullPath(named) == folder && fullDeckFolder.Length > 0 ? named : folder;
    }
}
