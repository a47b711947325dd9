using System.Globalization;
using InterfaceFE.Marching;
using InterfaceFE.Results;

namespace InterfaceFE.Validation.Replays;

/// <summary>Where two tables of a run differ most.</summary>
/// <param name="Relative">Difference over the scale of its column; infinite where the tables do not have the same rows, columns, words or empty fields.</param>
/// <param name="Where">Column and row, or what does not fit.</param>
public readonly record struct TableDifference(double Relative, string Where);

/// <summary>
/// Compares the tables of two runs column by column. A difference is measured by the largest magnitude of its column in the recorded table, but by a tenth of the largest of the columns
/// with the same unit at least: in what is 0 by symmetry, a sliding beside an opening, the march's tolerance of 1e-10 leaves as much of the other. Forces are measured by the largest of all forces of the table, and by a thousandth of the
/// largest carried inside at least: a reaction that is 0 by balance holds nothing but the rounding of what balances. Moments likewise, by such a force on an arm of 1 mm at least; rotations by
/// a thousandth at least. Columns without a unit (shares, relative errors) are measured by 1 at least, angles in degrees by a right angle.
/// </summary>
public static class TableComparison
{
    private const double ShareOfCarried = 1e-3, ShareOfUnit = 0.1, LeastRotation = 1e-3;

    /// <summary>Columns of convergence.csv that a replay repeats, at the last iteration of each point.</summary>
    private static readonly string[] Followed = ["stage", "point", "retries", "control", "stride", "progress", "load factor", "root", "unstable directions", "guess"];

    /// <summary>Names of the tables of a run.</summary>
    public static IReadOnlyList<string> Tables { get; } = ["grips.csv", "front.csv", "energy.csv", "convergence.csv"];

    /// <summary>The largest difference between a recorded table and another.</summary>
    /// <param name="table">Its name: one of <see cref="Tables"/>.</param>
    /// <param name="recorded">Text of the recorded one.</param>
    /// <param name="got">Text of the other.</param>
    /// <param name="carried">Largest force carried inside in the recorded run [N].</param>
    public static TableDifference Compare(string table, string recorded, string got, double carried)
    {
        if (recorded == got)
            return new TableDifference(0, "the same bytes");
        List<string[]> before = CsvReader.Rows(recorded), after = CsvReader.Rows(got);
        if (table == "convergence.csv")
            (before, after) = (Accepted(before), Accepted(after));
        if (before.Count != after.Count || before.Count < 2)
            return new TableDifference(double.PositiveInfinity, Text($"{after.Count - 1} rows instead of {before.Count - 1}"));
        double[] scales = Scales(before, carried);
        var worst = new TableDifference(0, "");
        for (int column = 0; column < before[0].Length; column++)
        {
            string name = before[0][column];
            int other = Array.IndexOf(after[0], name);
            if (other < 0)
                return new TableDifference(double.PositiveInfinity, $"column '{name}' is missing");
            for (int row = 1; row < before.Count; row++)
            {
                double difference = Difference(before[row][column], after[row][other], scales[column]);
                if (difference > worst.Relative)
                    worst = new TableDifference(difference, Text($"{name}, row {row}: {before[row][column]} became {after[row][other]}"));
            }
        }
        return worst;
    }

    /// <summary>Largest force carried inside [N]: what convergence.csv measures the forces out of balance by.</summary>
    public static double Carried(string convergence)
    {
        List<string[]> rows = CsvReader.Rows(convergence);
        int force = Array.IndexOf(rows[0], "out of balance [N]"), relative = Array.IndexOf(rows[0], "relative");
        double carried = 0;
        foreach (string[] row in rows.Skip(1))
            if (Number(row[force]) is { } f && Number(row[relative]) is > 0 and double share)
                carried = Math.Max(carried, f / share);
        return carried;
    }

    private static double Difference(string before, string after, double scale)
    {
        if (before == after)
            return 0;
        if (Number(before) is not { } a || Number(after) is not { } b || !double.IsFinite(a) || !double.IsFinite(b) || !(scale > 0))
            return double.PositiveInfinity;
        return Math.Abs(a - b) / scale;
    }

    private static double[] Scales(List<string[]> rows, double carried)
    {
        double[] own = [.. rows[0].Select((_, c) => rows.Skip(1).Max(row => Number(row[c]) is { } value && double.IsFinite(value) ? Math.Abs(value) : 0))];
        var scales = new double[own.Length];
        for (int c = 0; c < scales.Length; c++)
        {
            string unit = Unit(rows[0][c]);
            double all = own.Where((_, other) => Unit(rows[0][other]) == unit).Max();
            scales[c] = unit switch
            {
                "N" or "N mm" => Math.Max(all, ShareOfCarried * carried),
                "" => Math.Max(own[c], 1),
                "deg" => Math.Max(own[c], 90),
                "rad" => Math.Max(all, LeastRotation),
                _ => Math.Max(own[c], ShareOfUnit * all),
            };
        }
        return scales;
    }

    /// <summary>The last row of each point that was found, with the columns that a replay repeats.</summary>
    private static List<string[]> Accepted(List<string[]> rows)
    {
        int point = Array.IndexOf(rows[0], "point"), reason = Array.IndexOf(rows[0], "reason");
        int[] columns = [.. Followed.Select(name => Array.IndexOf(rows[0], name)).Where(c => c >= 0)];
        List<string[]> accepted = [[.. columns.Select(c => rows[0][c])]];
        for (int row = 1; row < rows.Count; row++)
            if (rows[row][reason] is IterationReason.Converged or IterationReason.AtFloor && (row + 1 == rows.Count || rows[row + 1][point] != rows[row][point]))
                accepted.Add([.. columns.Select(c => rows[row][c])]);
        return accepted;
    }

    private static string Unit(string column) => column.EndsWith(']') && column.LastIndexOf('[') is >= 0 and int at ? column[(at + 1)..^1] : "";

    private static double? Number(string text) => double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out double value) ? value : null;

    private static string Text(FormattableString text) => FormattableString.Invariant(text);
}
