using System.Globalization;
using InterfaceFE.Marching;

namespace InterfaceFE.Results;

/// <summary>A record that cannot be replayed; the message says what is wrong with it.</summary>
/// <param name="message">What is wrong.</param>
public sealed class ReplayException(string message) : Exception(message);

/// <summary>Reads from convergence.csv what a replay needs: for each point the searches that found it. Searches that failed or were refused are left out.</summary>
public static class ReplayReader
{
    /// <summary>Reads the text of a convergence.csv. A last row that breaks off, as a killed run may leave it, is left out.</summary>
    /// <exception cref="ReplayException">The text is no such table, or not that of one run.</exception>
    public static ReplayPlan Read(string text)
    {
        List<Row> rows = Rows(text);
        List<RecordedPoint> points = [];
        for (int first = 0; first < rows.Count;)
        {
            int end = first + 1;
            while (end < rows.Count && rows[end].Stage == rows[first].Stage && rows[end].Point == rows[first].Point)
                end++;
            if (Point(rows[first..end]) is { } point)
                points.Add(point);
            else if (end < rows.Count)
                throw new ReplayException($"point {Whole(rows[first].Point)} was not found in this run, and yet others follow it");
            first = end;
        }
        if (points.Count == 0)
            throw new ReplayException("it holds no point");
        try
        {
            return new ReplayPlan(points);
        }
        catch (ArgumentException e)
        {
            throw new ReplayException(e.Message);
        }
    }

    /// <summary>The point whose rows are given; null when its last search did not find it.</summary>
    private static RecordedPoint? Point(List<Row> rows)
    {
        Row last = rows[^1];
        if (last.Reason is not (IterationReason.Converged or IterationReason.AtFloor))
            return null;
        if (last.Root != 0)
            throw new ReplayException($"point {Whole(last.Point)} took root {Whole(last.Root)} of its control equation; this version knows controls with one root only");
        List<RecordedSearch> searches = [Search(last)];
        int before = rows.FindLastIndex(row => row.Iteration == 0) - 1;
        if (before >= 0 && rows[before].Reason == IterationReason.PastEnd && rows[before].Retries == last.Retries)
            searches.Insert(0, Search(rows[before]));
        return new RecordedPoint(last.Stage, last.Point, last.Retries, searches);
    }

    private static RecordedSearch Search(Row end) => new(end.Control, end.Stride, end.Guess, end.Progress, end.Iteration, end.Relative);

    private static List<Row> Rows(string text)
    {
        List<string[]> table;
        try
        {
            table = CsvReader.Rows(text);
        }
        catch (FormatException e)
        {
            throw new ReplayException(e.Message);
        }
        string[] missing = table.Count == 0 ? ConvergenceTable.Header : [.. ConvergenceTable.Header.Except(table[0])];
        if (missing.Length == ConvergenceTable.Header.Length)
            throw new ReplayException("it is no convergence.csv");
        if (missing.Length > 0)
            throw new ReplayException($"it is no convergence.csv of this version: it has no column '{missing[0]}'");
        int[] column = [.. ConvergenceTable.Header.Select(name => Array.IndexOf(table[0], name))];
        bool breaksOff = !text.EndsWith('\n');
        List<Row> rows = [];
        for (int i = 1; i < table.Count - (breaksOff ? 1 : 0); i++)
        {
            string[] fields = table[i];
            if (fields.Length != table[0].Length)
                throw new ReplayException($"row {Whole(i + 1)} has {Whole(fields.Length)} fields, the table {Whole(table[0].Length)} columns");
            rows.Add(new Row(Integer("stage"), Integer("point"), Integer("retries"), Integer("iteration"), Field("control"), Number("stride"), Number("progress"), Integer("root"), Number("relative"), Field("reason"), Number("guess")));

            string Field(string name) => fields[column[Array.IndexOf(ConvergenceTable.Header, name)]];

            int Integer(string name) => int.TryParse(Field(name), NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out int value) ? value : throw Wrong(name, "a whole number");

            double Number(string name) => double.TryParse(Field(name), NumberStyles.Float, CultureInfo.InvariantCulture, out double value) ? value : throw Wrong(name, "a number");

            ReplayException Wrong(string name, string what) => new($"row {Whole(i + 1)}, column '{name}': '{Field(name)}' is not {what}");
        }
        return rows;
    }

    private static string Whole(int value) => value.ToString(CultureInfo.InvariantCulture);

    private sealed record Row(int Stage, int Point, int Retries, int Iteration, string Control, double Stride, double Progress, int Root, double Relative, string Reason, double Guess);
}
