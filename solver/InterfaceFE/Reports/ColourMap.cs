namespace InterfaceFE.Reports;

/// <summary>
/// A continuous colour map over 0 to 1, linear between control colours in sRGB. Batlow and vik are by F. Crameri, Scientific colour maps 7.0.1, doi 10.5281/zenodo.5501399
/// (MIT licence, text in Colours/LICENSE-batlow-vik.txt): 33 even places of the published 256 colours, which this interpolates within 3 of 255 of any channel. They
/// read in grey and for colour-blind people.
/// </summary>
public sealed class ColourMap
{
    private readonly uint[] _colours;

    private ColourMap(params uint[] colours) => _colours = colours;

    /// <summary>For magnitudes: dark blue over green and ochre to pale pink.</summary>
    public static ColourMap Batlow { get; } = new(
        0x011959, 0x08255B, 0x0D315D, 0x0F3B5F, 0x114360, 0x134B61, 0x175262, 0x1B5962, 0x226061, 0x2B655E, 0x356A59, 0x406F53, 0x4D734D, 0x597745, 0x667B3E, 0x747E38,
        0x828232, 0x90862D, 0xA0892B, 0xB08D2E, 0xBF9035, 0xCE923F, 0xDC954C, 0xE8985B, 0xF19D6B, 0xF8A27E, 0xFCA891, 0xFDAEA2, 0xFDB4B4, 0xFDBAC4, 0xFCBFD6, 0xFBC6E8,
        0xFACCFA);

    /// <summary>For signed values and temperature: blue over near-white to red-brown.</summary>
    public static ColourMap Vik { get; } = new(
        0x001261, 0x021F69, 0x022B71, 0x023779, 0x034481, 0x055189, 0x0C5E92, 0x1B6D9C, 0x2F7DA6, 0x478CB1, 0x609DBC, 0x79ADC7, 0x92BDD2, 0xACCCDD, 0xC5DBE6, 0xDDE6E9,
        0xECE5E0, 0xEEDACF, 0xE9CBB9, 0xE3BBA4, 0xDCAB8F, 0xD69C7B, 0xCF8D67, 0xC97F55, 0xC37243, 0xBD6431, 0xB3531F, 0xA5400F, 0x942F06, 0x832106, 0x741506, 0x670A07,
        0x590008);

    /// <summary>Shade of damage below 1: pale grey where intact, deepening ochre while the layer softens.</summary>
    public static ColourMap Softening { get; } = new(0xE4E4E2, 0xE3C896, 0xD9A441, 0xB97B1E, 0x8A560F);

    /// <summary>Control colours 0xRRGGBB at even places from 0 to 1.</summary>
    internal ReadOnlySpan<uint> Colours => _colours;

    /// <summary>Colour 0xRRGGBB at a place; places outside 0 to 1 take the end's colour, NaN the first.</summary>
    public uint At(double place)
    {
        double scaled = (place > 0 ? Math.Min(place, 1) : 0) * (_colours.Length - 1);
        int below = Math.Min((int)scaled, _colours.Length - 2);
        double share = scaled - below;
        return Mix(16) | Mix(8) | Mix(0);

        uint Mix(int shift)
        {
            double from = (_colours[below] >> shift) & 0xFF, to = (_colours[below + 1] >> shift) & 0xFF;
            return (uint)Math.Round(from + share * (to - from)) << shift;
        }
    }
}
