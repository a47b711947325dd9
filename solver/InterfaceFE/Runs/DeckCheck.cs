using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Geometry;
using InterfaceFE.Marching;
using InterfaceFE.Model;
using InterfaceFE.Reports;
using InterfaceFE.Results;

namespace InterfaceFE.Runs;

/// <summary>What came of a check.</summary>
/// <param name="Code">How it ended.</param>
/// <param name="Messages">What is wrong, one line each; empty when there is a report.</param>
/// <param name="Report">The report; null when the deck cannot be run.</param>
public sealed record CheckOutcome(ExitCode Code, IReadOnlyList<string> Messages, CheckReport? Report);

/// <summary>Checks a deck without running it: reads it, builds mesh and model, looks for parts that nothing holds, estimates the size.</summary>
public static class DeckCheck
{
    // Largest resident memory measured on peel coupons: 122 MB at 2,446 unknowns, 582 MB at 182,022. A rough guide, no promise.
    private const double ProgramMegabytes = 115;
    private const double BytesPerElement = 6000;
    private const double BytesPerFactorEntry = 8 * 2.5;

    /// <summary>Checks a deck file.</summary>
    /// <param name="deckFile">The deck.</param>
    /// <param name="folder">Folder for a drawing of the model; null for none.</param>
    /// <param name="progress">Takes lines of progress.</param>
    public static CheckOutcome Execute(string deckFile, string? folder, Action<string> progress)
    {
        ArgumentException.ThrowIfNullOrEmpty(deckFile);
        DeckReading reading = DeckReader.Read(deckFile);
        return Faults.Guard(reading, folder ?? deckFile, () => Check(reading, folder, progress), Fail);
    }

    private static CheckOutcome Fail(ExitCode code, IReadOnlyList<string> messages) => new(code, messages, null);

    private static CheckOutcome Check(DeckReading reading, string? folder, Action<string> progress)
    {
        if (reading.Deck is not { } deck)
            return Fail(ExitCode.WrongDeckOrCall, [.. reading.Problems.Select(p => p.ToString())]);
        if (folder is not null && File.Exists(folder))
            return Fail(ExitCode.WrongDeckOrCall, [$"{folder} is a file; --into names a folder"]);
        MeshingResult meshing = Mesher.Build(deck);
        SpecimenModel model = ModelBuilder.Build(deck, meshing.Mesh);
        _ = new GaugeReader(deck, meshing.Mesh);
        FreeMovement.Refuse(model);
        var equilibrium = new FullEquilibrium(model);
        if (Loose(equilibrium) is { } loose)
            return Fail(ExitCode.WrongDeckOrCall, [loose]);
        if (folder is not null)
            Draw(meshing.Mesh, deck.Title, folder, progress);
        long elements = model.Solids.Sum(s => (long)s.Count), layerElements = model.Layers.Sum(l => (long)l.Count);
        const double Megabyte = 1024 * 1024;
        return new CheckOutcome(ExitCode.Done, [], new CheckReport
        {
            Title = deck.Title,
            Stages = [.. model.Stages.Select(s => Text.Of($"{s.Number}: {s.Words}"))],
            Counts = new Dictionary<string, long>
            {
                ["unknowns"] = model.Unknowns.Count,
                ["nodes"] = meshing.Mesh.NodeCount,
                ["elements"] = elements,
                ["layer elements"] = layerElements,
            },
            Mesh = meshing.Notes,
            OutOfPlane = deck.Model.OutOfPlane switch { Decks.OutOfPlane.Held => "held (plane strain)", Decks.OutOfPlane.Free => "free (plane stress)", _ => "uniform strain (generalised plane strain)" },
            Advice = OutOfPlaneAdvice.For(deck, meshing.Mesh),
            Warnings = [.. reading.Warnings.Select(w => w.ToString()), .. meshing.Warnings],
            MemoryMegabytes = Math.Ceiling(ProgramMegabytes + (BytesPerFactorEntry * equilibrium.Plan.FactorNonZeros + BytesPerElement * (elements + layerElements)) / Megabyte),
            FieldMegabytes = Math.Round((8.0 * 8 * meshing.Mesh.NodeCount + 8.0 * 6 * 3 * layerElements) / Megabyte, 3),
            ResolvedDeck = DeckWriter.Write(deck),
        });
    }

    /// <summary>What can still move freely at the start of a stage, with its usual causes; null when all is held.</summary>
    private static string? Loose(FullEquilibrium equilibrium)
    {
        foreach (LoadStage stage in equilibrium.Model.Stages.Where(s => s.Marches))
        {
            equilibrium.StartStage(stage);
            if (!equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate).Finite)
                return "the stiffness of the model is not finite at the start: look for extreme numbers in the deck";
            if (equilibrium.Stability() is { Singular: >= 0 and int unknown })
                return Text.Of($"stage {stage.Number} ({stage.Words}): {StageMarch.CanStillMove(equilibrium, unknown)}");
        }
        return null;
    }

    private static void Draw(Mesh mesh, string title, string folder, Action<string> progress)
    {
        string figures = Path.Join(folder, "figures");
        Directory.CreateDirectory(figures);
        foreach (WrittenFigure figure in FigureWriter.WriteModel(mesh, title, figures, progress).Figures)
            progress($"drawn: {Path.Join(figures, figure.FileName)}.png and .svg");
    }
}
