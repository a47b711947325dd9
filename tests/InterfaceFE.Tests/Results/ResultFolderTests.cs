using InterfaceFE.Results;
using Xunit;

namespace InterfaceFE.Tests.Results;

public class ResultFolderTests
{
    [Fact]
    public void Tables_have_the_agreed_columns()
    {
        using TemporaryFolder folder = new();
        RunHistory history = InventedRun.Peel(points: 3);
        using (new ResultFolder(folder.Folder, history))
        {
        }
        Assert.Equal(
            "point,stage,progress,time [s],temperature [°C],upper block displacement [mm],upper block force [N],upper block rotation [rad],upper block moment [N mm],"
            + "lower block force x [N],lower block force y [N],clip gauge [mm],far strain [-],load factor,stable",
            FirstLine(folder, "grips.csv"));
        Assert.Equal(
            "joint,front,point,crack tip [mm],process zone start [mm],process zone [mm],opening at starter tip [mm],sliding at starter tip [mm],"
            + "J path [N/mm],J rotation [N/mm],J under law [N/mm],mode mix [deg],largest peel [MPa],largest shear [MPa]",
            FirstLine(folder, "front.csv"));
        Assert.Equal(
            "point,stage,put in [mJ],stored in adherends [mJ],stored in layers [mJ],spent in layers [mJ],spent in yielding [mJ],spent in friction [mJ],"
            + "thermal [mJ],released in jumps [mJ],balance,path error",
            FirstLine(folder, "energy.csv"));
        Assert.Equal(
            "stage,point,retries,iteration,control,stride,progress,load factor,root,out of balance [N],relative,correction [mm],unstable directions,changed elements,reason,guess",
            FirstLine(folder, "convergence.csv"));
    }

    [Fact]
    public void A_row_of_grips_reads_as_agreed()
    {
        RunHistory history = InventedRun.Peel();
        StringWriter text = new();
        using (GripTable table = new(text, history.Grips, history.Gauges))
        {
            table.Write(new PointRow
            {
                Point = 7,
                Stage = 2,
                Progress = 0.25,
                Time = 90,
                Temperature = 233.15,
                LoadFactor = 0.25,
                Stable = false,
                Grips = [new GripReading(1.5, -20, null, null, 3, 4), new GripReading(9, 9, 0.1, 5, -3, 20)],
                Gauges = [0.5, 1e-7],
            });
        }
        Assert.Equal("7,2,0.25,90,-40,1.5,-20,,,-3,20,0.5,1E-07,0.25,no", text.ToString().Split("\r\n")[1]);
    }

    [Fact]
    public void A_value_without_meaning_is_an_empty_field_of_the_front()
    {
        StringWriter text = new();
        using (FrontTable table = new(text))
        {
            table.Write(new FrontRow
            {
                Joint = "left, \"cold\"",
                Front = 2,
                Point = 3,
                CrackTip = 30,
                ProcessZoneStart = null,
                ProcessZone = null,
                Opening = 0,
                Sliding = null,
                JPath = null,
                JRotation = null,
                JUnderLaw = 0.5,
                ModeMixDegrees = null,
                LargestPeel = null,
                LargestShear = 0.1,
            });
        }
        Assert.Equal("\"left, \"\"cold\"\"\",2,3,30,,,0,,,,0.5,,,0.1", text.ToString().Split("\r\n")[1]);
    }

    [Fact]
    public void A_point_of_other_grips_is_refused()
    {
        RunHistory history = InventedRun.Peel();
        using GripTable table = new(new StringWriter(), history.Grips, []);
        Assert.Throws<ArgumentException>(() => table.Write(history.Points[0]));
    }

    [Fact]
    public void Names_that_need_quotes_are_quoted_in_the_header()
    {
        StringWriter text = new();
        using (GripTable table = new(text, [new GripInfo("a, b", true, 1, 0, false, 0, 0)], []))
            Assert.Contains("\"a, b displacement [mm]\",\"a, b force [N]\"", text.ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void Every_row_of_a_history_is_written()
    {
        using TemporaryFolder folder = new();
        RunHistory history = InventedRun.Peel();
        using (new ResultFolder(folder.Folder, history))
        {
        }
        Assert.Equal(history.Points.Count + 1, File.ReadAllLines(folder.File("grips.csv")).Length);
        Assert.Equal(history.Fronts.Count + 1, File.ReadAllLines(folder.File("front.csv")).Length);
        Assert.Equal(history.Energies.Count + 1, File.ReadAllLines(folder.File("energy.csv")).Length);
        Assert.Equal(history.Iterations.Count + 1, File.ReadAllLines(folder.File("convergence.csv")).Length);
        Assert.Equal(2 * history.Snapshots.Count, Directory.GetFiles(folder.File("fields")).Length);
    }

    private static string FirstLine(TemporaryFolder folder, string name) => File.ReadAllLines(folder.File(name))[0];
}
