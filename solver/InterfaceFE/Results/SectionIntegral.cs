using InterfaceFE.Model;

namespace InterfaceFE.Results;

/// <summary>
/// Sections, upright before deformation, through a straight adherend for J: the integral over the section of traction·du/dx - W per width, W the mechanical energy density with its
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
    /// <param name="outOfPlane">Strain out of plane.</param>
    public static double? Mean(SolidBlock solid, double fromX, double toX, double[] ux, double[] uy, double temperature, double outOfPlane = 0)
    {
        int n = solid.NodesPerElement;
        Span<double> native = stackalloc double[2 * n], momentum = stackalloc double[4], positions = stackalloc double[8];
        Span<double> byX = stackalloc double[4 * n], byY = stackalloc double[4 * n], areas = stackalloc double[4];
        double sum = 0, area = 0;
        for (int e = 0; e < solid.Count; e++)
        {
            solid.GaussPositions(e, positions);
            double middle = 0.25 * (positions[0] + positions[2] + positions[4] + positions[6]);
            if (middle < fromX || middle > toX)
                continue;
            LayerSample.Gather(solid.Nodes(e), ux, uy, native);
            solid.EnergyMomentum(e, native, temperature, outOfPlane, momentum);
            solid.ShapeGradients(e, byX, byY, areas);
            for (int p = 0; p < 4; p++)
            {
                sum += areas[p] * momentum[p];
                area += areas[p];
            }
        }
        return area > 0 ? sum * solid.Adherend.Thickness / area : null;
    }
}
