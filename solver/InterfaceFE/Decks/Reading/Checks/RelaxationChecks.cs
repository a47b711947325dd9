using System.Globalization;

namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>Relaxation of a layer: shares and times that belong together, and what its shift needs and takes.</summary>
internal static class RelaxationChecks
{
    private const double RoundOff = 1e-12;

    /// <summary>Checks the block.</summary>
    public static void Run(LayerDeck layer, RelaxationDeck relaxation, string layerPath, ReadContext context)
    {
        string path = layerPath + ".relaxation";
        if (relaxation is { Share: { } share, Time: { } time })
        {
            if (share.Count != time.Count)
                context.Fail(path + ".time", string.Create(CultureInfo.InvariantCulture, $"has {time.Count} entries, but `share` has {share.Count}; each share needs its time"));
            if (share.Sum() > 1 + RoundOff)
                context.Fail(path + ".share", string.Create(CultureInfo.InvariantCulture, $"sums to {share.Sum():G6}; no more than 1, all of the traction, can fade"));
        }
        if (layer.Peel?.PlasticShare > 0 || layer.Shear?.PlasticShare > 0)
            context.Fail(path, "does not go with a plastic share: what relaxes is a law that unloads to the origin");
        if (context.IsGiven(path + ".shift") && !context.IsSound(path + ".shift"))
            return;
        string word = DeckShape.WordsOf(typeof(ShiftLaw)).First(w => w.Value.Equals(relaxation.Shift)).Text;
        Key("reference", relaxation.Shift != ShiftLaw.None, "23 °C");
        Key("c1", relaxation.Shift == ShiftLaw.Wlf, "17.4");
        Key("c2", relaxation.Shift == ShiftLaw.Wlf, "51.6 K");
        Key("activation", relaxation.Shift == ShiftLaw.Arrhenius, "9600 K");

        void Key(string key, bool needed, string example)
        {
            string at = ReadContext.Join(path, key);
            if (needed && !context.IsGiven(at))
                context.FailAt(context.Find(path, out _).Key, at, $"is missing; the shift {word} needs it, for example {key}: {example}");
            else if (!needed && context.IsGiven(at))
                context.Fail(at, $"does not apply to the shift {word}");
        }
    }
}
