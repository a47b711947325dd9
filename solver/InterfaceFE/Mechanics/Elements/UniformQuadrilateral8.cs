using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Mechanics.Elements;

/// <summary>The eight-node quadrilateral with a strain out of plane that is the same everywhere: one unknown more, after those of the nodes, whose force is the integral of szz.</summary>
internal static class UniformQuadrilateral8
{
    /// <summary>Unknowns: two per node and the strain out of plane.</summary>
    public const int UnknownCount = Quadrilateral8.UnknownCount + 1;

    private const int Plane = Quadrilateral8.UnknownCount;
    private const int Points = GaussPoints.Count;

    /// <summary>Force, tangent and energy for a law with a state at each Gauss point; see <see cref="Quadrilateral8.Respond{TLaw}"/>.</summary>
    /// <param name="coordinates">Node coordinates, length 16.</param>
    /// <param name="law">Law, held out of plane.</param>
    /// <param name="width">Width out of plane [mm].</param>
    /// <param name="displacements">Node displacements [mm] and, last, the strain out of plane; length 17.</param>
    /// <param name="temperatureChange">Temperature change from the stress-free state [K].</param>
    /// <param name="accepted">Accepted state, point after point.</param>
    /// <param name="tentative">State at the end of the stride, overwritten.</param>
    /// <param name="force">Internal force [N; last N·mm], length 17, overwritten.</param>
    /// <param name="tangent">Derivative of the force, row-major 17×17, overwritten; empty when not wanted.</param>
    /// <param name="byTemperature">Derivative of the force by temperature, length 17, overwritten; empty when not wanted.</param>
    public static PlaneEnergy Respond(
        ReadOnlySpan<double> coordinates,
        J2Plasticity law,
        double width,
        ReadOnlySpan<double> displacements,
        double temperatureChange,
        ReadOnlySpan<double> accepted,
        Span<double> tentative,
        Span<double> force,
        Span<double> tangent,
        Span<double> byTemperature)
    {
        const int nodes = Quadrilateral8.NodeCount;
        Span<double> byX = stackalloc double[Points * nodes], byY = stackalloc double[Points * nodes], areas = stackalloc double[Points];
        Span<double> gradient = stackalloc double[4], strain = stackalloc double[4], stresses = stackalloc double[4 * Points], rates = stackalloc double[4 * Points], rate = stackalloc double[4];
        Span<double> moduli = stackalloc double[16], inPlane = stackalloc double[9], stiffness = stackalloc double[Plane * Plane], column = stackalloc double[Plane], across = stackalloc double[4 * Points];
        Quadrilateral8.ShapeGradients(coordinates, byX, byY, areas);
        stiffness.Clear();
        double stored = 0, dissipated = 0, storedByTemperature = 0, out1 = 0, outByTemperature = 0, outStiffness = 0;
        int state = law.StateSize;
        strain[3] = displacements[Plane];
        for (int point = 0; point < Points; point++)
        {
            ReadOnlySpan<double> gx = byX.Slice(point * nodes, nodes), gy = byY.Slice(point * nodes, nodes);
            PlaneKernel.Gradient(gx, gy, displacements[..Plane], gradient);
            PlaneKernel.Strain(gradient, strain);
            PlaneEnergy energy = law.Update(strain, temperatureChange, accepted.Slice(point * state, state), tentative.Slice(point * state, state), stresses.Slice(4 * point, 4), moduli, rate);
            double volume = areas[point] * width;
            stored += energy.Stored * volume;
            dissipated += energy.Dissipated * volume;
            storedByTemperature += energy.StoredByTemperature * volume;
            out1 += stresses[4 * point + 2] * volume;
            outByTemperature += rate[3] * volume;
            outStiffness += moduli[15] * volume;
            (rates[4 * point], rates[4 * point + 1], rates[4 * point + 3]) = (rate[0], rate[1], rate[2]);
            (across[4 * point], across[4 * point + 1], across[4 * point + 3]) = (moduli[3], moduli[7], moduli[11]);
            for (int i = 0; i < 3; i++)
                moduli.Slice(4 * i, 3).CopyTo(inPlane[(3 * i)..]);
            if (!tangent.IsEmpty)
                PlaneKernel.AddStiffness(gx, gy, volume, inPlane, stiffness);
        }
        PlaneKernel.Force(nodes, nodes, byX, byY, areas, stresses, width, force);
        force[Plane] = out1;
        if (!byTemperature.IsEmpty)
        {
            PlaneKernel.Force(nodes, nodes, byX, byY, areas, rates, width, byTemperature);
            byTemperature[Plane] = outByTemperature;
        }
        if (!tangent.IsEmpty)
        {
            PlaneKernel.Mirror(Plane, stiffness);
            PlaneKernel.Force(nodes, nodes, byX, byY, areas, across, width, column);
            for (int i = 0; i < Plane; i++)
            {
                stiffness.Slice(i * Plane, Plane).CopyTo(tangent[(i * UnknownCount)..]);
                tangent[i * UnknownCount + Plane] = tangent[Plane * UnknownCount + i] = column[i];
            }
            tangent[UnknownCount * UnknownCount - 1] = outStiffness;
        }
        return new PlaneEnergy(stored, dissipated, storedByTemperature);
    }
}
