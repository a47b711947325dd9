using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using Xunit;

namespace InterfaceFE.Tests.Decks;

public sealed class IncludeTests : IDisposable
{
    private readonly string _top = Directory.CreateTempSubdirectory("include").FullName;

    public void Dispose() => Directory.Delete(_top, true);

    private string Write(string file, string text)
    {
        string path = Path.Combine(_top, file);
        Directory.CreateDirectory(Path.GetDirectoryName(path)!);
        File.WriteAllText(path, text);
        return path;
    }

    private static string DeckWith(string include) => include + DeckReference.Example.Replace("  aluminium: {young: 70 GPa, poisson: 0.33}", "  brass: {young: 100 GPa, poisson: 0.35}", StringComparison.Ordinal).Replace("of: aluminium, rectangle: {corner: [0 mm, 0", "of: brass, rectangle: {corner: [0 mm, 0", StringComparison.Ordinal);

    [Fact]
    public void A_file_is_found_in_the_deck_folder_first_then_up_to_inputs()
    {
        string deck = Write("inputs/ferry/roof/deck.yaml", DeckWith("include: [metals.yaml, foams.yaml]\n"));
        Write("inputs/metals.yaml", "materials:\n  aluminium: {young: 69 GPa, poisson: 0.33}\n");
        Write("inputs/ferry/foams.yaml", "layers:\n  foam: {thickness: 2 mm, peel: {law: bilinear, stiffness: 1 MPa/mm, strength: 0.5 MPa, toughness: 1 kJ/m^2}, shear: {law: bilinear, stiffness: 1 MPa/mm, strength: 0.5 MPa, toughness: 1 kJ/m^2}, mixing: independent modes}\n");

        DeckReading reading = DeckReader.Read(deck);
        Deck read = DeckReaderTests.Good(reading);

        Assert.Equal(69000, read.Materials["aluminium"].Young.X);
        Assert.Equal(["tape", "foam"], read.Layers!.Keys);
        Assert.Null(read.Include);
        Assert.Equal(2, reading.IncludedFiles.Count);
        Assert.Empty(reading.Warnings);

        Write("inputs/ferry/roof/metals.yaml", "materials:\n  aluminium: {young: 71 GPa, poisson: 0.33}\n");
        Assert.Equal(71000, DeckReaderTests.Good(DeckReader.Read(deck)).Materials["aluminium"].Young.X);
    }

    [Fact]
    public void Without_a_folder_called_inputs_only_the_deck_folder_is_searched()
    {
        string deck = Write("decks/roof/deck.yaml", DeckWith("include: metals.yaml\n"));
        Write("decks/metals.yaml", "materials:\n  aluminium: {young: 69 GPa, poisson: 0.33}\n");

        Assert.Contains(DeckReader.Read(deck).Problems, p => p.ToString().EndsWith("deck.yaml:1:10 include: \"metals.yaml\" there is no such file in the deck's folder", StringComparison.Ordinal));
    }

    [Fact]
    public void A_link_that_leads_outside_is_not_followed()
    {
        string deck = Write("inputs/deck.yaml", DeckWith("include: [metals.yaml, linked/metals.yaml]\n"));
        string outside = Write("outside/metals.yaml", "materials:\n  aluminium: {young: 69 GPa, poisson: 0.33}\n");
        File.CreateSymbolicLink(Path.Combine(_top, "inputs/metals.yaml"), outside);
        Directory.CreateSymbolicLink(Path.Combine(_top, "inputs/linked"), Path.Combine(_top, "outside"));

        DeckReading reading = DeckReader.Read(deck);

        Assert.Equal(2, reading.Problems.Count(p => p.Message.StartsWith("is a link that leads outside", StringComparison.Ordinal)));
        Assert.Empty(reading.IncludedFiles);
    }

    [Fact]
    public void A_link_that_stays_inside_is_followed()
    {
        string deck = Write("inputs/deck.yaml", DeckWith("include: metals.yaml\n"));
        string inside = Write("inputs/shared/all.yaml", "materials:\n  aluminium: {young: 69 GPa, poisson: 0.33}\n");
        File.CreateSymbolicLink(Path.Combine(_top, "inputs/metals.yaml"), inside);

        DeckReaderTests.Good(DeckReader.Read(deck));
    }
}
