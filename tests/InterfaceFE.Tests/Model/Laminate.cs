using System.Globalization;
using InterfaceFE.Geometry;
using InterfaceFE.Results;

namespace InterfaceFE.Tests.Model;

/// <summary>
/// A strip of plies, 60 mm long, by classical laminate theory and as a deck. Carbon and glass plies are invented. Theory (Jones, Mechanics of Composite Materials (1975), from memory): each
/// ply has no stress across the thickness; stress along x is Q11·(strain x - free) + Q12·(strain z - free) + Q16·(shear xz - free), Q from Ex, Ez, nu_xz, Gxz turned about the thickness.
/// Lengths in mm, stresses in MPa, per width.
/// </summary>
internal sealed class Laminate
{
    public const double Length = 60;

    /// <summary>Change of temperature in the thermal deck [K].</summary>
    public const double Heating = 80;

    private static readonly Stuff Carbon = new(140000, 10000, 0.3, 5000, -0.5e-6, 28e-6), Glass = new(38000, 9000, 0.27, 3700, 8e-6, 22e-6);
    private readonly (double Thickness, double Degrees, bool IsGlass)[] _plies;

    /// <summary>Plies from the bottom up.</summary>
    public Laminate(params (double Thickness, double Degrees, bool IsGlass)[] plies) => _plies = plies;

    /// <summary>Plies of different angles, thicknesses and materials, in no symmetric order.</summary>
    public static Laminate Uneven { get; } = new((0.5, 0, false), (0.3, 90, false), (0.4, 45, false), (0.6, -30, true), (0.2, 0, true));

    /// <summary>Two plies that cross.</summary>
    public static Laminate Crossed { get; } = new((1, 0, false), (1, 90, false));

    public double Thickness => _plies.Sum(p => p.Thickness);

    /// <summary>Curvature under a moment per width, and after <see cref="Heating"/> with no moment [1/mm]; the strip is free along x.</summary>
    /// <param name="state">held, free or uniform strain.</param>
    /// <param name="moment">Moment per width [N]; positive where the bottom is stretched.</param>
    public (double ByMoment, double ByHeating) Curvatures(string state, double moment)
    {
        double bottom = -Thickness / 2;
        double[,] k = new double[3, 3];
        double[] heat = new double[3];
        foreach ((double thickness, double degrees, bool isGlass) in _plies)
        {
            (double q11, double q12, double q22, double nx, double nz) = Ply(isGlass ? Glass : Carbon, degrees * Math.PI / 180, state == "free");
            double top = bottom + thickness, first = (top * top - bottom * bottom) / 2, second = (top * top * top - bottom * bottom * bottom) / 3;
            k[0, 0] += q11 * thickness;
            k[0, 1] += q11 * first;
            k[1, 1] += q11 * second;
            k[0, 2] += q12 * thickness;
            k[1, 2] += q12 * first;
            k[2, 2] += q22 * thickness;
            heat[0] += nx * thickness * Heating;
            heat[1] += nx * first * Heating;
            heat[2] += nz * thickness * Heating;
            bottom = top;
        }
        // Strain of the middle, curvature of the sense in which the top stretches, strain out of plane.
        int unknowns = state == "uniform strain" ? 3 : 2;
        return (-Solve(k, [0, moment, 0], unknowns)[1], -Solve(k, heat, unknowns)[1]);
    }

    /// <summary>Deck in which the ends turn freely and the strip is heated, or are rigid faces that a moment per width turns.</summary>
    /// <param name="state">held, free or uniform strain.</param>
    /// <param name="moment">Moment per width [N]; null: heated.</param>
    /// <param name="elements">Kind of element.</param>
    public string Deck(string state, double? moment, string elements = "eight-node")
    {
        string plies = string.Join(", ", _plies.Select(p => string.Create(CultureInfo.InvariantCulture, $"{{thickness: {p.Thickness} mm, angle: {p.Degrees} deg{(p.IsGlass ? ", of: glass" : "")}}}")));
        string grips = moment is null ? "left: {on: bottom of strip, at: start}\n  right: {on: bottom of strip, at: end}" : "left: {on: left end of strip}\n  right: {on: right end of strip}";
        string stage = moment is { } m ? string.Create(CultureInfo.InvariantCulture, $"turn: {{grips: {{left: -1, right: 1}}, moment: {-m} N*mm}}") : "heat to: 100 °C";
        string size = string.Create(CultureInfo.InvariantCulture, $"{Thickness} mm");
        return $$"""
            title: Strip of plies
            model: {width: 1 mm, out of plane: {{state}}, rotation: small, elements: {{elements}} }
            materials:
              carbon: {young: {x: 140 GPa, y: 10 GPa, z: 10 GPa}, poisson: {xz: 0.3, xy: 0.3, zy: 0.45}, shear modulus: {xy: 5 GPa, xz: 5 GPa, zy: 3.4 GPa}, expansion: {x: -0.5e-6 1/K, y: 28e-6 1/K, z: 28e-6 1/K} }
              glass: {young: {x: 38 GPa, y: 9 GPa, z: 9 GPa}, poisson: {xz: 0.27, xy: 0.27, zy: 0.4}, shear modulus: {xy: 3.7 GPa, xz: 3.7 GPa, zy: 3.2 GPa}, expansion: {x: 8e-6 1/K, y: 22e-6 1/K, z: 22e-6 1/K} }
            adherends:
              strip: {of: carbon, rectangle: {corner: [0 mm, 0 mm], size: [60 mm, {{size}}]}, plies: [{{plies}}], elements: {along: 60} }
            stress-free temperature: 20 °C
            grips:
              {{grips}}
            sequence:
              - fix: {left: [x, y], right: [y]}
              - {{stage}}
            keep: {fields: every 1 points}
            """;
    }

    /// <summary>Curvature of the middle fifth: difference of the turns of two sections over their distance [1/mm].</summary>
    public double Curvature(Mesh mesh, FieldSnapshot fields)
    {
        MeshedAdherend strip = mesh.Adherends[0];
        return (Turn(0.6 * Length) - Turn(0.4 * Length)) / (0.2 * Length);

        double Turn(double x)
        {
            int top = strip.Edges["top"].Nodes[strip.Edges["top"].Nearest(x)], bottom = strip.Edges["bottom"].Nodes[strip.Edges["bottom"].Nearest(x)];
            return -(fields.DisplacementX[top] - fields.DisplacementX[bottom]) / Thickness;
        }
    }

    /// <summary>Plane stiffnesses of a turned ply over x and z, and the stresses along x and z of one kelvin at no strain. Free: no stress along z or in shear xz either.</summary>
    private static (double Q11, double Q12, double Q22, double Nx, double Nz) Ply(Stuff stuff, double angle, bool free)
    {
        double zx = stuff.Poisson * stuff.Ez / stuff.Ex, rest = 1 - stuff.Poisson * zx;
        double q11 = stuff.Ex / rest, q22 = stuff.Ez / rest, q12 = zx * stuff.Ex / rest, q66 = stuff.Shear, s = Math.Sin(angle), c = Math.Cos(angle);
        double t11 = q11 * Math.Pow(c, 4) + 2 * (q12 + 2 * q66) * s * s * c * c + q22 * Math.Pow(s, 4), t22 = q11 * Math.Pow(s, 4) + 2 * (q12 + 2 * q66) * s * s * c * c + q22 * Math.Pow(c, 4);
        double t12 = (q11 + q22 - 4 * q66) * s * s * c * c + q12 * (Math.Pow(s, 4) + Math.Pow(c, 4));
        double t16 = (q11 - q12 - 2 * q66) * s * c * c * c + (q12 - q22 + 2 * q66) * s * s * s * c, t26 = (q11 - q12 - 2 * q66) * s * s * s * c + (q12 - q22 + 2 * q66) * s * c * c * c;
        double ax = stuff.AlphaX * c * c + stuff.AlphaZ * s * s, az = stuff.AlphaX * s * s + stuff.AlphaZ * c * c, axz = 2 * s * c * (stuff.AlphaX - stuff.AlphaZ);
        if (!free)
            return (t11, t12, t22, t11 * ax + t12 * az + t16 * axz, t12 * ax + t22 * az + t26 * axz);
        double modulus = 1 / (Math.Pow(c, 4) / stuff.Ex + (1 / stuff.Shear - 2 * stuff.Poisson / stuff.Ex) * s * s * c * c + Math.Pow(s, 4) / stuff.Ez);
        return (modulus, 0, 0, modulus * ax, 0);
    }

    /// <summary>Gauss elimination of a symmetric system given by its upper triangle.</summary>
    private static double[] Solve(double[,] upper, double[] right, int size)
    {
        double[,] a = new double[size, size];
        double[] x = [.. right.Take(size)];
        for (int i = 0; i < size; i++)
            for (int j = 0; j < size; j++)
                a[i, j] = upper[Math.Min(i, j), Math.Max(i, j)];
        for (int pivot = 0; pivot < size; pivot++)
            for (int row = 0; row < size; row++)
            {
                if (row == pivot)
                    continue;
                double factor = a[row, pivot] / a[pivot, pivot];
                for (int column = 0; column < size; column++)
                    a[row, column] -= factor * a[pivot, column];
                x[row] -= factor * x[pivot];
            }
        for (int i = 0; i < size; i++)
            x[i] /= a[i, i];
        return x;
    }

    private readonly record struct Stuff(double Ex, double Ez, double Poisson, double Shear, double AlphaX, double AlphaZ);
}
