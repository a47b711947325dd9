using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Mechanics.Elements;

/// <summary>
/// Eight-node quadrilateral of the serendipity family, integrated with 2×2 Gauss points.
/// <para>
/// Why 2×2: with 3×3 points the element locks towards incompressibility and in fully developed yielding (plastic flow keeps the volume), and its trapezoids
/// are stiff in bending (MacNeal-Harder beam 0.899 of the exact tip movement, against 0.967 here). Four points leave one movement without strain beside the
/// three rigid ones (u ~ xi·(3·eta² - 1), v ~ -eta·(3·xi² - 1) on a square), but neighbours cannot share it: seen from the two elements beside a common
/// side, its movement across the side has opposite signs where its movement along the side has equal signs, so no factor fits both. Two joined elements have
/// exactly three zero eigenvalues (tested). A single element that is held at a few nodes alone can still swing: a model needs two.
/// </para>
/// Shape functions: Ergatoudis, Irons and Zienkiewicz, Int. J. Solids Struct. 4 (1968) 31-42 (from memory). Members: <see cref="IPlaneElement"/>.
/// </summary>
public readonly struct Quadrilateral8 : IPlaneElement
{
    /// <summary>Number of nodes.</summary>
    public const int NodeCount = 8;

    /// <summary>Number of unknowns.</summary>
    public const int UnknownCount = 16;

    private const int Points = GaussPoints.Count;
    private static readonly double[] NodeXi = [-1, 1, 1, -1, 0, 1, 0, -1];
    private static readonly double[] NodeEta = [-1, -1, 1, 1, -1, 0, 1, 0];
    private static readonly double[] GaussByXi = Tabulate(byXi: true);
    private static readonly double[] GaussByEta = Tabulate(byXi: false);

    /// <inheritdoc/>
    public static int Nodes => NodeCount;

    /// <inheritdoc/>
    public static int Unknowns => UnknownCount;

    /// <inheritdoc/>
    public static void ShapeFunctions(double xi, double eta, Span<double> values)
    {
        for (int i = 0; i < 4; i++)
        {
            double x = NodeXi[i] * xi, y = NodeEta[i] * eta;
            values[i] = 0.25 * (1 + x) * (1 + y) * (x + y - 1);
        }
        values[4] = 0.5 * (1 - xi * xi) * (1 - eta);
        values[5] = 0.5 * (1 + xi) * (1 - eta * eta);
        values[6] = 0.5 * (1 - xi * xi) * (1 + eta);
        values[7] = 0.5 * (1 - xi) * (1 - eta * eta);
    }

    /// <inheritdoc/>
    public static void ShapeDerivatives(double xi, double eta, Span<double> byXi, Span<double> byEta)
    {
        for (int i = 0; i < 4; i++)
        {
            double x = NodeXi[i] * xi, y = NodeEta[i] * eta;
            byXi[i] = 0.25 * NodeXi[i] * (1 + y) * (2 * x + y);
            byEta[i] = 0.25 * NodeEta[i] * (1 + x) * (2 * y + x);
        }
        byXi[4] = -xi * (1 - eta);
        byXi[5] = 0.5 * (1 - eta * eta);
        byXi[6] = -xi * (1 + eta);
        byXi[7] = -0.5 * (1 - eta * eta);
        byEta[4] = -0.5 * (1 - xi * xi);
        byEta[5] = -eta * (1 + xi);
        byEta[6] = 0.5 * (1 - xi * xi);
        byEta[7] = -eta * (1 - xi);
    }

    /// <inheritdoc/>
    public static ElementShape Shape(ReadOnlySpan<double> coordinates)
    {
        Span<double> byXi = stackalloc double[NodeCount], byEta = stackalloc double[NodeCount];
        Span<double> gauss = stackalloc double[Points], nodes = stackalloc double[NodeCount];
        for (int point = 0; point < Points; point++)
            gauss[point] = PlaneKernel.Jacobian(coordinates, NaturalByXi(point), NaturalByEta(point), out _, out _, out _, out _);
        for (int node = 0; node < NodeCount; node++)
        {
            ShapeDerivatives(NodeXi[node], NodeEta[node], byXi, byEta);
            nodes[node] = PlaneKernel.Jacobian(coordinates, byXi, byEta, out _, out _, out _, out _);
        }
        return PlaneKernel.Shape(gauss, nodes);
    }

    /// <inheritdoc/>
    public static void ShapeGradients(ReadOnlySpan<double> coordinates, Span<double> byX, Span<double> byY, Span<double> areas)
    {
        for (int point = 0; point < Points; point++)
        {
            int at = point * NodeCount;
            areas[point] = PlaneKernel.Map(coordinates, NaturalByXi(point), NaturalByEta(point), byX.Slice(at, NodeCount), byY.Slice(at, NodeCount));
        }
    }

    /// <inheritdoc/>
    public static void Stiffness(ReadOnlySpan<double> coordinates, PlaneElasticity material, double width, Span<double> stiffness)
    {
        Span<double> byX = stackalloc double[Points * NodeCount], byY = stackalloc double[Points * NodeCount], areas = stackalloc double[Points];
        ShapeGradients(coordinates, byX, byY, areas);
        PlaneKernel.Stiffness(NodeCount, byX, byY, areas, material, width, stiffness);
    }

    /// <inheritdoc/>
    public static void ThermalForce(ReadOnlySpan<double> coordinates, PlaneElasticity material, double width, Span<double> force)
    {
        Span<double> byX = stackalloc double[Points * NodeCount], byY = stackalloc double[Points * NodeCount], areas = stackalloc double[Points];
        Span<double> stresses = stackalloc double[4 * Points];
        ShapeGradients(coordinates, byX, byY, areas);
        PlaneKernel.StressesOfOneKelvin(material, stresses);
        PlaneKernel.Force(NodeCount, NodeCount, byX, byY, areas, stresses, width, force);
    }

    /// <inheritdoc/>
    public static void InternalForce(
        ReadOnlySpan<double> coordinates, PlaneElasticity material, double width, ReadOnlySpan<double> displacements, double temperatureChange, Span<double> force)
    {
        Span<double> byX = stackalloc double[Points * NodeCount], byY = stackalloc double[Points * NodeCount], areas = stackalloc double[Points];
        Span<double> gradients = stackalloc double[4 * Points], stresses = stackalloc double[4 * Points];
        ShapeGradients(coordinates, byX, byY, areas);
        PlaneKernel.Gradients(NodeCount, byX, byY, displacements, gradients);
        PlaneKernel.Stresses(gradients, material, temperatureChange, stresses);
        PlaneKernel.Force(NodeCount, NodeCount, byX, byY, areas, stresses, width, force);
    }

    /// <inheritdoc/>
    public static void Stresses(
        ReadOnlySpan<double> coordinates, PlaneElasticity material, ReadOnlySpan<double> displacements, double temperatureChange, Span<double> stresses)
    {
        Span<double> gradients = stackalloc double[4 * Points];
        DisplacementGradients(coordinates, material, displacements, gradients);
        PlaneKernel.Stresses(gradients, material, temperatureChange, stresses);
    }

    /// <inheritdoc/>
    public static void DisplacementGradients(
        ReadOnlySpan<double> coordinates, PlaneElasticity material, ReadOnlySpan<double> displacements, Span<double> gradients)
    {
        Span<double> byX = stackalloc double[Points * NodeCount], byY = stackalloc double[Points * NodeCount], areas = stackalloc double[Points];
        ShapeGradients(coordinates, byX, byY, areas);
        PlaneKernel.Gradients(NodeCount, byX, byY, displacements, gradients);
    }

    /// <inheritdoc/>
    public static double StrainEnergy(
        ReadOnlySpan<double> coordinates, PlaneElasticity material, double width, ReadOnlySpan<double> displacements, double temperatureChange)
    {
        Span<double> byX = stackalloc double[Points * NodeCount], byY = stackalloc double[Points * NodeCount], areas = stackalloc double[Points];
        Span<double> gradients = stackalloc double[4 * Points];
        ShapeGradients(coordinates, byX, byY, areas);
        PlaneKernel.Gradients(NodeCount, byX, byY, displacements, gradients);
        return PlaneKernel.Energy(gradients, areas, material, width, temperatureChange);
    }

    /// <summary>
    /// Force, tangent and energy of the element for any material law with a state at each Gauss point. (Four nodes with incompatible modes would have to
    /// iterate on their inner parameters: yielding is a matter of eight nodes.)
    /// </summary>
    /// <typeparam name="TLaw">Type of the law.</typeparam>
    /// <param name="coordinates">Node coordinates, length 16.</param>
    /// <param name="law">Law, the same at all points.</param>
    /// <param name="width">Width out of plane [mm].</param>
    /// <param name="displacements">Node displacements at the end of the stride, length 16.</param>
    /// <param name="temperatureChange">Temperature change from the stress-free state [K].</param>
    /// <param name="accepted">Accepted state, point after point, length 4·StateSize.</param>
    /// <param name="tentative">State at the end of the stride, same length, overwritten; must not alias <paramref name="accepted"/>.</param>
    /// <param name="force">Internal force [N], length 16, overwritten.</param>
    /// <param name="tangent">Derivative of the force by the displacements [N/mm], row-major 16×16, symmetric, overwritten; empty when not wanted.</param>
    /// <param name="byTemperature">Derivative of the force by temperature at fixed displacements [N/K], length 16, overwritten; empty when not wanted.</param>
    /// <returns>Energies of the element [mJ].</returns>
    public static PlaneEnergy Respond<TLaw>(
        ReadOnlySpan<double> coordinates,
        TLaw law,
        double width,
        ReadOnlySpan<double> displacements,
        double temperatureChange,
        ReadOnlySpan<double> accepted,
        Span<double> tentative,
        Span<double> force,
        Span<double> tangent,
        Span<double> byTemperature = default)
        where TLaw : IPlaneLaw
    {
        Span<double> byX = stackalloc double[Points * NodeCount], byY = stackalloc double[Points * NodeCount], areas = stackalloc double[Points];
        Span<double> gradient = stackalloc double[4], strain = stackalloc double[3], stresses = stackalloc double[4 * Points], moduli = stackalloc double[9];
        ShapeGradients(coordinates, byX, byY, areas);
        Span<double> rates = stackalloc double[4 * Points], rate = stackalloc double[3];
        tangent.Clear();
        rate.Clear();
        double stored = 0, dissipated = 0, storedByTemperature = 0;
        int state = law.StateSize;
        for (int point = 0; point < Points; point++)
        {
            ReadOnlySpan<double> gx = byX.Slice(point * NodeCount, NodeCount), gy = byY.Slice(point * NodeCount, NodeCount);
            PlaneKernel.Gradient(gx, gy, displacements, gradient);
            PlaneKernel.Strain(gradient, strain);
            PlaneEnergy energy = law.Update(
                strain, temperatureChange, accepted.Slice(point * state, state), tentative.Slice(point * state, state), stresses.Slice(4 * point, 4), moduli,
                byTemperature.IsEmpty ? [] : rate);
            double volume = areas[point] * width;
            stored += energy.Stored * volume;
            dissipated += energy.Dissipated * volume;
            storedByTemperature += energy.StoredByTemperature * volume;
            (rates[4 * point], rates[4 * point + 1], rates[4 * point + 3]) = (rate[0], rate[1], rate[2]);
            if (!tangent.IsEmpty)
                PlaneKernel.AddStiffness(gx, gy, volume, moduli, tangent);
        }
        if (!tangent.IsEmpty)
            PlaneKernel.Mirror(UnknownCount, tangent);
        PlaneKernel.Force(NodeCount, NodeCount, byX, byY, areas, stresses, width, force);
        if (!byTemperature.IsEmpty)
            PlaneKernel.Force(NodeCount, NodeCount, byX, byY, areas, rates, width, byTemperature);
        return new PlaneEnergy(stored, dissipated, storedByTemperature);
    }

    /// <inheritdoc/>
    public static void GaussPositions(ReadOnlySpan<double> coordinates, Span<double> positions)
    {
        Span<double> values = stackalloc double[NodeCount];
        for (int point = 0; point < Points; point++)
        {
            ShapeFunctions(GaussPoints.Xi(point), GaussPoints.Eta(point), values);
            PlaneKernel.Position(values, coordinates, positions.Slice(2 * point, 2));
        }
    }

    /// <inheritdoc/>
    public static void ExtrapolateToNodes(int components, ReadOnlySpan<double> gaussValues, Span<double> nodeValues) =>
        PlaneKernel.Extrapolate(NodeXi, NodeEta, components, gaussValues, nodeValues);

    private static ReadOnlySpan<double> NaturalByXi(int point) => GaussByXi.AsSpan(point * NodeCount, NodeCount);

    private static ReadOnlySpan<double> NaturalByEta(int point) => GaussByEta.AsSpan(point * NodeCount, NodeCount);

    private static double[] Tabulate(bool byXi)
    {
        double[] xi = new double[Points * NodeCount], eta = new double[Points * NodeCount];
        for (int point = 0; point < Points; point++)
            ShapeDerivatives(GaussPoints.Xi(point), GaussPoints.Eta(point), xi.AsSpan(point * NodeCount, NodeCount), eta.AsSpan(point * NodeCount, NodeCount));
        return byXi ? xi : eta;
    }
}
