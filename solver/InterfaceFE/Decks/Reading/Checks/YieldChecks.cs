using System.Globalization;
using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>A yield curve: its two tables, and whether the rest of the deck can use it.</summary>
internal static class YieldChecks
{
    /// <summary>Yield stress over Young's modulus above which a number looks wrong: the strongest steels and aluminium alloys reach about 0.01. Common practice, no source.</summary>
    private const double UnusualStrain = 0.05;

    /// <summary>Checks the yield curve of a material.</summary>
    /// <param name="deck">The deck.</param>
    /// <param name="name">Name of the material.</param>
    /// <param name="material">The material.</param>
    /// <param name="curve">Its yield curve.</param>
    /// <param name="context">Where problems go.</param>
    public static void Run(Deck deck, string name, MaterialDeck material, YieldCurveDeck curve, ReadContext context)
    {
        string path = $"materials.{name}", at = path + ".yield curve";
        if (context.IsGiven(path + ".young.x") || context.IsGiven(path + ".poisson.xy"))
            context.Fail(at, "needs an isotropic material, with one number each for young and poisson");
        if (CheckPairs(curve.PlasticStrain, "plastic strain", curve.Stress, "stress", at, context))
            CheckCurve(material, curve, at, context);
        CheckShares(curve, at, context);
        if (!DeckChecks.Entries(deck.Adherends).Any(adherend => adherend.Value.Of == name))
            return;
        if (deck.Model is { Elements: ElementKind.FourNode })
            context.Fail("model.elements", $"must be eight-node: {name} has a yield curve, and four-node elements cannot yield");
        if (curve.Temperature is { } temperatures && curve.ShareOfStress is not null)
            CheckRange(deck, temperatures, at, context);
    }

    private static void CheckCurve(MaterialDeck material, YieldCurveDeck curve, string at, ReadContext context)
    {
        if (curve.PlasticStrain[0] > 0)
            context.Fail(Entry(at, "plastic strain", 0), "the table starts at plastic strain 0, where yielding begins");
        for (int i = 1; i < curve.PlasticStrain.Count; i++)
        {
            if (curve.PlasticStrain[i] <= curve.PlasticStrain[i - 1])
                context.Fail(Entry(at, "plastic strain", i), string.Create(CultureInfo.InvariantCulture, $"must be greater than the entry before it ({curve.PlasticStrain[i - 1]})"));
            if (curve.Stress[i] < curve.Stress[i - 1])
                context.Fail(Entry(at, "stress", i), $"must not be less than the entry before it ({QuantityText.Write(curve.Stress[i - 1], Dimension.Stress)}): a metal that softens has no single answer in a mesh; give true stress, not force over the first cross-section");
        }
        if (curve.Stress[0] > UnusualStrain * material.Young.X)
            context.Warn(Entry(at, "stress", 0), "is unusually high against young: look at the units");
    }

    private static void CheckShares(YieldCurveDeck curve, string at, ReadContext context)
    {
        string temperature = at + ".temperature", share = at + ".share of stress";
        bool hasTemperature = context.IsGiven(temperature), hasShare = context.IsGiven(share);
        if (hasTemperature != hasShare)
        {
            context.Fail(hasTemperature ? temperature : share, hasTemperature ? "needs `share of stress`, one for each temperature" : "needs `temperature`, one for each share");
            return;
        }
        if (curve.Temperature is null || curve.ShareOfStress is null || !CheckPairs(curve.Temperature, "temperature", curve.ShareOfStress, "share of stress", at, context))
            return;
        for (int i = 1; i < curve.Temperature.Count; i++)
            if (curve.Temperature[i] <= curve.Temperature[i - 1])
                context.Fail(Entry(at, "temperature", i), $"must be greater than the entry before it ({QuantityText.Write(curve.Temperature[i - 1], Dimension.Temperature)})");
    }

    /// <summary>Nothing is extrapolated: the temperatures of the sequence must lie within the table.</summary>
    private static void CheckRange(Deck deck, IReadOnlyList<double> temperatures, string at, ReadContext context)
    {
        List<double> met = [deck.StressFreeTemperature];
        foreach (StageDeck stage in deck.Sequence?.Where(s => s is not null) ?? [])
            met.AddRange(((ReadOnlySpan<double?>)[stage.CoolTo, stage.HeatTo]).ToArray().Where(t => t is not null).Select(t => t!.Value));
        if (met.FindIndex(t => t < temperatures[0] || t > temperatures[^1]) is >= 0 and var outside)
            context.Fail(at + ".temperature", $"must span all temperatures of the deck; {QuantityText.Write(met[outside], Dimension.Temperature)} lies outside, and yield stress is not extrapolated");
    }

    /// <summary>Whether two lists belong together entry by entry and can be used.</summary>
    private static bool CheckPairs(IReadOnlyList<double>? first, string firstName, IReadOnlyList<double>? second, string secondName, string at, ReadContext context)
    {
        if (first is null || second is null || first.Concat(second).Any(double.IsNaN))
            return false;
        if (first.Count == second.Count)
            return true;
        context.Fail(ReadContext.Join(at, secondName), string.Create(CultureInfo.InvariantCulture, $"has {second.Count} {(second.Count == 1 ? "entry" : "entries")}, but `{firstName}` has {first.Count}; they belong together one by one"));
        return false;
    }

    private static string Entry(string at, string list, int index) => ReadContext.Join(ReadContext.Join(at, list), index + 1);
}
