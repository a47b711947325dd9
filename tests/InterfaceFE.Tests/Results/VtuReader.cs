using System.Buffers.Binary;
using System.Globalization;
using System.IO.Compression;
using System.Runtime.InteropServices;
using System.Xml.Linq;

namespace InterfaceFE.Tests.Results;

/// <summary>Reads back VTU files with inline base64 and zlib, by the format's rules and not by the writer's code.</summary>
internal sealed class VtuReader
{
    private readonly XElement _piece;

    public VtuReader(string path)
    {
        XElement root = XDocument.Load(path).Root!;
        if ((string?)root.Attribute("version") != "1.0" || (string?)root.Attribute("header_type") != "UInt64"
            || (string?)root.Attribute("compressor") != "vtkZLibDataCompressor" || (string?)root.Attribute("byte_order") != "LittleEndian")
            throw new InvalidDataException("other attributes than agreed");
        Root = root;
        _piece = root.Element("UnstructuredGrid")!.Element("Piece")!;
    }

    public XElement Root { get; }

    public int Points => Count("NumberOfPoints");

    public int Cells => Count("NumberOfCells");

    public double[] Doubles(string section, string name) => MemoryMarshal.Cast<byte, double>(Bytes(section, name, "Float64")).ToArray();

    public long[] Longs(string section, string name) => MemoryMarshal.Cast<byte, long>(Bytes(section, name, "Int64")).ToArray();

    public int[] Ints(string section, string name) => MemoryMarshal.Cast<byte, int>(Bytes(section, name, "Int32")).ToArray();

    public byte[] Types() => Bytes("Cells", "types", "UInt8");

    public string[] Names(string section) => [.. _piece.Element(section)!.Elements("DataArray").Select(array => (string)array.Attribute("Name")!)];

    private int Count(string attribute) => int.Parse((string)_piece.Attribute(attribute)!, CultureInfo.InvariantCulture);

    private byte[] Bytes(string section, string name, string type)
    {
        XElement array = _piece.Element(section)!.Elements("DataArray").Single(one => (string?)one.Attribute("Name") == name);
        if ((string?)array.Attribute("type") != type || (string?)array.Attribute("format") != "binary")
            throw new InvalidDataException($"{name} is of another type or format");
        return Decoded(array.Value.Trim());
    }

    private static byte[] Decoded(string text)
    {
        ulong blocks = BinaryPrimitives.ReadUInt64LittleEndian(Convert.FromBase64String(text[..32]));
        int headerBytes = 8 * (3 + (int)blocks), headerText = (headerBytes + 2) / 3 * 4;
        byte[] header = Convert.FromBase64String(text[..headerText]);
        byte[] packed = headerText == text.Length ? [] : Convert.FromBase64String(text[headerText..]);
        ulong blockSize = BinaryPrimitives.ReadUInt64LittleEndian(header.AsSpan(8));
        ulong last = BinaryPrimitives.ReadUInt64LittleEndian(header.AsSpan(16));
        using MemoryStream whole = new();
        int at = 0;
        for (ulong i = 0; i < blocks; i++)
        {
            int size = (int)BinaryPrimitives.ReadUInt64LittleEndian(header.AsSpan(24 + 8 * (int)i));
            using ZLibStream zlib = new(new MemoryStream(packed, at, size), CompressionMode.Decompress);
            long before = whole.Length;
            zlib.CopyTo(whole);
            ulong expected = i + 1 == blocks && last != 0 ? last : blockSize;
            if ((ulong)(whole.Length - before) != expected)
                throw new InvalidDataException("a block has another size than its header says");
            at += size;
        }
        if (at != packed.Length)
            throw new InvalidDataException("bytes are left over");
        return whole.ToArray();
    }
}
