using System.Globalization;
using System.Text.Json;
using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Units;
using Xunit;

namespace InterfaceFE.Tests.Decks;

/// <summary>Writer, schema and reference: all made from the records, so all must agree with the reader.</summary>
public class DeckTextTests
{
    [Fact]
    public void A_written_deck_reads_back_as_the_same_deck_and_the_same_text()
    {
        string second = DeckReaderTests.RoofText()
            .Replace("    mixing: independent modes", "    mixing: benzeggagh-kenane\n    exponent: 2.1", StringComparison.Ordinal)
            .Replace("law: table, opening: [0 mm, 0.3 mm, 4 mm, 7 mm], traction: [0 MPa, 0.42 MPa, 0.5 MPa, 0 MPa]", "law: bilinear, stiffness: 1.7 MPa/mm, strength: 3.3 bar, toughness: 350 J/m^2", StringComparison.Ordinal)
            .Replace("law: trapezoid", "law: bilinear", StringComparison.Ordinal)
            .Replace("travel: 8 mm, speed: 2 mm/min, counted from: start of this stage}", "force: 0.1 kN}\n    over: 3 min\n  - let go: ends\n  - turn: {grips: {left end: -0.5}, angle: 5 deg}", StringComparison.Ordinal)
            .Replace("young:   {x: 24 GPa, y: 9 GPa, z: 24 GPa}", "young: 24 GPa", StringComparison.Ordinal)
            .Replace("title: Stiff", "title: '\"#1\": yes & no \\ {Stiff}, °µ'  # Stiff", StringComparison.Ordinal);
        foreach (string text in (string[])[DeckReaderTests.RoofText(), second, DeckReference.Example])
        {
            Deck deck = DeckReaderTests.Good(DeckReader.ReadText(text, "first.yaml"));
            string written = DeckWriter.Write(deck);
            Deck again = DeckReaderTests.Good(DeckReader.ReadText(written, "second.yaml"));
            SameDeck.Check(deck, again);
            Assert.Equal(written, DeckWriter.Write(again));
        }
    }

    [Fact]
    public void Defaults_in_the_attributes_are_those_of_the_records()
    {
        int compared = 0;
        foreach (DeckShape shape in DeckShape.All())
        {
            object fresh = Activator.CreateInstance(shape.Type)!;
            foreach (KeyShape key in shape.Keys.Where(k => k.Key.Default is not null))
            {
                object? actual = key.Property.GetValue(fresh);
                string where = shape.Type.Name + "." + key.Name;
                if (key.Value.Kind == ValueKind.Word)
                    Assert.True(DeckShape.WordsOf(key.Value.Type).First(w => w.Value.Equals(actual)).Text == key.Key.Default, where);
                else if (key.Value.Kind == ValueKind.FieldInterval)
                    Assert.Equal(key.Key.Default, string.Create(CultureInfo.InvariantCulture, $"every {((FieldInterval)actual!).Points} points"));
                else
                {
                    Assert.True(QuantityText.TryRead(key.Key.Default!, key.Key.Dimension, null, out double value, out string error), where + error);
                    Close.To(value, actual is Directional d ? d.X : Convert.ToDouble(actual, CultureInfo.InvariantCulture), 0, 0, where);
                }
                compared++;
            }
        }
        Assert.True(compared > 10);
    }

    [Fact]
    public void Single_examples_in_the_attributes_are_valid()
    {
        foreach (DeckShape shape in DeckShape.All())
            foreach (KeyShape key in shape.Keys.Where(k => k.Key.Example is not null && k.Value.Kind == ValueKind.Number))
            {
                Assert.True(QuantityText.TryRead(key.Key.Example!, key.Key.Dimension, null, out double value, out string error), $"{shape.Type.Name}.{key.Name}: {error}");
                Assert.True(value > key.Key.Above && value >= key.Key.AtLeast && value < key.Key.Below && value <= key.Key.AtMost, $"{shape.Type.Name}.{key.Name}");
            }
    }

    [Fact]
    public void The_deck_of_the_reference_is_good()
    {
        DeckReading reading = DeckReader.ReadText(DeckReference.Example, "example.yaml");

        DeckReaderTests.Good(reading);
        Assert.Empty(reading.Warnings);
    }

    [Fact]
    public void Reference_and_schema_name_every_key_and_word()
    {
        string reference = DeckReference.Write();
        string schema = DeckSchema.Write();
        using JsonDocument json = JsonDocument.Parse(schema);
        JsonElement definitions = json.RootElement.GetProperty("$defs");
        Assert.Equal(DeckShape.All().Count - 1, definitions.EnumerateObject().Count());
        foreach (DeckShape shape in DeckShape.All())
            foreach (KeyShape key in shape.Keys)
            {
                Assert.Contains(key.Key.Meaning, reference, StringComparison.Ordinal);
                Assert.Contains($"\"{key.Name}\": {{", schema, StringComparison.Ordinal);
                if (key.Value.Kind == ValueKind.Word)
                    Assert.All(DeckShape.WordsOf(key.Value.Type), w => Assert.Contains($"- `{w.Text}`: {w.Meaning}", reference, StringComparison.Ordinal));
            }
        foreach (JsonElement link in Links(json.RootElement))
            Assert.True(definitions.TryGetProperty(link.GetString()!["#/$defs/".Length..], out _), link.GetString());
    }

    [Fact]
    public void Links_within_the_reference_lead_to_headings()
    {
        string[] lines = DeckReference.Write().Split('\n');
        HashSet<string> anchors = [.. lines.Where(l => l.StartsWith('#')).Select(l => string.Concat(l.TrimStart('#', ' ').ToLowerInvariant().Where(c => char.IsLetterOrDigit(c) || c is ' ' or '-')).Replace(' ', '-'))];
        foreach (string line in lines)
            foreach (string link in line.Split("](#").Skip(1))
                Assert.Contains(link.Split(')')[0], anchors);
    }

    private static IEnumerable<JsonElement> Links(JsonElement element) => element.ValueKind switch
    {
        JsonValueKind.Object => element.EnumerateObject().SelectMany(p => p.Name == "$ref" ? [p.Value] : Links(p.Value)),
        JsonValueKind.Array => element.EnumerateArray().SelectMany(Links),
        _ => [],
    };
}
