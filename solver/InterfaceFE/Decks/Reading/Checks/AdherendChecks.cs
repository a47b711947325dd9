using System.Globalization;
using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>Adherends and joints taken by themselves; whether edges face each other is a matter of geometry.</summary>
internal static class AdherendChecks
{
    /// <summary>Checks an adherend.</summary>
    public static void Run(Deck deck, AdherendDeck adherend, string path, ReadContext context)
    {
        if (path.Contains(" of ", StringComparison.Ordinal))
            context.FailAt(context.Find(path, out _).Key, path, "a name of an adherend holds no \" of \", since edges are written EDGE of ADHEREND");
        DeckChecks.NameExists(adherend.Of, deck.Materials, "materials", path + ".of", context);
        bool rectangle = context.IsGiven(path + ".rectangle");
        bool sheet = context.IsGiven(path + ".sheet");
        if (rectangle && sheet)
            context.Fail(path + ".sheet", "an adherend has one shape; give `rectangle` or `sheet`, not both");
        else if (!rectangle && !sheet)
            context.FailAt(context.Find(path, out _).Key, path, "has no shape; give `rectangle` or `sheet`, for example rectangle: {corner: [0 mm, 0 mm], size: [300 mm, 4 mm]}");
        if (adherend.Sheet is { } drawn)
            CheckSheet(drawn, path + ".sheet", context);
        if (deck.Model?.Gravity is not null)
            foreach (string name in (adherend.Plies?.Select(ply => ply?.Of ?? adherend.Of) ?? [adherend.Of]).OfType<string>().Distinct())
                if (deck.Materials?.GetValueOrDefault(name) is { Density: null } && !context.IsGiven($"materials.{name}.density"))
                    context.Fail("model.gravity", $"needs the density of {name}, of which {path["adherends.".Length..]} is made, for example density: 2700 kg/m^3");
        if (adherend.Plies is { } plies)
            PlyChecks.Run(deck, adherend, plies, path, context);
        if (adherend.Elements?.Finer is { } finer)
            for (int i = 0; i < finer.Count; i++)
                if (finer[i] is { } place)
                    DeckChecks.Rises(place.From, place.To, ReadContext.Join(path + ".elements.finer", i + 1), context);
    }

    private static void CheckSheet(SheetDeck sheet, string path, ReadContext context)
    {
        int runs = (sheet.Line?.Count ?? 1) - 1;
        if (sheet.Line is { } line)
            CheckLine(sheet, line, path, context);
        if (sheet.BendRadius is { } radius && sheet.BendRadius <= sheet.Thickness / 2)
            context.Fail(path + ".bend radius", $"must be greater than half the thickness ({QuantityText.Write(sheet.Thickness / 2, Dimension.Length)}), else the inner face folds over itself");
        Dictionary<int, string> named = [];
        foreach ((string name, int run) in DeckChecks.Entries(sheet.Stretches))
        {
            string at = $"{path}.stretches.{name}";
            if (!context.IsSound(at))
                continue;
            if (runs > 0 && run > runs)
                context.Fail(at, string.Create(CultureInfo.InvariantCulture, $"the line has {runs} straight {(runs == 1 ? "run" : "runs")}, numbered from 1 at the left end"));
            else if (!named.TryAdd(run, name))
                context.Fail(at, $"this run is already called {named[run]}");
            if (EdgeText.SheetEdges.Contains(name))
                context.Fail(at, "is the name of an edge that every sheet has; choose another name");
            else if (name.Contains(" of ", StringComparison.Ordinal))
                context.Fail(at, "a name of a stretch holds no \" of \", since edges are written EDGE of ADHEREND");
        }
    }

    private static void CheckLine(SheetDeck sheet, IReadOnlyList<IReadOnlyList<double>> line, string path, ReadContext context)
    {
        bool hasCorner = false;
        for (int i = 1; i < line.Count; i++)
        {
            if (line[i] is not [var x, var y] || line[i - 1] is not [var x0, var y0])
                return;
            if (x == x0 && y == y0)
                context.Fail(ReadContext.Join(path + ".line", i + 1), "is the same point as the one before it");
            if (i + 1 < line.Count && line[i + 1] is [var x1, var y1])
                hasCorner |= (x - x0) * (y1 - y) != (y - y0) * (x1 - x);
        }
        if (hasCorner && !context.IsGiven(path + ".bend radius"))
            context.FailAt(context.Find(path, out _).Key, path + ".bend radius", "is missing; the line has corners, which are rounded by it, for example bend radius: 6 mm");
    }
}
