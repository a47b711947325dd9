using InterfaceFE.Geometry;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Model;

namespace InterfaceFE.Results;

/// <summary>
/// One front of a joint: an end of a bonded stretch, from which a crack may grow inwards. Follows the crack tip, the process zone and the law's work at the starter tip.
/// </summary>
public sealed class BondFront
{
    private const double Separated = 1 - 1e-9;
    private const double NearLargest = 0.999;

    private readonly LayerBlock _layer;
    private readonly int _first, _last, _step;
    private readonly int _tipElement, _tipStation;
    private double[] _tipState, _tipTentative;

    private BondFront(LayerBlock layer, int joint, int number, int firstElement, int lastElement, int sense)
    {
        _layer = layer;
        Joint = joint;
        Number = number;
        Sense = sense;
        int points = layer.PointsPerElement;
        _step = sense;
        _first = sense > 0 ? firstElement * points : (lastElement + 1) * points - 1;
        _last = sense > 0 ? (lastElement + 1) * points - 1 : firstElement * points;
        _tipElement = sense > 0 ? firstElement : lastElement;
        _tipStation = sense > 0 ? 0 : layer.Stations - 1;
        StarterTip = layer.StationPosition(_tipElement, _tipStation);
        StretchEnd = sense > 0 ? layer.StationPosition(lastElement, layer.Stations - 1) : layer.StationPosition(firstElement, 0);
        _tipState = new double[layer.Law.StateSize];
        _tipTentative = new double[layer.Law.StateSize];
    }

    /// <summary>Index of the joint.</summary>
    public int Joint { get; }

    /// <summary>Number within the joint, from 1.</summary>
    public int Number { get; }

    /// <summary>+1 when a crack grows towards the joint's end, -1 towards its start.</summary>
    public int Sense { get; }

    /// <summary>Position of the starter tip along the joint [mm].</summary>
    public double StarterTip { get; }

    /// <summary>Position of the other end of the bonded stretch [mm].</summary>
    public double StretchEnd { get; }

    /// <summary>Node of the lower face at the starter tip.</summary>
    public int TipNode => _layer.Nodes(_tipElement)[_tipStation];

    /// <summary>Jump at the starter tip, free opening included [mm].</summary>
    public Separation TipSeparation { get; private set; }

    /// <summary>Work of the law at the starter tip [N/mm].</summary>
    public double TipWork { get; private set; }

    /// <summary>Position of the crack tip [mm]: damage 1, or the starter tip before growth.</summary>
    public double CrackTip { get; private set; }

    /// <summary>Position of the first traction maximum, coming from the intact side [mm]; null while nothing is damaged.</summary>
    public double? ZoneStart { get; private set; }

    /// <summary>Whether the crack has run through the whole stretch.</summary>
    public bool RunThrough { get; private set; }

    /// <summary>Mode mix at the moving front, atan sqrt(G_II/G_I) [deg]; null while no energy is spent.</summary>
    public double? ModeMixDegrees { get; private set; }

    /// <summary>All fronts of a joint: two for each bonded stretch.</summary>
    public static IEnumerable<BondFront> Of(LayerBlock layer, int joint)
    {
        int number = 1;
        for (int e = 0; e < layer.Count;)
        {
            int last = e;
            while (last + 1 < layer.Count && layer.JointElement(last + 1) == layer.JointElement(last) + 1)
                last++;
            yield return new BondFront(layer, joint, number++, e, last, 1);
            yield return new BondFront(layer, joint, number++, e, last, -1);
            e = last + 1;
        }
    }

    /// <summary>Moves on to an accepted point.</summary>
    public void Follow(LayerSample sample, Mesh mesh, double[] ux, double[] uy, double temperature)
    {
        FollowTip(mesh, ux, uy, temperature);
        FollowCrack(sample);
    }

    private void FollowTip(Mesh mesh, double[] ux, double[] uy, double temperature)
    {
        Span<double> native = stackalloc double[2 * _layer.NodesPerElement];
        LayerSample.Gather(_layer.Nodes(_tipElement), ux, uy, native);
        TipSeparation = _layer.AtStation(_tipElement, _tipStation, native);
        var less = new Separation(TipSeparation.Opening - _layer.FreeOpening(temperature), TipSeparation.Sliding);
        LayerResponse response = _layer.Law.Update(less, new LawPoint(temperature, 0), _tipState, _tipTentative);
        (_tipState, _tipTentative) = (_tipTentative, _tipState);
        TipWork = response.Stored + response.Dissipated;
    }

    private void FollowCrack(LayerSample sample)
    {
        LayerResponse[] r = sample.Response;
        int tip = _first - _step;
        for (int i = _first; r[i].Damage >= Separated; i += _step)
        {
            tip = i;
            if (i == _last)
                break;
        }
        bool grown = tip != _first - _step;
        RunThrough = tip == _last;
        CrackTip = grown ? TipBetween(sample, tip) : StarterTip;
        FollowZone(sample, RunThrough ? _last : tip + _step);
        LayerResponse at = r[grown ? tip : _first];
        ModeMixDegrees = at.Damage > 0 && at.EnergyPeel + at.EnergyShear > 0 ? Math.Atan2(Math.Sqrt(Math.Max(at.EnergyShear, 0)), Math.Sqrt(Math.Max(at.EnergyPeel, 0))) * 180 / Math.PI : null;
    }

    /// <summary>Damage of the next two points, carried on in a straight line to 1, sets the tip between the last separated point and the next.</summary>
    private double TipBetween(LayerSample sample, int tip)
    {
        if (tip == _last)
            return StretchEnd;
        double here = sample.Position[tip], next = sample.Position[tip + _step];
        if (tip + _step == _last)
            return 0.5 * (here + next);
        double damage = sample.Response[tip + _step].Damage, slope = (sample.Response[tip + 2 * _step].Damage - damage) / (sample.Position[tip + 2 * _step] - next);
        double position = slope != 0 ? next + (1 - damage) / slope : here;
        return Math.Clamp(position, Math.Min(here, next), Math.Max(here, next));
    }

    private void FollowZone(LayerSample sample, int from)
    {
        ZoneStart = null;
        if (RunThrough || sample.Response[from].Damage <= 0)
            return;
        double largest = 0;
        int end = from;
        for (int i = from; sample.Response[i].Damage > 0; i += _step)
        {
            largest = Math.Max(largest, sample.Traction(i));
            end = i;
            if (i == _last)
                break;
        }
        for (int i = end; ; i -= _step)
        {
            if (sample.Traction(i) >= NearLargest * largest)
            {
                ZoneStart = sample.Position[i];
                return;
            }
            if (i == from)
                return;
        }
    }
}
