using InterfaceFE.Geometry;
using InterfaceFE.Mechanics.Layers;

namespace InterfaceFE.Model;

/// <summary>Layer elements of one joint, in order from its start: the bonded ones, or those that never were (starter crack, unbonded stretches) and only meet when pressed together.</summary>
public sealed class LayerBlock : IElementBlock
{
    private readonly MeshedJoint _joint;
    private readonly LayerRule _rule;
    private readonly LayerKinematics? _kinematics;
    private readonly double _freeOpeningPerKelvin, _stressFreeTemperature;
    private readonly int[] _jointElement, _nodes;
    private readonly double[] _coordinates;

    /// <summary>Makes the block of a joint.</summary>
    /// <param name="mesh">The mesh.</param>
    /// <param name="joint">The joint.</param>
    /// <param name="law">Law of the layer.</param>
    /// <param name="thickness">Thickness of the layer [mm].</param>
    /// <param name="rule">Integration along an element.</param>
    /// <param name="freeOpeningPerKelvin">Stress-free opening per change of temperature [mm/K].</param>
    /// <param name="stressFreeTemperature">Temperature without thermal stress [K].</param>
    /// <param name="bonded">Whether the block takes the bonded elements or the others.</param>
    /// <param name="kinematics">How separations follow from displacements; null: small rotation of faces that lie on each other.</param>
    public LayerBlock(
        Mesh mesh,
        MeshedJoint joint,
        ILayerLaw law,
        double thickness,
        LayerRule rule,
        double freeOpeningPerKelvin,
        double stressFreeTemperature,
        bool bonded,
        LayerKinematics? kinematics = null)
    {
        _kinematics = kinematics;
        _joint = joint;
        Law = law;
        Thickness = thickness;
        _rule = rule;
        _freeOpeningPerKelvin = freeOpeningPerKelvin;
        _stressFreeTemperature = stressFreeTemperature;
        Stations = mesh.NodesPerFace;
        _jointElement = [.. Enumerable.Range(0, joint.ElementCount).Where(e => joint.Bonded[e] == bonded)];
        _nodes = new int[_jointElement.Length * 2 * Stations];
        _coordinates = new double[2 * _nodes.Length];
        for (int e = 0; e < _jointElement.Length; e++)
        {
            for (int i = 0; i < Stations; i++)
            {
                _nodes[e * NodesPerElement + i] = joint.LowerNodes[_jointElement[e] * Stations + i];
                _nodes[e * NodesPerElement + Stations + i] = joint.UpperNodes[_jointElement[e] * Stations + i];
            }
        }
        for (int i = 0; i < _nodes.Length; i++)
        {
            _coordinates[2 * i] = mesh.X[_nodes[i]];
            _coordinates[2 * i + 1] = mesh.Y[_nodes[i]];
        }
    }

    /// <inheritdoc/>
    public string Name => _joint.Name;

    /// <inheritdoc/>
    public int Count => _jointElement.Length;

    /// <inheritdoc/>
    public int NodesPerElement => 2 * Stations;

    /// <inheritdoc/>
    public int StateSize => _rule.Count * Law.StateSize;

    /// <inheritdoc/>
    public TangentKind Kind => Law.HasSymmetricTangent ? TangentKind.Symmetric : TangentKind.Unsymmetric;

    /// <summary>Law of the layer.</summary>
    public ILayerLaw Law { get; }

    /// <summary>Thickness of the layer [mm].</summary>
    public double Thickness { get; }

    /// <summary>Nodes of a face.</summary>
    public int Stations { get; }

    /// <summary>Integration points of an element.</summary>
    public int PointsPerElement => _rule.Count;

    /// <summary>Index of the adherend below.</summary>
    public int LowerAdherend => _joint.LowerAdherend;

    /// <summary>Index of the adherend above.</summary>
    public int UpperAdherend => _joint.UpperAdherend;

    /// <inheritdoc/>
    public ReadOnlySpan<int> Nodes(int element) => _nodes.AsSpan(element * NodesPerElement, NodesPerElement);

    /// <summary>Element of the joint, unbonded ones counted, that an element of the block is.</summary>
    public int JointElement(int element) => _jointElement[element];

    /// <summary>Length of an element [mm].</summary>
    public double Length(int element) => _joint.Position[_jointElement[element] + 1] - _joint.Position[_jointElement[element]];

    /// <summary>Position of an integration point along the joint [mm].</summary>
    public double Position(int element, int point) => _joint.Position[_jointElement[element]] + 0.5 * (1 + _rule.Positions[point]) * Length(element);

    /// <summary>Length that an integration point stands for [mm].</summary>
    public double PointLength(int element, int point) => 0.5 * _rule.Weights[point] * Length(element);

    /// <summary>Position of a station (node pair) along the joint [mm].</summary>
    public double StationPosition(int element, int station) => _joint.Position[_jointElement[element]] + Length(element) * station / (Stations - 1);

    /// <summary>Stress-free opening at a temperature [mm].</summary>
    public double FreeOpening(double temperature) => _freeOpeningPerKelvin * (temperature - _stressFreeTemperature);

    /// <inheritdoc/>
    public ElementAnswer Evaluate(int element, in PathPoint at, ReadOnlySpan<double> displacement, ReadOnlySpan<double> accepted, Span<double> tentative, Wanted wanted, in ElementBuffers into)
    {
        ReadOnlySpan<double> xy = Coordinates(element);
        bool tangent = (wanted & Wanted.Tangent) != 0, rate = (wanted & Wanted.LoadRate) != 0, dissipation = (wanted & Wanted.Dissipation) != 0;
        var conditions = new LawPoint(at.Temperature, at.TimeStride);
        Span<double> intoTangent = tangent ? into.Tangent : [], intoDissipation = dissipation ? into.Dissipation : [], intoRate = rate ? into.LoadRate : [];
        LayerElementSums sums = _kinematics is { } kinematics
            ? TurningLayerElement.Evaluate(kinematics, _rule, xy, displacement, _joint.Width, FreeOpening(at.Temperature), Law, conditions, accepted, tentative, into.Force, intoTangent, intoDissipation, intoRate)
            : LayerElement.Evaluate(_rule, xy, displacement, _joint.Width, FreeOpening(at.Temperature), Law, conditions, accepted, tentative, into.Force, intoTangent, intoDissipation, intoRate);
        if (rate)
            for (int i = 0; i < into.LoadRate.Length; i++)
                into.LoadRate[i] *= _freeOpeningPerKelvin;
        return new ElementAnswer(sums.Stored, sums.Dissipated, -_freeOpeningPerKelvin * (_kinematics is null ? PeelResultant(xy, into.Force) : sums.PeelResultant), _freeOpeningPerKelvin * sums.DissipatedByFreeOpening, sums.LargestDamage, sums.LeastDamage, sums.Growing)
        {
            SpentInFriction = sums.SpentInFriction,
        };
    }

    /// <summary>The law's answer and the separation (free opening taken off) at each integration point of an element, without changing any state.</summary>
    /// <param name="element">Element.</param>
    /// <param name="at">Place on the path.</param>
    /// <param name="displacement">Native displacements at the accepted point [mm].</param>
    /// <param name="accepted">Accepted state.</param>
    /// <param name="separations">One per point, overwritten.</param>
    /// <param name="responses">One per point, overwritten.</param>
    public void Sample(int element, in PathPoint at, ReadOnlySpan<double> displacement, ReadOnlySpan<double> accepted, Span<Separation> separations, Span<LayerResponse> responses)
    {
        ReadOnlySpan<double> xy = Coordinates(element);
        Span<double> scratch = stackalloc double[Law.StateSize];
        for (int p = 0; p < _rule.Count; p++)
        {
            separations[p] = SeparationAt(xy, displacement, FreeOpening(at.Temperature), _rule.Positions[p]);
            responses[p] = Law.Update(separations[p], new LawPoint(at.Temperature, 0), accepted.Slice(p * Law.StateSize, Law.StateSize), scratch);
        }
    }

    /// <summary>Jump at a station, free opening included [mm].</summary>
    public Separation AtStation(int element, int station, ReadOnlySpan<double> displacement) =>
        SeparationAt(Coordinates(element), displacement, 0, 2.0 * station / (Stations - 1) - 1);

    /// <summary>How the layer stands at an integration point; null where only the jump counts (small rotation, zero thickness).</summary>
    public LayerStance? Stance(int element, int point, ReadOnlySpan<double> displacement) =>
        _kinematics is { } kinematics ? TurningLayerElement.At(kinematics, Coordinates(element), displacement, 0, _rule.Positions[point]) : null;

    private Separation SeparationAt(ReadOnlySpan<double> xy, ReadOnlySpan<double> displacement, double freeOpening, double xi) => _kinematics is { } kinematics
        ? TurningLayerElement.At(kinematics, xy, displacement, freeOpening, xi).Separation
        : LayerElement.SeparationAt(Stations, xy, displacement, freeOpening, xi);

    private ReadOnlySpan<double> Coordinates(int element) => _coordinates.AsSpan(element * 2 * NodesPerElement, 2 * NodesPerElement);

    /// <summary>Integral of the peel traction over the element [N]: the upper face's force along the normal.</summary>
    private double PeelResultant(ReadOnlySpan<double> xy, ReadOnlySpan<double> force)
    {
        if (_freeOpeningPerKelvin == 0)
            return 0;
        PointFrame frame = LayerElement.FrameAt(Stations, xy, 0);
        double sum = 0;
        for (int i = Stations; i < 2 * Stations; i++)
            sum += force[2 * i] * frame.NormalX + force[2 * i + 1] * frame.NormalY;
        return sum;
    }
}
