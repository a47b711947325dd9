using InterfaceFE.Model;
using InterfaceFE.Sparse;

namespace InterfaceFE.Marching;

/// <summary>
/// The plain form of equilibrium: every element is evaluated at every evaluation, in slot order. It is the measure for faster forms.
/// </summary>
public sealed class FullEquilibrium : IEquilibrium
{
    private const double Rounding = 50.0 / (1L << 52);

    /// <summary>Share of the largest reference of the run below which the reference does not fall: after full unloading only rounding is left to measure by.</summary>
    private const double LeastReference = 1e-3;

    /// <summary>Share of the reference above which rounding is no excuse once metal has yielded: displacements have run away, as they do at its limit load.</summary>
    private const double LargestFloor = 1e-5;

    private readonly SpecimenModel _model;
    private readonly ElementTable _table;
    private readonly TangentFactor _factor;
    private readonly StateStore _state;
    private readonly double[] _u, _accepted, _internal, _layerForce, _dissipationGradient, _magnitudes, _temperatureRate, _external, _externalRate, _held, _heldRate, _pressure, _pressureRate;
    private readonly double[] _rightSide, _solution, _progressRate, _gradient, _base, _noMagnitudes = [];
    private readonly BondDamage _bonds;
    private readonly bool[] _isHeld;
    private readonly double[] _native, _force, _rate, _dissipation, _tangent, _work, _transformed;
    private int[] _heldUnknowns = [];
    private double[] _heldStart = [], _heldEnd = [];
    private readonly double[] _externalStart, _externalEnd, _weightStart, _weightEnd;
    private double _temperatureStart, _temperatureEnd, _baseProgress, _correctionProgress, _reference, _largestReference;
    private LoadStage? _stage;

    /// <summary>Makes the equilibrium of a model at its stress-free state, with the constant tangents in place.</summary>
    public FullEquilibrium(SpecimenModel model)
    {
        _model = model;
        _table = new ElementTable(model);
        _factor = new TangentFactor(_table.Pattern, _table.LargestSlot);
        _state = new StateStore(_table.Blocks);
        int n = model.Unknowns.Count;
        _u = new double[n];
        _accepted = new double[n];
        _internal = new double[n];
        _layerForce = new double[n];
        _dissipationGradient = new double[n];
        _magnitudes = new double[n];
        _temperatureRate = new double[n];
        _external = new double[n];
        _externalRate = new double[n];
        _externalStart = new double[n];
        _externalEnd = new double[n];
        _weightStart = new double[n];
        _weightEnd = new double[n];
        _held = new double[n];
        _heldRate = new double[n];
        _pressure = new double[n];
        _pressureRate = new double[n];
        _rightSide = new double[n];
        _solution = new double[n];
        _progressRate = new double[n];
        _gradient = new double[n];
        _base = new double[n];
        _isHeld = new bool[n];
        _bonds = new BondDamage(model);
        int native = _table.LargestNative, slot = _table.LargestSlot;
        _native = new double[native];
        _force = new double[native];
        _rate = new double[native];
        _dissipation = new double[native];
        _tangent = new double[native * native];
        _work = new double[native * slot];
        _transformed = new double[slot * slot];
        Temperature = AcceptedTemperature = _temperatureStart = _temperatureEnd = model.StressFreeTemperature;
    }

    /// <summary>The model.</summary>
    public SpecimenModel Model => _model;

    /// <summary>Damage of the bonds, and what hangs together by them.</summary>
    public BondDamage Bonds => _bonds;

    /// <summary>The plan of the factorisation, for its counts.</summary>
    public SparsePlan Plan => _factor.Plan;

    /// <inheritdoc/>
    public double Progress { get; set; }

    /// <inheritdoc/>
    public double AcceptedProgress { get; private set; }

    /// <summary>Temperature at the tentative progress [K].</summary>
    public double Temperature { get; private set; }

    /// <summary>Temperature of the accepted point [K].</summary>
    public double AcceptedTemperature { get; private set; }

    /// <inheritdoc/>
    public ReadOnlySpan<double> Displacement => _u;

    /// <inheritdoc/>
    public ReadOnlySpan<double> AcceptedDisplacement => _accepted;

    /// <inheritdoc/>
    public ReadOnlySpan<double> InternalForce => _internal;

    /// <inheritdoc/>
    public ReadOnlySpan<double> LayerForce => _layerForce;

    /// <inheritdoc/>
    public EnergyState Energy { get; private set; }

    /// <inheritdoc/>
    public double LayerWorkByProgress { get; private set; }

    /// <inheritdoc/>
    public ReadOnlySpan<double> DissipationGradient => _dissipationGradient;

    /// <inheritdoc/>
    public double DissipationByProgress { get; private set; }

    /// <inheritdoc/>
    public double Potential
    {
        get
        {
            double potential = Energy.Total;
            for (int i = 0; i < _u.Length; i++)
                if (!_isHeld[i])
                    potential -= (_external[i] - _pressure[i]) * _u[i];
            return potential;
        }
    }

    /// <inheritdoc/>
    public int GrowingElements { get; private set; }

    /// <summary>Number of factorisations so far.</summary>
    public long Factorisations => _factor.Factorisations;

    /// <summary>Arithmetic of all factorisations so far, in whole factorisations.</summary>
    public double WholeFactorisations => _factor.WholeFactorisations;

    /// <summary>Number of solves so far, each with its refinement.</summary>
    public long Solves { get; private set; }

    /// <summary>Number of element tangents so far that differed from those in the factor, the first ones not counted.</summary>
    public long ChangedTangents => _factor.Changed;

    /// <summary>Time by phase.</summary>
    public PhaseClock Clock { get; init; } = new();

    /// <summary>Threads that a factorisation may use, 1 or 2; the numbers are the same to the last bit.</summary>
    public int Threads
    {
        get => _factor.Threads;
        init => _factor.Threads = value;
    }

    /// <summary>Whether the latest factorisation met numbers that are not finite.</summary>
    public bool FactorOverflows => _factor.Outcome.Status == FactorStatus.NotFinite;

    /// <summary>Unknowns held in the current stage.</summary>
    public ReadOnlySpan<int> HeldUnknowns => _heldUnknowns;

    /// <summary>External force on an unknown at the tentative progress: the reaction where it is held, else the applied force [N or N·mm].</summary>
    public double ExternalForce(int unknown) => _isHeld[unknown] ? _internal[unknown] + _pressure[unknown] : _external[unknown];

    /// <summary>External force on an unknown and what pressures put on it: all that does work from outside [N or N·mm].</summary>
    public double OutsideForce(int unknown) => _isHeld[unknown] ? _internal[unknown] : _external[unknown] - _pressure[unknown];

    /// <summary>Force of a grip on an unknown: the external force without the weight that acts there [N or N·mm].</summary>
    public double GripForce(int unknown) => ExternalForce(unknown) - _weightStart[unknown] - Progress * (_weightEnd[unknown] - _weightStart[unknown]);

    /// <summary>Begins a stage from the accepted point: values held, forces from where they are, temperature.</summary>
    public void StartStage(LoadStage stage)
    {
        _stage = stage;
        Array.Copy(_accepted, _u, _u.Length);
        Array.Copy(_weightEnd, _weightStart, _weightEnd.Length);
        Array.Clear(_weightEnd);
        foreach (ForceTarget weight in stage.Weights)
            _weightEnd[weight.Unknown] = weight.Value;
        for (int i = 0; i < _externalStart.Length; i++)
        {
            _externalStart[i] = ExternalForce(i);
            _externalEnd[i] = (_isHeld[i] ? 0 : _external[i] - _weightStart[i]) + _weightEnd[i];
        }
        Array.Clear(_isHeld);
        _heldUnknowns = [.. stage.Held.Select(h => h.Unknown)];
        _heldStart = new double[_heldUnknowns.Length];
        _heldEnd = new double[_heldUnknowns.Length];
        for (int i = 0; i < _heldUnknowns.Length; i++)
        {
            HeldTarget target = stage.Held[i];
            _isHeld[target.Unknown] = true;
            _heldStart[i] = _accepted[target.Unknown];
            _heldEnd[i] = target.Kind switch
            {
                TargetKind.MoveTo => target.Value,
                TargetKind.MoveBy => _heldStart[i] + target.Value,
                _ => _heldStart[i],
            };
        }
        foreach (ForceTarget force in stage.Forces)
            _externalEnd[force.Unknown] = force.Value + _weightEnd[force.Unknown];
        for (int i = 0; i < _externalRate.Length; i++)
        {
            if (_isHeld[i])
                _externalStart[i] = _externalEnd[i] = 0;
            _externalRate[i] = _externalEnd[i] - _externalStart[i];
        }
        Array.Clear(_heldRate);
        for (int i = 0; i < _heldUnknowns.Length; i++)
            _heldRate[_heldUnknowns[i]] = _heldEnd[i] - _heldStart[i];
        _temperatureStart = AcceptedTemperature;
        _temperatureEnd = stage.Temperature ?? AcceptedTemperature;
        Progress = AcceptedProgress = 0;
    }

    /// <inheritdoc/>
    public ResidualReport Evaluate(Wanted wanted)
    {
        using PhaseClock.Stretch time = Clock.In(Phase.Elements);
        LoadStage stage = _stage ?? throw new InvalidOperationException("no stage has been started");
        Temperature = _temperatureStart + Progress * (_temperatureEnd - _temperatureStart);
        for (int i = 0; i < _external.Length; i++)
            _external[i] = _externalStart[i] + Progress * _externalRate[i];
        for (int i = 0; i < _heldUnknowns.Length; i++)
            _held[_heldUnknowns[i]] = _heldStart[i] + Progress * (_heldEnd[i] - _heldStart[i]);

        PathPoint at = At(stage);
        bool finite = true;
        Array.Clear(_internal);
        Array.Clear(_layerForce);
        Array.Clear(_magnitudes);
        Array.Clear(_temperatureRate);
        Array.Clear(_pressure);
        Array.Clear(_pressureRate);
        Array.Clear(_dissipationGradient);
        wanted |= Wanted.Force | Wanted.Energy;
        int changed = 0;
        GrowingElements = 0;
        _table.Turn(_u);
        double storedSolids = 0, storedTrains = 0, friction = 0, storedLayers = 0, spent = 0, yielding = 0, byTemperature = 0, layersByTemperature = 0, dissipatedByTemperature = 0;
        for (int block = 0; block < _table.Blocks.Count; block++)
        {
            IElementBlock elements = _table.Blocks[block];
            bool layer = block >= _table.FirstLayerBlock, pressure = !layer && block >= _table.FirstPressureBlock;
            int n = elements.NativeCount;
            var buffers = new ElementBuffers { Force = _force.AsSpan(0, n), Tangent = _tangent.AsSpan(0, n * n), LoadRate = _rate.AsSpan(0, n), Dissipation = _dissipation.AsSpan(0, n) };
            Span<double> native = _native.AsSpan(0, n);
            for (int e = 0; e < elements.Count; e++)
            {
                int slot = _table.Slot(block, e);
                Wanted own = wanted;
                if (elements.Kind == TangentKind.Constant && _factor.Has(slot))
                    own &= ~Wanted.Tangent;
                _table.Gather(slot, _u, native);
                ElementAnswer answer = elements.Evaluate(e, at, native, _state.Accepted(block, e), _state.Tentative(block, e), own, buffers);
                _table.Scatter(slot, buffers.Force, pressure ? _pressure : _internal, _magnitudes);
                if (layer)
                    _table.Scatter(slot, buffers.Force, _layerForce, _noMagnitudes);
                if ((own & Wanted.LoadRate) != 0)
                    _table.Scatter(slot, buffers.LoadRate, pressure ? _pressureRate : _temperatureRate, _noMagnitudes);
                if ((own & Wanted.Tangent) != 0)
                {
                    finite &= IsFinite(buffers.Tangent);
                    if (_factor.Store(slot, _table.TransformTangent(slot, buffers.Tangent, buffers.Force, _work, _transformed)))
                        changed++;
                }
                byTemperature += answer.StoredByTemperature;
                friction += answer.SpentInFriction;
                if (layer)
                {
                    storedLayers += answer.Stored;
                    spent += answer.Dissipated;
                    layersByTemperature += answer.StoredByTemperature;
                    dissipatedByTemperature += answer.DissipatedByTemperature;
                    if ((own & Wanted.Dissipation) != 0 && answer.Growing)
                        _table.Scatter(slot, buffers.Dissipation, _dissipationGradient, _noMagnitudes);
                    if (answer.Growing)
                        GrowingElements++;
                    int layerElement = slot - _table.Slot(_table.FirstLayerBlock, 0);
                    _bonds.Take(layerElement, answer);
                }
                else if (block < _table.SolidBlocks)
                {
                    storedSolids += answer.Stored;
                    yielding += answer.Dissipated;
                }
                else if (elements is LoadTrainBlock)
                    storedTrains += answer.Stored;
                else
                    storedLayers += answer.Stored;
            }
        }
        Energy = new EnergyState(storedSolids, storedLayers, spent, byTemperature) { SpentInYielding = yielding, StoredInLoadTrains = storedTrains, SpentInFriction = friction };
        LayerWorkByProgress = layersByTemperature * (_temperatureEnd - _temperatureStart);
        DissipationByProgress = dissipatedByTemperature * (_temperatureEnd - _temperatureStart);

        double worst = 0, reference = 0, workOut = 0, workAll = 0;
        finite &= double.IsFinite(Energy.Total);
        for (int i = 0; i < _internal.Length; i++)
        {
            double difference = _isHeld[i] ? 0 : _external[i] - _pressure[i] - _internal[i], way = _u[i] - _accepted[i];
            finite &= double.IsFinite(_internal[i]);
            workOut += difference * way;
            workAll += Math.Abs(_internal[i] * way);
            worst = Math.Max(worst, Math.Abs(difference));
            reference = Math.Max(reference, Math.Max(_magnitudes[i], Math.Abs(_external[i])));
        }
        bool inPlace = true;
        for (int i = 0; i < _heldUnknowns.Length; i++)
        {
            int h = _heldUnknowns[i];
            inPlace &= Math.Abs(_held[h] - _u[h]) <= 1e-13 * Math.Max(Math.Abs(_held[h]), Math.Abs(_heldEnd[i] - _heldStart[i]));
        }
        _reference = reference;
        return new ResidualReport(worst, Math.Max(reference, LeastReference * _largestReference), finite, inPlace, changed, workAll > 0 ? Math.Abs(workOut) / workAll : 0);
    }

    /// <inheritdoc/>
    public string? Fault() => ElementFault.IsModerate(_model, _u) ? ElementFault.Find(_model, _table, _state, _u, At(_stage!)) : null;

    /// <inheritdoc/>
    public double ResidualFloor()
    {
        StiffnessTimesDisplacement();
        double largest = 0;
        foreach (double value in _rightSide)
            largest = Math.Max(largest, value);
        double mostWhileFlowing = Energy.SpentInYielding > 0 ? LargestFloor * Math.Max(_reference, LeastReference * _largestReference) : double.PositiveInfinity;
        return Math.Min(Rounding * largest, mostWhileFlowing);
    }

    /// <summary>Energy below which rounding rules [mJ]: 50 units of rounding of displacement times stiffness times displacement, magnitudes throughout.</summary>
    public double EnergyFloor()
    {
        StiffnessTimesDisplacement();
        double sum = 0;
        for (int i = 0; i < _rightSide.Length; i++)
            sum += _rightSide[i] * Math.Max(Math.Abs(_u[i]), Math.Abs(_accepted[i]));
        return Rounding * sum;
    }

    /// <inheritdoc/>
    public Correction Solve(IControl control)
    {
        FactorIfNeeded();
        if (FactorOverflows)
            return new Correction(double.PositiveInfinity, 0, 0, -1, false);
        for (int i = 0; i < _rightSide.Length; i++)
        {
            _rightSide[i] = _external[i] - _pressure[i] - _internal[i];
            _solution[i] = _isHeld[i] ? _held[i] - _u[i] : 0;
        }
        double equation = control.Equation(this, _gradient, out double byProgress);
        SolveWith(control, equation, byProgress);
        double largest = 0;
        bool finite = double.IsFinite(_correctionProgress);
        foreach (double value in _solution)
        {
            largest = Math.Max(largest, Math.Abs(value));
            finite &= double.IsFinite(value);
        }
        Array.Copy(_u, _base, _u.Length);
        _baseProgress = Progress;
        int singular = _factor.Outcome.Status == FactorStatus.Done ? -1 : _factor.Outcome.Unknown;
        return new Correction(largest, _correctionProgress, Math.Abs(equation) / control.Stride, singular, finite);
    }

    /// <inheritdoc/>
    public double WorkAlongCorrection()
    {
        double work = 0;
        for (int i = 0; i < _solution.Length; i++)
            if (!_isHeld[i])
                work += _solution[i] * (_external[i] - _pressure[i] - _internal[i]);
        return work;
    }

    /// <inheritdoc/>
    public void Move(double share)
    {
        for (int i = 0; i < _u.Length; i++)
            _u[i] = _base[i] + share * _solution[i];
        Progress = _baseProgress + share * _correctionProgress;
    }

    /// <inheritdoc/>
    public void Guess(ReadOnlySpan<double> way, double wayProgress, double share)
    {
        for (int i = 0; i < _u.Length; i++)
            _u[i] = _accepted[i] + share * way[i];
        Progress = AcceptedProgress + share * wayProgress;
    }

    /// <inheritdoc/>
    public void RollBack()
    {
        Array.Copy(_accepted, _u, _u.Length);
        Progress = AcceptedProgress;
    }

    /// <inheritdoc/>
    public void Accept()
    {
        Array.Copy(_u, _accepted, _u.Length);
        AcceptedProgress = Progress;
        AcceptedTemperature = Temperature;
        _largestReference = Math.Max(_largestReference, _reference);
        _bonds.Accept();
        _state.Accept();
    }

    /// <summary>
    /// Directions in which the equilibrium is unstable while the stage's held unknowns are held: negative eigenvalues of the tangent (of its symmetric part where it is skew)
    /// by the latest evaluation with tangents. Second: the first unknown with a numerically zero pivot, or -1.
    /// </summary>
    public (int Negative, int Singular) Stability()
    {
        FactorSymmetric();
        if (FactorOverflows)
            return (0, -1);
        Inertia inertia = _factor.Inertia(_heldUnknowns);
        if (_factor.Outcome.Unknown >= 0)
            return (inertia.Negative, _factor.Outcome.Unknown);
        return (inertia.Negative, inertia.Zero == 0 ? -1 : LooseGrip(inertia.Zero));
    }

    /// <summary>Estimate of the condition number of the latest tangent that <see cref="Stability"/> factored: it costs as many digits of a solution as it has.</summary>
    public double Condition() => _factor.Condition(_heldUnknowns);

    /// <summary>
    /// A movement of all unknowns that nothing resists, of any size, by the latest factored tangent. A grip's loose unknown is held at 1 without any force: all else follows it. Elsewhere a force
    /// on the loose unknown moves the part, and what that force strains is taken off.
    /// </summary>
    /// <param name="unknown">The unknown that <see cref="Stability"/> found loose.</param>
    public double[] FreeMovement(int unknown)
    {
        bool isGrip = _model.Unknowns.IsRoot[_model.Unknowns.VertexOfUnknown[unknown]];
        Array.Clear(_rightSide);
        Array.Clear(_solution);
        (isGrip ? _solution : _rightSide)[unknown] = 1;
        _factor.SolveSymmetric(_rightSide, _solution, isGrip ? [.. _heldUnknowns, unknown] : _heldUnknowns);
        double[] movement = [.. _solution];
        if (isGrip)
            return movement;
        _factor.MultiplySymmetric(movement, _rightSide);
        Array.Clear(_solution);
        _factor.SolveSymmetric(_rightSide, _solution, _heldUnknowns);
        for (int i = 0; i < movement.Length; i++)
            movement[i] -= _solution[i];
        return movement;
    }

    /// <summary>A grip's unknown that would stop a free movement if it were held: turns are tried first, since a free turn moves x and y too.</summary>
    private int LooseGrip(int zeros)
    {
        UnknownMap map = _model.Unknowns;
        int[] held = [.. _heldUnknowns, 0];
        for (int component = 2; component >= 0; component--)
        {
            for (int b = 0; b < map.Bodies.Count; b++)
            {
                if (component == 2 && !map.Bodies[b].Rigid)
                    continue;
                held[^1] = (map.Bodies[b].Rigid ? map.OfBody(b) : map.OfNode(map.Bodies[b].Nodes[0])) + component;
                if (!_isHeld[held[^1]] && _factor.Inertia(held).Zero < zeros)
                    return held[^1];
            }
        }
        return 0;
    }

    /// <summary>State of an element of an adherend at the accepted point.</summary>
    public ReadOnlySpan<double> AcceptedSolidState(int adherend, int element) => _state.Accepted(adherend, element);

    /// <summary>State of a layer element at the accepted point.</summary>
    public ReadOnlySpan<double> AcceptedLayerState(int joint, int element) => _state.Accepted(_table.FirstLayerBlock + joint, element);

    /// <summary>
    /// |K|·|u| into the right side, with the larger of the tentative and the accepted displacement: the tentative one is the accepted one plus a change and carries its rounding, also where
    /// the path leads back to nothing.
    /// </summary>
    private void StiffnessTimesDisplacement()
    {
        Array.Clear(_rightSide);
        for (int slot = 0; slot < _table.SlotCount; slot++)
        {
            ReadOnlySpan<int> ids = _table.Pattern.Unknowns(slot);
            ReadOnlySpan<double> k = _factor.Tangent(slot);
            for (int i = 0; i < ids.Length; i++)
            {
                double sum = 0;
                for (int j = 0; j < ids.Length; j++)
                    sum += Math.Abs(k[i * ids.Length + j]) * Math.Max(Math.Abs(_u[ids[j]]), Math.Abs(_accepted[ids[j]]));
                _rightSide[ids[i]] += sum;
            }
        }
    }

    private PathPoint At(LoadStage stage) => new(Progress, Temperature, stage.Duration * Math.Max(Progress - AcceptedProgress, 0), stage.Number);

    private static bool IsFinite(ReadOnlySpan<double> values)
    {
        double sum = 0;
        foreach (double value in values)
            sum += 0 * value;
        return sum == 0;
    }

    /// <summary>Solves for the correction that the right side and held values ask for, with that of the progress where the control does not fix it.</summary>
    private void SolveWith(IControl control, double equation, double byProgress)
    {
        using PhaseClock.Stretch time = Clock.In(Phase.Solves);
        Solves++;
        _correctionProgress = 0;
        if (control.FixesProgress)
        {
            _factor.Solve(_rightSide, _solution, _heldUnknowns);
            return;
        }
        double temperatureRate = _temperatureEnd - _temperatureStart;
        for (int i = 0; i < _progressRate.Length; i++)
            _progressRate[i] = _externalRate[i] - _pressureRate[i] - _temperatureRate[i] * temperatureRate;
        _correctionProgress = _factor.SolveControlled(_rightSide, _progressRate, _gradient, byProgress, -equation, _solution, _heldUnknowns, _heldRate);
    }

    private void FactorIfNeeded()
    {
        using PhaseClock.Stretch time = Clock.In(Phase.Factorisation);
        _factor.Factor();
    }

    private void FactorSymmetric()
    {
        using PhaseClock.Stretch time = Clock.In(Phase.Factorisation);
        _factor.FactorSymmetric();
    }
}
