using InterfaceFE.Geometry;
using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Model;

/// <summary>Elements of an adherend whose material yields, at small rotation. An element in which no point yields has the elastic tangent, the same to the last bit.</summary>
internal sealed class YieldingBlock : SolidBlock<Quadrilateral8>
{
    private readonly J2Plasticity[] _laws;
    private readonly OutOfPlaneLink? _link;

    public YieldingBlock(Mesh mesh, MeshedAdherend adherend, PlaneElasticity[] materials, J2Plasticity yielding, double stressFreeTemperature, OutOfPlaneLink? link)
        : base(mesh, adherend, materials, stressFreeTemperature)
    {
        _link = link;
        _laws = new J2Plasticity[Count];
        for (int e = 0; e < Count; e++)
            _laws[e] = adherend.StraightAlongX ? yielding : yielding.Rotated(AngleAlong(Coordinates(e)));
        YieldCurve = yielding.Curve;
        StateSize = GaussPoints.Count * yielding.StateSize;
    }

    public override int NativeCount => Quadrilateral8.UnknownCount + (_link is null ? 0 : 1);

    public override int OutOfPlaneUnknown => _link?.Unknown ?? -1;

    public override int StateSize { get; }

    public override TangentKind Kind => TangentKind.Symmetric;

    public override YieldCurve YieldCurve { get; }

    public override ElementAnswer Evaluate(int element, in PathPoint at, ReadOnlySpan<double> displacement, ReadOnlySpan<double> accepted, Span<double> tentative, Wanted wanted, in ElementBuffers into)
    {
        const int n = Quadrilateral8.UnknownCount;
        Span<double> strained = stackalloc double[n + 1], tangent = (wanted & Wanted.Tangent) != 0 ? into.Tangent : [], rate = (wanted & Wanted.LoadRate) != 0 ? into.LoadRate : [];
        double change = at.Temperature - StressFreeTemperature;
        TakeRigidMovementOff(element, displacement[..n], strained[..n]);
        PlaneEnergy energy;
        if (_link is { } link)
        {
            strained[n] = displacement[n] / link.Length;
            energy = UniformQuadrilateral8.Respond(Coordinates(element), _laws[element], Adherend.Width, strained, change, accepted, tentative, into.Force, tangent, rate);
            Scale(1 / link.Length, into.Force, tangent, rate);
        }
        else
            energy = Quadrilateral8.Respond(Coordinates(element), _laws[element], Adherend.Width, strained[..n], change, accepted, tentative, into.Force, tangent, rate);
        if ((wanted & Wanted.Dissipation) != 0)
            into.Dissipation.Clear();
        return new ElementAnswer(energy.Stored, energy.Dissipated, energy.StoredByTemperature, 0, 0, 0, false);
    }

    public override void Stresses(int element, ReadOnlySpan<double> displacement, double temperature, ReadOnlySpan<double> accepted, Span<double> stresses)
    {
        J2Plasticity law = _laws[element];
        int state = law.StateSize;
        Span<double> gradients = stackalloc double[16], strain = stackalloc double[_link is null ? 3 : 4], scratch = stackalloc double[state], moduli = stackalloc double[16];
        if (_link is { } link)
            strain[3] = displacement[Quadrilateral8.UnknownCount] / link.Length;
        Gradients(element, displacement, gradients);
        for (int point = 0; point < GaussPoints.Count; point++)
        {
            ReadOnlySpan<double> g = gradients.Slice(4 * point, 4);
            (strain[0], strain[1], strain[2]) = (g[0], g[3], g[1] + g[2]);
            law.Update(strain, temperature - StressFreeTemperature, accepted.Slice(point * state, state), scratch, stresses.Slice(4 * point, 4), moduli);
        }
    }

    public override void PlasticStrains(ReadOnlySpan<double> accepted, Span<double> strains)
    {
        for (int point = 0; point < GaussPoints.Count; point++)
            strains[point] = accepted[point * _laws[0].StateSize + J2Plasticity.EquivalentStrain];
    }

    /// <summary>From the strain out of plane to the elongation over a length, whose inverse is the scale.</summary>
    private static void Scale(double scale, Span<double> force, Span<double> tangent, Span<double> rate)
    {
        const int n = Quadrilateral8.UnknownCount;
        force[n] *= scale;
        if (!rate.IsEmpty)
            rate[n] *= scale;
        for (int i = 0; i <= n && !tangent.IsEmpty; i++)
        {
            tangent[i * (n + 1) + n] *= scale;
            tangent[n * (n + 1) + i] *= scale;
        }
    }
}
