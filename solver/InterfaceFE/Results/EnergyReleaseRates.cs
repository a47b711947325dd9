using InterfaceFE.Geometry;
using InterfaceFE.Marching;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Mechanics.Materials;
using InterfaceFE.Model;

namespace InterfaceFE.Results;

/// <summary>
/// Energy release rate of a front in two independent ways besides the law's own work, each null where it is not valid, with the reason.
/// <para>
/// By path (Rice 1968; with finite rotation in Eshelby's form, over sections before deformation): sections through both adherends behind and ahead of the front, and the law's energy density where the section ahead cuts the bond, so that it is the
/// whole J at the starter tip. Valid where both adherends are straight rectangles along x, no grip and no other joint touches them between the sections.
/// </para>
/// <para>
/// By rotation (Paris and Paris 1988; Olsson and Stigh 1989): J = -(1/b)·sum of Fy·θ over all grips, in the linear kinematics of small rotation; with finite rotation
/// J = (1/b)·sum of Fx·(1 - cos θ) - Fy·sin θ, and no value with a rigid grip behind the front. At small rotation a rigid grip behind the
/// front is cut off with a piece of its arm as long as the arm is thick: θ is that of the section there, and a beam's M²/(2·b·E'I) + 2·V²/(5·b·G·A) of its moment and shear force
/// is added. Valid with one joint of straight adherends at constant temperature.
/// </para>
/// </summary>
public sealed class EnergyReleaseRates
{
    private readonly SpecimenModel _model;
    private readonly BondFront _front;
    private readonly MeshedJoint _joint;
    private readonly SolidBlock _upper, _lower;
    private readonly double _behindFrom, _behindTo, _aheadFrom, _aheadTo;

    /// <summary>Prepares the sections of a front.</summary>
    public EnergyReleaseRates(SpecimenModel model, BondFront front)
    {
        _model = model;
        _front = front;
        _joint = model.Mesh.Joints[front.Joint];
        _upper = model.Solids[_joint.UpperAdherend];
        _lower = model.Solids[_joint.LowerAdherend];
        double tip = model.Mesh.X[front.TipNode];
        bool isHeavy = model.Stages.Any(stage => stage.Weights.Count > 0);
        PathReason = Place(tip, out double behind, out double ahead) ?? (isHeavy ? "weight acts on the arms" : null);
        _behindFrom = Math.Min(tip + 0.3 * (behind - tip), tip + 0.7 * (behind - tip));
        _behindTo = Math.Max(tip + 0.3 * (behind - tip), tip + 0.7 * (behind - tip));
        _aheadFrom = Math.Min(tip + 0.85 * (ahead - tip), tip + 0.95 * (ahead - tip));
        _aheadTo = Math.Max(tip + 0.85 * (ahead - tip), tip + 0.95 * (ahead - tip));
        RotationReason = CheckRotation(tip) ?? (isHeavy ? "weight acts on the arms" : null);
        if (model.Layers[front.Joint].Law is FrictionLaw)
            PathReason = RotationReason = "friction of the faces behind the front does work that the formula leaves out";
    }

    /// <summary>Why J by path has no value; null when it has.</summary>
    public string? PathReason { get; }

    /// <summary>Why J by rotation has no value; null when it has.</summary>
    public string? RotationReason { get; }

    /// <summary>J by path [N/mm] at the accepted point; null where not valid.</summary>
    /// <param name="sample">The joint's layer.</param>
    /// <param name="ux">Displacement of nodes along x [mm].</param>
    /// <param name="uy">Displacement of nodes along y [mm].</param>
    /// <param name="temperature">Temperature [K].</param>
    /// <param name="outOfPlane">Strain out of plane of both adherends.</param>
    public double? Path(LayerSample sample, double[] ux, double[] uy, double temperature, double outOfPlane = 0)
    {
        if (PathReason is not null || FrontIsNear)
            return null;
        double j = 0;
        foreach (SolidBlock solid in (ReadOnlySpan<SolidBlock>)[_upper, _lower])
        {
            double? behind = SectionIntegral.Mean(solid, _behindFrom, _behindTo, ux, uy, temperature, outOfPlane);
            double? ahead = SectionIntegral.Mean(solid, _aheadFrom, _aheadTo, ux, uy, temperature, outOfPlane);
            if (behind is null || ahead is null)
                return null;
            j += (behind.Value - ahead.Value) * solid.Adherend.Width / _joint.Width;
        }
        return j + WorkAhead(sample);
    }

    /// <summary>J by rotation [N/mm] at the accepted point; null where not valid.</summary>
    public double? Rotation(IReadOnlyList<GripReading> readings, double[] ux, double[] uy, bool temperatureChanged)
    {
        if (RotationReason is not null || temperatureChanged)
            return null;
        double sum = 0;
        for (int g = 0; g < _model.Grips.Count; g++)
        {
            GripBody body = _model.Unknowns.Bodies[_model.Grips[g].Bodies[0]];
            if (body.Rigid && IsBehind(body) && !_model.Unknowns.Turns)
            {
                sum += CutBehind(body, readings[g], ux);
                continue;
            }
            if (Math.Abs(readings[g].ForceY) > 0)
            {
                double? slope = readings[g].Rotation ?? Slope(body, ux, uy);
                if (slope is null)
                    return null;
                sum -= readings[g].ForceY * (_model.Unknowns.Turns ? Math.Sin(slope.Value) : slope.Value);
            }
            if (_model.Unknowns.Turns && Math.Abs(readings[g].ForceX) > 0)
            {
                if ((readings[g].Rotation ?? Slope(body, ux, uy)) is not { } slope)
                    return null;
                sum += readings[g].ForceX * (1 - Math.Cos(slope));
            }
            if (readings[g].Moment is { } moment && IsEndFace(body))
                sum -= _front.Sense * moment * moment / (2 * Bending(BlockOf(body.Nodes[0])));
        }
        return _front.Sense * sum / _joint.Width;
    }

    /// <summary>
    /// Part of a rigid grip and the piece of free arm at it [N]: at its very edge the arm turns against the grip, a thickness away it is a beam. Forces from the grip, turn of the section
    /// from the nodes of its faces. Integral of sigma_xx·u_x,x + sigma_xy·u_y,x - W over the section with the parabola of shear: M²/(2·E'I) + V·slope - 3·V²/(5·G·A), and the slope
    /// that works with the shear is the turn of the line between the faces plus V/(G·A) (but for 0.02 of that by Poisson's ratio), hence 2/5.
    /// </summary>
    private double CutBehind(GripBody body, GripReading reading, double[] ux)
    {
        Mesh mesh = _model.Mesh;
        SolidBlock solid = BlockOf(body.Nodes[0]);
        double tip = mesh.X[_front.TipNode], height = solid.Adherend.Thickness, edge = mesh.X[body.Nodes[0]];
        foreach (int node in body.Nodes)
            if (Math.Abs(mesh.X[node] - tip) < Math.Abs(edge - tip))
                edge = mesh.X[node];
        double wanted = edge + _front.Sense * Math.Min(height, 0.5 * Math.Abs(tip - edge));
        (int lower, int upper) = Section(solid, wanted);
        double turn = -(ux[upper] - ux[lower]) / (mesh.Y[upper] - mesh.Y[lower]);
        double moment = (reading.Moment ?? 0) + (body.PinX - mesh.X[lower]) * reading.ForceY - (body.PinY - 0.5 * (mesh.Y[lower] + mesh.Y[upper])) * reading.ForceX;
        double share = moment * moment / (2 * Bending(solid)) + 0.4 * reading.ForceY * reading.ForceY / (solid.Material(0).ShearModulus * solid.Adherend.Width * height);
        return _front.Sense * share - reading.ForceY * turn;
    }

    /// <summary>Lowest and highest node of the column of nodes nearest to x.</summary>
    private (int Lower, int Upper) Section(SolidBlock solid, double x)
    {
        Mesh mesh = _model.Mesh;
        int lower = solid.Adherend.FirstNode, upper = lower;
        double slack = 1e-9 * solid.Adherend.Thickness;
        for (int node = solid.Adherend.FirstNode; node < solid.Adherend.FirstNode + solid.Adherend.NodeCount; node++)
        {
            double nearer = Math.Abs(mesh.X[lower] - x) - Math.Abs(mesh.X[node] - x);
            if (nearer > slack)
                lower = upper = node;
            else if (nearer >= -slack && mesh.Y[node] < mesh.Y[lower])
                lower = node;
            else if (nearer >= -slack && mesh.Y[node] > mesh.Y[upper])
                upper = node;
        }
        return (lower, upper);
    }

    private static double Bending(SolidBlock solid) => solid.Material(0).YoungAlongX * solid.Adherend.Width * Math.Pow(solid.Adherend.Thickness, 3) / 12;

    private bool IsBehind(GripBody body) => body.Nodes.All(node => _front.Sense * (_model.Mesh.X[_front.TipNode] - _model.Mesh.X[node]) > 0);

    private bool IsEndFace(GripBody body) => body.Rigid && Math.Abs(_model.Mesh.X[body.Nodes[0]] - _model.Mesh.X[body.Nodes[^1]]) < 1e-9 * BlockOf(body.Nodes[0]).Adherend.Thickness;

    /// <summary>Whether the process zone has come within two thicknesses of the section ahead, where stresses vary too sharply for a section of few elements.</summary>
    private bool FrontIsNear
    {
        get
        {
            double offset = _model.Mesh.X[_joint.LowerNodes[0]] - _joint.Position[0], x = (_front.ZoneStart ?? _front.CrackTip) + offset;
            double reach = 2 * Math.Max(_upper.Adherend.Thickness, _lower.Adherend.Thickness);
            return _front.Sense > 0 ? x > _aheadFrom - reach : x < _aheadTo + reach;
        }
    }

    private double WorkAhead(LayerSample sample)
    {
        double sum = 0, length = 0;
        double offset = _model.Mesh.X[_joint.LowerNodes[0]] - _joint.Position[0];
        for (int i = 0; i < sample.Position.Length; i++)
        {
            double x = sample.Position[i] + offset;
            if (x < _aheadFrom || x > _aheadTo)
                continue;
            LayerResponse r = sample.Response[i];
            sum += sample.Length[i] * (r.Stored + r.Dissipated - sample.CoupleFlow[i]);
            length += sample.Length[i];
        }
        return length > 0 ? sum / length : 0;
    }

    private string? Place(double tip, out double behind, out double ahead)
    {
        Mesh mesh = _model.Mesh;
        behind = ahead = tip;
        if (!_upper.Adherend.StraightAlongX || !_lower.Adherend.StraightAlongX)
            return "an adherend is bent";
        if (IsPressed)
            return "pressure acts on an adherend";
        double left = Math.Max(Extent(_upper, mesh).From, Extent(_lower, mesh).From), right = Math.Min(Extent(_upper, mesh).To, Extent(_lower, mesh).To);
        double offset = mesh.X[_joint.LowerNodes[0]] - _joint.Position[0];
        double end = _front.StretchEnd + offset;
        (left, right) = _front.Sense > 0 ? (left, Math.Min(right, end)) : (Math.Max(left, end), right);
        foreach (Grip grip in _model.Grips)
        {
            foreach (int b in grip.Bodies)
            {
                foreach (int node in _model.Unknowns.Bodies[b].Nodes)
                {
                    if (!Belongs(_upper, node) && !Belongs(_lower, node))
                        continue;
                    double x = mesh.X[node];
                    if (x <= tip)
                        left = Math.Max(left, x);
                    if (x >= tip)
                        right = Math.Min(right, x);
                }
            }
        }
        (behind, ahead) = _front.Sense > 0 ? (left, right) : (right, left);
        double thickness = Math.Max(_upper.Adherend.Thickness, _lower.Adherend.Thickness);
        if (Math.Abs(behind - tip) < thickness)
            return "no free arms longer than they are thick lie behind the front";
        if (Math.Abs(ahead - tip) < thickness)
            return "the bond ahead of the front is shorter than an arm is thick";
        // A section too near a pin sees the sharp stresses under it, which the mesh does not resolve.
        ahead -= _front.Sense * Math.Min(2 * thickness, 0.4 * Math.Abs(ahead - tip));
        for (int j = 0; j < mesh.Joints.Count; j++)
        {
            MeshedJoint other = mesh.Joints[j];
            bool shares = other.UpperAdherend == _joint.UpperAdherend || other.LowerAdherend == _joint.LowerAdherend || other.UpperAdherend == _joint.LowerAdherend || other.LowerAdherend == _joint.UpperAdherend;
            if (j != _front.Joint && shares)
                return "another joint touches the adherends";
        }
        return null;
    }

    private string? CheckRotation(double tip)
    {
        if (_model.Mesh.Joints.Count != 1)
            return "the formula holds for a single joint";
        if (!_upper.Adherend.StraightAlongX || !_lower.Adherend.StraightAlongX)
            return "an adherend is bent";
        if (_upper.Adherend.PlyOfRow.Count > 0 || _lower.Adherend.PlyOfRow.Count > 0)
            return "an adherend has plies";
        if (IsPressed)
            return "pressure acts on an adherend";
        if (_model.Solids.Count != 2)
            return "there are further adherends";
        if (_model.Unknowns.Bodies.Any(body => Spans(body, tip)))
            return "a rigid grip reaches over the front";
        if (_model.Unknowns.Turns && _model.Unknowns.Bodies.Any(body => body.Rigid && IsBehind(body) && !IsEndFace(body)))
            return "a rigid grip lies behind the front, and rotations are finite";
        return Math.Abs(_front.StarterTip - (_front.Sense > 0 ? _joint.Position[0] : _joint.Position[^1])) > 0 || PathReason is null ? null : $"no crack lies behind the front at x = {tip.ToString("G6", System.Globalization.CultureInfo.InvariantCulture)} mm";
    }

    private bool IsPressed => _model.Pressures.Any(p => p.Adherend == _joint.UpperAdherend || p.Adherend == _joint.LowerAdherend);

    private bool Spans(GripBody body, double tip) => body.Rigid && body.Nodes.Min(n => _model.Mesh.X[n]) < tip && body.Nodes.Max(n => _model.Mesh.X[n]) > tip;

    /// <summary>Slope of the edge at a pin: mean over one element to each side, so that the dent under the load, which is even, drops out; null at the end of an edge.</summary>
    private double? Slope(GripBody body, double[] ux, double[] uy)
    {
        if (body.Nodes.Length != 1)
            return null;
        int node = body.Nodes[0];
        Mesh mesh = _model.Mesh;
        int reach = mesh.NodesPerFace - 1;
        foreach (MeshedEdge edge in BlockOf(node).Adherend.Edges.Values)
        {
            int at = Array.IndexOf(edge.Nodes, node);
            if (at < reach || at + reach >= edge.Nodes.Length)
                continue;
            int before = edge.Nodes[at - reach], after = edge.Nodes[at + reach];
            if (Math.Abs(mesh.X[after] - mesh.X[before]) < Math.Abs(mesh.Y[after] - mesh.Y[before]))
                continue;
            return _model.Unknowns.Turns
                ? Angle(mesh.X[after] - mesh.X[before], mesh.Y[after] - mesh.Y[before], ux[after] - ux[before], uy[after] - uy[before])
                : (uy[after] - uy[before]) / (mesh.X[after] - mesh.X[before]);
        }
        return null;
    }

    private static double Angle(double x, double y, double moveX, double moveY) => Math.Atan2(x * (y + moveY) - y * (x + moveX), x * (x + moveX) + y * (y + moveY));

    private SolidBlock BlockOf(int node) => _model.Solids.First(s => Belongs(s, node));

    private static bool Belongs(SolidBlock solid, int node) => node >= solid.Adherend.FirstNode && node < solid.Adherend.FirstNode + solid.Adherend.NodeCount;

    private static (double From, double To) Extent(SolidBlock solid, Mesh mesh)
    {
        double from = double.PositiveInfinity, to = double.NegativeInfinity;
        for (int i = solid.Adherend.FirstNode; i < solid.Adherend.FirstNode + solid.Adherend.NodeCount; i++)
        {
            from = Math.Min(from, mesh.X[i]);
            to = Math.Max(to, mesh.X[i]);
        }
        return (from, to);
    }
}
