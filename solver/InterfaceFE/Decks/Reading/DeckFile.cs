using System.Globalization;
using System.Text;

namespace InterfaceFE.Decks.Reading;

/// <summary>Brings a deck file into memory as text, or says in words why not. Never throws for what is in the file or on the disk.</summary>
internal static class DeckFile
{
    /// <summary>Largest deck [bytes]. A deck is written by hand or by a small script; a larger file is another kind of file.</summary>
    public const int LargestSize = 4 * 1024 * 1024;

    private static readonly UTF8Encoding StrictUtf8 = new(false, true);

    /// <summary>The text of a file; null when it cannot be used, with the reason among the problems.</summary>
    public static string? Load(string path, string shownAs, ProblemList problems)
    {
        TextPlace whole = new(shownAs, 0, 0);
        try
        {
            if (Directory.Exists(path))
            {
                problems.Add(whole, "", null, "is a folder; a deck is a file, for example deck.yaml in it");
                return null;
            }
            if (!File.Exists(path))
            {
                problems.Add(whole, "", null, "there is no such file" + Near(path));
                return null;
            }
            byte[]? bytes = ReadLimited(path);
            if (bytes is not null)
                return Decode(bytes, shownAs, problems);
            problems.Add(whole, "", null, string.Create(CultureInfo.InvariantCulture, $"is larger than {LargestSize / 1024 / 1024} MB and is not read; a deck is a short text"));
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException or ArgumentException or NotSupportedException)
        {
            problems.Add(whole, "", null, "cannot be read: " + ReadProblem.Shown(e is UnauthorizedAccessException ? "no permission" : e.Message));
        }
        return null;
    }

    /// <summary>Turns bytes into text and refuses what is no plain UTF-8 text.</summary>
    public static string? Decode(ReadOnlySpan<byte> bytes, string shownAs, ProblemList problems)
    {
        if (bytes.StartsWith((ReadOnlySpan<byte>)[0xEF, 0xBB, 0xBF]))
            bytes = bytes[3..];
        if (bytes.StartsWith((ReadOnlySpan<byte>)[0xFF, 0xFE]) || bytes.StartsWith((ReadOnlySpan<byte>)[0xFE, 0xFF]))
        {
            problems.Add(new TextPlace(shownAs, 1, 1), "", null, "the file is in UTF-16; save it as UTF-8");
            return null;
        }
        string text;
        try
        {
            text = StrictUtf8.GetString(bytes);
        }
        catch (DecoderFallbackException e)
        {
            problems.Add(PlaceOfByte(bytes, e.Index, shownAs), "", null, "the file is not in UTF-8 from here on (an old code page, perhaps, at a sign such as ° or µ); save it as UTF-8");
            return null;
        }
        return CheckSigns(text, shownAs, problems) ? text : null;
    }

    private static byte[]? ReadLimited(string path)
    {
        using FileStream stream = new(path, FileMode.Open, FileAccess.Read, FileShare.ReadWrite);
        byte[] buffer = new byte[LargestSize + 1];
        int length = stream.ReadAtLeast(buffer, buffer.Length, throwOnEndOfStream: false);
        return length > LargestSize ? null : buffer[..length];
    }

    private static bool CheckSigns(string text, string shownAs, ProblemList problems)
    {
        if (string.IsNullOrWhiteSpace(text))
        {
            problems.Add(new TextPlace(shownAs, 1, 1), "", null, "the file is empty; a deck starts with its title");
            return false;
        }
        int line = 1;
        int start = 0;
        bool good = true;
        bool inIndent = true;
        for (int i = 0; i < text.Length && good; i++)
        {
            char c = text[i];
            if (c == '\n')
            {
                (line, start, inIndent) = (line + 1, i + 1, true);
                continue;
            }
            TextPlace place = new(shownAs, line, i - start + 1);
            if (c == '\t' && inIndent && !IsBlankLine(text, i))
            {
                problems.Add(place, "", null, "a tab stands at the start of the line; indent with spaces");
                good = false;
            }
            else if (char.IsControl(c) && c is not ('\t' or '\r' or '\u0085'))
            {
                problems.Add(place, "", null, string.Create(CultureInfo.InvariantCulture, $"the file holds the control character {(int)c}; it is no plain text"));
                good = false;
            }
            inIndent &= c == ' ';
        }
        return good;
    }

    private static bool IsBlankLine(string text, int at)
    {
        while (at < text.Length && text[at] is ' ' or '\t' or '\r')
            at++;
        return at == text.Length || text[at] is '\n' or '#';
    }

    private static TextPlace PlaceOfByte(ReadOnlySpan<byte> bytes, int index, string shownAs)
    {
        ReadOnlySpan<byte> before = bytes[..Math.Clamp(index, 0, bytes.Length)];
        int line = 1 + before.Count((byte)'\n');
        int lineStart = before.LastIndexOf((byte)'\n') + 1;
        return new TextPlace(shownAs, line, StrictUtf8.GetCharCount(before[lineStart..]) + 1);
    }

    private static string Near(string path)
    {
        string? folder = Path.GetDirectoryName(Path.GetFullPath(path));
        if (folder is null || !Directory.Exists(folder))
            return "";
        string? near = Units.NearestText.Find(Path.GetFileName(path), Directory.EnumerateFiles(folder).Take(1000).Select(f => Path.GetFileName(f)!).Order(StringComparer.Ordinal));
        return near is null ? "" : $"; nearest file {near}";
    }
}
