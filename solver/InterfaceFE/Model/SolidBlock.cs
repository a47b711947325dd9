using InterfaceFE.Geometry;
using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Model;

/// <summary>
/// Elements of one adherend. Linear elastic at small rotation: stiffness, thermal force and blocked thermal energy of each element are computed once, after which
/// force = K·u + thermal force·dT, energy = ½·u·K·u + dT·(thermal force·u) + ½·c·dT². A material that yields is in <see cref="YieldingBlock"/>.
/// </summary>
public abstract class SolidBlock : IElementBlock
{
    private protected SolidBlock(MeshedAdherend adherend, double stressFreeTemperature)
    {
        Adherend = adherend;
        StressFreeTemperature = stressFreeTemperature;
    }

    /// <summary>The meshed adherend.</summary>
    public MeshedAdherend Adherend { get; }

    /// <summary>Temperature without thermal stress [K].</summary>
    protected double StressFreeTemperature { get; }

    /// <inheritdoc/>
    public string Name => Adherend.Name;

    /// <inheritdoc/>
    public abstract int Count { get; }

    /// <inheritdoc/>
    public abstract int NodesPerElement { get; }

    /// <inheritdoc/>
    public virtual int NativeCount => 2 * NodesPerElement;

    /// <inheritdoc/>
    public virtual int OutOfPlaneUnknown => -1;

    /// <inheritdoc/>
    public virtual int StateSize => 0;

    /// <inheritdoc/>
    public virtual TangentKind Kind => TangentKind.Constant;

    /// <summary>Yield stress of the material; null when it does not yield.</summary>
    public virtual YieldCurve? YieldCurve => null;

    /// <inheritdoc/>
    public ReadOnlySpan<int> Nodes(int element) => Adherend.Connectivity.AsSpan(element * NodesPerElement, NodesPerElement);

    /// <inheritdoc/>
    public abstract ElementAnswer Evaluate(int element, in PathPoint at, ReadOnlySpan<double> displacement, ReadOnlySpan<double> accepted, Span<double> tentative, Wanted wanted, in ElementBuffers into);

    /// <summary>Material of an element, in the model's axes.</summary>
    public abstract PlaneElasticity Material(int element);

    /// <summary>Stresses at the four Gauss points of an element.</summary>
    /// <param name="element">Element index.</param>
    /// <param name="displacement">Native displacements [mm], <see cref="NativeCount"/> numbers.</param>
    /// <param name="temperature">Temperature [K].</param>
    /// <param name="accepted">Accepted state that goes with the displacements.</param>
    /// <param name="stresses">Point after point xx, yy, zz, xy [MPa]; length 16, overwritten.</param>
    public abstract void Stresses(int element, ReadOnlySpan<double> displacement, double temperature, ReadOnlySpan<double> accepted, Span<double> stresses);

    /// <summary>Equivalent plastic strain at the Gauss points of an element, from its accepted state.</summary>
    /// <param name="accepted">Accepted state.</param>
    /// <param name="strains">Length 4, overwritten.</param>
    public virtual void PlasticStrains(ReadOnlySpan<double> accepted, Span<double> strains) => strains.Clear();

    /// <summary>Displacement gradients at the Gauss points: du/dx, du/dy, dv/dx, dv/dy, point after point; length 16, overwritten.</summary>
    public abstract void Gradients(int element, ReadOnlySpan<double> displacement, Span<double> gradients);

    /// <summary>Rotation of the material at a displacement gradient [rad], counter-clockwise.</summary>
    public virtual double Rotation(ReadOnlySpan<double> gradient) => 0.5 * (gradient[2] - gradient[1]);

    /// <summary>
    /// Component xx of Eshelby's energy momentum at the Gauss points with opposite sign, before deformation: traction on a section whose normal is x times d displacement/dx, less the
    /// energy density, of the strain less the thermal strain and with its out-of-plane part, for a material that has not yielded.
    /// </summary>
    /// <param name="element">Element index.</param>
    /// <param name="displacement">Native displacements [mm].</param>
    /// <param name="temperature">Temperature [K].</param>
    /// <param name="outOfPlane">Strain out of plane.</param>
    /// <param name="momentum">One per point [MPa]; length 4, overwritten.</param>
    public virtual void EnergyMomentum(int element, ReadOnlySpan<double> displacement, double temperature, double outOfPlane, Span<double> momentum)
    {
        Span<double> gradients = stackalloc double[16], strain = stackalloc double[3], stress = stackalloc double[4];
        double change = temperature - StressFreeTemperature;
        Gradients(element, displacement, gradients);
        for (int p = 0; p < 4; p++)
        {
            ReadOnlySpan<double> g = gradients.Slice(4 * p, 4);
            strain[0] = g[0];
            strain[1] = g[3];
            strain[2] = g[1] + g[2];
            Material(element).Stress(strain, change, stress, outOfPlane);
            momentum[p] = stress[0] * g[0] + stress[3] * g[2] - Material(element).EnergyDensity(strain, change, outOfPlane);
        }
    }

    /// <summary>Derivatives of the shape functions at the Gauss points [1/mm] (point after point, one per node) and the areas the points stand for [mm²].</summary>
    public abstract void ShapeGradients(int element, Span<double> byX, Span<double> byY, Span<double> areas);

    /// <summary>Volume of an element that each of its nodes stands for: integral of its shape function [mm³]; one per node, overwritten.</summary>
    public abstract void VolumeShares(int element, Span<double> volumes);

    /// <summary>Positions of the Gauss points x, y [mm], point after point; length 8, overwritten.</summary>
    public abstract void GaussPositions(int element, Span<double> positions);

    /// <summary>Values at the nodes from values at the Gauss points.</summary>
    public abstract void ExtrapolateToNodes(int components, ReadOnlySpan<double> gaussValues, Span<double> nodeValues);

    /// <summary>Angle from the model's x axis to an element's way along its adherend [rad].</summary>
    private protected static double AngleAlong(ReadOnlySpan<double> xy) =>
        Math.Atan2(xy[3] + xy[5] - xy[1] - xy[7], xy[2] + xy[4] - xy[0] - xy[6]);

    /// <summary>Makes the block of an adherend in the mesh's kind of element.</summary>
    /// <param name="mesh">The mesh.</param>
    /// <param name="adherend">Adherend.</param>
    /// <param name="materials">Material in the axes of the adherend, x along it: one, or one for each row of elements from the bottom up.</param>
    /// <param name="stressFreeTemperature">Temperature without thermal stress [K].</param>
    /// <param name="yielding">The same material as it yields; null: it does not.</param>
    /// <param name="outOfPlane">The unknown with which it strains out of plane; null: none.</param>
    /// <param name="turns">Whether rotations are finite.</param>
    /// <exception cref="ArgumentException">The material yields or rotations are finite, and the elements have four nodes; or rotations are finite and there is a strain out of plane.</exception>
    public static SolidBlock Create(
        Mesh mesh, MeshedAdherend adherend, PlaneElasticity[] materials, double stressFreeTemperature, J2Plasticity? yielding = null, OutOfPlaneLink? outOfPlane = null, bool turns = false)
    {
        bool eight = mesh.NodesPerSolid == Quadrilateral8.NodeCount;
        if (turns)
        {
            return eight && outOfPlane is null
                ? new TurningBlock(mesh, adherend, materials, yielding, stressFreeTemperature)
                : throw new ArgumentException("finite rotation needs eight-node elements without strain out of plane", nameof(turns));
        }
        if (yielding is not null)
        {
            return eight
                ? new YieldingBlock(mesh, adherend, materials, yielding, stressFreeTemperature, outOfPlane)
                : throw new ArgumentException("yielding needs eight-node elements", nameof(yielding));
        }
        if (outOfPlane is { } link)
            return eight ? new UniformBlock<Quadrilateral8>(mesh, adherend, materials, stressFreeTemperature, link) : new UniformBlock<Quadrilateral4>(mesh, adherend, materials, stressFreeTemperature, link);
        return eight ? new SolidBlock<Quadrilateral8>(mesh, adherend, materials, stressFreeTemperature) : new SolidBlock<Quadrilateral4>(mesh, adherend, materials, stressFreeTemperature);
    }
}

/// <summary>The unknown with which a block strains out of plane.</summary>
/// <param name="Unknown">Elongation of the group [mm].</param>
/// <param name="Length">Length over which it is counted [mm]: strain = elongation over length.</param>
public readonly record struct OutOfPlaneLink(int Unknown, double Length);

/// <summary>The block for one kind of element.</summary>
/// <typeparam name="TElement">Kind of element.</typeparam>
internal class SolidBlock<TElement> : SolidBlock
    where TElement : struct, IPlaneElement
{
    private readonly double[] _coordinates, _stiffness, _thermal, _blocked;
    private readonly PlaneElasticity[] _materials;

    public SolidBlock(Mesh mesh, MeshedAdherend adherend, PlaneElasticity[] materials, double stressFreeTemperature)
        : base(adherend, stressFreeTemperature)
    {
        int n = TElement.Unknowns;
        Count = adherend.Connectivity.Length / TElement.Nodes;
        _coordinates = new double[Count * n];
        _stiffness = new double[checked(Count * n * n)];
        _thermal = new double[Count * n];
        _blocked = new double[Count];
        _materials = new PlaneElasticity[Count];
        Span<double> zero = stackalloc double[n];
        for (int e = 0; e < Count; e++)
        {
            ReadOnlySpan<int> nodes = Nodes(e);
            Span<double> xy = _coordinates.AsSpan(e * n, n);
            for (int i = 0; i < nodes.Length; i++)
            {
                xy[2 * i] = mesh.X[nodes[i]];
                xy[2 * i + 1] = mesh.Y[nodes[i]];
            }
            PlaneElasticity material = materials[e % materials.Length];
            _materials[e] = adherend.StraightAlongX ? material : material.Rotated(AngleAlong(xy));
            TElement.Stiffness(xy, _materials[e], adherend.Width, _stiffness.AsSpan(e * n * n, n * n));
            TElement.ThermalForce(xy, _materials[e], adherend.Width, _thermal.AsSpan(e * n, n));
            _blocked[e] = 2 * TElement.StrainEnergy(xy, _materials[e], adherend.Width, zero, 1);
        }
    }

    public override int Count { get; }

    public override int NodesPerElement => TElement.Nodes;

    public override ElementAnswer Evaluate(int element, in PathPoint at, ReadOnlySpan<double> displacement, ReadOnlySpan<double> accepted, Span<double> tentative, Wanted wanted, in ElementBuffers into)
    {
        int n = TElement.Unknowns;
        double change = at.Temperature - StressFreeTemperature;
        ReadOnlySpan<double> k = _stiffness.AsSpan(element * n * n, n * n);
        ReadOnlySpan<double> thermal = _thermal.AsSpan(element * n, n);
        Span<double> strained = stackalloc double[n];
        TakeRigidMovementOff(element, displacement, strained);
        double work = 0, thermalWork = 0;
        for (int i = 0; i < n; i++)
        {
            double sum = Dot(k.Slice(i * n, n), strained);
            work += strained[i] * sum;
            thermalWork += strained[i] * thermal[i];
            into.Force[i] = sum + thermal[i] * change;
        }
        if ((wanted & Wanted.Tangent) != 0)
            k.CopyTo(into.Tangent);
        if ((wanted & Wanted.LoadRate) != 0)
            thermal.CopyTo(into.LoadRate);
        if ((wanted & Wanted.Dissipation) != 0)
            into.Dissipation.Clear();
        double stored = 0.5 * work + change * thermalWork + 0.5 * _blocked[element] * change * change;
        return new ElementAnswer(stored, 0, thermalWork + _blocked[element] * change, 0, 0, 0, false);
    }

    public override PlaneElasticity Material(int element) => _materials[element];

    public override void Stresses(int element, ReadOnlySpan<double> displacement, double temperature, ReadOnlySpan<double> accepted, Span<double> stresses) =>
        TElement.Stresses(Coordinates(element), _materials[element], displacement, temperature - StressFreeTemperature, stresses);

    public override void Gradients(int element, ReadOnlySpan<double> displacement, Span<double> gradients) =>
        TElement.DisplacementGradients(Coordinates(element), _materials[element], displacement, gradients);

    public override void ShapeGradients(int element, Span<double> byX, Span<double> byY, Span<double> areas) =>
        TElement.ShapeGradients(Coordinates(element), byX, byY, areas);

    public override void GaussPositions(int element, Span<double> positions) => TElement.GaussPositions(Coordinates(element), positions);

    public override void VolumeShares(int element, Span<double> volumes)
    {
        Span<double> byX = stackalloc double[4 * TElement.Nodes], byY = stackalloc double[4 * TElement.Nodes], areas = stackalloc double[GaussPoints.Count], shape = stackalloc double[TElement.Nodes];
        TElement.ShapeGradients(Coordinates(element), byX, byY, areas);
        volumes.Clear();
        for (int point = 0; point < GaussPoints.Count; point++)
        {
            TElement.ShapeFunctions(GaussPoints.Xi(point), GaussPoints.Eta(point), shape);
            for (int i = 0; i < shape.Length; i++)
                volumes[i] += shape[i] * areas[point] * Adherend.Width;
        }
    }

    public override void ExtrapolateToNodes(int components, ReadOnlySpan<double> gaussValues, Span<double> nodeValues) =>
        TElement.ExtrapolateToNodes(components, gaussValues, nodeValues);

    /// <summary>
    /// Displacement less a rigid movement: that of the first node and the turn of the diagonal. It strains nothing, so forces stay the same; their rounding then grows with the
    /// strain and not with the travel, which in slender arms is ten thousand times as large.
    /// </summary>
    protected void TakeRigidMovementOff(int element, ReadOnlySpan<double> displacement, Span<double> strained)
    {
        ReadOnlySpan<double> xy = Coordinates(element);
        double x = xy[0], y = xy[1], u = displacement[0], v = displacement[1];
        double alongX = xy[4] - x, alongY = xy[5] - y;
        double turn = (alongX * (displacement[5] - v) - alongY * (displacement[4] - u)) / (alongX * alongX + alongY * alongY);
        for (int i = 0; i < strained.Length; i += 2)
        {
            strained[i] = displacement[i] - u + turn * (xy[i + 1] - y);
            strained[i + 1] = displacement[i + 1] - v - turn * (xy[i] - x);
        }
    }

    /// <summary>Elastic stiffness of an element [N/mm], row-major.</summary>
    protected ReadOnlySpan<double> ElasticStiffness(int element) => _stiffness.AsSpan(element * TElement.Unknowns * TElement.Unknowns, TElement.Unknowns * TElement.Unknowns);

    /// <summary>Coordinates of an element's nodes.</summary>
    protected ReadOnlySpan<double> Coordinates(int element) => _coordinates.AsSpan(element * TElement.Unknowns, TElement.Unknowns);

    private static double Dot(ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        double sum = 0;
        for (int i = 0; i < a.Length; i++)
            sum += a[i] * b[i];
        return sum;
    }
}
