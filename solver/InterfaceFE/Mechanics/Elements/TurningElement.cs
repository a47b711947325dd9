using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Mechanics.Elements;

/// <summary>
/// Plane solid elements for finite rotation and strain, total Lagrangian: at each Gauss point the material law is asked with the logarithmic strain (<see cref="LogarithmicStrain"/>),
/// and force and tangent are the exact first and second derivative of its energy. With the stress T that the law returns, S = T:dE/dG is the stress that does work on Green's strain,
/// force = ∫ δG·S and tangent = ∫ δG·(dE/dG·D·dE/dG + T:d²E/dG²)·δG + S·δ²G. A rigid movement strains nothing, however far it turns. Energies and stresses count per volume before
/// deformation. Conventions as in <see cref="IPlaneElement"/>; no allocation, safe between threads.
/// </summary>
public static class TurningElement
{
    private const int Points = GaussPoints.Count;

    /// <summary>Largest number of unknowns of an element.</summary>
    private const int Most = 16;

    /// <summary>Force, tangent and energy of an element.</summary>
    /// <typeparam name="TLaw">Type of the law.</typeparam>
    /// <param name="byX">Derivatives of the shape functions by x before deformation [1/mm], point after point, one per node.</param>
    /// <param name="byY">As <paramref name="byX"/>, by y.</param>
    /// <param name="areas">Area that each point stands for [mm²], length 4.</param>
    /// <param name="law">Law, the same at all points.</param>
    /// <param name="width">Width out of plane before deformation [mm].</param>
    /// <param name="displacements">Node displacements at the end of the stride, two per node.</param>
    /// <param name="temperatureChange">Temperature change from the stress-free state [K].</param>
    /// <param name="accepted">Accepted state, point after point, length 4·StateSize.</param>
    /// <param name="tentative">State at the end of the stride, same length, overwritten; must not alias <paramref name="accepted"/>.</param>
    /// <param name="force">Internal force [N], two per node, overwritten.</param>
    /// <param name="tangent">Derivative of the force by the displacements [N/mm], row-major, symmetric, overwritten; empty when not wanted.</param>
    /// <param name="byTemperature">Derivative of the force by temperature at fixed displacements [N/K], two per node, overwritten; empty when not wanted.</param>
    /// <returns>Energies of the element [mJ].</returns>
    public static PlaneEnergy Respond<TLaw>(
        ReadOnlySpan<double> byX,
        ReadOnlySpan<double> byY,
        ReadOnlySpan<double> areas,
        TLaw law,
        double width,
        ReadOnlySpan<double> displacements,
        double temperatureChange,
        ReadOnlySpan<double> accepted,
        Span<double> tentative,
        Span<double> force,
        Span<double> tangent,
        Span<double> byTemperature)
        where TLaw : IPlaneLaw
    {
        int size = displacements.Length, nodes = size / 2, state = law.StateSize;
        Span<double> gradient = stackalloc double[4], strain = stackalloc double[3], stress = stackalloc double[4], moduli = stackalloc double[9], rate = stackalloc double[3];
        Span<double> derivative = stackalloc double[9], green = stackalloc double[9], s = stackalloc double[3], variation = stackalloc double[3 * Most], relative = stackalloc double[Most];
        relative = relative[..size];
        TakeTravelOff(displacements, relative);
        force.Clear();
        tangent.Clear();
        byTemperature.Clear();
        rate.Clear();
        double stored = 0, dissipated = 0, storedByTemperature = 0;
        for (int point = 0; point < Points; point++)
        {
            ReadOnlySpan<double> gx = byX.Slice(point * nodes, nodes), gy = byY.Slice(point * nodes, nodes);
            PlaneKernel.Gradient(gx, gy, relative, gradient);
            LogarithmicStrain measure = LogarithmicStrain.Of(gradient);
            measure.Strain(strain);
            PlaneEnergy energy = law.Update(
                strain, temperatureChange, accepted.Slice(point * state, state), tentative.Slice(point * state, state), stress, moduli, byTemperature.IsEmpty ? [] : rate);
            double volume = areas[point] * width;
            stored += energy.Stored * volume;
            dissipated += energy.Dissipated * volume;
            storedByTemperature += energy.StoredByTemperature * volume;
            measure.Derivative(derivative);
            Variation(gx, gy, gradient, variation);
            Pull(derivative, stress[0], stress[1], stress[3], s);
            AddForce(variation[..(3 * size)], s, volume, force);
            if (!byTemperature.IsEmpty)
            {
                Pull(derivative, rate[0], rate[1], rate[2], green[..3]);
                AddForce(variation[..(3 * size)], green[..3], volume, byTemperature);
            }
            if (tangent.IsEmpty)
                continue;
            Pull(derivative, moduli, green);
            measure.AddSecondDerivative(stress[0], stress[1], stress[3], green);
            AddTangent(gx, gy, variation[..(3 * size)], green, s, volume, tangent);
        }
        if (!tangent.IsEmpty)
            PlaneKernel.Mirror(size, tangent);
        return new PlaneEnergy(stored, dissipated, storedByTemperature);
    }

    /// <summary>Displacements less that of the first node: rounding of gradients then grows with the element's own movement and not with the travel.</summary>
    internal static void TakeTravelOff(ReadOnlySpan<double> displacements, Span<double> relative)
    {
        for (int i = 0; i < displacements.Length; i += 2)
        {
            relative[i] = displacements[i] - displacements[0];
            relative[i + 1] = displacements[i + 1] - displacements[1];
        }
    }

    /// <summary>Stress on Green's strain from stress on the logarithmic strain.</summary>
    internal static void Pull(ReadOnlySpan<double> derivative, double xx, double yy, double xy, Span<double> s)
    {
        for (int i = 0; i < 3; i++)
            s[i] = xx * derivative[i] + yy * derivative[3 + i] + xy * derivative[6 + i];
    }

    private static void Pull(ReadOnlySpan<double> derivative, ReadOnlySpan<double> moduli, Span<double> result)
    {
        Span<double> half = stackalloc double[9];
        for (int i = 0; i < 3; i++)
            for (int j = 0; j < 3; j++)
                half[3 * i + j] = moduli[3 * i] * derivative[j] + moduli[3 * i + 1] * derivative[3 + j] + moduli[3 * i + 2] * derivative[6 + j];
        for (int i = 0; i < 3; i++)
            for (int j = 0; j < 3; j++)
                result[3 * i + j] = derivative[i] * half[j] + derivative[3 + i] * half[3 + j] + derivative[6 + i] * half[6 + j];
    }

    /// <summary>Change of Green's strain xx, yy, xy by a unit of each unknown, three numbers each.</summary>
    private static void Variation(ReadOnlySpan<double> gx, ReadOnlySpan<double> gy, ReadOnlySpan<double> gradient, Span<double> variation)
    {
        double xX = 1 + gradient[0], xY = gradient[1], yX = gradient[2], yY = 1 + gradient[3];
        for (int i = 0; i < gx.Length; i++)
        {
            Span<double> v = variation.Slice(6 * i, 6);
            v[0] = xX * gx[i];
            v[1] = xY * gy[i];
            v[2] = xX * gy[i] + xY * gx[i];
            v[3] = yX * gx[i];
            v[4] = yY * gy[i];
            v[5] = yX * gy[i] + yY * gx[i];
        }
    }

    private static void AddForce(ReadOnlySpan<double> variation, ReadOnlySpan<double> s, double volume, Span<double> force)
    {
        for (int i = 0; i < force.Length; i++)
            force[i] += volume * (variation[3 * i] * s[0] + variation[3 * i + 1] * s[1] + variation[3 * i + 2] * s[2]);
    }

    /// <summary>Adds the upper triangle.</summary>
    private static void AddTangent(
        ReadOnlySpan<double> gx, ReadOnlySpan<double> gy, ReadOnlySpan<double> variation, ReadOnlySpan<double> moduli, ReadOnlySpan<double> s, double volume, Span<double> tangent)
    {
        int size = 2 * gx.Length;
        for (int j = 0; j < size; j++)
        {
            double vx = volume * variation[3 * j], vy = volume * variation[3 * j + 1], vxy = volume * variation[3 * j + 2];
            double xx = moduli[0] * vx + moduli[1] * vy + moduli[2] * vxy, yy = moduli[3] * vx + moduli[4] * vy + moduli[5] * vxy, xy = moduli[6] * vx + moduli[7] * vy + moduli[8] * vxy;
            for (int i = 0; i <= j; i++)
                tangent[i * size + j] += variation[3 * i] * xx + variation[3 * i + 1] * yy + variation[3 * i + 2] * xy;
        }
        for (int b = 0; b < gx.Length; b++)
        {
            double alongX = volume * (s[0] * gx[b] + s[2] * gy[b]), alongY = volume * (s[2] * gx[b] + s[1] * gy[b]);
            for (int a = 0; a <= b; a++)
            {
                double value = gx[a] * alongX + gy[a] * alongY;
                tangent[2 * a * size + 2 * b] += value;
                tangent[(2 * a + 1) * size + 2 * b + 1] += value;
            }
        }
    }

    /// <summary>Force per area before deformation on a section whose normal was x: the first column of F·S, from the stress on the logarithmic strain.</summary>
    /// <param name="gradient">Displacement gradient, length 4.</param>
    /// <param name="stress">What the law returns: xx, yy, zz, xy [MPa].</param>
    internal static (double X, double Y) NominalTraction(ReadOnlySpan<double> gradient, ReadOnlySpan<double> stress)
    {
        Span<double> derivative = stackalloc double[9], s = stackalloc double[3];
        LogarithmicStrain.Of(gradient).Derivative(derivative);
        Pull(derivative, stress[0], stress[1], stress[3], s);
        return ((1 + gradient[0]) * s[0] + gradient[1] * s[2], gradient[2] * s[0] + (1 + gradient[3]) * s[2]);
    }

    /// <summary>
    /// Stress per area after deformation at the Gauss points, in the model's axes, from stresses on the logarithmic strain: F·S·Fᵀ/det F. What the width changes by is left out: it is of
    /// the order of the strain.
    /// </summary>
    /// <param name="gradients">Displacement gradients, point after point, length 16.</param>
    /// <param name="stresses">On entry what the law returns, xx, yy, zz, xy point after point; on exit the true stress [MPa]. Length 16.</param>
    public static void TrueStress(ReadOnlySpan<double> gradients, Span<double> stresses)
    {
        Span<double> derivative = stackalloc double[9], s = stackalloc double[3];
        for (int point = 0; point < Points; point++)
        {
            ReadOnlySpan<double> g = gradients.Slice(4 * point, 4);
            Span<double> stress = stresses.Slice(4 * point, 4);
            LogarithmicStrain.Of(g).Derivative(derivative);
            Pull(derivative, stress[0], stress[1], stress[3], s);
            double xX = 1 + g[0], xY = g[1], yX = g[2], yY = 1 + g[3], area = xX * yY - xY * yX;
            double atX = xX * s[0] + xY * s[2], atY = xX * s[2] + xY * s[1], btX = yX * s[0] + yY * s[2], btY = yX * s[2] + yY * s[1];
            stress[0] = (atX * xX + atY * xY) / area;
            stress[3] = (atX * yX + atY * yY) / area;
            stress[1] = (btX * yX + btY * yY) / area;
            stress[2] /= area;
        }
    }
}
