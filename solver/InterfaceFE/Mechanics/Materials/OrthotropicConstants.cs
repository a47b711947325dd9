using System.Globalization;

namespace InterfaceFE.Mechanics.Materials;

/// <summary>
/// Constants of an orthotropic elastic material in its own axes: x along, y through the thickness, z out of plane. A ratio ij is the contraction along j
/// under stress along i; the ratios not given follow from the symmetry nu_ij / E_i = nu_ji / E_j.
/// </summary>
/// <param name="YoungX">Young's modulus along x [MPa], > 0.</param>
/// <param name="YoungY">Young's modulus along y [MPa], > 0.</param>
/// <param name="YoungZ">Young's modulus along z [MPa], > 0.</param>
/// <param name="PoissonXy">Stress along x, contraction along y.</param>
/// <param name="PoissonXz">Stress along x, contraction along z.</param>
/// <param name="PoissonZy">Stress along z, contraction along y.</param>
/// <param name="ShearXy">Shear modulus in the plane [MPa], > 0.</param>
/// <param name="ExpansionX">Thermal expansion along x [1/K].</param>
/// <param name="ExpansionY">Thermal expansion along y [1/K].</param>
/// <param name="ExpansionZ">Thermal expansion along z [1/K].</param>
public readonly record struct OrthotropicConstants(
    double YoungX,
    double YoungY,
    double YoungZ,
    double PoissonXy,
    double PoissonXz,
    double PoissonZy,
    double ShearXy,
    double ExpansionX = 0,
    double ExpansionY = 0,
    double ExpansionZ = 0)
{
    private const string Consequence = "a strain exists whose elastic energy is not positive";

    /// <summary>
    /// Why these constants are no stable elastic material, in words, or null when they are one. The elastic energy must be positive for every strain: moduli
    /// above 0, nu_ij·nu_ji below 1 for each pair, and 1 - nu_xy·nu_yx - nu_xz·nu_zx - nu_zy·nu_yz - 2·nu_xy·nu_yz·nu_zx above 0 (Lempriere, AIAA Journal 6
    /// (1968) 2226-2227, from memory; it is the determinant of the compliance of the normal strains).
    /// </summary>
    public string? Fault()
    {
        ReadOnlySpan<double> all = [YoungX, YoungY, YoungZ, PoissonXy, PoissonXz, PoissonZy, ShearXy, ExpansionX, ExpansionY, ExpansionZ];
        foreach (double value in all)
            if (!double.IsFinite(value))
                return "a constant is not a finite number";
        if (YoungX <= 0 || YoungY <= 0 || YoungZ <= 0)
            return Words($"Young's moduli must be greater than 0, given x {YoungX}, y {YoungY}, z {YoungZ} MPa");
        if (ShearXy <= 0)
            return Words($"the shear modulus xy must be greater than 0, given {ShearXy} MPa");
        double yx = PoissonXy * YoungY / YoungX, zx = PoissonXz * YoungZ / YoungX, yz = PoissonZy * YoungY / YoungZ;
        return PairFault("xy", PoissonXy, "yx", yx)
            ?? PairFault("xz", PoissonXz, "zx", zx)
            ?? PairFault("zy", PoissonZy, "yz", yz)
            ?? TripleFault(yx, zx, yz);
    }

    private static string? PairFault(string name, double given, string reverseName, double reverse) =>
        given * reverse < 1
            ? null
            : Words($"Poisson's ratios {name} and {reverseName} multiply to {given * reverse}, which must be below 1: {Consequence}");

    private string? TripleFault(double yx, double zx, double yz)
    {
        double determinant = 1 - PoissonXy * yx - PoissonXz * zx - PoissonZy * yz - 2 * PoissonXy * yz * zx;
        return determinant > 0
            ? null
            : Words($"Poisson's ratios together give 1 - xy·yx - xz·zx - zy·yz - 2·xy·yz·zx = {determinant}, which must be greater than 0: {Consequence}");
    }

    private static string Words(FormattableString text) => text.ToString(CultureInfo.InvariantCulture);
}
