namespace InterfaceFE.Mechanics.Materials;

/// <summary>
/// An orthotropic material turned about the thickness axis y, as a ply of a laminate. With the strains xx, yy, zz, xz of the material = T·(strains of the model) the stiffness of the model
/// is Tᵀ·C·T; shear xy mixes the moduli xy and zy.
/// <para>
/// Held: strain zz and shear strains xz, zy are 0 (zz may be driven). Eliminated as for an orthotropic material: D = C over xx, yy; thermal stress b = C·expansion; free in-plane strain
/// D⁻¹·b, szz = n·stress + ... with n = C(z, in-plane)·D⁻¹. Free: stresses zz, xz, zy are 0, D = C - C(in, out)·C(out, out)⁻¹·C(out, in). (Jones, Mechanics of Composite Materials (1975), for the
/// turn; from memory.)
/// </para>
/// </summary>
public static class TurnedPly
{
    /// <summary>The ply in the model's axes.</summary>
    /// <param name="constants">Constants in the material's axes.</param>
    /// <param name="shearXz">Shear modulus xz [MPa], > 0.</param>
    /// <param name="shearZy">Shear modulus zy [MPa], > 0.</param>
    /// <param name="angle">Angle from x towards z [rad].</param>
    /// <param name="state">State out of plane.</param>
    /// <exception cref="ArgumentException">The constants are no stable elastic material; the message says why.</exception>
    public static PlaneElasticity Of(in OrthotropicConstants constants, double shearXz, double shearZy, double angle, OutOfPlaneState state)
    {
        if (constants.Fault() is { } fault)
            throw new ArgumentException(fault, nameof(constants));
        if (!(shearXz > 0) || !(shearZy > 0))
            throw new ArgumentException("the shear moduli must be greater than 0", nameof(shearXz));
        Span<double> c = stackalloc double[16], turned = stackalloc double[16], there = stackalloc double[16], back = stackalloc double[16];
        Stiffness(constants, shearXz, c);
        Turn(angle, there);
        Turn(-angle, back);
        for (int i = 0; i < 4; i++)
            for (int j = 0; j < 4; j++)
                for (int k = 0; k < 4; k++)
                    for (int l = 0; l < 4; l++)
                        turned[4 * i + j] += there[4 * k + i] * c[4 * k + l] * there[4 * l + j];
        Span<double> expansion = stackalloc double[4];
        ReadOnlySpan<double> own = [constants.ExpansionX, constants.ExpansionY, constants.ExpansionZ, 0];
        for (int i = 0; i < 4; i++)
            for (int j = 0; j < 4; j++)
                expansion[i] += back[4 * i + j] * own[j];
        (double s, double cos) = Math.SinCos(angle);
        return state == OutOfPlaneState.Held
            ? Held(turned, expansion, cos * cos * constants.ShearXy + s * s * shearZy)
            : Free(turned, expansion, 1 / (cos * cos / constants.ShearXy + s * s / shearZy));
    }

    private static PlaneElasticity Held(ReadOnlySpan<double> c, ReadOnlySpan<double> expansion, double shear)
    {
        (double xx, double xy, double yy) = (c[0], c[1], c[5]);
        double determinant = xx * yy - xy * xy;
        Span<double> thermal = stackalloc double[4];
        double blocked = 0;
        for (int i = 0; i < 4; i++)
        {
            for (int j = 0; j < 4; j++)
                thermal[i] += c[4 * i + j] * expansion[j];
            blocked += 0.5 * thermal[i] * expansion[i];
        }
        double alongX = (yy * thermal[0] - xy * thermal[1]) / determinant, alongY = (xx * thermal[1] - xy * thermal[0]) / determinant;
        double nx = (yy * c[8] - xy * c[9]) / determinant, ny = (xx * c[9] - xy * c[8]) / determinant;
        return PlaneElasticity.FromParts(
            OutOfPlaneState.Held,
            [xx, xy, 0, xy, yy, 0, 0, 0, shear],
            [alongX, alongY, 0],
            [nx, ny, 0],
            nx * thermal[0] + ny * thermal[1] - thermal[2],
            blocked - 0.5 * (alongX * thermal[0] + alongY * thermal[1]),
            c[10] - nx * c[8] - ny * c[9]);
    }

    private static PlaneElasticity Free(ReadOnlySpan<double> c, ReadOnlySpan<double> expansion, double shear)
    {
        double determinant = c[10] * c[15] - c[11] * c[14];
        Span<double> d = stackalloc double[4];
        for (int i = 0; i < 2; i++)
            for (int j = 0; j < 2; j++)
            {
                (double zi, double gi, double zj, double gj) = (c[4 * i + 2], c[4 * i + 3], c[4 * j + 2], c[4 * j + 3]);
                d[2 * i + j] = c[4 * i + j] - (zi * (c[15] * zj - c[11] * gj) + gi * (c[10] * gj - c[14] * zj)) / determinant;
            }
        return PlaneElasticity.FromParts(OutOfPlaneState.Free, [d[0], d[1], 0, d[1], d[3], 0, 0, 0, shear], [expansion[0], expansion[1], 0], [0, 0, 0], 0, 0, 0);
    }

    /// <summary>Stiffness over xx, yy, zz, xz in the material's axes: inverse of the compliance.</summary>
    private static void Stiffness(in OrthotropicConstants k, double shearXz, Span<double> c)
    {
        double xx = 1 / k.YoungX, yy = 1 / k.YoungY, zz = 1 / k.YoungZ, xy = -k.PoissonXy / k.YoungX, xz = -k.PoissonXz / k.YoungX, zy = -k.PoissonZy / k.YoungZ;
        double determinant = xx * (yy * zz - zy * zy) - xy * (xy * zz - zy * xz) + xz * (xy * zy - yy * xz);
        c.Clear();
        c[0] = (yy * zz - zy * zy) / determinant;
        c[5] = (xx * zz - xz * xz) / determinant;
        c[10] = (xx * yy - xy * xy) / determinant;
        c[1] = c[4] = (xz * zy - xy * zz) / determinant;
        c[2] = c[8] = (xy * zy - yy * xz) / determinant;
        c[6] = c[9] = (xy * xz - xx * zy) / determinant;
        c[15] = shearXz;
    }

    private static void Turn(double angle, Span<double> t)
    {
        (double s, double c) = Math.SinCos(angle);
        t.Clear();
        (t[0], t[2], t[3]) = (c * c, s * s, c * s);
        t[5] = 1;
        (t[8], t[10], t[11]) = (s * s, c * c, -c * s);
        (t[12], t[14], t[15]) = (-2 * c * s, 2 * c * s, c * c - s * s);
    }
}
