using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>
/// Modulus that ties the energy release rate to the stress intensity at a crack along x, G = K²/E*, one for each mode. Orthotropic (Sih, Paris and Irwin, Int. J. Fract. Mech. 1 (1965)
/// 189-203): with compliances s_ij in the plane and q = √(√(s22/s11) + (2·s12 + s66)/(2·s11)), 1/E*_I = √(s11·s22/2)·q and 1/E*_II = s11/√2·q. Isotropic: E' in both.
/// A fibre-reinforced arm, stiff along x, is many times softer there than E' along x says, and its process zone is shorter as long as it is short against the arm's thickness.
/// </summary>
/// <param name="Peel">E*_I [MPa].</param>
/// <param name="Shear">E*_II [MPa].</param>
public readonly record struct CrackTipModulus(double Peel, double Shear)
{
    /// <summary>Moduli of a material whose Young's moduli or Poisson's ratios differ by direction; null for an isotropic one and for numbers that are not positive definite.</summary>
    /// <param name="material">Material, y across the crack.</param>
    /// <param name="held">Whether strain out of plane is held at 0.</param>
    public static CrackTipModulus? Of(MaterialDeck material, bool held)
    {
        ArgumentNullException.ThrowIfNull(material);
        if (material.ShearModulus is not { } shear)
            return null;
        double s11 = 1 / material.Young.X, s22 = 1 / material.Young.Y, s12 = -material.Poisson.Xy / material.Young.X, s66 = 1 / shear.Xy;
        if (held)
        {
            double s13 = -material.Poisson.Xz / material.Young.X, s23 = -material.Poisson.Zy / material.Young.Z, s33 = 1 / material.Young.Z;
            (s11, s22, s12) = (s11 - s13 * s13 / s33, s22 - s23 * s23 / s33, s12 - s13 * s23 / s33);
        }
        if (!(s11 > 0 && s22 > 0 && s66 > 0))
            return null;
        double q = Math.Sqrt(Math.Sqrt(s22 / s11) + (2 * s12 + s66) / (2 * s11));
        return q > 0 ? new CrackTipModulus(1 / (Math.Sqrt(s11 * s22 / 2) * q), Math.Sqrt(2) / (s11 * q)) : null;
    }
}
