using System.Globalization;
using System.Text;

namespace InterfaceFE.Results;

/// <summary>
/// A table of comma-separated values as RFC 4180 has it: UTF-8 without byte order mark, one header line, lines ended by CR LF, fields with a comma, a quote or a
/// line break put in quotes and their quotes doubled. Numbers are written in the invariant culture with the fewest digits that read back to the same double;
/// null is an empty field. Each row reaches the file before <see cref="EndRow"/> returns, so an interrupted run keeps its rows. Not safe for several threads.
/// </summary>
public sealed class CsvTable : IDisposable
{
    private const string LineEnd = "\r\n";

    private readonly TextWriter _writer;
    private readonly StringBuilder _line = new();
    private readonly int _columns;
    private int _filled;

    /// <summary>Creates the file (an existing one is replaced) and writes the header line.</summary>
    /// <param name="path">File; its folder must exist.</param>
    /// <param name="header">Names of the columns, at least one.</param>
    public CsvTable(string path, IReadOnlyList<string> header)
        : this(Open(path), header)
    {
    }

    /// <summary>Writes to a writer, which is closed with the table. The header line is written at once.</summary>
    /// <param name="writer">Where the table goes.</param>
    /// <param name="header">Names of the columns, at least one.</param>
    /// <exception cref="ArgumentException">There is no column.</exception>
    public CsvTable(TextWriter writer, IReadOnlyList<string> header)
    {
        ArgumentNullException.ThrowIfNull(writer);
        ArgumentNullException.ThrowIfNull(header);
        if (header.Count == 0)
            throw new ArgumentException("a table needs at least one column", nameof(header));
        _writer = writer;
        _columns = header.Count;
        foreach (string name in header)
            Add(name);
        EndRow();
    }

    /// <summary>Adds a text field; null is an empty field.</summary>
    /// <returns>The table, so that fields can be chained.</returns>
    /// <exception cref="InvalidOperationException">The row is full already.</exception>
    public CsvTable Add(string? text)
    {
        StartField();
        if (text is null)
            return this;
        if (text.AsSpan().IndexOfAny(",\"\r\n") < 0)
            _line.Append(text);
        else
            _line.Append('"').Append(text.Replace("\"", "\"\"", StringComparison.Ordinal)).Append('"');
        return this;
    }

    /// <summary>Adds a number; null is an empty field. Minus zero is written 0; a value that is not finite is written in words (NaN, Infinity), never hidden.</summary>
    /// <returns>The table, so that fields can be chained.</returns>
    /// <exception cref="InvalidOperationException">The row is full already.</exception>
    public CsvTable Add(double? value)
    {
        StartField();
        if (value is { } number)
            _line.Append(Number(number));
        return this;
    }

    /// <summary>Adds a whole number.</summary>
    /// <returns>The table, so that fields can be chained.</returns>
    /// <exception cref="InvalidOperationException">The row is full already.</exception>
    public CsvTable Add(int value)
    {
        StartField();
        _line.Append(CultureInfo.InvariantCulture, $"{value}");
        return this;
    }

    /// <summary>Ends the row and hands it to the file.</summary>
    /// <exception cref="InvalidOperationException">The row has too few fields.</exception>
    public void EndRow()
    {
        if (_filled != _columns)
            throw new InvalidOperationException(string.Create(CultureInfo.InvariantCulture, $"the row has {_filled} fields, the table {_columns} columns"));
        _line.Append(LineEnd);
        _writer.Write(_line);
        _writer.Flush();
        _line.Clear();
        _filled = 0;
    }

    /// <inheritdoc/>
    public void Dispose() => _writer.Dispose();

    /// <summary>The fewest digits that read back to the same double; minus zero as 0.</summary>
    internal static string Number(double value) => (value + 0.0).ToString("R", CultureInfo.InvariantCulture);

    private static StreamWriter Open(string path) =>
        new(new FileStream(path, FileMode.Create, FileAccess.Write, FileShare.ReadWrite), new UTF8Encoding(encoderShouldEmitUTF8Identifier: false));

    private void StartField()
    {
        if (_filled == _columns)
            throw new InvalidOperationException(string.Create(CultureInfo.InvariantCulture, $"the row is full: the table has {_columns} columns"));
        if (_filled++ > 0)
            _line.Append(',');
    }
}
