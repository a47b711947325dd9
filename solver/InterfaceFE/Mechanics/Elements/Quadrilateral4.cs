using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Mechanics.Elements;

/// <summary>
/// Four-node quadrilateral with two incompatible modes, 2×2 Gauss points. The modes 1 - xi² and 1 - eta² (Wilson, Taylor, Doherty and Ghaboussi 1973) bend
/// without shear locking; their gradients are taken with the Jacobian J0 of the element's centre and weighed by det J0/det J, so that their integral
/// vanishes and every distorted mesh passes the patch test (Taylor, Beresford and Wilson, Int. J. Numer. Meth. Eng. 10 (1976) 1211-1219, from memory). Their
/// four parameters are condensed inside the element and follow from the displacements. As the integral of their gradients is 0, a uniform temperature change
/// moves none of them.
/// <para>
/// On trapezoids in bending the element is stiff (MacNeal-Harder beam 0.05 of the exact tip movement): use it on rectangles and parallelograms, or use eight
/// nodes.
/// </para>
/// Members: <see cref="IPlaneElement"/>.
/// </summary>
public readonly struct Quadrilateral4 : IPlaneElement
{
    /// <summary>Number of nodes.</summary>
    public const int NodeCount = 4;

    /// <summary>Number of unknowns.</summary>
    public const int UnknownCount = 8;

    /// <summary>Number of inner parameters: x, y of the mode 1 - xi², then of 1 - eta² [mm].</summary>
    public const int InnerCount = 4;

    private const int Points = GaussPoints.Count;
    private const int Functions = NodeCount + 2;
    private const int FullCount = 2 * Functions;
    private static readonly double[] NodeXi = [-1, 1, 1, -1];
    private static readonly double[] NodeEta = [-1, -1, 1, 1];
    private static readonly double[] GaussByXi = Tabulate(byXi: true);
    private static readonly double[] GaussByEta = Tabulate(byXi: false);

    /// <inheritdoc/>
    public static int Nodes => NodeCount;

    /// <inheritdoc/>
    public static int Unknowns => UnknownCount;

    /// <inheritdoc/>
    public static void ShapeFunctions(double xi, double eta, Span<double> values)
    {
        for (int i = 0; i < NodeCount; i++)
            values[i] = 0.25 * (1 + NodeXi[i] * xi) * (1 + NodeEta[i] * eta);
    }

    /// <inheritdoc/>
    public static void ShapeDerivatives(double xi, double eta, Span<double> byXi, Span<double> byEta)
    {
        for (int i = 0; i < NodeCount; i++)
        {
            byXi[i] = 0.25 * NodeXi[i] * (1 + NodeEta[i] * eta);
            byEta[i] = 0.25 * NodeEta[i] * (1 + NodeXi[i] * xi);
        }
    }

    /// <inheritdoc/>
    public static ElementShape Shape(ReadOnlySpan<double> coordinates)
    {
        Span<double> byXi = stackalloc double[NodeCount], byEta = stackalloc double[NodeCount];
        Span<double> gauss = stackalloc double[Points], nodes = stackalloc double[NodeCount];
        for (int point = 0; point < Points; point++)
        {
            gauss[point] = PlaneKernel.Jacobian(coordinates, NaturalByXi(point), NaturalByEta(point), out _, out _, out _, out _);
            ShapeDerivatives(NodeXi[point], NodeEta[point], byXi, byEta);
            nodes[point] = PlaneKernel.Jacobian(coordinates, byXi, byEta, out _, out _, out _, out _);
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
        Span<double> byX = stackalloc double[Points * Functions], byY = stackalloc double[Points * Functions], areas = stackalloc double[Points];
        Span<double> full = stackalloc double[FullCount * FullCount];
        FullGradients(coordinates, byX, byY, areas);
        PlaneKernel.Stiffness(Functions, byX, byY, areas, material, width, full);
        EliminateInner(full);
        for (int row = 0; row < UnknownCount; row++)
            full.Slice(row * FullCount, UnknownCount).CopyTo(stiffness.Slice(row * UnknownCount, UnknownCount));
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
        Span<double> byX = stackalloc double[Points * Functions], byY = stackalloc double[Points * Functions], areas = stackalloc double[Points];
        Span<double> gradients = stackalloc double[4 * Points], stresses = stackalloc double[4 * Points];
        FullGradients(coordinates, byX, byY, areas);
        GradientsWithModes(byX, byY, areas, material, displacements, gradients);
        PlaneKernel.Stresses(gradients, material, temperatureChange, stresses);
        PlaneKernel.Force(Functions, NodeCount, byX, byY, areas, stresses, width, force);
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
        Span<double> byX = stackalloc double[Points * Functions], byY = stackalloc double[Points * Functions], areas = stackalloc double[Points];
        FullGradients(coordinates, byX, byY, areas);
        GradientsWithModes(byX, byY, areas, material, displacements, gradients);
    }

    /// <inheritdoc/>
    public static double StrainEnergy(
        ReadOnlySpan<double> coordinates, PlaneElasticity material, double width, ReadOnlySpan<double> displacements, double temperatureChange)
    {
        Span<double> byX = stackalloc double[Points * Functions], byY = stackalloc double[Points * Functions], areas = stackalloc double[Points];
        Span<double> gradients = stackalloc double[4 * Points];
        FullGradients(coordinates, byX, byY, areas);
        GradientsWithModes(byX, byY, areas, material, displacements, gradients);
        return PlaneKernel.Energy(gradients, areas, material, width, temperatureChange);
    }

    /// <summary>Parameters of the incompatible modes that go with the displacements [mm].</summary>
    /// <param name="coordinates">Node coordinates.</param>
    /// <param name="material">Material; only ratios of its stiffness matter.</param>
    /// <param name="displacements">Node displacements.</param>
    /// <param name="parameters">Length <see cref="InnerCount"/>, overwritten.</param>
    public static void InnerParameters(ReadOnlySpan<double> coordinates, PlaneElasticity material, ReadOnlySpan<double> displacements, Span<double> parameters)
    {
        Span<double> byX = stackalloc double[Points * Functions], byY = stackalloc double[Points * Functions], areas = stackalloc double[Points];
        FullGradients(coordinates, byX, byY, areas);
        SolveInner(byX, byY, areas, material, displacements, parameters);
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

    // Gradients of the four shape functions and, behind them at each point, of the two modes.
    private static void FullGradients(ReadOnlySpan<double> coordinates, Span<double> byX, Span<double> byY, Span<double> areas)
    {
        Span<double> centreByXi = stackalloc double[NodeCount], centreByEta = stackalloc double[NodeCount];
        ShapeDerivatives(0, 0, centreByXi, centreByEta);
        PlaneKernel.Jacobian(coordinates, centreByXi, centreByEta, out double xXi, out double yXi, out double xEta, out double yEta);
        for (int point = 0; point < Points; point++)
        {
            int at = point * Functions;
            double determinant = PlaneKernel.Map(coordinates, NaturalByXi(point), NaturalByEta(point), byX.Slice(at, NodeCount), byY.Slice(at, NodeCount));
            areas[point] = determinant;
            // (det J0/det J)·J0⁻ᵀ·(natural gradient); det J0 cancels against the determinant in the inverse.
            double first = -2 * GaussPoints.Xi(point) / determinant, second = -2 * GaussPoints.Eta(point) / determinant;
            byX[at + NodeCount] = yEta * first;
            byY[at + NodeCount] = -xEta * first;
            byX[at + NodeCount + 1] = -yXi * second;
            byY[at + NodeCount + 1] = xXi * second;
        }
    }

    private static void GradientsWithModes(
        ReadOnlySpan<double> byX,
        ReadOnlySpan<double> byY,
        ReadOnlySpan<double> areas,
        PlaneElasticity material,
        ReadOnlySpan<double> displacements,
        Span<double> gradients)
    {
        Span<double> all = stackalloc double[FullCount];
        displacements[..UnknownCount].CopyTo(all);
        SolveInner(byX, byY, areas, material, displacements, all[UnknownCount..]);
        PlaneKernel.Gradients(Functions, byX, byY, all, gradients);
    }

    // Inner rows: K_aa·a = -K_au·u, by back substitution in the matrix from which the inner unknowns were eliminated.
    private static void SolveInner(
        ReadOnlySpan<double> byX,
        ReadOnlySpan<double> byY,
        ReadOnlySpan<double> areas,
        PlaneElasticity material,
        ReadOnlySpan<double> displacements,
        Span<double> parameters)
    {
        Span<double> full = stackalloc double[FullCount * FullCount];
        PlaneKernel.Stiffness(Functions, byX, byY, areas, material, 1, full);
        EliminateInner(full);
        for (int row = UnknownCount; row < FullCount; row++)
        {
            double sum = 0;
            for (int column = 0; column < UnknownCount; column++)
                sum += full[row * FullCount + column] * displacements[column];
            for (int column = UnknownCount; column < row; column++)
                sum += full[row * FullCount + column] * parameters[column - UnknownCount];
            parameters[row - UnknownCount] = -sum / full[row * FullCount + row];
        }
    }

    // Symmetric elimination of the inner unknowns, last first: the leading 8×8 becomes the condensed stiffness,
    // row k keeps the equation of unknown k with the later ones gone.
    private static void EliminateInner(Span<double> full)
    {
        for (int pivot = FullCount - 1; pivot >= UnknownCount; pivot--)
            for (int row = 0; row < pivot; row++)
            {
                double factor = full[pivot * FullCount + row] / full[pivot * FullCount + pivot];
                for (int column = row; column < pivot; column++)
                {
                    double value = full[row * FullCount + column] - factor * full[pivot * FullCount + column];
                    full[row * FullCount + column] = value;
                    full[column * FullCount + row] = value;
                }
            }
    }

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
