using System.Globalization;
using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>A layer: its two curves, how they mix, and whether its numbers are plausible.</summary>
internal static class LayerChecks
{
    private const double LeastPower = 0.5;

    /// <summary>Peel stiffness of a layer of this bulk [MPa/mm]: confined E(1-nu)/((1+nu)(1-2nu))/t, unconfined E/t.</summary>
    public static double PeelStiffness(BulkDeck bulk, double thickness)
    {
        double nu = bulk.Poisson;
        double modulus = bulk.BetweenFaces == Confinement.Confined ? bulk.Young * (1 - nu) / ((1 + nu) * (1 - 2 * nu)) : bulk.Young;
        return modulus / thickness;
    }

    /// <summary>Shear stiffness of a layer of this bulk [MPa/mm]: G/t.</summary>
    public static double ShearStiffness(BulkDeck bulk, double thickness) => bulk.Young / (2 * (1 + bulk.Poisson)) / thickness;

    /// <summary>Checks a layer.</summary>
    public static void Run(LayerDeck layer, string path, ReadContext context)
    {
        CurveFigures peel = layer.Peel is null ? CurveFigures.Unknown : new CurveChecks(layer.Peel, layer, path, true, context).Run();
        CurveFigures shear = layer.Shear is null ? CurveFigures.Unknown : new CurveChecks(layer.Shear, layer, path, false, context).Run();
        if (context.IsSound(path + ".mixing"))
        {
            if (layer.Mixing == Mixing.CoupledPotential)
                CheckPotential(layer, path, context);
            else if (layer.Mixing == Mixing.IndependentModes)
                CheckIndependentModes(layer, peel, shear, path, context);
            else
                CheckSingleDamage(layer, path, context);
        }
        if (layer.Cavities is { } cavities)
            CheckCavities(layer, cavities, peel, path, context);
        if (layer.Relaxation is { } relaxation)
            RelaxationChecks.Run(layer, relaxation, path, context);
        LayerRanges.Run(layer, peel, shear, path, context);
    }

    private static void CheckIndependentModes(LayerDeck layer, CurveFigures peel, CurveFigures shear, string path, ReadContext context)
    {
        if (context.IsGiven(path + ".exponent"))
            context.Fail(path + ".exponent", "does not apply to independent modes; it belongs to benzeggagh-kenane and the power law");
        foreach ((CurveDeck? curve, string mode) in ((CurveDeck?, string)[])[(layer.Peel, ".peel"), (layer.Shear, ".shear")])
            if (curve is { Law: CurveShape.Potential } && context.IsSound(path + mode + ".law"))
                context.Fail(path + mode + ".law", "belongs to the mixing coupled potential; independent modes take every other law");
        CheckRelease(layer, peel, "peel", path, context);
        CheckRelease(layer, shear, "shear", path, context);
    }

    // Release branch, item 9: the criterion must still be below 1 where a curve reaches its strength, else the layer would let go before it has carried it.
    private static void CheckRelease(LayerDeck layer, CurveFigures curve, string mode, string path, ReadContext context)
    {
        double criterion = curve.CriterionAtStrength(layer.ReleaseLength);
        double atOnce = curve.AreaToPeak / curve.Toughness;
        // A curve that cannot fall at all has been reported as such.
        if (!(criterion >= 1) || !(atOnce < 1))
            return;
        string at = context.IsGiven(path + ".release length") ? path + ".release length" : $"{path}.{mode}";
        double largest = (1 - atOnce) * curve.Toughness * 2 / (curve.Strength * curve.Final);
        context.Fail(at, string.Create(CultureInfo.InvariantCulture, $"with a release length of {layer.ReleaseLength} the layer would let go before the {mode} curve reaches its strength (energy criterion {NumberText.Rounded(criterion, 4)} there, must be below 1); this curve needs a release length below {NumberText.Rounded(largest, 3)}"));
    }

    private static void CheckCavities(LayerDeck layer, CavitiesDeck cavities, CurveFigures peel, string path, ReadContext context)
    {
        string at = path + ".cavities";
        if (context.IsSound(path + ".mixing") && layer.Mixing != Mixing.IndependentModes)
            context.Fail(at, "belongs to the mixing independent modes: the other mixings have no peel curve of their own that pressure could change");
        if (layer.MeasuredAt?.Pressure is null && !context.IsGiven(path + ".measured at.pressure"))
            context.FailAt(context.Find(at, out _).Key, path + ".measured at.pressure", "is missing; `cavities` needs the pressure at which the peel curve was measured, for example measured at: {pressure: 1.013 bar}");
        if (cavities.Opening is not { } w || cavities.Share is not { } share || w.Any(double.IsNaN) || share.Any(double.IsNaN))
            return;
        if (w.Count != share.Count)
        {
            context.Fail(at + ".share", string.Create(CultureInfo.InvariantCulture, $"has {share.Count} entries, but `opening` has {w.Count}; each opening needs its share"));
            return;
        }
        for (int i = 1; i < w.Count; i++)
            if (w[i] <= w[i - 1])
                context.Fail(ReadContext.Join(at + ".opening", i + 1), "must be greater than the entry before it");
        foreach (int end in (int[])[0, share.Count - 1])
            if (share[end] != 0)
                context.Fail(ReadContext.Join(at + ".share", end + 1), "must be 0: the first point is where cavities begin, the last where they are vented");
        if (w[0] <= 0)
            context.Fail(ReadContext.Join(at + ".opening", 1), "must be greater than 0 mm: cavities begin in a layer that has opened");
        if (w[^1] > peel.Final)
            context.Fail(ReadContext.Join(at + ".opening", w.Count), string.Create(CultureInfo.InvariantCulture, $"lies beyond the final separation of the peel curve, {NumberText.Rounded(peel.Final, 4)} mm: by then all cavities are vented"));
    }

    private static void CheckSingleDamage(LayerDeck layer, string path, ReadContext context)
    {
        string word = DeckShape.WordsOf(typeof(Mixing)).First(w => w.Value.Equals(layer.Mixing)).Text;
        if (!context.IsGiven(path + ".exponent"))
            context.FailAt(context.Find(path, out _).Key, path + ".exponent", $"is missing; {word} needs it, for example exponent: {(layer.Mixing == Mixing.PowerLaw ? "1" : "2.1")}");
        else if (layer.Mixing == Mixing.PowerLaw && layer.Exponent < LeastPower)
            context.Fail(path + ".exponent", string.Create(CultureInfo.InvariantCulture, $"must be at least {LeastPower} with the power law: below, tractions would change at an infinite rate next to pure peel and pure shear"));
        foreach ((CurveDeck? curve, string mode) in ((CurveDeck?, string)[])[(layer.Peel, ".peel"), (layer.Shear, ".shear")])
            if (curve is not null && context.IsSound(path + mode + ".law") && curve.Law != CurveShape.Bilinear)
                context.Fail(path + mode + ".law", $"must be bilinear with the mixing {word}");
        RefuseCriterionKeys(word, path, context);
    }

    private static void CheckPotential(LayerDeck layer, string path, ReadContext context)
    {
        foreach ((CurveDeck? curve, string mode) in ((CurveDeck?, string)[])[(layer.Peel, ".peel"), (layer.Shear, ".shear")])
            if (curve is not null && context.IsSound(path + mode + ".law") && curve.Law != CurveShape.Potential)
                context.Fail(path + mode + ".law", "must be potential with the mixing coupled potential");
        if (context.IsGiven(path + ".exponent"))
            context.Fail(path + ".exponent", "does not apply to coupled potential; there each of `peel` and `shear` has its own `exponent`");
        RefuseCriterionKeys("coupled potential", path, context);
    }

    private static void RefuseCriterionKeys(string word, string path, ReadContext context)
    {
        foreach (string mode in (string[])[".peel", ".shear"])
            if (context.IsGiven(path + mode + ".plastic share"))
                context.Fail(path + mode + ".plastic share", $"does not apply to {word}, which unloads to the origin; it belongs to independent modes");
        foreach (string key in (string[])["counted by", "release length"])
            if (context.IsGiven(ReadContext.Join(path, key)))
                context.Fail(ReadContext.Join(path, key), $"does not apply to {word}; it belongs to independent modes");
    }
}
