using System.Globalization;
using System.Text;

namespace InterfaceFE.Decks.Reading;

/// <summary>Where the key and the value of a path stand, and the value as written.</summary>
/// <param name="Key">Place of the key; of the entry itself in a list.</param>
/// <param name="Value">Place of the value.</param>
/// <param name="Written">The value as written; null for a block.</param>
internal readonly record struct Location(TextPlace Key, TextPlace Value, string? Written);

/// <summary>What the parts of the reader share: the problems found, the warnings, and where each key path stands.</summary>
internal sealed class ReadContext
{
    private const int LongestWritten = 60;
    private readonly Dictionary<string, Location> _locations = new(StringComparer.Ordinal);
    private readonly HashSet<string> _single = new(StringComparer.Ordinal);
    private readonly HashSet<string> _bad = new(StringComparer.Ordinal);

    /// <summary>Starts with nothing found.</summary>
    /// <param name="file">The deck's own file, as shown in messages.</param>
    public ReadContext(string file)
    {
        File = file;
    }

    /// <summary>The deck's own file, as shown in messages.</summary>
    public string File { get; }

    /// <summary>Errors.</summary>
    public ProblemList Problems { get; } = new();

    /// <summary>Doubtful values; the deck can be used.</summary>
    public ProblemList Warnings { get; } = new();

    /// <summary>Notes where a path stands.</summary>
    public void Locate(string path, TextPlace key, DeckNode value) => _locations[path] = new Location(key, value.Place, Written(value));

    /// <summary>Notes that the list at the path is written as a single value, so that its entry 1 is the list itself.</summary>
    public void MarkSingle(string path) => _single.Add(path);

    /// <summary>Notes that the value at the path cannot be used, when that has been reported elsewhere.</summary>
    public void MarkBad(string path) => _bad.Add(Canonical(path));

    /// <summary>Whether something is written at the path.</summary>
    public bool IsGiven(string path) => _locations.ContainsKey(Canonical(path));

    /// <summary>Whether something is written at the path and read without a problem of its own.</summary>
    public bool IsSound(string path) => IsGiven(path) && !_bad.Contains(Canonical(path));

    /// <summary>The place of a path, or of the nearest block above it.</summary>
    /// <param name="path">Key path.</param>
    /// <param name="isExact">Whether the path itself was found.</param>
    public Location Find(string path, out bool isExact)
    {
        isExact = true;
        for (string at = Canonical(path); ; at = at[..Math.Max(0, at.LastIndexOf('.'))])
        {
            if (_locations.TryGetValue(at, out Location location))
                return location;
            isExact = false;
            if (at.Length == 0)
                return new Location(new TextPlace(File, 1, 1), new TextPlace(File, 1, 1), null);
        }
    }

    /// <summary>Adds an error about the value at a path. A block is pointed at by its key.</summary>
    public void Fail(string path, string message)
    {
        path = Canonical(path);
        _bad.Add(path);
        Location location = Find(path, out bool isExact);
        Problems.Add(isExact && location.Written is not null ? location.Value : location.Key, path, isExact ? location.Written : null, message);
    }

    /// <summary>Adds an error at a place, about no value of its own.</summary>
    public void FailAt(TextPlace place, string path, string message)
    {
        _bad.Add(path);
        Problems.Add(place, path, null, message);
    }

    /// <summary>Adds a warning about the value at a path.</summary>
    public void Warn(string path, string message)
    {
        path = Canonical(path);
        Location location = Find(path, out bool isExact);
        Warnings.Add(isExact && location.Written is not null ? location.Value : location.Key, path, isExact ? location.Written : null, message);
    }

    /// <summary>The entries of a map without merge keys, empty keys and keys that stand there already; those are reported.</summary>
    public List<MapEntry> UniqueEntries(MapNode map, string path)
    {
        Dictionary<string, TextPlace> seen = new(StringComparer.Ordinal);
        List<MapEntry> unique = [];
        foreach (MapEntry entry in map.Entries)
        {
            string name = entry.Key.Text;
            string at = Join(path, name);
            if (name == "<<" && entry.Key.IsPlain)
                FailAt(entry.Key.Place, at, "brings in another place; write the keys here, or keep materials and layers in a file of their own and `include` it");
            else if (entry.Key.IsEmpty)
                FailAt(entry.Key.Place, path, "a key is missing before the colon");
            else if (seen.TryGetValue(name, out TextPlace first))
                FailAt(entry.Key.Place, at, string.Create(CultureInfo.InvariantCulture, $"stands here a second time; the first is in line {first.Line}{(first.File == entry.Key.Place.File ? "" : " of " + first.File)}"));
            else
            {
                seen.Add(name, entry.Key.Place);
                unique.Add(entry);
            }
        }
        return unique;
    }

    /// <summary>Joins a key to the path of its block.</summary>
    public static string Join(string path, string key) => path.Length == 0 ? key : path + "." + key;

    /// <summary>Joins the number of a list entry, from 1, to the path of its list.</summary>
    public static string Join(string path, int number) => string.Create(CultureInfo.InvariantCulture, $"{path}.{number}");

    private string Canonical(string path) => path.EndsWith(".1", StringComparison.Ordinal) && _single.Contains(path[..^2]) ? path[..^2] : path;

    /// <summary>A value in one line: text, a list of texts, or null for anything larger.</summary>
    private static string? Written(DeckNode node)
    {
        if (node is TextNode text)
            return text.Text;
        if (node is not ListNode list || list.Items.Exists(i => i is MapNode))
            return null;
        StringBuilder line = new("[");
        foreach (DeckNode item in list.Items)
        {
            line.Append(line.Length == 1 ? "" : ", ").Append(item is TextNode entry ? entry.Text : Written(item));
            if (line.Length > LongestWritten)
                return line.ToString();
        }
        return line.Append(']').ToString();
    }
}
