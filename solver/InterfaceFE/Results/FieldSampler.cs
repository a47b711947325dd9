using InterfaceFE.Geometry;
using InterfaceFE.Marching;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Model;

namespace InterfaceFE.Results;

/// <summary>Stresses at the nodes and layer values at the stations, from nodal displacements at an accepted point. Reuses its arrays from point to point.</summary>
public sealed class FieldSampler
{
    private readonly SpecimenModel _model;
    private readonly double[] _share;
    private readonly double[][] _stress = new double[4][];
    private readonly bool[] _atGrip;
    private readonly LayerBlock?[] _openFaces;

    /// <summary>Prepares the averaging at nodes.</summary>
    public FieldSampler(SpecimenModel model)
    {
        _model = model;
        int nodes = model.Mesh.NodeCount;
        DisplacementX = new double[nodes];
        DisplacementY = new double[nodes];
        Equivalent = new double[nodes];
        PlasticStrain = new double[nodes];
        Yielding = new YieldSample[model.Solids.Count];
        for (int i = 0; i < 4; i++)
            _stress[i] = new double[nodes];
        _share = new double[nodes];
        foreach (SolidBlock solid in model.Solids)
            foreach (int node in solid.Adherend.Connectivity)
                _share[node]++;
        _atGrip = NearGrips(model);
        _openFaces = [.. model.Layers.Select(layer => model.OpenFaces.FirstOrDefault(faces => faces.Name == layer.Name))];
    }

    /// <summary>Displacement of each node along x [mm].</summary>
    public double[] DisplacementX { get; }

    /// <summary>Displacement of each node along y [mm].</summary>
    public double[] DisplacementY { get; }

    /// <summary>Equivalent stress at each node [MPa].</summary>
    public double[] Equivalent { get; }

    /// <summary>Equivalent plastic strain at each node [-].</summary>
    public double[] PlasticStrain { get; }

    /// <summary>Largest equivalent plastic strain of each adherend, at its integration points.</summary>
    public YieldSample[] Yielding { get; }

    /// <summary>Largest rotation of the material at the latest sample, magnitude [rad].</summary>
    public double LargestRotation { get; private set; }

    /// <summary>Whether a node belongs to an element that touches a grip, where stresses are those of the grip's idealisation.</summary>
    public IReadOnlyList<bool> AtGrip => _atGrip;

    /// <summary>Samples displacement and stress.</summary>
    public void Sample(FullEquilibrium equilibrium)
    {
        for (int node = 0; node < DisplacementX.Length; node++)
            (DisplacementX[node], DisplacementY[node]) = _model.Unknowns.Displacement(node, equilibrium.AcceptedDisplacement);
        foreach (double[] component in _stress)
            Array.Clear(component);
        Array.Clear(PlasticStrain);
        Array.Clear(Yielding);
        LargestRotation = 0;
        Span<double> native = stackalloc double[17], gauss = stackalloc double[16], nodal = stackalloc double[32], gradients = stackalloc double[16];
        for (int adherend = 0; adherend < _model.Solids.Count; adherend++)
        {
            SolidBlock solid = _model.Solids[adherend];
            int n = solid.NodesPerElement;
            if (solid.OutOfPlaneUnknown >= 0)
                native[2 * n] = equilibrium.AcceptedDisplacement[solid.OutOfPlaneUnknown];
            for (int e = 0; e < solid.Count; e++)
            {
                ReadOnlySpan<int> nodes = solid.Nodes(e);
                ReadOnlySpan<double> state = equilibrium.AcceptedSolidState(adherend, e);
                if (solid.YieldCurve is not null)
                    TakeYielding(adherend, e, state);
                LayerSample.Gather(nodes, DisplacementX, DisplacementY, native);
                solid.Stresses(e, native[..solid.NativeCount], equilibrium.AcceptedTemperature, state, gauss);
                solid.Gradients(e, native[..(2 * n)], gradients);
                for (int p = 0; p < 4; p++)
                    LargestRotation = Math.Max(LargestRotation, Math.Abs(solid.Rotation(gradients.Slice(4 * p, 4))));
                solid.ExtrapolateToNodes(4, gauss, nodal[..(4 * n)]);
                for (int i = 0; i < n; i++)
                    for (int c = 0; c < 4; c++)
                        _stress[c][nodes[i]] += nodal[4 * i + c] / _share[nodes[i]];
            }
        }
        for (int node = 0; node < Equivalent.Length; node++)
        {
            double xx = _stress[0][node], yy = _stress[1][node], zz = _stress[2][node], xy = _stress[3][node];
            Equivalent[node] = Math.Sqrt(0.5 * ((xx - yy) * (xx - yy) + (yy - zz) * (yy - zz) + (zz - xx) * (zz - xx)) + 3 * xy * xy);
        }
    }

    private void TakeYielding(int adherend, int element, ReadOnlySpan<double> state)
    {
        SolidBlock solid = _model.Solids[adherend];
        ReadOnlySpan<int> nodes = solid.Nodes(element);
        Span<double> strains = stackalloc double[4], positions = stackalloc double[8], nodal = stackalloc double[8];
        solid.PlasticStrains(state, strains);
        bool atGrip = true;
        foreach (int node in nodes)
            atGrip &= _atGrip[node];
        YieldSample largest = Yielding[adherend];
        for (int p = 0; p < 4; p++)
        {
            if (strains[p] == 0)
                continue;
            solid.GaussPositions(element, positions);
            if (atGrip)
                largest = largest with { AtGrip = true };
            else if (strains[p] > largest.Largest)
                largest = largest with { Largest = strains[p], X = positions[2 * p], Y = positions[2 * p + 1] };
            largest = largest with { LargestAnywhere = Math.Max(largest.LargestAnywhere, strains[p]) };
        }
        Yielding[adherend] = largest;
        solid.ExtrapolateToNodes(1, strains, nodal[..nodes.Length]);
        for (int i = 0; i < nodes.Length; i++)
            PlasticStrain[nodes[i]] += Math.Max(nodal[i], 0) / _share[nodes[i]];
    }

    /// <summary>A copy of the fields for keeping.</summary>
    public FieldSnapshot Snapshot(MarchPoint point, IReadOnlyList<LayerSample> layers) => new()
    {
        Point = point.Number,
        Stage = point.Stage,
        Time = point.Time,
        Temperature = point.Temperature,
        DisplacementX = [.. DisplacementX],
        DisplacementY = [.. DisplacementY],
        StressXx = [.. _stress[0]],
        StressYy = [.. _stress[1]],
        StressZz = [.. _stress[2]],
        StressXy = [.. _stress[3]],
        EquivalentStress = [.. Equivalent],
        PlasticStrain = [.. PlasticStrain],
        Layers = [.. layers.Select((sample, joint) => Layer(sample, joint))],
    };

    private LayerField Layer(LayerSample sample, int joint)
    {
        MeshedJoint mesh = _model.Mesh.Joints[joint];
        int stations = _model.Mesh.NodesPerFace, count = mesh.ElementCount * stations, points = sample.Layer.PointsPerElement;
        var field = new LayerField
        {
            Joint = joint,
            Position = new double[count],
            Opening = new double[count],
            Sliding = new double[count],
            Peel = new double[count],
            Shear = new double[count],
            Damage = new double[count],
        };
        Array.Fill(field.Damage, 1);
        Span<double> native = stackalloc double[4 * stations];
        for (int e = 0, bonded = 0; e < mesh.ElementCount; e++)
        {
            LayerBlock block = mesh.Bonded[e] ? sample.Layer : _openFaces[joint]!;
            int own = mesh.Bonded[e] ? bonded : e - bonded;
            LayerSample.Gather(block.Nodes(own), DisplacementX, DisplacementY, native);
            for (int s = 0; s < stations; s++)
            {
                int i = e * stations + s;
                field.Position[i] = mesh.Position[e] + (mesh.Position[e + 1] - mesh.Position[e]) * s / (stations - 1);
                Separation jump = block.AtStation(own, s, native);
                (field.Opening[i], field.Sliding[i]) = (jump.Opening, jump.Sliding);
            }
            if (!mesh.Bonded[e])
                continue;
            for (int s = 0; s < stations; s++)
            {
                int i = e * stations + s;
                int near = bonded * points + (s == 0 ? 0 : s == stations - 1 ? points - 1 : points / 2);
                int other = s == 0 ? near + 1 : near - 1;
                double share = (field.Position[i] - sample.Position[near]) / (sample.Position[other] - sample.Position[near]);
                field.Peel[i] = Along(sample.Response[near].Peel, sample.Response[other].Peel, share);
                field.Shear[i] = Along(sample.Response[near].Shear, sample.Response[other].Shear, share);
                field.Damage[i] = Math.Clamp(Along(sample.Response[near].Damage, sample.Response[other].Damage, share), 0, 1);
            }
            bonded++;
        }
        return field;
    }

    private static double Along(double near, double other, double share) => near + share * (other - near);

    private static bool[] NearGrips(SpecimenModel model)
    {
        var gripped = new bool[model.Mesh.NodeCount];
        foreach (GripBody body in model.Unknowns.Bodies)
            foreach (int node in body.Nodes)
                gripped[node] = true;
        var near = new bool[gripped.Length];
        foreach (SolidBlock solid in model.Solids)
        {
            for (int e = 0; e < solid.Count; e++)
            {
                bool touches = false;
                foreach (int node in solid.Nodes(e))
                    touches |= gripped[node];
                if (!touches)
                    continue;
                foreach (int node in solid.Nodes(e))
                    near[node] = true;
            }
        }
        return near;
    }
}
