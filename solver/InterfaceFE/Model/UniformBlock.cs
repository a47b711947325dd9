using InterfaceFE.Geometry;
using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Model;

/// <summary>
/// Linear elastic elements whose strain out of plane e is one unknown of their group. To the held element e is what a temperature is: with its force q at no displacement, its energy c and
/// its mixed term m with temperature, force = K·u + f·dT + q·e, force of the unknown = q·u + m·dT + c·e, and the energy is theirs.
/// </summary>
internal sealed class UniformBlock<TElement> : SolidBlock<TElement>
    where TElement : struct, IPlaneElement
{
    private readonly double[] _force, _stiffness, _mixed;
    private readonly OutOfPlaneLink _link;

    public UniformBlock(Mesh mesh, MeshedAdherend adherend, PlaneElasticity[] materials, double stressFreeTemperature, OutOfPlaneLink link)
        : base(mesh, adherend, materials, stressFreeTemperature)
    {
        int n = TElement.Unknowns;
        _link = link;
        _force = new double[Count * n];
        _stiffness = new double[Count];
        _mixed = new double[Count];
        Span<double> zero = stackalloc double[n], areas = stackalloc double[GaussPoints.Count], byX = stackalloc double[4 * TElement.Nodes], byY = stackalloc double[4 * TElement.Nodes], rates = stackalloc double[4];
        for (int e = 0; e < Count; e++)
        {
            PlaneElasticity driven = Material(e).DrivenOutOfPlane();
            TElement.ThermalForce(Coordinates(e), driven, adherend.Width, _force.AsSpan(e * n, n));
            _stiffness[e] = 2 * TElement.StrainEnergy(Coordinates(e), driven, adherend.Width, zero, 1);
            TElement.ShapeGradients(Coordinates(e), byX, byY, areas);
            Material(e).StressByTemperature(rates);
            _mixed[e] = rates[3] * adherend.Width * (areas[0] + areas[1] + areas[2] + areas[3]);
        }
    }

    public override int NativeCount => TElement.Unknowns + 1;

    public override int OutOfPlaneUnknown => _link.Unknown;

    public override ElementAnswer Evaluate(int element, in PathPoint at, ReadOnlySpan<double> displacement, ReadOnlySpan<double> accepted, Span<double> tentative, Wanted wanted, in ElementBuffers into)
    {
        int n = TElement.Unknowns;
        double scale = 1 / _link.Length, strain = displacement[n] * scale, change = at.Temperature - StressFreeTemperature;
        ReadOnlySpan<double> q = _force.AsSpan(element * n, n);
        Span<double> strained = stackalloc double[n];
        ElementAnswer held = base.Evaluate(element, at, displacement[..n], accepted, tentative, wanted & ~Wanted.Tangent, into);
        TakeRigidMovementOff(element, displacement[..n], strained);
        double work = 0;
        for (int i = 0; i < n; i++)
        {
            work += q[i] * strained[i];
            into.Force[i] += q[i] * strain;
        }
        into.Force[n] = scale * (work + _mixed[element] * change + _stiffness[element] * strain);
        if ((wanted & Wanted.Tangent) != 0)
        {
            ReadOnlySpan<double> stiffness = ElasticStiffness(element);
            for (int i = 0; i < n; i++)
            {
                stiffness.Slice(i * n, n).CopyTo(into.Tangent[(i * (n + 1))..]);
                into.Tangent[i * (n + 1) + n] = into.Tangent[n * (n + 1) + i] = scale * q[i];
            }
            into.Tangent[(n + 1) * (n + 1) - 1] = scale * scale * _stiffness[element];
        }
        if ((wanted & Wanted.LoadRate) != 0)
            into.LoadRate[n] = scale * _mixed[element];
        return held with
        {
            Stored = held.Stored + strain * (work + _mixed[element] * change + 0.5 * _stiffness[element] * strain),
            StoredByTemperature = held.StoredByTemperature + _mixed[element] * strain,
        };
    }

    public override void Stresses(int element, ReadOnlySpan<double> displacement, double temperature, ReadOnlySpan<double> accepted, Span<double> stresses)
    {
        Span<double> gradients = stackalloc double[16], strain = stackalloc double[3];
        Gradients(element, displacement, gradients);
        for (int point = 0; point < GaussPoints.Count; point++)
        {
            ReadOnlySpan<double> g = gradients.Slice(4 * point, 4);
            (strain[0], strain[1], strain[2]) = (g[0], g[3], g[1] + g[2]);
            Material(element).Stress(strain, temperature - StressFreeTemperature, stresses.Slice(4 * point, 4), displacement[TElement.Unknowns] / _link.Length);
        }
    }
}
