using InterfaceFE.Decks.Reading;
using Xunit;

namespace InterfaceFE.Tests.Decks;

/// <summary>Each bad deck in the folder Bad has the messages it must give in a file of the same name beside it; "warning: " leads the warnings.</summary>
public class BadDeckTests
{
    public static TheoryData<string> BadDecks() => [.. Directory.EnumerateFiles(Folder(), "*.yaml").Select(f => Path.GetFileName(f)!).Order(StringComparer.Ordinal)];

    [Theory]
    [MemberData(nameof(BadDecks))]
    public void A_bad_deck_gives_its_expected_messages(string deck)
    {
        string path = Path.Combine(Folder(), deck);
        DeckReading reading = DeckReader.Read(path);
        string[] expected = File.ReadAllLines(Path.ChangeExtension(path, ".expected"));

        Assert.Equal(string.Join('\n', expected), string.Join('\n', Lines(reading)));
        Assert.Equal(expected.All(l => l.StartsWith("warning: ", StringComparison.Ordinal)), reading.Deck is not null);
    }

    internal static IEnumerable<string> Lines(DeckReading reading) =>
        reading.Problems.Select(p => p.ToString()).Concat(reading.Warnings.Select(w => "warning: " + w)).Select(l => l.Replace(Folder() + Path.DirectorySeparatorChar, "", StringComparison.Ordinal));

    internal static string Folder() => Repository.Path("tests", "InterfaceFE.Tests", "Decks", "Bad");
}
