using System.Globalization;
using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>The plies of an adherend: they fill its thickness, and their materials can be turned as they are.</summary>
internal static class PlyChecks
{
    private const double RoundOff = 1e-6;

    /// <summary>Checks the plies of an adherend.</summary>
    public static void Run(Deck deck, AdherendDeck adherend, IReadOnlyList<PlyDeck> plies, string path, ReadContext context)
    {
        double sum = 0;
        for (int i = 0; i < plies.Count; i++)
        {
            if (plies[i] is not { } ply)
                return;
            sum += ply.Thickness;
            string at = ReadContext.Join(path + ".plies", i + 1);
            if (ply.Of is not null)
                DeckChecks.NameExists(ply.Of, deck.Materials, "materials", at + ".of", context);
            if ((ply.Of ?? adherend.Of) is { } name && deck.Materials?.GetValueOrDefault(name) is { } material)
                CheckMaterial(name, material, ply, at, context);
        }
        double thickness = adherend.Sheet?.Thickness ?? (adherend.Rectangle is { Size: [_, var height] } ? height : double.NaN);
        if (Math.Abs(sum - thickness) > RoundOff * thickness)
            context.Fail(path + ".plies", string.Create(CultureInfo.InvariantCulture, $"the plies are {NumberText.Rounded(sum, 6)} mm thick together, the adherend {NumberText.Rounded(thickness, 6)} mm"));
    }

    private static void CheckMaterial(string name, MaterialDeck material, PlyDeck ply, string at, ReadContext context)
    {
        if (material.YieldCurve is not null)
            context.Fail(at, $"a ply cannot yield: {name} has a yield curve");
        bool isTurned = material.ShearModulus is not null && Math.Abs(Math.Sin(ply.Angle)) > 1e-12;
        if (isTurned && (material.ShearModulus!.Xz is null || material.ShearModulus.Zy is null))
            context.Fail(at + ".angle", $"a turned ply needs all shear moduli of its material; give xz and zy in `shear modulus` of {name}, for example shear modulus: {{xy: 3.6 GPa, xz: 4.1 GPa, zy: 3.6 GPa}}");
    }
}
