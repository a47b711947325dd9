using System.Globalization;
using System.Text;

namespace InterfaceFE.Reports;

/// <summary>Names that every file system takes, from names in a deck.</summary>
internal static class FileNames
{
    /// <summary>
    /// A name of ASCII letters, digits and single hyphens: accents are dropped (Öse: Ose), other letters become their code (u41a), all else a hyphen. Never empty.
    /// </summary>
    public static string Safe(string name)
    {
        StringBuilder safe = new();
        foreach (char c in name.Replace("ß", "ss", StringComparison.Ordinal).Normalize(NormalizationForm.FormD))
        {
            if (char.IsAsciiLetterOrDigit(c))
                safe.Append(c);
            else if (char.IsLetterOrDigit(c))
                safe.Append(CultureInfo.InvariantCulture, $"u{(int)c:x}");
            else if (CharUnicodeInfo.GetUnicodeCategory(c) != UnicodeCategory.NonSpacingMark && safe.Length > 0 && safe[^1] != '-')
                safe.Append('-');
            if (safe.Length > 80)
                break;
        }
        string text = safe.ToString().Trim('-');
        return text.Length > 0 ? text : "x";
    }

    /// <summary>Safe names for a list, made different from each other (case does not count) by a number at the end.</summary>
    public static string[] Safe(IReadOnlyList<string> names)
    {
        HashSet<string> taken = new(StringComparer.OrdinalIgnoreCase);
        string[] safe = new string[names.Count];
        for (int i = 0; i < names.Count; i++)
        {
            string first = Safe(names[i]), name = first;
            for (int number = 2; !taken.Add(name); number++)
                name = string.Create(CultureInfo.InvariantCulture, $"{first}-{number}");
            safe[i] = name;
        }
        return safe;
    }
}
