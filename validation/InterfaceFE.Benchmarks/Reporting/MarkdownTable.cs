using System.Text;

namespace InterfaceFE.Benchmarks.Reporting;

/// <summary>A table in Markdown; the first column is set to the left, the others to the right.</summary>
/// <param name="headings">Headings.</param>
public sealed class MarkdownTable(params string[] headings)
{
    private readonly List<string[]> _rows = [];

    /// <summary>Whether there is no row.</summary>
    public bool IsEmpty => _rows.Count == 0;

    /// <summary>Adds a row.</summary>
    /// <exception cref="ArgumentException">It has another number of cells than there are headings.</exception>
    public void Add(params string[] cells)
    {
        ArgumentNullException.ThrowIfNull(cells);
        if (cells.Length != headings.Length)
            throw new ArgumentException($"a row of {cells.Length} cells under {headings.Length} headings", nameof(cells));
        _rows.Add([.. cells.Select(cell => cell.Replace("|", "\\|", StringComparison.Ordinal))]);
    }

    /// <summary>The table's text, columns padded, one line per row, each ended.</summary>
    public override string ToString()
    {
        int[] width = [.. headings.Select((heading, i) => Math.Max(heading.Length, _rows.Select(row => row[i].Length).DefaultIfEmpty(0).Max()))];
        StringBuilder text = new();
        Append(headings);
        text.Append('|').AppendJoin('|', width.Select((w, i) => i == 0 ? new string('-', w + 2) : new string('-', w + 1) + ':')).Append("|\n");
        foreach (string[] row in _rows)
            Append(row);
        return text.ToString();

        void Append(string[] cells) =>
            text.Append("| ").AppendJoin(" | ", cells.Select((cell, i) => i == 0 ? cell.PadRight(width[i]) : cell.PadLeft(width[i]))).Append(" |\n");
    }
}
