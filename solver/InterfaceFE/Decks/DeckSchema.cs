using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using InterfaceFE.Units;

namespace InterfaceFE.Decks;

/// <summary>Writes the JSON Schema (2020-12) of a deck from its records, for editors that complete and check YAML. It checks forms; the reader checks the rest.</summary>
public static class DeckSchema
{
    private const string Number = @"[-+]?([0-9]+\.?[0-9]*|\.[0-9]+)([eE][-+]?[0-9]+)?";
    private static readonly JsonSerializerOptions Layout = new() { WriteIndented = true, Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    /// <summary>The schema as text, lines ended by \n.</summary>
    public static string Write()
    {
        JsonObject definitions = [];
        foreach (DeckShape shape in DeckShape.All().Where(s => s.Type != typeof(Deck)))
            definitions[NameOf(shape.Type)] = BlockOf(shape);
        JsonObject root = new() { ["$schema"] = "https://json-schema.org/draft/2020-12/schema", ["title"] = "InterfaceFE deck" };
        foreach ((string key, JsonNode? value) in BlockOf(DeckShape.Of(typeof(Deck))))
            root[key] = value?.DeepClone();
        root["$defs"] = definitions;
        return root.ToJsonString(Layout).ReplaceLineEndings("\n") + "\n";
    }

    private static JsonObject BlockOf(DeckShape shape)
    {
        JsonObject properties = [];
        foreach (KeyShape key in shape.Keys)
        {
            JsonObject value = ValueOf(key.Value, key.Key);
            value["description"] = key.Key.Meaning;
            if (key.Key.Default is not null)
                value["default"] = key.Key.Default;
            properties[key.Name] = value;
        }
        JsonObject block = new() { ["description"] = shape.Meaning, ["type"] = "object", ["additionalProperties"] = false, ["properties"] = properties };
        JsonArray required = [.. shape.Keys.Where(k => k.IsRequired && !k.Key.MayBeIncluded).Select(k => JsonValue.Create(k.Name))];
        if (required.Count > 0)
            block["required"] = required;
        return block;
    }

    private static JsonObject ValueOf(ValueShape shape, KeyAttribute key) => shape.Kind switch
    {
        ValueKind.Text => new() { ["type"] = "string", ["minLength"] = 1 },
        ValueKind.Number => Quantity(key.Dimension),
        ValueKind.WholeNumber => WholeNumber(key),
        ValueKind.Word => new() { ["oneOf"] = new JsonArray([.. DeckShape.WordsOf(shape.Type).Select(w => new JsonObject { ["const"] = w.Text, ["description"] = w.Meaning })]) },
        ValueKind.Block => new() { ["$ref"] = "#/$defs/" + NameOf(shape.Type) },
        ValueKind.List => ListOf(shape, key),
        ValueKind.Map => new() { ["type"] = "object", ["minProperties"] = Math.Max(1, key.LeastCount), ["additionalProperties"] = ValueOf(shape.Entry!, key) },
        ValueKind.Directional => ByPart(key, ["x", "y", "z"]),
        ValueKind.PoissonRatios => ByPart(key, ["xy", "xz", "zy"]),
        ValueKind.EdgePoint => new() { ["anyOf"] = new JsonArray(new JsonObject { ["enum"] = new JsonArray("start", "middle", "end") }, Quantity(Dimension.Length)) },
        _ => new() { ["type"] = "string", ["pattern"] = "^(none|every point|every [1-9][0-9]* points?)$" },
    };

    private static JsonObject ListOf(ValueShape shape, KeyAttribute key)
    {
        JsonObject list = new() { ["type"] = "array", ["minItems"] = Math.Max(1, key.LeastCount), ["items"] = ValueOf(shape.Entry!, key) };
        if (key.MostCount < int.MaxValue)
            list["maxItems"] = key.MostCount;
        if (shape.IsListOfPoints)
            list["items"] = new JsonObject { ["type"] = "array", ["minItems"] = 2, ["maxItems"] = 2, ["items"] = Quantity(key.Dimension) };
        return shape.MayBeSingle ? new JsonObject { ["anyOf"] = new JsonArray(list, ValueOf(shape.Entry!, key)) } : list;
    }

    private static JsonObject ByPart(KeyAttribute key, string[] parts)
    {
        JsonObject block = new()
        {
            ["type"] = "object",
            ["additionalProperties"] = false,
            ["properties"] = new JsonObject(parts.Select(p => KeyValuePair.Create<string, JsonNode?>(p, Quantity(key.Dimension)))),
            ["required"] = new JsonArray([.. parts.Select(p => JsonValue.Create(p))]),
        };
        return new JsonObject { ["anyOf"] = new JsonArray(Quantity(key.Dimension), block) };
    }

    private static JsonObject WholeNumber(KeyAttribute key)
    {
        JsonObject number = new() { ["type"] = "integer" };
        if (double.IsFinite(key.AtLeast))
            number["minimum"] = key.AtLeast;
        if (double.IsFinite(key.AtMost))
            number["maximum"] = key.AtMost;
        return number;
    }

    private static JsonObject Quantity(Dimension dimension) => dimension switch
    {
        Dimension.None => new() { ["anyOf"] = new JsonArray(new JsonObject { ["type"] = "number" }, new JsonObject { ["type"] = "string", ["pattern"] = $"^{Number}( ?%)?$" }) },
        Dimension.Temperature => new() { ["type"] = "string", ["pattern"] = $"^{Number} ?°C$", ["examples"] = new JsonArray(DimensionText.Example(dimension)) },
        _ => new() { ["type"] = "string", ["pattern"] = $"^{Number} ?[^0-9 ].*$|^{Number} 1/.+$", ["examples"] = new JsonArray(DimensionText.Example(dimension)) },
    };

    private static string NameOf(Type type)
    {
        string name = type.Name.EndsWith("Deck", StringComparison.Ordinal) ? type.Name[..^4] : type.Name;
        return string.Concat(name.Select((c, i) => char.IsUpper(c) ? (i == 0 ? "" : " ") + char.ToLowerInvariant(c) : c.ToString()));
    }
}
