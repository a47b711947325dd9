using System.Globalization;
using System.Text;
using InterfaceFE.Geometry;

namespace InterfaceFE.Results;

/// <summary>
/// The fields of a run: fields/solids-NNNN.vtu and fields/layers-NNNN.vtu, NNNN the point's number, and fields.pvd that lists them. The list is replaced as a whole
/// after each point, so that it is valid at any time. Its time value is the point's number: time itself may stand still or run back where a path snaps back, and
/// readers want it to rise; time and stage are kept inside each file.
/// </summary>
public sealed class FieldSeries
{
    private readonly string _folder;
    private readonly Mesh _mesh;
    private readonly List<int> _points = [];

    /// <summary>Starts a series: makes the folder `fields` and an empty list.</summary>
    /// <param name="folder">Folder of the run; must exist.</param>
    /// <param name="mesh">The mesh.</param>
    public FieldSeries(string folder, Mesh mesh)
    {
        ArgumentNullException.ThrowIfNull(mesh);
        _folder = folder;
        _mesh = mesh;
        Directory.CreateDirectory(Path.Combine(folder, "fields"));
        WriteList();
    }

    /// <summary>Writes the fields of a point and adds them to the list; a point that was written before is replaced.</summary>
    public void Write(FieldSnapshot fields)
    {
        ArgumentNullException.ThrowIfNull(fields);
        VtuWriter.WriteSolids(Path.Combine(_folder, Name("solids", fields.Point)), _mesh, fields);
        if (_mesh.Joints.Count > 0)
            VtuWriter.WriteLayers(Path.Combine(_folder, Name("layers", fields.Point)), _mesh, fields);
        if (!_points.Contains(fields.Point))
            _points.Add(fields.Point);
        _points.Sort();
        WriteList();
    }

    private static string Name(string kind, int point) => string.Create(CultureInfo.InvariantCulture, $"fields/{kind}-{point:0000}.vtu");

    private void WriteList()
    {
        StringBuilder list = new();
        list.Append("<?xml version=\"1.0\" encoding=\"UTF-8\"?>\n<VTKFile type=\"Collection\" version=\"1.0\" byte_order=\"LittleEndian\">\n<Collection>\n");
        foreach (int point in _points)
        {
            list.Append(CultureInfo.InvariantCulture, $"<DataSet timestep=\"{point}\" group=\"\" part=\"0\" name=\"adherends\" file=\"{Name("solids", point)}\"/>\n");
            if (_mesh.Joints.Count > 0)
                list.Append(CultureInfo.InvariantCulture, $"<DataSet timestep=\"{point}\" group=\"\" part=\"1\" name=\"layers\" file=\"{Name("layers", point)}\"/>\n");
        }
        list.Append("</Collection>\n</VTKFile>\n");
        WholeFile.Write(Path.Combine(_folder, "fields.pvd"), list.ToString());
    }
}
