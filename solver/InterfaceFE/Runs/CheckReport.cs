using System.Globalization;
using System.Text.Encodings.Web;
using System.Text.Json;

namespace InterfaceFE.Runs;

/// <summary>What a check of a deck has to tell.</summary>
public sealed class CheckReport
{
    private static readonly JsonWriterOptions Layout = new() { Indented = true, NewLine = "\n", Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    /// <summary>Title of the deck.</summary>
    public required string Title { get; init; }

    /// <summary>Stages in words, numbered as in the deck.</summary>
    public required IReadOnlyList<string> Stages { get; init; }

    /// <summary>Counts by name: unknowns, nodes, elements, layer elements.</summary>
    public required IReadOnlyDictionary<string, long> Counts { get; init; }

    /// <summary>Lengths of elements and why.</summary>
    public required IReadOnlyList<string> Mesh { get; init; }

    /// <summary>State out of plane in words.</summary>
    public required string OutOfPlane { get; init; }

    /// <summary>What would suit the deck better.</summary>
    public required IReadOnlyList<string> Advice { get; init; }

    /// <summary>Doubtful values.</summary>
    public required IReadOnlyList<string> Warnings { get; init; }

    /// <summary>Estimated memory of a run without stored fields [MB].</summary>
    public required double MemoryMegabytes { get; init; }

    /// <summary>Estimated memory of the fields of one point [MB].</summary>
    public required double FieldMegabytes { get; init; }

    /// <summary>Estimated condition number of the stiffness at the start, scaled; null where no stage marches.</summary>
    public required double? Condition { get; init; }

    /// <summary>The deck as resolved, YAML.</summary>
    public required string ResolvedDeck { get; init; }

    /// <summary>Writes the report as plain lines.</summary>
    public void WriteText(TextWriter to)
    {
        ArgumentNullException.ThrowIfNull(to);
        to.WriteLine(Title);
        Lines("stage", Stages);
        Line("out of plane", OutOfPlane);
        Lines("mesh", Mesh);
        Line("size", string.Join(", ", Counts.Select(count => string.Create(CultureInfo.InvariantCulture, $"{count.Key} {count.Value}"))));
        Line("memory", string.Create(CultureInfo.InvariantCulture, $"about {MemoryMegabytes:0} MB, and {FieldMegabytes:0.###} MB for each point whose fields are kept"));
        if (Condition is { } condition)
            Line("rounding", string.Create(CultureInfo.InvariantCulture, $"displacements keep about {Digits(condition)} of 16 digits (condition of the stiffness about {condition:0.0e0})"));
        Lines("advice", Advice);
        Lines("warning", Warnings);
        Line("outcome", "the deck can be run");

        void Line(string label, string text) => to.WriteLine($"  {label,-14}{text}");

        void Lines(string label, IReadOnlyList<string> texts)
        {
            foreach (string text in texts)
                Line(label, text);
        }
    }

    /// <summary>Writes the report as JSON.</summary>
    /// <param name="to">Where it goes, UTF-8.</param>
    /// <param name="withDeck">Whether the resolved deck is part of it.</param>
    public void WriteJson(Stream to, bool withDeck)
    {
        ArgumentNullException.ThrowIfNull(to);
        using (Utf8JsonWriter json = new(to, Layout))
        {
            json.WriteStartObject();
            json.WriteString("title", Title);
            Strings(json, "stages", Stages);
            json.WriteString("out of plane", OutOfPlane);
            Strings(json, "mesh", Mesh);
            json.WriteStartObject("counts");
            foreach ((string name, long count) in Counts)
                json.WriteNumber(name, count);
            json.WriteEndObject();
            json.WriteNumber("memory [MB]", MemoryMegabytes);
            json.WriteNumber("memory of fields of a point [MB]", FieldMegabytes);
            if (Condition is { } condition)
                json.WriteNumber("condition of the stiffness", condition);
            Strings(json, "advice", Advice);
            Strings(json, "warnings", Warnings);
            if (withDeck)
                json.WriteString("deck", ResolvedDeck);
            json.WriteEndObject();
        }
        to.Write("\n"u8);
    }

    private static int Digits(double condition) => (int)Math.Clamp(Math.Floor(16 - Math.Log10(condition)), 0, 16);

    private static void Strings(Utf8JsonWriter json, string name, IReadOnlyList<string> lines)
    {
        json.WriteStartArray(name);
        foreach (string line in lines)
            json.WriteStringValue(line);
        json.WriteEndArray();
    }
}
