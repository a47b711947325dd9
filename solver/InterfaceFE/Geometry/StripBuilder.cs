using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>Turns adherends of a deck into strips and reports shapes that cannot be.</summary>
internal static class StripBuilder
{
    private const double LargestTurn = 175 * Math.PI / 180;
    private const double LargestCoordinate = 1e9;

    // Below this turn [rad] two runs meet without a bend: the wedge between their ends is far below the accuracy of any element.
    private const double StraightTurn = 1e-3;

    /// <summary>All adherends in deck order.</summary>
    /// <exception cref="DeckException">All faults of shape found.</exception>
    public static Strip[] Build(Deck deck)
    {
        List<DeckProblem> problems = [];
        List<Strip> strips = [];
        foreach ((string name, AdherendDeck adherend) in deck.Adherends)
        {
            List<DeckProblem> own = [];
            Strip? strip = Build(deck, name, adherend, strips.Count, own);
            problems.AddRange(own);
            if (strip != null)
                strips.Add(strip);
        }
        if (problems.Count > 0)
            throw new DeckException(problems);
        return [.. strips];
    }

    private static Strip? Build(Deck deck, string name, AdherendDeck adherend, int index, List<DeckProblem> problems)
    {
        string path = "adherends." + name;
        if (adherend.Rectangle == null == (adherend.Sheet == null))
        {
            problems.Add(new DeckProblem(path, "an adherend has one shape: give either `rectangle` or `sheet`"));
            return null;
        }
        CheckElements(path, adherend.Elements, problems);
        List<Run> runs = adherend.Rectangle != null
            ? RectangleRuns(path + ".rectangle", adherend.Rectangle, problems)
            : SheetRuns(path + ".sheet", adherend.Sheet!, problems);
        if (problems.Count > 0)
            return null;
        double arc = 0;
        foreach (Run run in runs)
        {
            (run.Strip, run.StartArc) = (index, arc);
            arc += run.Length;
        }
        Dictionary<string, int> stretches = [];
        Dictionary<string, EdgeSpan> edges = adherend.Rectangle != null ? RectangleEdges() : SheetEdges(path, adherend.Sheet!, runs, stretches, problems);
        if (problems.Count > 0)
            return null;
        return new Strip
        {
            Index = index,
            Name = name,
            Deck = adherend,
            Width = adherend.Width ?? deck.Model.Width,
            Thickness = adherend.Rectangle != null ? adherend.Rectangle.Size[1] : adherend.Sheet!.Thickness,
            Runs = runs,
            Edges = edges,
            Stretches = stretches,
        };
    }

    private static void CheckElements(string path, ElementsDeck? elements, List<DeckProblem> problems)
    {
        if (elements == null)
            return;
        if (elements.Along != null && (elements.Finer is { Count: > 0 } || elements.Length != null))
            problems.Add(new DeckProblem(path + ".elements.along", "a number along makes an even division; leave out `along`, or leave out `finer` and `length`"));
        for (int i = 0; i < (elements.Finer?.Count ?? 0); i++)
        {
            FinerDeck finer = elements.Finer![i];
            if (!(finer.To > finer.From))
                problems.Add(new DeckProblem(Text.Of($"{path}.elements.finer.{i + 1}.to"), Text.Of($"{finer.To:G6} mm must be greater than `from`, {finer.From:G6} mm")));
            if (!(finer.Length > 0))
                problems.Add(new DeckProblem(Text.Of($"{path}.elements.finer.{i + 1}.length"), "must be greater than 0 mm"));
        }
        if (!(elements.Growth > 1))
            problems.Add(new DeckProblem(path + ".elements.growth", "must be greater than 1, for example 1.3"));
        if (elements.Length is { } length && !(length > 0))
            problems.Add(new DeckProblem(path + ".elements.length", "must be greater than 0 mm"));
        if (elements.Along < 1 || elements.Through < 1)
            problems.Add(new DeckProblem(path + ".elements", "numbers of elements must be 1 or more"));
    }

    private static List<Run> RectangleRuns(string path, RectangleDeck rectangle, List<DeckProblem> problems)
    {
        if (rectangle.Corner.Count != 2 || !rectangle.Corner.All(IsPlace))
        {
            problems.Add(new DeckProblem(path + ".corner", "two coordinates are due, for example [0 mm, 0 mm], each within 1000 km"));
            return [];
        }
        if (rectangle.Size.Count != 2 || !rectangle.Size.All(s => IsPlace(s) && s > 0))
        {
            problems.Add(new DeckProblem(path + ".size", "length and height are due, both greater than 0, for example [300 mm, 4 mm]"));
            return [];
        }
        double y = rectangle.Corner[1] + rectangle.Size[1] / 2;
        return [Run.Straight(1, rectangle.Corner[0], y, rectangle.Corner[0] + rectangle.Size[0], y, 0)];
    }

    private static bool IsPlace(double coordinate) => Math.Abs(coordinate) <= LargestCoordinate;

    private static List<Run> SheetRuns(string path, SheetDeck sheet, List<DeckProblem> problems)
    {
        if (!(sheet.Thickness > 0) || !IsPlace(sheet.Thickness))
        {
            problems.Add(new DeckProblem(path + ".thickness", "must be greater than 0 mm"));
            return [];
        }
        int last = sheet.Line.Count - 1;
        if (last < 1)
            problems.Add(new DeckProblem(path + ".line", "at least two corner points are due, for example [[0 mm, 5 mm], [40 mm, 5 mm]]"));
        for (int i = 0; i <= last; i++)
            if (sheet.Line[i].Count != 2 || !sheet.Line[i].All(IsPlace))
                problems.Add(new DeckProblem(Text.Of($"{path}.line.{i + 1}"), "two coordinates are due, for example [40 mm, 5 mm], each within 1000 km"));
        if (problems.Count > 0)
            return [];
        double[] length = new double[last];
        double[] angle = new double[last];
        for (int i = 0; i < last; i++)
        {
            double dx = sheet.Line[i + 1][0] - sheet.Line[i][0];
            double dy = sheet.Line[i + 1][1] - sheet.Line[i][1];
            (length[i], angle[i]) = (Math.Sqrt(dx * dx + dy * dy), Math.Atan2(dy, dx));
            if (!(length[i] > 1e-6 * sheet.Thickness))
                problems.Add(new DeckProblem(Text.Of($"{path}.line.{i + 2}"), Text.Of($"the point falls on the one before it, [{sheet.Line[i][0]:G6} mm, {sheet.Line[i][1]:G6} mm]")));
        }
        return problems.Count > 0 ? [] : RoundedRuns(path, sheet, length, angle, problems);
    }

    private static List<Run> RoundedRuns(string path, SheetDeck sheet, double[] length, double[] angle, List<DeckProblem> problems)
    {
        int count = length.Length;
        double radius = sheet.BendRadius ?? 0;
        double[] turn = new double[count + 1];
        double[] cut = new double[count + 1];
        for (int i = 1; i < count; i++)
        {
            turn[i] = Math.IEEERemainder(angle[i] - angle[i - 1], 2 * Math.PI);
            if (Math.Abs(turn[i]) < StraightTurn)
                turn[i] = 0;
            else if (Math.Abs(turn[i]) > LargestTurn)
                problems.Add(new DeckProblem(Text.Of($"{path}.line.{i + 1}"), Text.Of($"the line goes back on itself at [{sheet.Line[i][0]:G6} mm, {sheet.Line[i][1]:G6} mm] (it turns by {Math.Abs(turn[i]) * 180 / Math.PI:F0}°; up to 175° is possible)")));
            cut[i] = turn[i] == 0 ? 0 : radius * Math.Tan(Math.Abs(turn[i]) / 2);
        }
        if (problems.Count > 0)
            return [];
        if (turn.Any(t => t != 0) && sheet.BendRadius == null)
            problems.Add(new DeckProblem(path, Text.Of($"the line has corners: give a `bend radius` of the mid-line, greater than {sheet.Thickness / 2:G6} mm (half the thickness)")));
        else if (turn.Any(t => t != 0) && !(radius > 0.501 * sheet.Thickness))
            problems.Add(new DeckProblem(path + ".bend radius", Text.Of($"{radius:G6} mm must be greater than half the thickness, {sheet.Thickness / 2:G6} mm (1.002 times it at least): it is the radius of the mid-line, and the inner face must keep a radius")));
        for (int i = 0; i < count; i++)
            if (cut[i] + cut[i + 1] > length[i] * (1 + 1e-9))
                problems.Add(new DeckProblem(path + ".bend radius", Text.Of($"the bends take {cut[i] + cut[i + 1]:G6} mm of run {i + 1}, from [{sheet.Line[i][0]:G6} mm, {sheet.Line[i][1]:G6} mm], which is {length[i]:G6} mm long: make the radius ({radius:G6} mm) smaller or the run longer")));
        if (problems.Count > 0)
            return [];
        List<Run> runs = [];
        for (int i = 0; i < count; i++)
        {
            (double x, double y) = (sheet.Line[i][0], sheet.Line[i][1]);
            (double cos, double sin) = ((sheet.Line[i + 1][0] - x) / length[i], (sheet.Line[i + 1][1] - y) / length[i]);
            if (turn[i] != 0)
                runs.Add(BendAt(x, y, angle[i - 1], angle[i], turn[i], cut[i], radius));
            if (length[i] - cut[i] - cut[i + 1] > 1e-6 * sheet.Thickness)
                runs.Add(Run.Straight(i + 1, x + cut[i] * cos, y + cut[i] * sin, sheet.Line[i + 1][0] - cut[i + 1] * cos, sheet.Line[i + 1][1] - cut[i + 1] * sin, 1e-9 * sheet.Thickness));
        }
        return runs;
    }

    private static Run BendAt(double x, double y, double angleBefore, double angleAfter, double turn, double cut, double radius)
    {
        int side = Math.Sign(turn);
        // The centre lies beside the tangent points; both tangents give the same centre, their mean keeps a mirrored bend mirrored.
        double cx = x + (cut * (Math.Cos(angleAfter) - Math.Cos(angleBefore)) - side * radius * (Math.Sin(angleBefore) + Math.Sin(angleAfter))) / 2;
        double cy = y + (cut * (Math.Sin(angleAfter) - Math.Sin(angleBefore)) + side * radius * (Math.Cos(angleBefore) + Math.Cos(angleAfter))) / 2;
        return Run.Bend(cx, cy, radius, angleBefore - side * Math.PI / 2, turn);
    }

    private static Dictionary<string, EdgeSpan> RectangleEdges() => new()
    {
        ["top"] = new EdgeSpan(Side.Upper, 0, 0),
        ["bottom"] = new EdgeSpan(Side.Lower, 0, 0),
        ["left end"] = new EdgeSpan(Side.Left, 0, 0),
        ["right end"] = new EdgeSpan(Side.Right, 0, 0),
    };

    private static Dictionary<string, EdgeSpan> SheetEdges(string path, SheetDeck sheet, List<Run> runs, Dictionary<string, int> stretches, List<DeckProblem> problems)
    {
        Dictionary<string, EdgeSpan> edges = new()
        {
            ["upper face"] = new EdgeSpan(Side.Upper, 0, runs.Count - 1),
            ["lower face"] = new EdgeSpan(Side.Lower, 0, runs.Count - 1),
            ["left end"] = new EdgeSpan(Side.Left, 0, 0),
            ["right end"] = new EdgeSpan(Side.Right, runs.Count - 1, runs.Count - 1),
        };
        foreach ((string name, int number) in sheet.Stretches ?? new Dictionary<string, int>())
        {
            string key = $"{path}.sheet.stretches.{name}";
            int run = runs.FindIndex(r => r.Number == number);
            if (number < 1 || number >= sheet.Line.Count)
                problems.Add(new DeckProblem(key, Text.Of($"there is no run {number}: the line has straight runs 1 to {sheet.Line.Count - 1}")));
            else if (run < 0)
                problems.Add(new DeckProblem(key, Text.Of($"nothing straight is left of run {number}: the bends beside it take all of it")));
            else if (!edges.TryAdd(name, new EdgeSpan(Side.Upper, run, run)) || !edges.TryAdd(name + " upper face", new EdgeSpan(Side.Upper, run, run))
                || !edges.TryAdd(name + " lower face", new EdgeSpan(Side.Lower, run, run)))
                problems.Add(new DeckProblem(key, $"\"{name}\" clashes with the name of another edge of this sheet: choose another name"));
            else
                stretches[name] = run;
        }
        return edges;
    }
}
