using InterfaceFE.Geometry;
using InterfaceFE.Marching;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Model;

namespace InterfaceFE.Results;

/// <summary>Keeps the largest values of joints and adherends over a run, the first damage and the first yield.</summary>
public sealed class RunMaxima
{
    private readonly SpecimenModel _model;
    private readonly IReadOnlyList<bool> _leftOut;
    private readonly double[] _opening, _sliding, _damage, _peel, _shear, _separated, _zone, _closing, _stress, _faceAngle;
    private readonly int[] _stressNode, _stressPoint;
    private readonly double[] _plastic, _plasticAnywhere;
    private readonly bool[] _yieldedAtGrip;

    /// <summary>Starts from nothing.</summary>
    /// <param name="model">The model.</param>
    /// <param name="leftOut">Nodes at grips, whose stresses do not count.</param>
    public RunMaxima(SpecimenModel model, IReadOnlyList<bool> leftOut)
    {
        _model = model;
        _leftOut = leftOut;
        int joints = model.Layers.Count, adherends = model.Solids.Count;
        _opening = new double[joints];
        _sliding = new double[joints];
        _damage = new double[joints];
        _peel = new double[joints];
        _shear = new double[joints];
        _separated = new double[joints];
        _zone = new double[joints];
        _closing = new double[joints];
        _faceAngle = new double[joints];
        _stress = new double[adherends];
        _stressNode = new int[adherends];
        _stressPoint = new int[adherends];
        _plastic = new double[adherends];
        _plasticAnywhere = new double[adherends];
        _yieldedAtGrip = new bool[adherends];
    }

    /// <summary>First damage; null while none.</summary>
    public EventSummary? FirstDamage { get; private set; }

    /// <summary>Largest angle between the faces of a joint where damage was under way [rad].</summary>
    public double FaceAngle(int joint) => _faceAngle[joint];

    /// <summary>First yield away from grips; null while none.</summary>
    public EventSummary? FirstYield { get; private set; }

    /// <summary>Whether an adherend has yielded in an element that touches a grip.</summary>
    public bool YieldedAtGrip(int adherend) => _yieldedAtGrip[adherend];

    /// <summary>Whether an adherend has yielded anywhere.</summary>
    public bool HasYielded(int adherend) => _plasticAnywhere[adherend] > 0;

    /// <summary>Whether an adherend has yielded beyond the end of its yield curve.</summary>
    public bool BeyondCurve(int adherend) => _model.Solids[adherend].YieldCurve is { IsTable: true } curve && _plasticAnywhere[adherend] > curve.End;

    /// <summary>Largest rotation of the material [rad].</summary>
    public double LargestRotation { get; private set; }

    /// <summary>Points with an equilibrium that is not stable.</summary>
    public int UnstablePoints { get; private set; }

    /// <summary>Takes an accepted point in.</summary>
    public void Take(MarchPoint point, LayerSample[] samples, BondFront[][] fronts, double[] equivalent, YieldSample[] yielding, double rotation)
    {
        LargestRotation = Math.Max(LargestRotation, rotation);
        if (!point.Stable)
            UnstablePoints++;
        for (int j = 0; j < samples.Length; j++)
        {
            TakeJoint(j, point, samples[j]);
            _faceAngle[j] = Math.Max(_faceAngle[j], samples[j].LargestFaceAngle);
            foreach (BondFront front in fronts[j])
                if (front.ZoneStart is { } start && front.CrackTip != front.StarterTip && !front.RunThrough)
                    _zone[j] = Math.Max(_zone[j], Math.Abs(start - front.CrackTip));
        }
        for (int a = 0; a < _stress.Length; a++)
        {
            TakeYielding(a, point, yielding[a]);
            MeshedAdherend adherend = _model.Mesh.Adherends[a];
            for (int node = adherend.FirstNode; node < adherend.FirstNode + adherend.NodeCount; node++)
            {
                if (_leftOut[node] || equivalent[node] <= _stress[a])
                    continue;
                _stress[a] = equivalent[node];
                _stressNode[a] = node;
                _stressPoint[a] = point.Number;
            }
        }
    }

    /// <summary>Largest depth to which the faces of a joint were pressed into each other, over the layer's thickness [-].</summary>
    public double ClosingShare(int joint) => _closing[joint] / _model.Layers[joint].Thickness;

    /// <summary>Whether a crack grew in a joint, so that its process zone was measured and not estimated.</summary>
    public bool HasGrown(int joint) => _zone[joint] > 0;

    /// <summary>Summaries of the joints.</summary>
    public IEnumerable<JointSummary> Joints()
    {
        for (int j = 0; j < _opening.Length; j++)
        {
            MeshedJoint joint = _model.Mesh.Joints[j];
            double thickness = _model.Layers[j].Thickness, length = 0;
            for (int e = 0; e < joint.ElementCount; e++)
                if (joint.Bonded[e])
                    length = Math.Max(length, joint.Position[e + 1] - joint.Position[e]);
            double zone = _zone[j] > 0 ? _zone[j] : joint.ProcessZoneEstimate;
            yield return new JointSummary
            {
                Name = joint.Name,
                LargestOpening = _opening[j],
                LargestSliding = _sliding[j],
                LargestPeelStrain = _opening[j] / thickness,
                LargestShearStrain = _sliding[j] / thickness,
                LargestDamage = _damage[j],
                LargestPeel = _peel[j],
                LargestShear = _shear[j],
                SeparatedLength = _separated[j],
                ElementLength = length,
                ElementsPerProcessZone = zone / length,
            };
        }
    }

    /// <summary>Summaries of the adherends.</summary>
    public IEnumerable<AdherendSummary> Adherends()
    {
        for (int a = 0; a < _stress.Length; a++)
        {
            yield return new AdherendSummary
            {
                Name = _model.Mesh.Adherends[a].Name,
                LargestEquivalentStress = _stress[a],
                X = _model.Mesh.X[_stressNode[a]],
                Y = _model.Mesh.Y[_stressNode[a]],
                Point = _stressPoint[a],
                LargestPlasticStrain = _plastic[a],
            };
        }
    }

    private void TakeYielding(int a, MarchPoint point, YieldSample yielding)
    {
        _plastic[a] = Math.Max(_plastic[a], yielding.Largest);
        _plasticAnywhere[a] = Math.Max(_plasticAnywhere[a], yielding.LargestAnywhere);
        _yieldedAtGrip[a] |= yielding.AtGrip;
        if (yielding.Largest > 0 && FirstYield is null)
            FirstYield = new EventSummary(string.Create(System.Globalization.CultureInfo.InvariantCulture, $"adherend '{_model.Mesh.Adherends[a].Name}' at x {yielding.X:G4} mm, y {yielding.Y:G4} mm"), point.Number, point.Stage, point.Progress);
    }

    private void TakeJoint(int j, MarchPoint point, LayerSample sample)
    {
        double separated = 0;
        for (int i = 0; i < sample.Response.Length; i++)
        {
            LayerResponse r = sample.Response[i];
            _opening[j] = Math.Max(_opening[j], sample.Separation[i].Opening);
            _closing[j] = Math.Max(_closing[j], -sample.Separation[i].Opening);
            _sliding[j] = Math.Max(_sliding[j], Math.Abs(sample.Separation[i].Sliding));
            _damage[j] = Math.Max(_damage[j], r.Damage);
            _peel[j] = Math.Max(_peel[j], r.Peel);
            _shear[j] = Math.Max(_shear[j], Math.Abs(r.Shear));
            if (r.Damage >= 1)
                separated += sample.Length[i];
            if (r.Damage > 0 && FirstDamage is null)
                FirstDamage = new EventSummary(string.Create(System.Globalization.CultureInfo.InvariantCulture, $"joint '{sample.Layer.Name}' at {sample.Position[i]:G6} mm along it"), point.Number, point.Stage, point.Progress);
        }
        _separated[j] = Math.Max(_separated[j], separated);
    }
}
