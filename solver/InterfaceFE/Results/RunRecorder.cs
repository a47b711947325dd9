using InterfaceFE.Geometry;
using InterfaceFE.Marching;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Model;

namespace InterfaceFE.Results;

/// <summary>Watches a march and makes its records: points, fronts, energies, iterations, fields, maxima.</summary>
public sealed class RunRecorder : IMarchObserver
{
    /// <summary>Angle between faces from which the choice of the frame is worth a remark: 3 degrees, a mode mix of some 3 % of a shear traction.</summary>
    private const double NoticeableFaceAngle = 0.05;

    private readonly SpecimenModel _model;
    private readonly FullEquilibrium _equilibrium;
    private readonly RunHistory _history;
    private readonly IRecordSink _sink;
    private readonly GripReader _grips;
    private readonly GaugeReader _gauges;
    private readonly FieldSampler _fields;
    private readonly BondFront[][] _fronts;
    private readonly EnergyReleaseRates[][] _rates;
    private readonly int _fieldInterval;
    private readonly RunMaxima _maxima;
    private readonly HashSet<(int Adherend, bool Beyond)> _told = [];
    private bool _temperatureChanged;
    private FieldSnapshot? _peak, _last;
    private double _largestLoad;
    private LayerSample[] _samples = [];

    /// <summary>Prepares the records of a run.</summary>
    /// <param name="equilibrium">Equilibrium that is marched.</param>
    /// <param name="history">History to fill.</param>
    /// <param name="gauges">Reader of the gauges.</param>
    /// <param name="fieldInterval">Points between stored fields; 0 for none.</param>
    /// <param name="sink">Told of each record.</param>
    public RunRecorder(FullEquilibrium equilibrium, RunHistory history, GaugeReader gauges, int fieldInterval, IRecordSink sink)
    {
        _model = equilibrium.Model;
        _equilibrium = equilibrium;
        _history = history;
        _sink = sink;
        _grips = new GripReader(_model, history.Grips);
        _gauges = gauges;
        _fields = new FieldSampler(_model);
        _fronts = [.. _model.Layers.Select((layer, joint) => BondFront.Of(layer, joint).ToArray())];
        _rates = [.. _fronts.Select(fronts => fronts.Select(front => new EnergyReleaseRates(_model, front)).ToArray())];
        _fieldInterval = fieldInterval;
        _maxima = new RunMaxima(_model, _fields.AtGrip);
    }

    /// <summary>Maxima over the run so far.</summary>
    public RunMaxima Maxima => _maxima;

    /// <summary>Why J by path or rotation is missing, one line for each reason.</summary>
    public IEnumerable<string> Remarks()
    {
        (string, Func<EnergyReleaseRates, string?>)[] ways = [("J path", rates => rates.PathReason), ("J rotation", rates => rates.RotationReason)];
        foreach ((string what, Func<EnergyReleaseRates, string?> reason) in ways)
        {
            var fronts = _rates.SelectMany((rates, joint) => rates.Select((r, f) => (Where: $"{_model.Layers[joint].Name} front {_fronts[joint][f].Number}", Reason: reason(r))));
            foreach (var group in fronts.Where(f => f.Reason is not null).GroupBy(f => f.Reason))
                yield return $"no {what} at {string.Join(", ", group.Select(f => f.Where))}: {group.Key}";
        }
        yield return "J path is left empty once the process zone has come within two thicknesses of the section ahead of it";
        for (int joint = 0; joint < _model.Layers.Count; joint++)
            if (_maxima.FaceAngle(joint) > NoticeableFaceAngle)
                yield return string.Create(System.Globalization.CultureInfo.InvariantCulture,
                    $"opening, sliding and mode mix of {_model.Layers[joint].Name} depend on the line that they are counted along (`frame`): where damage was under way its faces stood up to {_maxima.FaceAngle(joint) * 180 / Math.PI:G3} degrees apart");
        if (_temperatureChanged)
            yield return "J rotation and J under law are left empty once the temperature has changed: they hold at constant temperature only";
        string[] yielded = [.. Named(_maxima.HasYielded)], beyond = [.. Named(_maxima.BeyondCurve)], atGrip = [.. Named(_maxima.YieldedAtGrip)];
        if (yielded.Length > 0 && _model.Layers.Count > 0)
            yield return $"J path and J rotation are left empty at joints of an adherend that has yielded ({string.Join(", ", yielded)}): they hold for elastic arms only";
        if (atGrip.Length > 0)
            yield return $"elements that touch a grip have yielded in {string.Join(", ", atGrip)}: first yield and largest plastic strain leave them out";
        if (beyond.Length > 0)
            yield return $"plastic strain went beyond the end of the yield curve in {string.Join(", ", beyond)}: the yield stress stays level there";
    }

    private IEnumerable<string> Named(Func<int, bool> which) => Enumerable.Range(0, _model.Solids.Count).Where(which).Select(a => $"'{_model.Solids[a].Name}'");

    /// <summary>Strains out of plane of the groups that have one, in order.</summary>
    private IEnumerable<double> OutOfPlaneStrains() =>
        Enumerable.Range(0, _model.Unknowns.OutOfPlane?.Count ?? 0).Select(g => _model.Unknowns.OutOfPlaneStrain(_model.Unknowns.OutOfPlane!.FirstOf(g), _equilibrium.AcceptedDisplacement));

    /// <summary>Says once for each adherend that it yields, and that it yields beyond its curve.</summary>
    private void TellYielding()
    {
        for (int a = 0; a < _model.Solids.Count; a++)
        {
            if (_maxima.HasYielded(a) && _told.Add((a, false)))
                _sink.Say($"adherend '{_model.Solids[a].Name}' begins to yield");
            if (_maxima.BeyondCurve(a) && _told.Add((a, true)))
                _sink.Say(string.Create(System.Globalization.CultureInfo.InvariantCulture, $"adherend '{_model.Solids[a].Name}' yields beyond plastic strain {_model.Solids[a].YieldCurve!.End}, where its yield curve ends: the yield stress stays level from there"));
        }
    }

    /// <summary>Keeps the fields of the last point and of the largest load of the main grip, if fields are kept at all and these are not among them.</summary>
    public void Finish()
    {
        if (_fieldInterval == 0)
            return;
        using PhaseClock.Stretch time = _equilibrium.Clock.In(Phase.Writing);
        foreach (FieldSnapshot? snapshot in (ReadOnlySpan<FieldSnapshot?>)[_peak, _last])
        {
            if (snapshot is null || _history.Snapshots.Any(s => s.Point == snapshot.Point))
                continue;
            _history.Snapshots.Add(snapshot);
            _sink.Write(snapshot);
        }
        _history.Snapshots.Sort((a, b) => a.Point.CompareTo(b.Point));
    }

    /// <inheritdoc/>
    public void PointAccepted(MarchPoint point)
    {
        using PhaseClock.Stretch time = _equilibrium.Clock.In(Phase.Recording);
        _temperatureChanged |= point.Temperature != _model.StressFreeTemperature;
        _fields.Sample(_equilibrium);
        _samples = [.. _model.Layers.Select((layer, joint) => new LayerSample(layer, joint, _equilibrium, _fields.DisplacementX, _fields.DisplacementY))];
        IReadOnlyList<GripReading> readings = _grips.Read(_equilibrium);
        var row = new PointRow
        {
            Point = point.Number,
            Stage = point.Stage,
            Progress = point.Progress,
            Time = point.Time,
            Temperature = point.Temperature,
            LoadFactor = point.Progress,
            Stable = point.Stable,
            Grips = readings,
            Gauges = [.. _gauges.Read(_fields.DisplacementX, _fields.DisplacementY), .. OutOfPlaneStrains()],
        };
        var fronts = new List<FrontRow>();
        for (int joint = 0; joint < _fronts.Length; joint++)
            for (int f = 0; f < _fronts[joint].Length; f++)
                fronts.Add(Front(point, joint, f, readings));
        EnergyRow energy = Energy(point);
        _maxima.Take(point, _samples, _fronts, _fields.Equivalent, _fields.Yielding, _fields.LargestRotation);
        TellYielding();
        _history.Points.Add(row);
        _history.Fronts.AddRange(fronts);
        _history.Energies.Add(energy);
        for (int joint = 0; joint < _samples.Length; joint++)
            _history.Damage.Add(new DamageRow(point.Number, joint, DamageOf(_samples[joint], _model.Mesh.Joints[joint])));
        using (_equilibrium.Clock.In(Phase.Writing))
            _sink.Write(row, fronts, energy);
        if (_fieldInterval == 0)
            return;
        FieldSnapshot snapshot = _fields.Snapshot(point, _samples);
        _last = snapshot;
        if (MainLoad(row) is var load && load > _largestLoad)
            (_largestLoad, _peak) = (load, snapshot);
        bool firstDamage = _maxima.FirstDamage?.Point == point.Number;
        if (!point.StageEnd && !firstDamage && point.Number % _fieldInterval != 0)
            return;
        _history.Snapshots.Add(snapshot);
        using PhaseClock.Stretch writing = _equilibrium.Clock.In(Phase.Writing);
        _sink.Write(snapshot);
    }

    /// <inheritdoc/>
    public void IterationMade(in MarchIteration iteration)
    {
        var row = new IterationRow
        {
            Stage = iteration.Stage,
            Point = iteration.Point,
            Retries = iteration.Retries,
            Iteration = iteration.Newton.Iteration,
            Control = iteration.Control,
            Stride = iteration.Stride,
            Progress = iteration.Progress,
            LoadFactor = iteration.Progress,
            Root = 0,
            OutOfBalance = iteration.Newton.OutOfBalance,
            Relative = iteration.Newton.Relative,
            Correction = iteration.Newton.Correction,
            UnstableDirections = iteration.UnstableDirections,
            ChangedElements = iteration.Newton.ChangedElements,
            Reason = iteration.Newton.Reason,
            Guess = iteration.Guess,
        };
        _history.Iterations.Add(row);
        using PhaseClock.Stretch time = _equilibrium.Clock.In(Phase.Writing);
        _sink.Write(row);
    }

    /// <inheritdoc/>
    public void Said(string line) => _sink.Say(line);

    private double MainLoad(PointRow row)
    {
        if (_history.CurvesOf.Count == 0)
            return 0;
        int main = 0;
        while (_history.Grips[main].Name != _history.CurvesOf[0])
            main++;
        return _history.Grips[main].Turned ? Math.Abs(row.Grips[main].Moment ?? 0) : row.Grips[main].Force;
    }

    private FrontRow Front(MarchPoint point, int joint, int f, IReadOnlyList<GripReading> readings)
    {
        BondFront front = _fronts[joint][f];
        LayerSample sample = _samples[joint];
        front.Follow(sample, _model.Mesh, _fields.DisplacementX, _fields.DisplacementY, point.Temperature);
        bool yielded = Yielded(_model.Layers[joint].LowerAdherend) || Yielded(_model.Layers[joint].UpperAdherend);
        double peel = 0, shear = 0;
        foreach (LayerResponse response in sample.Response)
        {
            peel = Math.Max(peel, response.Peel);
            shear = Math.Max(shear, Math.Abs(response.Shear));
        }
        return new FrontRow
        {
            Joint = _model.Layers[joint].Name,
            Front = front.Number,
            Point = point.Number,
            CrackTip = front.CrackTip,
            ProcessZoneStart = front.ZoneStart,
            ProcessZone = front.ZoneStart is { } start ? Math.Abs(start - front.CrackTip) : null,
            Opening = front.TipSeparation.Opening,
            Sliding = front.TipSeparation.Sliding,
            JPath = yielded ? null : _rates[joint][f].Path(sample, _fields.DisplacementX, _fields.DisplacementY, point.Temperature, _model.Unknowns.OutOfPlaneStrain(_model.Layers[joint].LowerAdherend, _equilibrium.AcceptedDisplacement)),
            JRotation = yielded ? null : _rates[joint][f].Rotation(readings, _fields.DisplacementX, _fields.DisplacementY, _temperatureChanged),
            JUnderLaw = _temperatureChanged ? null : front.TipWork,
            ModeMixDegrees = front.ModeMixDegrees,
            LargestPeel = peel,
            LargestShear = shear,
        };
    }

    private bool Yielded(int adherend) => _fields.Yielding[adherend].LargestAnywhere > 0;

    private EnergyRow Energy(MarchPoint point) => new()
    {
        StoredInLoadTrains = _model.LoadTrains.Count > 0 ? point.Energy.State.StoredInLoadTrains : null,
        Point = point.Number,
        Stage = point.Stage,
        PutIn = point.Energy.PutIn,
        StoredInAdherends = point.Energy.State.StoredInAdherends,
        StoredInLayers = point.Energy.State.StoredInLayers,
        SpentInLayers = point.Energy.State.SpentInLayers,
        SpentInYielding = point.Energy.State.SpentInYielding,
        SpentInFriction = point.Energy.State.SpentInFriction,
        Thermal = point.Energy.Thermal,
        ReleasedInJumps = 0,
        Balance = point.Energy.Balance,
        PathError = point.Energy.PathError,
    };

    private static float[] DamageOf(LayerSample sample, MeshedJoint joint)
    {
        var damage = new float[joint.ElementCount];
        int points = sample.Layer.PointsPerElement;
        for (int e = 0, bonded = 0; e < damage.Length; e++)
        {
            if (!joint.Bonded[e])
            {
                damage[e] = float.NaN;
                continue;
            }
            double largest = 0;
            for (int p = 0; p < points; p++)
                largest = Math.Max(largest, sample.Response[bonded * points + p].Damage);
            damage[e] = (float)largest;
            bonded++;
        }
        return damage;
    }
}
