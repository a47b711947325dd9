using System.Globalization;
using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>Elastic constants that a material can have.</summary>
internal static class MaterialChecks
{
    private const double NearlyIncompressible = 0.49;

    /// <summary>Common moduli of adherends [MPa], from rubber to tungsten carbide: common practice, no source.</summary>
    private const double LeastYoung = 1, LargestYoung = 1e6;

    /// <summary>Checks a material.</summary>
    public static void Run(MaterialDeck material, string path, ReadContext context)
    {
        string young = path + ".young";
        string poisson = path + ".poisson";
        string shear = path + ".shear modulus";
        if (!context.IsSound(young) || !context.IsSound(poisson))
            return;
        foreach (double modulus in (ReadOnlySpan<double>)[material.Young.X, material.Young.Y, material.Young.Z])
        {
            if (modulus is >= LeastYoung and <= LargestYoung)
                continue;
            context.Warn(young, string.Create(CultureInfo.InvariantCulture, $"a modulus of {NumberText.Rounded(modulus, 4)} MPa is unusual for an adherend; common are {LeastYoung} to {LargestYoung} MPa: look at the unit"));
            break;
        }
        bool isIsotropic = !context.IsGiven(young + ".x") && !context.IsGiven(poisson + ".xy");
        if (isIsotropic)
        {
            if (context.IsGiven(shear))
                context.Fail(shear, "does not apply: with one number each for young and poisson the material is isotropic and the shear modulus follows from them");
            if (material.Poisson.Xy >= 0.5)
                context.Fail(poisson, "must be less than 0.5 for an isotropic material");
            else if (material.Poisson.Xy > NearlyIncompressible)
                context.Warn(poisson, "is so near 0.5 that elements without a pressure of their own become too stiff");
            return;
        }
        if (!context.IsGiven(shear))
            context.FailAt(context.Find(path, out _).Key, shear, "is missing; an orthotropic material needs it, for example shear modulus: {xy: 3.6 GPa}");
        CheckCompliance(material, poisson, context);
    }

    /// <summary>
    /// Strain energy is positive for every stress when each ratio obeys nu_ij² &lt; E_i/E_j and the determinant of the normal compliances is positive
    /// (Lempriere, AIAA J. 6 (1968) 2226, from memory; derived here as Sylvester's criterion on the compliance scaled to a unit diagonal).
    /// </summary>
    private static void CheckCompliance(MaterialDeck material, string path, ReadContext context)
    {
        Directional young = material.Young;
        PoissonRatios ratio = material.Poisson;
        bool pairs = PairHolds(ratio.Xy, young.X, young.Y, "xy", "x", "y", path, context)
            & PairHolds(ratio.Xz, young.X, young.Z, "xz", "x", "z", path, context)
            & PairHolds(ratio.Zy, young.Z, young.Y, "zy", "z", "y", path, context);
        double p = ratio.Xy * Math.Sqrt(young.Y / young.X);
        double q = ratio.Xz * Math.Sqrt(young.Z / young.X);
        double r = ratio.Zy * Math.Sqrt(young.Y / young.Z);
        double determinant = 1 - p * p - q * q - r * r - 2 * p * q * r;
        if (pairs && determinant <= 0)
            context.Fail(path, string.Create(CultureInfo.InvariantCulture, $"with these moduli the three ratios together would give a body that yields energy when loaded (determinant of the scaled compliance {NumberText.Rounded(determinant, 3)}, must be greater than 0); smaller ratios are needed"));
    }

    private static bool PairHolds(double ratio, double first, double second, string pair, string i, string j, string path, ReadContext context)
    {
        double bound = Math.Sqrt(first / second);
        if (!(Math.Abs(ratio) >= bound))
            return true;
        string at = context.IsGiven(ReadContext.Join(path, pair)) ? ReadContext.Join(path, pair) : path;
        context.Fail(at, string.Create(CultureInfo.InvariantCulture, $"must be less than sqrt(young {i} / young {j}) = {NumberText.Rounded(bound, 4)} for the pair {pair}"));
        return false;
    }
}
