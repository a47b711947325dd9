using System.Globalization;
using InterfaceFE.Results;

namespace InterfaceFE.Reports;

/// <summary>Figures of the fronts of a joint: tip and process zone against the travel, energy release rates against the tip's opening.</summary>
internal static class FrontFigures
{
    /// <summary>Crack tip, start of the process zone and the zone between them against the main grip's travel, or against the points where the travel turns back.</summary>
    /// <exception cref="NoDataException">The joint has no front.</exception>
    public static Figure Growth(RunHistory history, RunSummary summary, string joint)
    {
        MainGrip main = new(history);
        List<Curve> curves = [];
        List<Band> bands = [];
        bool byPoint = main.TurnsBack();
        List<FrontRow> rows = Rows(history, joint);
        int[] fronts = [.. rows.Select(row => row.Front).Distinct().Order()];
        for (int f = 0; f < fronts.Length; f++)
        {
            FrontRow[] own = [.. rows.Where(row => row.Front == fronts[f])];
            double[] x = [.. own.Select(row => byPoint ? row.Point : main.At(row.Point))];
            double[] start = [.. own.Select(row => row.ProcessZoneStart ?? double.NaN)];
            // Once its process zone is gone a front has run through its stretch: it has no tip any more.
            int last = Array.FindLastIndex(start, double.IsFinite);
            double[] tip = [.. own.Select((row, i) => last < 0 || i <= last ? row.CrackTip ?? double.NaN : double.NaN)];
            string of = fronts.Length > 1 ? string.Create(CultureInfo.InvariantCulture, $" of front {fronts[f]}") : "";
            bands.AddRange(Bands($"process zone{of}", x, tip, start, 2 * f));
            if (Any(x, tip))
                curves.Add(new Curve($"crack tip{of} (damage 1)", x, tip, 2 * f));
            if (Any(x, start))
                curves.Add(new Curve($"start of process zone{of}", x, start, 2 * f + 1));
        }
        if (curves.Count == 0)
            throw new NoDataException($"{joint} has no front with a position");
        return new Figure
        {
            Title = $"Crack front and process zone of {joint}",
            Subtitles = [history.Title, .. LoadFigure.EndWords(summary)],
            Panels = [new Panel { XTitle = byPoint ? "Point" : main.Title, YTitle = $"Position along {joint} (mm)", Curves = curves, Bands = bands }],
        };
    }

    /// <summary>J by path, by loads and rotations and under the law, against the larger of opening and sliding at the starter tip.</summary>
    /// <exception cref="NoDataException">No J has a meaning at this joint.</exception>
    public static Figure EnergyRelease(RunHistory history, RunSummary summary, string joint)
    {
        List<FrontRow> rows = Rows(history, joint);
        int[] fronts = [.. rows.Where(row => (row.JPath ?? row.JRotation ?? row.JUnderLaw) is not null).Select(row => row.Front).Distinct().Order()];
        if (fronts.Length == 0 || !rows.Any(row => (row.JPath ?? row.JRotation ?? row.JUnderLaw) > 0))
            throw new NoDataException($"no J has a meaning at {joint}");
        double Largest(Func<FrontRow, double?> of) => rows.Select(row => Math.Abs(of(row) ?? 0)).Where(double.IsFinite).DefaultIfEmpty(0).Max();
        bool sliding = Largest(row => row.Sliding) > Largest(row => row.Opening);
        List<Curve> curves = [];
        int style = 0;
        foreach (int front in fronts)
        {
            FrontRow[] own = [.. rows.Where(row => row.Front == front)];
            double[] x = [.. own.Select(row => Math.Abs((sliding ? row.Sliding : row.Opening) ?? double.NaN))];
            string of = fronts.Length > 1 ? string.Create(CultureInfo.InvariantCulture, $", front {front}") : "";
            foreach ((string name, Func<FrontRow, double?> value) in new (string, Func<FrontRow, double?>)[]
                { ("path integral", row => row.JPath), ("loads and rotations", row => row.JRotation), ("work of the law at the starter tip", row => row.JUnderLaw) })
            {
                double[] y = [.. own.Select(row => value(row) ?? double.NaN)];
                if (Any(x, y))
                    curves.Add(new Curve(name + of, x, y, style));
                style++;
            }
        }
        if (curves.Count == 0)
            throw new NoDataException($"J of {joint} has no {(sliding ? "sliding" : "opening")} to be drawn against");
        return new Figure
        {
            Title = $"Energy release rate of {joint}, by independent ways",
            Subtitles = [history.Title, .. LoadFigure.EndWords(summary)],
            Panels =
            [
                new Panel { XTitle = sliding ? "Sliding at the starter tip, magnitude (mm)" : "Opening at the starter tip (mm)", YTitle = "J (N/mm = kJ/m²)", Curves = curves },
            ],
        };
    }

    private static List<FrontRow> Rows(RunHistory history, string joint)
    {
        List<FrontRow> rows = [.. history.Fronts.Where(row => row.Joint == joint)];
        if (rows.Count == 0)
            throw new NoDataException($"{joint} has no front");
        // A front at which nothing happened only draws a level line; it is shown when no front moved.
        HashSet<int> moved = [.. rows.Where(row => row.ProcessZoneStart is not null).Select(row => row.Front)];
        return moved.Count > 0 ? [.. rows.Where(row => moved.Contains(row.Front))] : rows;
    }

    private static bool Any(double[] x, double[] y)
    {
        for (int i = 0; i < x.Length; i++)
            if (double.IsFinite(x[i]) && double.IsFinite(y[i]))
                return true;
        return false;
    }

    private static IEnumerable<Band> Bands(string name, double[] x, double[] tip, double[] start, int style)
    {
        int from = 0;
        for (int i = 0; i <= x.Length; i++)
        {
            if (i < x.Length && double.IsFinite(x[i]) && double.IsFinite(tip[i]) && double.IsFinite(start[i]))
                continue;
            if (i - from > 1)
                yield return new Band(name, x[from..i], tip[from..i], start[from..i], style);
            from = i + 1;
        }
    }
}
