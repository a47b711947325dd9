using InterfaceFE.Geometry;
using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Model;

/// <summary>Elements of an adherend for finite rotation: eight nodes, logarithmic strain, any material law.</summary>
internal sealed class TurningBlock : SolidBlock
{
    private const int Nodes8 = Quadrilateral8.NodeCount, Unknowns8 = Quadrilateral8.UnknownCount, Points = GaussPoints.Count;

    private readonly double[] _coordinates, _byX, _byY, _areas;
    private readonly PlaneElasticity[] _materials;
    private readonly IPlaneLaw[] _laws;
    private readonly int _stateSize;

    public TurningBlock(Mesh mesh, MeshedAdherend adherend, PlaneElasticity[] materials, J2Plasticity? yielding, double stressFreeTemperature)
        : base(adherend, stressFreeTemperature)
    {
        Count = adherend.Connectivity.Length / Nodes8;
        _coordinates = new double[Count * Unknowns8];
        _byX = new double[Count * Points * Nodes8];
        _byY = new double[Count * Points * Nodes8];
        _areas = new double[Count * Points];
        _materials = new PlaneElasticity[Count];
        _laws = new IPlaneLaw[Count];
        for (int e = 0; e < Count; e++)
        {
            Span<double> xy = _coordinates.AsSpan(e * Unknowns8, Unknowns8);
            ReadOnlySpan<int> nodes = Nodes(e);
            for (int i = 0; i < nodes.Length; i++)
            {
                xy[2 * i] = mesh.X[nodes[i]];
                xy[2 * i + 1] = mesh.Y[nodes[i]];
            }
            Quadrilateral8.ShapeGradients(xy, Slice(_byX, e), Slice(_byY, e), _areas.AsSpan(e * Points, Points));
            double angle = adherend.StraightAlongX ? 0 : AngleAlong(xy);
            _materials[e] = materials[e % materials.Length].Rotated(angle);
            _laws[e] = yielding is null ? _materials[e] : yielding.Rotated(angle);
        }
        YieldCurve = yielding?.Curve;
        _stateSize = yielding?.StateSize ?? 0;
    }

    public override int Count { get; }

    public override int NodesPerElement => Nodes8;

    public override int StateSize => Points * _stateSize;

    public override TangentKind Kind => TangentKind.Symmetric;

    public override YieldCurve? YieldCurve { get; }

    public override ElementAnswer Evaluate(int element, in PathPoint at, ReadOnlySpan<double> displacement, ReadOnlySpan<double> accepted, Span<double> tentative, Wanted wanted, in ElementBuffers into)
    {
        PlaneEnergy energy = TurningElement.Respond(Slice(_byX, element), Slice(_byY, element), _areas.AsSpan(element * Points, Points), _laws[element], Adherend.Width, displacement,
            at.Temperature - StressFreeTemperature, accepted, tentative, into.Force, (wanted & Wanted.Tangent) != 0 ? into.Tangent : [], (wanted & Wanted.LoadRate) != 0 ? into.LoadRate : []);
        if ((wanted & Wanted.Dissipation) != 0)
            into.Dissipation.Clear();
        return new ElementAnswer(energy.Stored, energy.Dissipated, energy.StoredByTemperature, 0, 0, 0, false);
    }

    public override PlaneElasticity Material(int element) => _materials[element];

    public override void Stresses(int element, ReadOnlySpan<double> displacement, double temperature, ReadOnlySpan<double> accepted, Span<double> stresses)
    {
        Span<double> gradients = stackalloc double[4 * Points], strain = stackalloc double[3], moduli = stackalloc double[9], scratch = stackalloc double[_stateSize];
        Gradients(element, displacement, gradients);
        for (int p = 0; p < Points; p++)
        {
            LogarithmicStrain.Of(gradients.Slice(4 * p, 4)).Strain(strain);
            _laws[element].Update(strain, temperature - StressFreeTemperature, accepted.Slice(p * _stateSize, _stateSize), scratch, stresses.Slice(4 * p, 4), moduli);
        }
        TurningElement.TrueStress(gradients, stresses);
    }

    public override void PlasticStrains(ReadOnlySpan<double> accepted, Span<double> strains)
    {
        for (int p = 0; p < Points; p++)
            strains[p] = _stateSize > 0 ? accepted[p * _stateSize + J2Plasticity.EquivalentStrain] : 0;
    }

    public override void Gradients(int element, ReadOnlySpan<double> displacement, Span<double> gradients)
    {
        Span<double> relative = stackalloc double[Unknowns8];
        TurningElement.TakeTravelOff(displacement, relative);
        PlaneKernel.Gradients(Nodes8, Slice(_byX, element), Slice(_byY, element), relative, gradients);
    }

    public override double Rotation(ReadOnlySpan<double> gradient) => Math.Atan2(gradient[2] - gradient[1], 2 + gradient[0] + gradient[3]);

    public override void ShapeGradients(int element, Span<double> byX, Span<double> byY, Span<double> areas)
    {
        Slice(_byX, element).CopyTo(byX);
        Slice(_byY, element).CopyTo(byY);
        _areas.AsSpan(element * Points, Points).CopyTo(areas);
    }

    public override void GaussPositions(int element, Span<double> positions) => Quadrilateral8.GaussPositions(Coordinates(element), positions);

    public override void ExtrapolateToNodes(int components, ReadOnlySpan<double> gaussValues, Span<double> nodeValues) =>
        Quadrilateral8.ExtrapolateToNodes(components, gaussValues, nodeValues);

    public override void EnergyMomentum(int element, ReadOnlySpan<double> displacement, double temperature, double outOfPlane, Span<double> momentum)
    {
        Span<double> gradients = stackalloc double[4 * Points], strain = stackalloc double[3], stress = stackalloc double[4];
        double change = temperature - StressFreeTemperature;
        Gradients(element, displacement, gradients);
        for (int p = 0; p < Points; p++)
        {
            ReadOnlySpan<double> g = gradients.Slice(4 * p, 4);
            LogarithmicStrain.Of(g).Strain(strain);
            _materials[element].Stress(strain, change, stress, outOfPlane);
            (double alongX, double alongY) = TurningElement.NominalTraction(g, stress);
            momentum[p] = alongX * g[0] + alongY * g[2] - _materials[element].EnergyDensity(strain, change, outOfPlane);
        }
    }

    private ReadOnlySpan<double> Coordinates(int element) => _coordinates.AsSpan(element * Unknowns8, Unknowns8);

    private static Span<double> Slice(double[] values, int element) => values.AsSpan(element * Points * Nodes8, Points * Nodes8);
}
