using System.Xml.Linq;
using InterfaceFE.Geometry;
using InterfaceFE.Results;
using Xunit;

namespace InterfaceFE.Tests.Results;

public class VtuWriterTests
{
    [Theory]
    [InlineData(true, 23, 8)]
    [InlineData(false, 9, 4)]
    public void Adherends_read_back_as_written(bool quadratic, byte type, int perCell)
    {
        using TemporaryFolder folder = new();
        RunHistory history = InventedRun.Hat(quadratic);
        Mesh mesh = history.Mesh;
        FieldSnapshot fields = history.Snapshots[2];
        VtuWriter.WriteSolids(folder.File("s.vtu"), mesh, fields);
        VtuReader read = new(folder.File("s.vtu"));

        Assert.Equal(mesh.NodeCount, read.Points);
        Assert.Equal(mesh.Adherends.Sum(a => a.ElementsAlong * a.ElementsThrough), read.Cells);
        Assert.All(read.Types(), one => Assert.Equal(type, one));
        Assert.Equal([.. mesh.Adherends.SelectMany(a => a.Connectivity).Select(node => (long)node)], read.Longs("Cells", "connectivity"));
        Assert.Equal([.. Enumerable.Range(1, read.Cells).Select(i => (long)i * perCell)], read.Longs("Cells", "offsets"));
        Assert.Equal([.. mesh.X.Zip(mesh.Y).SelectMany(p => new[] { p.First, p.Second, 0 })], read.Doubles("Points", "Points"));
        Assert.Equal([.. fields.DisplacementX.Zip(fields.DisplacementY).SelectMany(p => new[] { p.First, p.Second, 0 })], read.Doubles("PointData", "displacement [mm]"));
        Assert.Equal(fields.StressXx, read.Doubles("PointData", "stress xx [MPa]"));
        Assert.Equal(fields.StressYy, read.Doubles("PointData", "stress yy [MPa]"));
        Assert.Equal(fields.StressZz, read.Doubles("PointData", "stress zz [MPa]"));
        Assert.Equal(fields.StressXy, read.Doubles("PointData", "stress xy [MPa]"));
        Assert.Equal(fields.EquivalentStress, read.Doubles("PointData", "equivalent stress [MPa]"));
        Assert.Equal(fields.PlasticStrain, read.Doubles("PointData", "plastic strain"));
        Assert.All(read.Doubles("PointData", "temperature [°C]"), one => Assert.Equal(-40, one));
        int[] adherends = read.Ints("CellData", "adherend");
        Assert.Equal(300, adherends.Count(a => a == 0));
        Assert.Equal(260, adherends.Count(a => a == 1));
        Assert.Contains("adherend hat", read.Root.Descendants("FieldData").Elements().Select(array => (string)array.Attribute("Name")!));
    }

    [Theory]
    [InlineData(true, 21)]
    [InlineData(false, 3)]
    public void Layers_read_back_station_by_station(bool quadratic, byte type)
    {
        using TemporaryFolder folder = new();
        RunHistory history = InventedRun.Hat(quadratic);
        FieldSnapshot fields = history.Snapshots[2];
        VtuWriter.WriteLayers(folder.File("l.vtu"), history.Mesh, fields);
        VtuReader read = new(folder.File("l.vtu"));

        Assert.Equal(60, read.Cells);
        Assert.All(read.Types(), one => Assert.Equal(type, one));
        Assert.Equal([.. fields.Layers.SelectMany(l => l.Opening)], read.Doubles("PointData", "opening [mm]"));
        Assert.Equal([.. fields.Layers.SelectMany(l => l.Sliding)], read.Doubles("PointData", "sliding [mm]"));
        Assert.Equal([.. fields.Layers.SelectMany(l => l.Peel)], read.Doubles("PointData", "peel traction [MPa]"));
        Assert.Equal([.. fields.Layers.SelectMany(l => l.Shear)], read.Doubles("PointData", "shear traction [MPa]"));
        Assert.Equal([.. fields.Layers.SelectMany(l => l.Damage)], read.Doubles("PointData", "damage"));
        Assert.Equal([.. Enumerable.Range(0, 60).Select(e => e / 30)], read.Ints("CellData", "joint"));
        Assert.Equal([.. history.Mesh.Joints.SelectMany(j => j.Bonded).Select(b => b ? 1 : 0)], read.Ints("CellData", "bonded"));

        // The middle point of each edge lies half-way between its ends, and every edge has points of its own.
        long[] connectivity = read.Longs("Cells", "connectivity");
        double[] points = read.Doubles("Points", "Points");
        Assert.Equal(read.Points, connectivity.Distinct().Count());
        Assert.Equal(read.Points, connectivity.Length);
        for (int e = 0; quadratic && e < read.Cells; e++)
            Close.To(0.5 * (points[3 * connectivity[3 * e]] + points[3 * connectivity[3 * e + 1]]), points[3 * connectivity[3 * e + 2]], 1e-12);
    }

    [Fact]
    public void Layers_without_an_element_are_a_valid_file()
    {
        using TemporaryFolder folder = new();
        Mesh mesh = new InventedMesh(true).Strip("arm", 1, 1, (0, 0), (1, 0)).Build();
        VtuWriter.WriteLayers(folder.File("l.vtu"), mesh, Rest(mesh, 0));
        VtuReader read = new(folder.File("l.vtu"));
        Assert.Equal((0, 0), (read.Points, read.Cells));
        Assert.Empty(read.Doubles("PointData", "damage"));
    }

    [Fact]
    public void Arrays_of_more_than_one_block_read_back()
    {
        using TemporaryFolder folder = new();
        Mesh mesh = new InventedMesh(true).Strip("arm", 4, 8, [.. InventedMesh.Run((0, 0), (400, 0), 400)]).Build();
        Assert.True(8 * mesh.NodeCount > 2 * 32768, "the mesh must need more than two blocks");
        FieldSnapshot fields = Rest(mesh, 1);
        Random random = new(1);
        for (int i = 0; i < mesh.NodeCount; i++)
            fields.StressXx[i] = random.NextDouble();
        VtuWriter.WriteSolids(folder.File("s.vtu"), mesh, fields);
        Assert.Equal(fields.StressXx, new VtuReader(folder.File("s.vtu")).Doubles("PointData", "stress xx [MPa]"));
    }

    [Fact]
    public void An_array_that_fills_its_block_has_a_last_size_of_0()
    {
        using TemporaryFolder folder = new();
        string text = VtuFile.Encoded(new byte[32768]);
        byte[] header = Convert.FromBase64String(text[..44]);
        Assert.Equal([1, 32768, 0], new[] { BitConverter.ToInt64(header, 0), BitConverter.ToInt64(header, 8), BitConverter.ToInt64(header, 16) });
    }

    [Fact]
    public void Fields_of_another_mesh_are_refused_and_leave_no_file()
    {
        using TemporaryFolder folder = new();
        RunHistory history = InventedRun.Peel(points: 2);
        Mesh other = new InventedMesh(true).Strip("arm", 1, 1, (0, 0), (1, 0)).Build();
        Assert.Throws<ArgumentException>(() => VtuWriter.WriteSolids(folder.File("s.vtu"), other, history.Snapshots[0]));
        Assert.Empty(Directory.GetFiles(folder.Folder));
    }

    [Fact]
    public void The_list_of_fields_is_valid_after_every_point()
    {
        using TemporaryFolder folder = new();
        RunHistory history = InventedRun.Peel();
        FieldSeries series = new(folder.Folder, history.Mesh);
        Assert.Empty(Listed(folder));
        for (int i = 0; i < history.Snapshots.Count; i++)
        {
            series.Write(history.Snapshots[i]);
            string[] listed = Listed(folder);
            Assert.Equal(2 * (i + 1), listed.Length);
            Assert.All(listed, name => Assert.True(File.Exists(folder.File(name)), name));
        }
        series.Write(history.Snapshots[^1]);
        Assert.Equal(2 * history.Snapshots.Count, Listed(folder).Length);
        Assert.Contains("fields/solids-0008.vtu", Listed(folder));
    }

    private static string[] Listed(TemporaryFolder folder) =>
        [.. XDocument.Load(folder.File("fields.pvd")).Descendants("DataSet").Select(one => (string)one.Attribute("file")!)];

    private static FieldSnapshot Rest(Mesh mesh, int point)
    {
        double[] Zeros() => new double[mesh.NodeCount];
        return new FieldSnapshot
        {
            Point = point,
            Stage = 0,
            Time = 0,
            Temperature = 293.15,
            DisplacementX = Zeros(),
            DisplacementY = Zeros(),
            StressXx = Zeros(),
            StressYy = Zeros(),
            StressZz = Zeros(),
            StressXy = Zeros(),
            EquivalentStress = Zeros(),
            PlasticStrain = Zeros(),
            Layers = [],
        };
    }
}
