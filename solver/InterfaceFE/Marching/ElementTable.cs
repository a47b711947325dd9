using InterfaceFE.Model;
using InterfaceFE.Sparse;

namespace InterfaceFE.Marching;

/// <summary>
/// All elements of a model in one numbering of slots: solids first, then layers. Holds each slot's unknowns and, for elements that touch a rigid grip, the matrix that
/// turns the slot's unknowns into native displacements; with finite rotation the matrix is that at the angles last told, and belongs to changes.
/// </summary>
internal sealed class ElementTable
{
    private readonly int[] _blockStart;
    private readonly double[]?[] _transforms;
    private readonly Arm[]?[] _arms;
    private readonly List<int> _turning = [];

    public ElementTable(SpecimenModel model)
    {
        Blocks = model.Blocks;
        _blockStart = new int[Blocks.Count + 1];
        for (int b = 0; b < Blocks.Count; b++)
            _blockStart[b + 1] = _blockStart[b] + Blocks[b].Count;
        int slots = _blockStart[^1];
        _transforms = new double[slots][];
        _arms = new Arm[slots][];
        var arms = new List<Arm>();
        var start = new int[slots + 1];
        var unknowns = new List<int>();
        var local = new List<int>();
        for (int b = 0; b < Blocks.Count; b++)
        {
            LargestNative = Math.Max(LargestNative, Blocks[b].NativeCount);
            for (int e = 0; e < Blocks[b].Count; e++)
            {
                int slot = _blockStart[b] + e;
                local.Clear();
                local.AddRange(Blocks[b].OwnUnknowns(e));
                if (local.Count == 0)
                {
                    arms.Clear();
                    _transforms[slot] = Link(model.Unknowns, model.Mesh, Blocks[b].Nodes(e), Blocks[b].OutOfPlaneUnknown, local, arms);
                    if (model.Unknowns.Turns && arms.Count > 0)
                    {
                        _arms[slot] = [.. arms];
                        _turning.Add(slot);
                    }
                }
                unknowns.AddRange(local);
                start[slot + 1] = unknowns.Count;
                LargestSlot = Math.Max(LargestSlot, local.Count);
            }
        }
        Pattern = new SlotPattern
        {
            UnknownCount = model.Unknowns.Count,
            VertexOfUnknown = model.Unknowns.VertexOfUnknown,
            VertexX = model.Unknowns.VertexX,
            VertexY = model.Unknowns.VertexY,
            IsRoot = model.Unknowns.IsRoot,
            IsChangeable = model.Unknowns.IsChangeable,
            SlotStart = start,
            SlotUnknowns = [.. unknowns],
        };
        FirstLayerBlock = Blocks.Count - model.Layers.Count;
        FirstPressureBlock = FirstLayerBlock - model.Pressures.Count;
        SolidBlocks = model.Solids.Count;
    }

    public IReadOnlyList<IElementBlock> Blocks { get; }

    public SlotPattern Pattern { get; }

    public int FirstLayerBlock { get; }

    public int FirstPressureBlock { get; }

    public int SolidBlocks { get; }

    public int LargestNative { get; }

    public int LargestSlot { get; }

    public int SlotCount => _blockStart[^1];

    public int Slot(int block, int element) => _blockStart[block] + element;

    /// <summary>Native displacements of a slot from the unknowns.</summary>
    public void Gather(int slot, ReadOnlySpan<double> unknowns, Span<double> native)
    {
        ReadOnlySpan<int> ids = Pattern.Unknowns(slot);
        double[]? transform = _transforms[slot];
        if (transform is null)
        {
            for (int i = 0; i < ids.Length; i++)
                native[i] = unknowns[ids[i]];
            return;
        }
        for (int i = 0; i < native.Length; i++)
        {
            double sum = 0;
            for (int j = 0; j < ids.Length; j++)
                sum += transform[i * ids.Length + j] * unknowns[ids[j]];
            native[i] = sum;
        }
        // The matrix belongs to changes: what it gives for the angle itself is replaced by the finite movement.
        foreach (Arm arm in _arms[slot] ?? [])
        {
            double angle = unknowns[ids[arm.Column]];
            (double x, double y) = UnknownMap.Turned(arm.X, arm.Y, angle);
            native[arm.Row] = unknowns[ids[arm.Column - 2]] + x;
            native[arm.Row + 1] = unknowns[ids[arm.Column - 1]] + y;
        }
    }

    /// <summary>Takes the angles of rigid grips from the unknowns, where rotations are finite.</summary>
    public void Turn(ReadOnlySpan<double> unknowns)
    {
        foreach (int slot in _turning)
        {
            ReadOnlySpan<int> ids = Pattern.Unknowns(slot);
            double[] transform = _transforms[slot]!;
            foreach (Arm arm in _arms[slot]!)
            {
                (double sine, double cosine) = Math.SinCos(unknowns[ids[arm.Column]]);
                transform[arm.Row * ids.Length + arm.Column] = -(sine * arm.X + cosine * arm.Y);
                transform[(arm.Row + 1) * ids.Length + arm.Column] = cosine * arm.X - sine * arm.Y;
            }
        }
    }

    /// <summary>Adds a native force of a slot to a vector over the unknowns, and its magnitudes to another.</summary>
    public void Scatter(int slot, ReadOnlySpan<double> native, Span<double> sum, Span<double> magnitudes)
    {
        ReadOnlySpan<int> ids = Pattern.Unknowns(slot);
        double[]? transform = _transforms[slot];
        for (int j = 0; j < ids.Length; j++)
        {
            double value = 0;
            if (transform is null)
                value = native[j];
            else
                for (int i = 0; i < native.Length; i++)
                    value += transform[i * ids.Length + j] * native[i];
            sum[ids[j]] += value;
            if (!magnitudes.IsEmpty)
                magnitudes[ids[j]] += Math.Abs(value);
        }
    }

    /// <summary>
    /// Turns a native tangent (n×n) into that of the slot's unknowns (k×k); returns the span that holds it. With finite rotation the native force works on the second derivative of the
    /// nodes' movement by the angle, which points from the node to the pin.
    /// </summary>
    public ReadOnlySpan<double> TransformTangent(int slot, ReadOnlySpan<double> native, ReadOnlySpan<double> force, Span<double> work, Span<double> result)
    {
        double[]? t = _transforms[slot];
        if (t is null)
            return native;
        int k = Pattern.Unknowns(slot).Length, n = t.Length / k;
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < k; j++)
            {
                double sum = 0;
                for (int m = 0; m < n; m++)
                    sum += native[i * n + m] * t[m * k + j];
                work[i * k + j] = sum;
            }
        }
        for (int i = 0; i < k; i++)
        {
            for (int j = 0; j < k; j++)
            {
                double sum = 0;
                for (int m = 0; m < n; m++)
                    sum += t[m * k + i] * work[m * k + j];
                result[i * k + j] = sum;
            }
        }
        foreach (Arm arm in _arms[slot] ?? [])
        {
            double turnedX = t[(arm.Row + 1) * k + arm.Column], turnedY = -t[arm.Row * k + arm.Column];
            result[arm.Column * k + arm.Column] -= force[arm.Row] * turnedX + force[arm.Row + 1] * turnedY;
        }
        return result[..(k * k)];
    }

    private static double[]? Link(UnknownMap map, Geometry.Mesh mesh, ReadOnlySpan<int> nodes, int outOfPlane, List<int> unknowns, List<Arm> arms)
    {
        bool plain = true;
        foreach (int node in nodes)
        {
            if (map.BodyOfNode(node) >= 0)
            {
                plain = false;
                continue;
            }
            unknowns.Add(map.OfNode(node));
            unknowns.Add(map.OfNode(node) + 1);
        }
        if (plain)
        {
            if (outOfPlane >= 0)
                unknowns.Add(outOfPlane);
            return null;
        }
        foreach (int node in nodes)
        {
            int body = map.BodyOfNode(node);
            if (body < 0 || unknowns.Contains(map.OfBody(body)))
                continue;
            for (int i = 0; i < 3; i++)
                unknowns.Add(map.OfBody(body) + i);
        }
        if (outOfPlane >= 0)
            unknowns.Add(outOfPlane);
        int k = unknowns.Count, native = 2 * nodes.Length + (outOfPlane >= 0 ? 1 : 0);
        var transform = new double[native * k];
        if (outOfPlane >= 0)
            transform[native * k - 1] = 1;
        for (int i = 0; i < nodes.Length; i++)
        {
            int body = map.BodyOfNode(nodes[i]);
            int rowX = 2 * i * k, rowY = rowX + k;
            if (body < 0)
            {
                int column = unknowns.IndexOf(map.OfNode(nodes[i]));
                transform[rowX + column] = 1;
                transform[rowY + column + 1] = 1;
                continue;
            }
            int first = unknowns.IndexOf(map.OfBody(body));
            var arm = new Arm(2 * i, first + 2, mesh.X[nodes[i]] - map.Bodies[body].PinX, mesh.Y[nodes[i]] - map.Bodies[body].PinY);
            arms.Add(arm);
            transform[rowX + first] = 1;
            transform[rowX + first + 2] = -arm.Y;
            transform[rowY + first + 1] = 1;
            transform[rowY + first + 2] = arm.X;
        }
        return transform;
    }

    /// <summary>A node on a rigid grip: row of its native ux, column of the grip's angle (x and y come before it), and its place from the pin before deformation [mm].</summary>
    private readonly record struct Arm(int Row, int Column, double X, double Y);
}
