namespace InterfaceFE.Sparse;

/// <summary>What a border becomes once the unknowns outside the root are eliminated: its entries at root unknowns and its own corner.</summary>
internal sealed class BorderBlock
{
    private readonly int _rootCount;
    private double[] _rows = [];
    private double[] _columns = [];
    private double[] _corner = [];
    private double[] _sizes = [];

    /// <summary>An empty border beside <paramref name="rootCount"/> root unknowns.</summary>
    public BorderBlock(int rootCount) => _rootCount = rootCount;

    /// <summary>Number of rows.</summary>
    public int Count { get; private set; }

    /// <summary>Whether each row is its column's transpose.</summary>
    public bool IsSymmetric { get; private set; }

    /// <summary>Starts anew with zeros.</summary>
    public void Reset(int count, bool isSymmetric)
    {
        Count = count;
        IsSymmetric = isSymmetric;
        if (_corner.Length < count * count)
        {
            _rows = new double[count * _rootCount];
            _columns = new double[count * _rootCount];
            _corner = new double[count * count];
            _sizes = new double[count];
        }
        Array.Clear(_rows);
        Array.Clear(_columns);
        Array.Clear(_corner);
        Array.Clear(_sizes);
    }

    /// <summary>Entry of a row at a root unknown.</summary>
    public ref double Row(int row, int root) => ref _rows[row * _rootCount + root];

    /// <summary>Entry of a column at a root unknown.</summary>
    public ref double Column(int column, int root) => ref _columns[column * _rootCount + root];

    /// <summary>Entry of the corner.</summary>
    public ref double Corner(int row, int column) => ref _corner[row * Count + column];

    /// <summary>Sum of magnitudes that went into a row's diagonal.</summary>
    public ref double Size(int row) => ref _sizes[row];
}
