using InterfaceFE.Decks;
using InterfaceFE.Geometry;

namespace InterfaceFE.Runs;

/// <summary>Whether the state out of plane suits the width of bonded arms.</summary>
internal static class OutOfPlaneAdvice
{
    /// <summary>
    /// Width over thickness below which an arm counts as narrow, so that it bends with E as the standards' formulas for coupons assume. Arms of usual coupons have 3 to 5.
    /// Common practice, no source.
    /// </summary>
    private const double Narrow = 5;

    /// <summary>One line for each narrow isotropic arm that is held out of plane: its bending stiffness is 1/(1 - ν²) of the free one.</summary>
    public static IReadOnlyList<string> For(Deck deck, Mesh mesh)
    {
        List<string> advice = [];
        if (deck.Model.OutOfPlane != OutOfPlane.Held)
            return advice;
        for (int i = 0; i < mesh.Adherends.Count; i++)
        {
            MeshedAdherend arm = mesh.Adherends[i];
            MaterialDeck material = deck.Materials[arm.Material];
            double poisson = material.Poisson.Xy;
            bool isIsotropic = material.ShearModulus is null && material.Young == new Directional(material.Young.X) && material.Poisson == new PoissonRatios(poisson);
            if (!isIsotropic || arm.PlyOfRow.Count > 0 || poisson == 0 || arm.Width >= Narrow * arm.Thickness || !mesh.Joints.Any(j => j.UpperAdherend == i || j.LowerAdherend == i))
                continue;
            advice.Add(Text.Of($"{arm.Name} is {arm.Width:G4} mm wide and {arm.Thickness:G4} mm thick. If the part ends at this width, as in a coupon, `out of plane: free` suits it: held, it bends {100 * (1 / (1 - poisson * poisson) - 1):0.#} % stiffer, and toughness from load and modulus comes out {100 * poisson * poisson:0.#} % lower. Leave it held for a slice of a long joint"));
        }
        return advice;
    }
}
