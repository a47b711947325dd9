using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Geometry;
using InterfaceFE.Model;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using Xunit;

namespace InterfaceFE.Tests.Decks.Shipped;

/// <summary>Every deck under `inputs` is good, and the deck reference there is the one that the records make.</summary>
public class ShippedDeckTests
{
    public static TheoryData<string> Decks => [.. Directory.EnumerateFiles(Inputs(), "*.yaml", SearchOption.AllDirectories)
        .Where(path => File.ReadLines(path).Any(line => line.StartsWith("title:", StringComparison.Ordinal)))
        .Select(path => Path.GetRelativePath(Inputs(), path)).Order(StringComparer.Ordinal)];

    [Fact]
    public void There_are_decks_to_look_at() => Assert.True(Decks.Count >= 7, $"{Decks.Count} decks in {Inputs()}");

    [Theory]
    [MemberData(nameof(Decks))]
    public void A_shipped_deck_reads_without_problems_and_its_resolved_text_is_the_same_deck(string name)
    {
        DeckReading reading = DeckReader.Read(Path.Combine(Inputs(), name));
        Assert.True(reading.Deck is not null, string.Join("\n", reading.Problems));
        DeckReading again = DeckReader.ReadText(DeckWriter.Write(reading.Deck), "resolved.yaml");
        Assert.True(again.Deck is not null, string.Join("\n", again.Problems));
        SameDeck.Check(reading.Deck, again.Deck);
    }

    [Theory]
    [MemberData(nameof(Decks))]
    public void A_shipped_deck_can_be_built_and_its_elements_are_short_enough(string name)
    {
        Deck deck = DeckReader.Read(Path.Combine(Inputs(), name)).Deck!;
        MeshingResult meshing = Mesher.Build(deck);
        Assert.Empty(meshing.Warnings);
        SpecimenModel model = ModelBuilder.Build(deck, meshing.Mesh);
        Assert.Equal(deck.Joints?.Count ?? 0, model.Layers.Count);
        Assert.Equal(deck.Sequence.Count, model.Stages.Count);
    }

    [Fact]
    public void The_deck_reference_is_up_to_date()
    {
        string path = Path.Combine(Inputs(), "README.md");
        string text = File.Exists(path) ? File.ReadAllText(path).ReplaceLineEndings("\n") : "";
        Assert.True(text == DeckReference.Write(), "inputs/README.md is not what the records say; make it anew: dotnet run -c Release --project solver/InterfaceFE.Cli -- deck-reference --into inputs/README.md");
    }

    [Fact]
    public void The_worked_example_of_the_deck_reference_runs()
    {
        DeckReading reading = DeckReader.ReadText(DeckReference.Example, "example.yaml");
        Assert.True(reading.Deck is not null, string.Join("\n", reading.Problems));
        RunResult run = DeckRun.Execute(reading.Deck, cancellation: TestContext.Current.CancellationToken);
        Assert.True(run.Summary.Status == RunStatus.Finished, run.Summary.Cause);
    }

    private static string Inputs() => Repository.Path("inputs");
}
