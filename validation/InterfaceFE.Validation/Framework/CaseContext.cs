using System.Diagnostics;
using System.Globalization;
using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Runs;

namespace InterfaceFE.Validation.Framework;

/// <summary>What a case may use.</summary>
/// <param name="quick">Whether the run is a quick one: a case may then take a part of its variants.</param>
/// <param name="root">Root folder of the repository.</param>
/// <param name="progress">Takes lines of progress.</param>
public sealed class CaseContext(bool quick, string root, Action<string> progress)
{
    private readonly List<CaseFigure> _figures = [];

    /// <summary>Whether the run is a quick one.</summary>
    public bool Quick { get; } = quick;

    /// <summary>Root folder of the repository.</summary>
    public string Root { get; } = root;

    /// <summary>Figures drawn so far, for the report.</summary>
    public IReadOnlyList<CaseFigure> Figures => _figures;

    /// <summary>Adds a figure to the report.</summary>
    public void Draw(CaseFigure figure) => _figures.Add(figure);

    /// <summary>Tells a line of progress.</summary>
    public void Say(string line) => progress(line);

    /// <summary>Reads a deck from text and runs it in memory.</summary>
    /// <param name="name">Name for progress and messages.</param>
    /// <param name="yaml">Deck in YAML; includes are looked for in the folder inputs.</param>
    /// <exception cref="DeckException">The deck cannot be built.</exception>
    /// <exception cref="InvalidOperationException">The deck has errors; the message lists them.</exception>
    public RunResult Run(string name, string yaml) => Run(name, Read(name, yaml));

    /// <summary>Runs a deck in memory.</summary>
    /// <exception cref="DeckException">The deck cannot be built.</exception>
    public RunResult Run(string name, Deck deck)
    {
        long start = Stopwatch.GetTimestamp();
        RunResult result = DeckRun.Execute(deck);
        Say(string.Create(CultureInfo.InvariantCulture,
            $"  {name}: {result.Summary.Counts["unknowns"]} unknowns, {result.History.Points.Count} points, {result.Summary.Status}, {Stopwatch.GetElapsedTime(start).TotalSeconds:0.0} s"));
        return result;
    }

    /// <summary>Reads a deck from text.</summary>
    /// <exception cref="InvalidOperationException">The deck has errors; the message lists them.</exception>
    public Deck Read(string name, string yaml)
    {
        DeckReading reading = DeckReader.ReadText(yaml, name, Path.Combine(Root, "inputs"));
        return reading.Deck is { } deck ? deck : throw new InvalidOperationException($"deck {name}: " + string.Join("; ", reading.Problems));
    }
}
