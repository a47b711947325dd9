using System.Text;

namespace InterfaceFE.Results;

/// <summary>Reads what <see cref="CsvTable"/> writes: RFC 4180, quoted fields included. Rows are lists of fields; an empty line is no row.</summary>
public static class CsvReader
{
    /// <summary>All rows of a text, the header among them.</summary>
    /// <exception cref="FormatException">A quote is left open, or stands within a field without quotes.</exception>
    public static List<string[]> Rows(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        List<string[]> rows = [];
        List<string> row = [];
        StringBuilder field = new();
        bool quoted = false;
        for (int i = 0; i < text.Length; i++)
        {
            char c = text[i];
            if (quoted && c == '"' && i + 1 < text.Length && text[i + 1] == '"')
            {
                field.Append('"');
                i++;
            }
            else if (quoted)
            {
                quoted = c != '"';
                if (quoted)
                    field.Append(c);
            }
            else if (c == '"')
            {
                if (field.Length > 0)
                    throw new FormatException(FormattableString.Invariant($"line {rows.Count + 1} has a quote within a field"));
                quoted = true;
            }
            else if (c == ',')
                EndField();
            else if (c == '\n')
                EndRow();
            else if (c != '\r')
                field.Append(c);
        }
        if (quoted)
            throw new FormatException("the last quote is left open");
        EndRow();
        return rows;

        void EndField()
        {
            row.Add(field.ToString());
            field.Clear();
        }

        void EndRow()
        {
            if (row.Count == 0 && field.Length == 0)
                return;
            EndField();
            rows.Add([.. row]);
            row.Clear();
        }
    }
}
