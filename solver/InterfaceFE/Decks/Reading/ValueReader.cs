using System.Globalization;
using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading;

/// <summary>Reads single values: texts, numbers with units, words, and the values that can be written in two ways. Null stands for a value that was refused.</summary>
internal sealed class ValueReader(ReadContext context)
{
    private static readonly string[] Directions = ["x", "y", "z"];
    private static readonly string[] RatioPairs = ["xy", "xz", "zy"];

    /// <summary>What stands for a value that could not be read: NaN for numbers, so that no comparison holds; null or the first word else.</summary>
    public static object? Unreadable(ValueShape shape, Type type) => shape.Kind switch
    {
        ValueKind.Number => double.NaN,
        ValueKind.Directional => new Directional(double.NaN),
        ValueKind.PoissonRatios => new PoissonRatios(double.NaN),
        ValueKind.EdgePoint => new EdgePoint(double.NaN, double.NaN),
        _ => type.IsValueType && Nullable.GetUnderlyingType(type) is null ? Activator.CreateInstance(type) : null,
    };

    /// <summary>Reads a value.</summary>
    /// <param name="shape">How it is written.</param>
    /// <param name="key">Its key, with dimension and bounds.</param>
    /// <param name="node">Its text.</param>
    /// <param name="path">Its path, already located.</param>
    /// <param name="owner">The record of the key.</param>
    public object? Read(ValueShape shape, KeyAttribute key, DeckNode node, string path, DeckShape owner) => shape.Kind switch
    {
        ValueKind.Directional => ReadByPart(key, node, path, Directions) is { } v ? new Directional(v[0], v[1], v[2]) : null,
        ValueKind.PoissonRatios => ReadByPart(key, node, path, RatioPairs) is { } v ? new PoissonRatios(v[0], v[1], v[2]) : null,
        _ when node is not TextNode => Refuse(path, $"is {BlockReader.KindOf(node)}, but {Wanted(shape, key)} is due{ForExample(shape, key)}"),
        ValueKind.Text => ReadText((TextNode)node, path),
        ValueKind.Number => ReadNumber(key, (TextNode)node, path),
        ValueKind.WholeNumber => ReadWholeNumber(key, (TextNode)node, path),
        ValueKind.Word => ReadWord(shape.Type, key, (TextNode)node, path, owner),
        ValueKind.EdgePoint => ReadEdgePoint(key, (TextNode)node, path),
        ValueKind.FieldInterval => ReadFieldInterval((TextNode)node, path),
        _ => throw new ArgumentException($"{shape.Kind} is no single value.", nameof(shape)),
    };

    /// <summary>The words of an enumeration for a message: "held", "free".</summary>
    public static string WordsInWords(Type type) => string.Join(", ", DeckShape.WordsOf(type).Select(w => $"\"{w.Text}\""));

    private string? ReadText(TextNode node, string path)
    {
        string text = node.Text.Trim();
        if (!text.Any(char.IsControl))
            return text;
        context.Fail(path, "is more than one line of text; write it in one line");
        return null;
    }

    private double[]? ReadByPart(KeyAttribute key, DeckNode node, string path, string[] parts)
    {
        if (node is TextNode single)
            return ReadNumber(key, single, path) is { } value ? [value, value, value] : null;
        string forms = $"one value ({key.Example}) or a block {{{string.Join(", ", parts)}}}";
        if (node is not MapNode map)
        {
            context.Fail(path, $"is {BlockReader.KindOf(node)}, but {forms} is due");
            return null;
        }
        double[] values = [double.NaN, double.NaN, double.NaN];
        foreach (MapEntry entry in context.UniqueEntries(map, path))
        {
            string at = ReadContext.Join(path, entry.Key.Text);
            context.Locate(at, entry.Key.Place, entry.Value);
            int part = Array.IndexOf(parts, entry.Key.Text);
            if (part < 0)
                context.FailAt(entry.Key.Place, at, $"unknown key; keys here are {string.Join(", ", parts)}");
            else if (entry.Value is TextNode { IsEmpty: false } text)
                values[part] = ReadNumber(key, text, at) ?? double.NaN;
            else
                context.Fail(at, $"needs a number, for example {key.Example}");
        }
        foreach (string part in parts.Where(p => !context.IsGiven(ReadContext.Join(path, p))))
            context.FailAt(context.Find(path, out _).Key, ReadContext.Join(path, part), $"is missing; given by part, all of {string.Join(", ", parts)} are needed");
        return values;
    }

    private double? ReadNumber(KeyAttribute key, TextNode node, string path)
    {
        if (!QuantityText.TryRead(node.Text, key.Dimension, NumberExample(key), out double value, out string error))
        {
            context.Fail(path, error);
            return null;
        }
        return Within(key, value, path) ? value : null;
    }

    private int? ReadWholeNumber(KeyAttribute key, TextNode node, string path)
    {
        string text = node.Text.Trim();
        string example = NumberExample(key) ?? "4";
        if (!NumberText.TryRead(text, out double value, out string error))
            context.Fail(path, $"{error}; wanted is a whole number, for example {example}");
        else if (value != Math.Floor(value) || text.AsSpan().IndexOfAny(".eE") >= 0)
            context.Fail(path, $"must be a whole number, for example {example}");
        else if (Math.Abs(value) > int.MaxValue)
            context.Fail(path, "is too large a number");
        else if (Within(key, value, path))
            return (int)value;
        return null;
    }

    private bool Within(KeyAttribute key, double value, string path)
    {
        string? error = null;
        if (!(value > key.Above))
            error = "must be greater than " + Bound(key.Above, key.Dimension);
        else if (!(value < key.Below))
            error = "must be less than " + Bound(key.Below, key.Dimension);
        else if (!(value >= key.AtLeast))
            error = "must be at least " + Bound(key.AtLeast, key.Dimension);
        else if (!(value <= key.AtMost))
            error = "must be at most " + Bound(key.AtMost, key.Dimension);
        if (error is not null)
            context.Fail(path, error);
        return error is null;
    }

    private object? ReadWord(Type type, KeyAttribute key, TextNode node, string path, DeckShape owner)
    {
        IReadOnlyList<WordShape> words = DeckShape.WordsOf(type);
        string text = node.Text.Trim();
        if (words.FirstOrDefault(w => w.Text == text) is { } word)
            return word.Value;
        if (owner.NotBuiltYet.Any(n => n.Key == key.Name && n.Value == text))
            return Refuse(path, $"is not built yet; this version knows {WordsInWords(type)}");
        string? near = NearestText.Find(text, words.Select(w => w.Text));
        return Refuse(path, $"is not a word known here; {(near is null || words.Count == 1 ? "" : $"nearest word \"{near}\"; ")}{(words.Count == 1 ? "the only one is" : "allowed are")} {WordsInWords(type)}");
    }

    private object? ReadEdgePoint(KeyAttribute key, TextNode node, string path)
    {
        string text = node.Text.Trim();
        double share = text switch { "start" => 0, "middle" => 0.5, "end" => 1, _ => double.NaN };
        if (!double.IsNaN(share))
            return new EdgePoint(share, double.NaN);
        if (NumberText.Measure(text) == 0)
        {
            string? near = NearestText.Find(text, ["start", "middle", "end"]);
            return Refuse(path, $"is not a point of an edge; {(near is null ? "" : $"nearest word \"{near}\"; ")}allowed are \"start\", \"middle\", \"end\", or a distance from the start, for example 20 mm");
        }
        if (!QuantityText.TryRead(text, Dimension.Length, "20 mm", out double distance, out string error))
            return Refuse(path, error);
        return distance < 0 ? Refuse(path, "must be at least 0 mm, counted from the start of the edge") : new EdgePoint(double.NaN, distance);
    }

    private object? ReadFieldInterval(TextNode node, string path)
    {
        string[] words = node.Text.Split(' ', StringSplitOptions.RemoveEmptyEntries);
        if (words is ["none"])
            return new FieldInterval(0);
        if (words is ["every", "point"])
            return new FieldInterval(1);
        if (words is ["every", var number, "points" or "point"] && number.All(char.IsAsciiDigit) && number[0] != '0' && int.TryParse(number, NumberStyles.None, CultureInfo.InvariantCulture, out int points))
            return new FieldInterval(points);
        return Refuse(path, "must be \"every N points\" with a whole number N from 1, for example every 10 points, or \"none\"");
    }

    private object? Refuse(string path, string message)
    {
        context.Fail(path, message);
        return null;
    }

    private static string Wanted(ValueShape shape, KeyAttribute key) => shape.Kind switch
    {
        ValueKind.Number => DimensionText.Words(key.Dimension),
        ValueKind.WholeNumber => "a whole number",
        ValueKind.Word => "a word",
        ValueKind.Text => "a single text",
        ValueKind.EdgePoint => "a point of an edge",
        _ => "a single value",
    };

    private static string ForExample(ValueShape shape, KeyAttribute key) => shape.Kind == ValueKind.Word
        ? ": " + WordsInWords(shape.Type)
        : key.Example is null && key.Default is null ? "" : $", for example {key.Example ?? key.Default}";

    /// <summary>A single number for a message: the example of the key unless that is a list or a block.</summary>
    private static string? NumberExample(KeyAttribute key)
    {
        string? example = key.Example ?? key.Default;
        return example is null || example.StartsWith('[') || example.StartsWith('{') ? null : example;
    }

    private static string Bound(double bound, Dimension dimension)
    {
        if (dimension != Dimension.Temperature)
            return bound == 0 ? "0" : QuantityText.Write(bound, dimension);
        return QuantityText.Write(bound, dimension) + (bound == 0 ? " (absolute zero)" : "");
    }
}
