namespace InterfaceFE.Reports;

/// <summary>Colours, dashes and markers of figures; each curve style differs in all three, so that it reads in grey.</summary>
internal static class Style
{
    public const uint Ink = 0x1F2328;
    public const uint Grey = 0x5A6068;
    public const uint PaleLine = 0xE3E5E8;
    public const uint IntactLayer = 0xD5D5D2;
    public const uint SofteningLayer = 0xD9A441;
    public const uint NeverBonded = 0xDCE6EE;

    /// <summary>Colours of curves, readable by colour-blind people (Okabe and Ito's set): blue, vermilion, green, purple, black.</summary>
    public static readonly uint[] Curves = [0x0072B2, 0xD55E00, 0x009E73, 0xCC79A7, 0x000000];

    /// <summary>Dashes of curves in pixels, drawn and left out in turn; empty is a full line.</summary>
    public static readonly float[][] Dashes = [[], [9, 4], [2.5f, 3], [9, 3, 2, 3], [15, 4]];

    /// <summary>Pale tints of adherends.</summary>
    public static readonly uint[] Tints = [0xCFE3F1, 0xF6DFC9, 0xCDE8DE, 0xF0DEE9, 0xE6E6E2, 0xFBF0C4];

    /// <summary>Colour of a curve.</summary>
    public static uint Colour(int style) => Curves[style % Curves.Length];

    /// <summary>Index of dash and marker; past the fifth style they move on against the colours, so that 25 styles differ.</summary>
    public static int Form(int style) => (style + style / Curves.Length) % Dashes.Length;
}
