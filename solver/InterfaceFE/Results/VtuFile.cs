using System.Buffers.Binary;
using System.Globalization;
using System.IO.Compression;
using System.Runtime.InteropServices;
using System.Text;

namespace InterfaceFE.Results;

/// <summary>
/// An unstructured grid in the open VTU format, version 1.0: XML with inline base64 data, zlib blocks of 32 KiB and a header of UInt64 before each array
/// (number of blocks, block size, size of the last block or 0 if it is full, compressed sizes). Header and data are encoded apart. Points have z = 0.
/// </summary>
internal sealed class VtuFile
{
    private const int BlockSize = 32768;

    private readonly List<DataArray> _pointData = [];
    private readonly List<DataArray> _cellData = [];
    private readonly List<DataArray> _fieldData = [];
    private readonly double[] _points;
    private readonly long[] _connectivity;
    private readonly long[] _offsets;
    private readonly byte[] _types;

    /// <summary>A grid of cells of one kind.</summary>
    /// <param name="x">x of each point [mm].</param>
    /// <param name="y">y of each point [mm].</param>
    /// <param name="connectivity">Points of all cells, cell after cell, in the format's order.</param>
    /// <param name="nodesPerCell">Points of a cell.</param>
    /// <param name="cellType">Number of the cell's kind in the format: 3 line, 9 quad, 21 quadratic edge, 23 quadratic quad.</param>
    public VtuFile(ReadOnlySpan<double> x, ReadOnlySpan<double> y, long[] connectivity, int nodesPerCell, byte cellType)
    {
        _points = Vectors(x, y);
        _connectivity = connectivity;
        int cells = connectivity.Length / nodesPerCell;
        _offsets = new long[cells];
        _types = new byte[cells];
        for (int i = 0; i < cells; i++)
        {
            _offsets[i] = (i + 1L) * nodesPerCell;
            _types[i] = cellType;
        }
    }

    /// <summary>Adds numbers at the points.</summary>
    public void AddPointData(string name, ReadOnlySpan<double> values) => _pointData.Add(Numbers(name, values, 1, _points.Length / 3));

    /// <summary>Adds vectors (x, y, 0) at the points.</summary>
    public void AddPointVectors(string name, ReadOnlySpan<double> x, ReadOnlySpan<double> y) => _pointData.Add(Numbers(name, Vectors(x, y), 3, _points.Length / 3));

    /// <summary>Adds whole numbers at the cells.</summary>
    public void AddCellData(string name, ReadOnlySpan<int> values)
    {
        if (values.Length != _types.Length)
            throw new ArgumentException($"{name}: {values.Length} values for {_types.Length} cells", nameof(values));
        _cellData.Add(new DataArray("Int32", name, 1, Bytes(values), values.Length));
    }

    /// <summary>Adds numbers that belong to the grid as a whole.</summary>
    public void AddFieldData(string name, ReadOnlySpan<double> values) => _fieldData.Add(Numbers(name, values, 1, values.Length));

    /// <summary>Writes the file.</summary>
    public void Write(Stream stream)
    {
        using StreamWriter writer = new(stream, new UTF8Encoding(false), 65536, leaveOpen: true) { NewLine = "\n" };
        int points = _points.Length / 3;
        writer.WriteLine("<?xml version=\"1.0\" encoding=\"UTF-8\"?>");
        writer.WriteLine("<VTKFile type=\"UnstructuredGrid\" version=\"1.0\" byte_order=\"LittleEndian\" header_type=\"UInt64\" compressor=\"vtkZLibDataCompressor\">");
        writer.WriteLine("<UnstructuredGrid>");
        if (_fieldData.Count > 0)
            Section(writer, "FieldData", _fieldData, asTuples: true);
        writer.WriteLine(string.Create(CultureInfo.InvariantCulture, $"<Piece NumberOfPoints=\"{points}\" NumberOfCells=\"{_types.Length}\">"));
        Section(writer, "Points", [new DataArray("Float64", "Points", 3, Bytes<double>(_points), points)], asTuples: false);
        Section(
            writer,
            "Cells",
            [
                new DataArray("Int64", "connectivity", 1, Bytes<long>(_connectivity), _connectivity.Length),
                new DataArray("Int64", "offsets", 1, Bytes<long>(_offsets), _offsets.Length),
                new DataArray("UInt8", "types", 1, _types, _types.Length),
            ],
            asTuples: false);
        Section(writer, "PointData", _pointData, asTuples: false);
        Section(writer, "CellData", _cellData, asTuples: false);
        writer.WriteLine("</Piece>");
        writer.WriteLine("</UnstructuredGrid>");
        writer.WriteLine("</VTKFile>");
    }

    private static void Section(StreamWriter writer, string element, List<DataArray> arrays, bool asTuples)
    {
        writer.WriteLine($"<{element}>");
        foreach (DataArray array in arrays)
        {
            string components = array.Components > 1 ? string.Create(CultureInfo.InvariantCulture, $" NumberOfComponents=\"{array.Components}\"") : "";
            string tuples = asTuples ? string.Create(CultureInfo.InvariantCulture, $" NumberOfTuples=\"{array.Tuples}\"") : "";
            writer.Write($"<DataArray type=\"{array.Type}\" Name=\"{System.Security.SecurityElement.Escape(array.Name)}\"{components}{tuples} format=\"binary\">");
            writer.Write(Encoded(array.Bytes));
            writer.WriteLine("</DataArray>");
        }
        writer.WriteLine($"</{element}>");
    }

    /// <summary>Header and zlib blocks in base64, encoded apart as the format wants it.</summary>
    internal static string Encoded(ReadOnlySpan<byte> data)
    {
        int blocks = (data.Length + BlockSize - 1) / BlockSize;
        byte[] header = new byte[8 * (3 + blocks)];
        BinaryPrimitives.WriteUInt64LittleEndian(header, (ulong)blocks);
        BinaryPrimitives.WriteUInt64LittleEndian(header.AsSpan(8), BlockSize);
        BinaryPrimitives.WriteUInt64LittleEndian(header.AsSpan(16), (ulong)(data.Length % BlockSize));
        using MemoryStream packed = new();
        for (int i = 0; i < blocks; i++)
        {
            long before = packed.Length;
            using (ZLibStream zlib = new(packed, CompressionLevel.Optimal, leaveOpen: true))
                zlib.Write(data.Slice(i * BlockSize, Math.Min(BlockSize, data.Length - i * BlockSize)));
            BinaryPrimitives.WriteUInt64LittleEndian(header.AsSpan(24 + 8 * i), (ulong)(packed.Length - before));
        }
        return Convert.ToBase64String(header) + Convert.ToBase64String(packed.GetBuffer(), 0, (int)packed.Length);
    }

    private static DataArray Numbers(string name, ReadOnlySpan<double> values, int components, int tuples)
    {
        if (values.Length != components * tuples)
            throw new ArgumentException($"{name}: {values.Length} values for {tuples} places of {components}", nameof(values));
        return new DataArray("Float64", name, components, Bytes(values), tuples);
    }

    private static double[] Vectors(ReadOnlySpan<double> x, ReadOnlySpan<double> y)
    {
        if (x.Length != y.Length)
            throw new ArgumentException($"{x.Length} values along x, {y.Length} along y", nameof(y));
        double[] vectors = new double[3 * x.Length];
        for (int i = 0; i < x.Length; i++)
        {
            vectors[3 * i] = x[i];
            vectors[3 * i + 1] = y[i];
        }
        return vectors;
    }

    /// <summary>Bytes in little-endian order; every platform that .NET 10 supports for this program has that order.</summary>
    private static byte[] Bytes<T>(ReadOnlySpan<T> values)
        where T : unmanaged => MemoryMarshal.AsBytes(values).ToArray();

    private sealed record DataArray(string Type, string Name, int Components, byte[] Bytes, int Tuples);
}
