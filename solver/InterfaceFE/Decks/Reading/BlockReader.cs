using System.Collections;
using System.Globalization;
using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading;

/// <summary>
/// Turns nodes into deck records by their attributes: blocks, lists and entries by name; single values go to <see cref="ValueReader"/>. Goes on after each problem,
/// so that all of them come in one read. What could not be read is NaN (numbers) or null, and its path is marked in the context.
/// </summary>
internal sealed class BlockReader(ReadContext context)
{
    private const int LongestName = 80;
    private readonly ValueReader _values = new(context);

    /// <summary>Reads a block; parts that are wrong or missing are left out.</summary>
    /// <param name="shape">Its record.</param>
    /// <param name="node">Its text.</param>
    /// <param name="path">Its path, already located.</param>
    public object? ReadBlock(DeckShape shape, DeckNode node, string path)
    {
        if (node is not MapNode map)
        {
            context.Fail(path, $"is {KindOf(node)}, but keys are due here: {KeysOf(shape)}");
            return null;
        }
        object record = Activator.CreateInstance(shape.Type)!;
        HashSet<string> given = new(StringComparer.Ordinal);
        foreach (MapEntry entry in context.UniqueEntries(map, path))
        {
            given.Add(entry.Key.Text);
            if (shape.Find(entry.Key.Text) is not { } key)
            {
                RefuseUnknown(shape, entry, path);
                continue;
            }
            string at = ReadContext.Join(path, key.Name);
            context.Locate(at, entry.Key.Place, entry.Value);
            key.Property.SetValue(record, Read(key.Value, key.Key, entry.Value, at, shape) ?? ValueReader.Unreadable(key.Value, key.Property.PropertyType));
        }
        foreach (KeyShape key in shape.Keys.Where(k => k.IsRequired && !given.Contains(k.Name)))
        {
            // A key that is missing is shown where its block is named; an entry of a list, where it starts.
            TextPlace place = path.Length == 0 ? map.Place : context.Find(path, out _).Key;
            context.FailAt(place, ReadContext.Join(path, key.Name), "is missing; " + HowToWrite(key));
            if (key.Value.Kind == ValueKind.Number)
                key.Property.SetValue(record, double.NaN);
        }
        return record;
    }

    private object? Read(ValueShape shape, KeyAttribute key, DeckNode node, string path, DeckShape owner)
    {
        if (node is TextNode { IsEmpty: true })
        {
            bool mayBeLeftOut = owner.Find(key.Name) is { IsRequired: false } own && own.Value == shape;
            if (node is TextNode { IsRefused: true })
                context.MarkBad(path);
            else
                context.Fail(path, "nothing is written here; give a value" + ForExample(key) + (mayBeLeftOut ? ", or leave the key out" : ""));
            return null;
        }
        return shape.Kind switch
        {
            ValueKind.Block => ReadInnerBlock(shape, node, path),
            ValueKind.List => ReadList(shape, key, node, path, owner),
            ValueKind.Map => ReadMap(shape, key, node, path, owner),
            _ => _values.Read(shape, key, node, path, owner),
        };
    }

    private object? ReadInnerBlock(ValueShape shape, DeckNode node, string path)
    {
        DeckShape block = DeckShape.Of(shape.Type);
        if (node is not MapNode { Entries.Count: 0 })
            return ReadBlock(block, node, path);
        context.Fail(path, $"is empty; give at least one of its keys ({KeysOf(block)}) or leave it out");
        return null;
    }

    private IList? ReadList(ValueShape shape, KeyAttribute key, DeckNode node, string path, DeckShape owner)
    {
        List<DeckNode> items;
        if (node is ListNode written)
            items = written.Items;
        else if (shape.MayBeSingle && node is TextNode)
            items = [node];
        else
        {
            context.Fail(path, $"is {KindOf(node)}, but a list is due{ForExample(key)}");
            return null;
        }
        int least = Math.Max(1, key.LeastCount);
        int most = key.MostCount;
        if (path.Length > 0 && shape.Entry!.Kind == ValueKind.Number && owner.Find(key.Name) is { Value.IsListOfPoints: true })
            (least, most) = (2, 2);
        if (items.Count < least || items.Count > most)
        {
            context.Fail(path, string.Create(CultureInfo.InvariantCulture, $"has {Count(items.Count)}, but {(least == most ? $"{least} are" : $"at least {least} {(least == 1 ? "is" : "are")}")} due{ForExample(key)}"));
            return null;
        }
        IList list = (IList)Activator.CreateInstance(typeof(List<>).MakeGenericType(shape.Entry!.Type))!;
        HashSet<object> seen = [];
        for (int i = 0; i < items.Count; i++)
        {
            string at = node is TextNode ? path : ReadContext.Join(path, i + 1);
            if (node is TextNode)
                context.MarkSingle(path);
            else
                context.Locate(at, items[i].Place, items[i]);
            object? value = Read(shape.Entry, key, items[i], at, owner);
            if (value is not null && shape.MayBeSingle && !seen.Add(value))
                context.Fail(at, "stands in this list twice");
            // An entry that could not be read keeps its place, so that those behind it keep their number.
            list.Add(value ?? ValueReader.Unreadable(shape.Entry, shape.Entry.Type));
        }
        return list;
    }

    private object? ReadMap(ValueShape shape, KeyAttribute key, DeckNode node, string path, DeckShape owner)
    {
        if (node is not MapNode map)
        {
            context.Fail(path, $"is {KindOf(node)}, but entries by name are due{ForExample(key)}");
            return null;
        }
        if (map.Entries.Count == 0)
        {
            context.Fail(path, "is empty; give at least one entry" + ForExample(key) + (key.LeastCount > 0 ? "" : " or leave the key out"));
            return null;
        }
        IDictionary entries = (IDictionary)Activator.CreateInstance(typeof(OrderedDictionary<,>).MakeGenericType(typeof(string), shape.Entry!.Type), StringComparer.Ordinal)!;
        foreach (MapEntry entry in context.UniqueEntries(map, path))
        {
            string at = ReadContext.Join(path, entry.Key.Text);
            context.Locate(at, entry.Key.Place, entry.Value);
            CheckName(entry.Key, at);
            object? value = Read(shape.Entry, key, entry.Value, at, owner) ?? ValueReader.Unreadable(shape.Entry, shape.Entry.Type);
            if (value is not null)
                entries.Add(entry.Key.Text, value);
        }
        return entries;
    }

    private void CheckName(TextNode name, string path)
    {
        string text = name.Text;
        if (text.Length > LongestName)
            context.FailAt(name.Place, path, string.Create(CultureInfo.InvariantCulture, $"the name is longer than {LongestName} letters"));
        else if (!char.IsLetterOrDigit(text[0]) || text[^1] == ' ' || text.Any(c => !char.IsLetterOrDigit(c) && c is not (' ' or '-' or '_' or '.' or '+' or '(' or ')' or '\'')))
            context.FailAt(name.Place, path, "a name starts with a letter or digit and holds only letters, digits, spaces and - _ . + ( ) '");
    }

    private void RefuseUnknown(DeckShape shape, MapEntry entry, string path)
    {
        string name = entry.Key.Text;
        string at = ReadContext.Join(path, name);
        context.Locate(at, entry.Key.Place, entry.Value);
        if (shape.NotBuiltYet.Any(n => n.Key == name && n.Value is null))
        {
            context.FailAt(entry.Key.Place, at, "this key is not built yet; the program would have to leave it out of the calculation, so it refuses the deck");
            return;
        }
        string? near = NearestText.Find(name, shape.Keys.Select(k => k.Name));
        if (near is not null)
        {
            context.FailAt(entry.Key.Place, at, $"unknown key; nearest key {near}");
            return;
        }
        if (name.All(char.IsAsciiDigit))
        {
            context.FailAt(entry.Key.Place, at, "is no key; the decimal sign is a point, and a comma starts the next key");
            return;
        }
        List<string> elsewhere = [.. DeckShape.All().Where(s => s.Find(name) is not null).Select(BlockName).Take(4)];
        string hint = elsewhere.Count == 0 ? "" : $"; it belongs to {string.Join(" or ", elsewhere)}";
        context.FailAt(entry.Key.Place, at, $"unknown key{hint}; keys here are {KeysOf(shape)}");
    }

    /// <summary>How a block is called in messages: the key that holds it.</summary>
    private static string BlockName(DeckShape shape)
    {
        foreach (DeckShape owner in DeckShape.All())
            foreach (KeyShape key in owner.Keys)
                for (ValueShape? value = key.Value; value is not null; value = value.Entry)
                    if (value.Kind == ValueKind.Block && value.Type == shape.Type)
                        return value == key.Value ? $"`{key.Name}`" : $"an entry of `{key.Name}`";
        return "the deck itself";
    }

    private static string KeysOf(DeckShape shape) => string.Join(", ", shape.Keys.Select(k => k.Name));

    private static string HowToWrite(KeyShape key) => key.Value.Kind switch
    {
        ValueKind.Word => $"write one of {ValueReader.WordsInWords(key.Value.Type)}",
        ValueKind.Block => $"it holds {KeysOf(DeckShape.Of(key.Value.Type))}",
        _ when key.Key.Example is not null => $"for example {key.Name}: {key.Key.Example}",
        _ => char.ToLowerInvariant(key.Key.Meaning[0]) + key.Key.Meaning[1..].TrimEnd('.'),
    };

    private static string ForExample(KeyAttribute key) => key.Example is null ? "" : $", for example {key.Example}";

    private static string Count(int count) => count switch { 0 => "no entry", 1 => "1 entry", _ => string.Create(CultureInfo.InvariantCulture, $"{count} entries") };

    /// <summary>What a node is, in words.</summary>
    public static string KindOf(DeckNode node) => node switch
    {
        TextNode => "a single value",
        ListNode => "a list",
        _ => "a block of keys",
    };
}
