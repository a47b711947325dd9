using InterfaceFE.Model;

namespace InterfaceFE.Results;

/// <summary>
/// Upright sections through a straight adherend for J: the integral over the section of sigma_xx·u_x,x + sigma_xy·u_y,x - W per width, W the mechanical energy density with its
/// out-of-plane part (Rice 1968; Eshelby's energy momentum), for a material that has not yielded. It is the same at every section between loads, so it is averaged over whole columns of elements.
/// </summary>
public static class SectionIntegral
{
    /// <summary>
    /// Mean over the columns of elements whose middle lies between two x [N/mm per width of the adherend]; null when no column does.
    /// </summary>
    /// <param name="solid">Block of the adherend.</param>
    /// <param name="fromX">Start [mm].</param>
    /// <param name="toX">End [mm].</param>
    /// <param name="ux">Displacement of nodes along x [mm].</param>
    /// <param name="uy">Displacement of nodes along y [mm].</param>
    /// <param name="temperature">Temperature [K].</param>
    /// <param name="stressFreeTemperature">Temperature without thermal stress [K].</param>
    /// <param name="outOfPlane">Strain out of plane.</param>
    public static double? Mean(SolidBlock solid, double fromX, double toX, double[] ux, double[] uy, double temperature, double stressFreeTemperature, double outOfPlane = 0)
    {
        int n = solid.NodesPerElement;
        Span<double> native = stackalloc double[2 * n], gradients = stackalloc double[16], positions = stackalloc double[8];
        Span<double> byX = stackalloc double[4 * n], byY = stackalloc double[4 * n], areas = stackalloc double[4], strain = stackalloc double[3], stress = stackalloc double[4];
        double sum = 0, area = 0;
        for (int e = 0; e < solid.Count; e++)
        {
            solid.GaussPositions(e, positions);
            double middle = 0.25 * (positions[0] + positions[2] + positions[4] + positions[6]);
            if (middle < fromX || middle > toX)
                continue;
            LayerSample.Gather(solid.Nodes(e), ux, uy, native);
            solid.Gradients(e, native, gradients);
            solid.ShapeGradients(e, byX, byY, areas);
            for (int p = 0; p < 4; p++)
            {
                ReadOnlySpan<double> g = gradients.Slice(4 * p, 4);
                strain[0] = g[0];
                strain[1] = g[3];
                strain[2] = g[1] + g[2];
                solid.Material(e).Stress(strain, temperature - stressFreeTemperature, stress, outOfPlane);
                double energy = solid.Material(e).EnergyDensity(strain, temperature - stressFreeTemperature, outOfPlane);
                sum += areas[p] * (stress[0] * g[0] + stress[3] * g[2] - energy);
                area += areas[p];
            }
        }
        return area > 0 ? sum * solid.Adherend.Thickness / area : null;
    }
}
