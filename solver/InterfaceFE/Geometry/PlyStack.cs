using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>Where the plies of a strip lie.</summary>
internal static class PlyStack
{
    /// <summary>Shares of the thickness at the faces of the plies, from 0 to 1; [0, 1] without plies.</summary>
    public static double[] Of(Strip strip)
    {
        if (strip.Deck.Plies is not { } plies)
            return [0, 1];
        double sum = plies.Sum(p => p.Thickness), at = 0;
        double[] faces = new double[plies.Count + 1];
        for (int i = 0; i < plies.Count; i++)
            faces[i + 1] = (at += plies[i].Thickness) / sum;
        faces[^1] = 1;
        return faces;
    }

    /// <summary>The ply in which each row of elements lies; empty without plies.</summary>
    /// <param name="strip">The strip.</param>
    /// <param name="lines">Shares of the thickness at the lines between rows.</param>
    public static int[] Rows(Strip strip, ReadOnlySpan<double> lines)
    {
        if (strip.Deck.Plies is null)
            return [];
        double[] faces = Of(strip);
        int[] rows = new int[lines.Length - 1];
        for (int row = 0, ply = 0; row < rows.Length; row++)
        {
            while (0.5 * (lines[row] + lines[row + 1]) > faces[ply + 1])
                ply++;
            rows[row] = ply;
        }
        return rows;
    }

    /// <summary>
    /// Modulus of a strip along x for the choice of element lengths [MPa]: that of the beam that bends as its plies do, each with Q11 of a turned ply (classical laminate theory). For this
    /// choice alone: the calculation takes the plies themselves.
    /// </summary>
    /// <param name="strip">The strip, with plies.</param>
    /// <param name="materials">Materials by name.</param>
    public static double BendingModulus(Strip strip, IReadOnlyDictionary<string, MaterialDeck> materials)
    {
        double[] faces = Of(strip);
        double a = 0, b = 0, d = 0;
        for (int i = 0; i < faces.Length - 1; i++)
        {
            PlyDeck ply = strip.Deck.Plies![i];
            double q = Along(materials[ply.Of ?? strip.Deck.Of], ply.Angle), from = faces[i] - 0.5, to = faces[i + 1] - 0.5;
            a += q * (to - from);
            b += q * (to * to - from * from) / 2;
            d += q * (to * to * to - from * from * from) / 3;
        }
        return 12 * (d - b * b / a);
    }

    private static double Along(MaterialDeck material, double angle)
    {
        (double s, double c) = Math.SinCos(angle);
        double zx = material.Poisson.Xz * material.Young.Z / material.Young.X, rest = Math.Max(1 - material.Poisson.Xz * zx, 0.1);
        double shear = material.ShearModulus is { } moduli ? moduli.Xz ?? moduli.Xy : material.Young.X / (2 * (1 + material.Poisson.Xy));
        return (material.Young.X * c * c * c * c + material.Young.Z * s * s * s * s + 2 * zx * material.Young.X * s * s * c * c) / rest + 4 * shear * s * s * c * c;
    }
}
