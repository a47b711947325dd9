using InterfaceFE.Sparse;
using MathNet.Numerics.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra.Double;

namespace InterfaceFE.Tests.Sparse;

/// <summary>Builds patterns and element matrices for the tests, and the dense matrix to compare with.</summary>
internal sealed class SparseModel
{
    private readonly List<double> _x = [];
    private readonly List<double> _y = [];
    private readonly List<bool> _root = [];
    private readonly List<bool> _changeable = [];
    private readonly List<int> _vertexOfUnknown = [];
    private readonly List<int> _slotStart = [0];
    private readonly List<int> _slotUnknowns = [];
    private SlotPattern? _pattern;

    public List<double[]> Matrices { get; } = [];

    public int Unknowns => _vertexOfUnknown.Count;

    public SlotPattern Pattern => _pattern ??= new SlotPattern
    {
        UnknownCount = Unknowns,
        VertexOfUnknown = _vertexOfUnknown.ToArray(),
        VertexX = _x.ToArray(),
        VertexY = _y.ToArray(),
        IsRoot = _root.ToArray(),
        IsChangeable = _changeable.ToArray(),
        SlotStart = _slotStart.ToArray(),
        SlotUnknowns = _slotUnknowns.ToArray(),
    };

    /// <summary>Adds a vertex and returns its first unknown.</summary>
    public int Vertex(double x, double y, int unknowns, bool root = false, bool changeable = false)
    {
        _pattern = null;
        _x.Add(x);
        _y.Add(y);
        _root.Add(root);
        _changeable.Add(changeable);
        for (int k = 0; k < unknowns; k++)
            _vertexOfUnknown.Add(_x.Count - 1);
        return Unknowns - unknowns;
    }

    /// <summary>Adds a slot; unknowns below zero are supported and drop out. Returns its index.</summary>
    public int Slot(int[] unknowns, double[] matrix)
    {
        _pattern = null;
        int m = unknowns.Length;
        int[] kept = Enumerable.Range(0, m).Where(k => unknowns[k] >= 0).ToArray();
        var reduced = new double[kept.Length * kept.Length];
        for (int r = 0; r < kept.Length; r++)
            for (int c = 0; c < kept.Length; c++)
                reduced[r * kept.Length + c] = matrix[kept[r] * m + kept[c]];
        _slotUnknowns.AddRange(kept.Select(k => unknowns[k]));
        _slotStart.Add(_slotUnknowns.Count);
        Matrices.Add(reduced);
        return Matrices.Count - 1;
    }

    public int Spring(int a, int b, double stiffness) =>
        b < 0 ? Slot([a], [stiffness]) : Slot([a, b], [stiffness, -stiffness, -stiffness, stiffness]);

    public Matrix<double> Dense()
    {
        var k = DenseMatrix.Create(Unknowns, Unknowns, 0);
        for (int slot = 0; slot < Pattern.SlotCount; slot++)
        {
            ReadOnlySpan<int> unknowns = Pattern.Unknowns(slot);
            for (int r = 0; r < unknowns.Length; r++)
                for (int c = 0; c < unknowns.Length; c++)
                    k[unknowns[r], unknowns[c]] += Matrices[slot][r * unknowns.Length + c];
        }
        return k;
    }

    public void Load(IWorkingFactor factor)
    {
        for (int slot = 0; slot < Matrices.Count; slot++)
            factor.Replace(slot, Matrices[slot]);
    }

    /// <summary>Root unknowns in their own order.</summary>
    public int[] RootUnknowns() => Enumerable.Range(0, Unknowns).Where(u => _root[_vertexOfUnknown[u]]).ToArray();

    /// <summary>The same model with slots in another order and the unknowns within each slot too.</summary>
    public SparseModel Shuffled(Random random)
    {
        var other = new SparseModel();
        other._x.AddRange(_x);
        other._y.AddRange(_y);
        other._root.AddRange(_root);
        other._changeable.AddRange(_changeable);
        other._vertexOfUnknown.AddRange(_vertexOfUnknown);
        int[] order = Enumerable.Range(0, Matrices.Count).ToArray();
        random.Shuffle(order);
        foreach (int slot in order)
        {
            int[] unknowns = Pattern.Unknowns(slot).ToArray();
            int m = unknowns.Length;
            int[] within = Enumerable.Range(0, m).ToArray();
            random.Shuffle(within);
            var matrix = new double[m * m];
            for (int r = 0; r < m; r++)
                for (int c = 0; c < m; c++)
                    matrix[r * m + c] = Matrices[slot][within[r] * m + within[c]];
            other.Slot(within.Select(k => unknowns[k]).ToArray(), matrix);
        }
        return other;
    }
}
