using System.Globalization;
using System.Text;

namespace InterfaceFE.Decks.Reading;

/// <summary>Something wrong or doubtful in a deck, with its place.</summary>
/// <param name="Place">File, line, column.</param>
/// <param name="Path">Key path, such as <c>layers.tape.peel.toughness</c>; empty for the file as a whole.</param>
/// <param name="Written">The value as written; null where there is none to show.</param>
/// <param name="Message">What is wrong and what would be right.</param>
public sealed record ReadProblem(TextPlace Place, string Path, string? Written, string Message)
{
    private const int LongestShown = 60;
    private const int LongestPath = 160;
    private const int LongestMessage = 1000;

    /// <summary>One line: <c>file:line:column key.path: "value as written" message</c>.</summary>
    public override string ToString()
    {
        StringBuilder line = new(Place.ToString());
        line.Append(Path.Length == 0 ? ":" : Place.Line == 0 ? ": " : " ").Append(Shown(Path, LongestPath));
        if (Path.Length > 0)
            line.Append(':');
        if (!string.IsNullOrWhiteSpace(Written))
            line.Append(CultureInfo.InvariantCulture, $" \"{Shown(Written)}\"");
        return line.Append(' ').Append(Shown(Message, LongestMessage)).ToString();
    }

    /// <summary>Text fit for one line of a message: control characters made visible, long text cut.</summary>
    internal static string Shown(string text, int longest = LongestShown)
    {
        StringBuilder shown = new();
        foreach (char c in text.Length > longest ? text[..(longest - 1)] + "…" : text)
        {
            if (char.IsControl(c) || c is '\u2028' or '\u2029')
                shown.Append(c switch { '\n' => "\\n", '\t' => "\\t", '\r' => "\\r", _ => string.Create(CultureInfo.InvariantCulture, $"\\u{(int)c:x4}") });
            else
                shown.Append(c);
        }
        return shown.ToString();
    }
}
