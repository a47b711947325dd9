using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>One of the two bodies of a joint, as the choice of an element length sees it.</summary>
/// <param name="Modulus">E' along x [MPa].</param>
/// <param name="Thickness">Thickness [mm].</param>
/// <param name="Width">Width [mm].</param>
public readonly record struct Arm(double Modulus, double Thickness, double Width)
{
    /// <summary>Modulus at a crack tip; null: E' in both modes.</summary>
    public CrackTipModulus? Tip { get; init; }

    /// <summary>Modulus at a crack tip in a mode [MPa].</summary>
    public double AtTip(bool peel) => Tip is not { } tip ? Modulus : peel ? tip.Peel : tip.Shear;
}

/// <summary>
/// Element length along a joint from layer and arms. With l_c = E*Γ/σ² (E* the modulus at a crack tip, E' in an isotropic arm) and l_s = (l_E h³)^(1/4) in peel, (l_E h)^(1/2) in
/// shear, l_E = E'Γ/σ², the process zone is about
/// c (1 - √r) l_c l_s/(l_c + l_s), c = 0.82 in peel and 1.0 in shear, r = elastic limit over final separation; 1 % error of the whole curve is met at
/// zone·(0.35 + 2.2 √r) with eight-node elements. Both fits are the project's own measurements on beams in peel and flexure, r up to 0.25 (DEVELOPERS.md).
/// A bond of width b on arms of width B counts with σ, Γ and k times b/B. Independent modes fall to zero within twice their release length, which is met on about twice that share of the zone:
/// elements longer than half of it turn the path jagged (seen on the demo's hat, 3 mm elements against a stretch of 3 mm).
/// </summary>
/// <param name="OnePercent">Length for about 1 % error; for four-node elements a third of the formula (a stated, not a measured factor) [mm].</param>
/// <param name="Zone">Estimated process zone of the mode that decides [mm].</param>
/// <param name="Default">Length chosen when the deck gives none [mm].</param>
/// <param name="Reason">What decides the default length, in words.</param>
/// <param name="Mode">peel or shear: the mode with the smaller length.</param>
public readonly record struct JointLength(double OnePercent, double Zone, double Default, string Reason, string Mode)
{
    /// <summary>Share of the eight-node length that four-node elements get.</summary>
    public const double FourNodeShare = 1.0 / 3.0;

    /// <summary>Above this share of elastic limit to final separation the fits are not backed by measurement and r is held at it.</summary>
    public const double LargestShare = 0.5;

    /// <summary>Chooses the length.</summary>
    /// <param name="peel">Peel curve.</param>
    /// <param name="shear">Shear curve.</param>
    /// <param name="upper">Arm above.</param>
    /// <param name="lower">Arm below.</param>
    /// <param name="bondWidth">Width of the bond [mm].</param>
    /// <param name="bonded">Longest bonded stretch [mm].</param>
    /// <param name="kind">Kind of element.</param>
    /// <param name="releaseShare">Release length of independent modes as a share of the final separation; 0 for a law without a release branch.</param>
    public static JointLength Choose(CurveNumbers peel, CurveNumbers shear, Arm upper, Arm lower, double bondWidth, double bonded, ElementKind kind, double releaseShare)
    {
        double thinner = Math.Min(upper.Thickness, lower.Thickness);
        bool four = kind == ElementKind.FourNode;
        (double onePercent, double zone, string mode) = (double.PositiveInfinity, 0, "");
        double decay = double.PositiveInfinity;
        foreach (Arm arm in (ReadOnlySpan<Arm>)[upper, lower])
        {
            double share = bondWidth / arm.Width;
            Consider(peel, true, arm, share, thinner, ref onePercent, ref zone, ref mode);
            Consider(shear, false, arm, share, thinner, ref onePercent, ref zone, ref mode);
            // Beam on an elastic layer: λ⁴ = 6 k (b/B)/(E' h³).
            double lambda = Math.Pow(6 * peel.Stiffness * share / (arm.Modulus * thinner * thinner * thinner), 0.25);
            decay = Math.Min(decay, 1 / lambda);
        }
        if (four)
            onePercent *= FourNodeShare;
        (double Length, string Reason)[] limits =
        [
            (onePercent / 2, "half the length for 1 % error"),
            (four ? thinner / 2 : thinner, four ? "half the thickness of the thinner arm" : "the thickness of the thinner arm"),
            (four ? decay / 6 : decay / 3, Text.Of($"a {(four ? "sixth" : "third")} of the elastic decay length ahead of the front, {decay:G4} mm")),
            (releaseShare > 0 ? releaseShare * zone / (four ? 2 : 1) : double.PositiveInfinity,
                Text.Of($"{(four ? "a quarter" : "half")} of the stretch on which modes release at fracture, about {2 * releaseShare * zone:G4} mm")),
            (LargestOn(bonded, kind), Text.Of($"{(four ? "twenty" : "ten")} elements along the bonded stretch of {bonded:G4} mm")),
        ];
        (double Length, string Reason) least = limits[0];
        foreach ((double Length, string Reason) limit in limits)
            if (limit.Length < least.Length)
                least = limit;
        return new JointLength(onePercent, zone, least.Length, least.Reason, mode);
    }

    /// <summary>Largest length [mm] on a bonded stretch [mm]: at least ten eight-node or twenty four-node elements along it.</summary>
    public static double LargestOn(double bonded, ElementKind kind) => bonded / (kind == ElementKind.FourNode ? 20 : 10);

    /// <summary>Estimated process zone [mm] of a mode.</summary>
    /// <param name="curve">Curve of the mode, per width of the bond.</param>
    /// <param name="peel">Peel, or else shear.</param>
    /// <param name="modulus">E' of the arm [MPa].</param>
    /// <param name="thickness">Thickness of the arm [mm].</param>
    /// <param name="widthShare">Width of the bond over that of the arm.</param>
    /// <param name="tipModulus">Modulus at a crack tip [MPa]; null: E' of the arm.</param>
    public static double ProcessZone(CurveNumbers curve, bool peel, double modulus, double thickness, double widthShare, double? tipModulus = null)
    {
        double characteristic = modulus * curve.Toughness / (curve.Strength * curve.Strength * widthShare);
        double slender = peel ? Math.Pow(characteristic * thickness * thickness * thickness, 0.25) : Math.Sqrt(characteristic * thickness);
        characteristic *= (tipModulus ?? modulus) / modulus;
        return (peel ? 0.82 : 1.0) * (1 - Math.Sqrt(ShareOf(curve))) * characteristic * slender / (characteristic + slender);
    }

    private static double ShareOf(CurveNumbers curve) => Math.Min(curve.ElasticLimit / curve.FinalSeparation, LargestShare);

    private static void Consider(CurveNumbers curve, bool peel, Arm arm, double share, double thinner, ref double onePercent, ref double zone, ref string mode)
    {
        double candidateZone = ProcessZone(curve, peel, arm.Modulus, thinner, share, arm.AtTip(peel));
        double length = candidateZone * (0.35 + 2.2 * Math.Sqrt(ShareOf(curve)));
        if (length < onePercent)
            (onePercent, zone, mode) = (length, candidateZone, peel ? "peel" : "shear");
    }
}
