using System.Globalization;

namespace InterfaceFE.Geometry;

/// <summary>Texts with numbers in the invariant culture.</summary>
internal static class Text
{
    /// <summary>The interpolated text, whatever the machine's culture.</summary>
    public static string Of(FormattableString text) => text.ToString(CultureInfo.InvariantCulture);
}
