using System.Globalization;
using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>
/// Warnings for values of a layer outside the range that adhesives, tapes and laminates are known to have: most are slips of a unit. The bands are wide common
/// practice around published adhesives (Campilho et al., Int. J. Adhes. Adhes. 44 (2013) 48-56, among them; outer bounds: no source).
/// </summary>
internal static class LayerRanges
{
    private const double StiffnessFactor = 5;
    private const double SensitivePoisson = 0.45;

    /// <summary>Warns where a value is out of the common range.</summary>
    public static void Run(LayerDeck layer, CurveFigures peel, CurveFigures shear, string path, ReadContext context)
    {
        Band(layer.Thickness, 0.02, 15, "mm", "thickness of a bond", path + ".thickness", context);
        Band(peel.Toughness, 0.02, 20, "kJ/m^2", "toughness in peel", Toughness(path + ".peel", context), context);
        Band(shear.Toughness, 0.05, 50, "kJ/m^2", "toughness in shear", Toughness(path + ".shear", context), context);
        Band(peel.Strength, 0.05, 150, "MPa", "strength in peel", Strength(path + ".peel", context), context);
        Band(shear.Strength, 0.05, 100, "MPa", "strength in shear", Strength(path + ".shear", context), context);
        double ratio = shear.Toughness / peel.Toughness;
        if (ratio is < 0.5 or > 20)
            context.Warn(Toughness(path + ".shear", context), string.Create(CultureInfo.InvariantCulture, $"the toughness in shear is {NumberText.Rounded(ratio, 3)} times that in peel; common are 0.5 to 20"));
        Fall(peel, path + ".peel", context);
        Fall(shear, path + ".shear", context);
        if (layer.Bulk is { } bulk)
            CompareWithBulk(layer, bulk, peel, shear, path, context);
    }

    private static void CompareWithBulk(LayerDeck layer, BulkDeck bulk, CurveFigures peel, CurveFigures shear, string path, ReadContext context)
    {
        if (bulk.BetweenFaces == Confinement.Confined && bulk.Poisson > SensitivePoisson)
        {
            double nu = bulk.Poisson;
            double factor = (1 - nu) / ((1 + nu) * (1 - 2 * nu));
            context.Warn(path + ".bulk.poisson", string.Create(CultureInfo.InvariantCulture, $"above {SensitivePoisson} the confined stiffness hangs on the last digit of it (now {NumberText.Rounded(factor, 3)} times young); a measured stiffness is better"));
        }
        Compare(peel.Stiffness, LayerChecks.PeelStiffness(bulk, layer.Thickness), "peel", path, context);
        Compare(shear.Stiffness, LayerChecks.ShearStiffness(bulk, layer.Thickness), "shear", path, context);
    }

    private static void Compare(double given, double fromBulk, string mode, string path, ReadContext context)
    {
        double ratio = given / fromBulk;
        string at = $"{path}.{mode}.stiffness";
        if (ratio is > StiffnessFactor or < 1 / StiffnessFactor)
            context.Warn(context.IsGiven(at) ? at : $"{path}.{mode}", string.Create(CultureInfo.InvariantCulture, $"the stiffness {NumberText.Rounded(given, 4)} MPa/mm is {NumberText.Rounded(ratio, 3)} times what `bulk` and the thickness give ({NumberText.Rounded(fromBulk, 4)} MPa/mm)"));
    }

    private static void Fall(CurveFigures curve, string path, ReadContext context)
    {
        if (curve.Final > curve.ElasticLimit && curve.Final < 2 * curve.ElasticLimit)
            context.Warn(Toughness(path, context), string.Create(CultureInfo.InvariantCulture, $"the curve falls very steeply: its final separation {NumberText.Rounded(curve.Final, 4)} mm is less than twice its elastic limit {NumberText.Rounded(curve.ElasticLimit, 4)} mm; the run may need many points"));
    }

    private static void Band(double value, double least, double most, string unit, string what, string path, ReadContext context)
    {
        if (value < least || value > most)
            context.Warn(path, string.Create(CultureInfo.InvariantCulture, $"a {what} of {NumberText.Rounded(value, 4)} {unit} is unusual; common are {least} to {most} {unit}"));
    }

    private static string Toughness(string path, ReadContext context) => context.IsGiven(path + ".toughness") ? path + ".toughness" : path;

    private static string Strength(string path, ReadContext context) => context.IsGiven(path + ".strength") ? path + ".strength" : path;
}
