using System.Xml.Linq;
using InterfaceFE.Reports;
using InterfaceFE.Results;
using InterfaceFE.Tests.Results;
using SkiaSharp;
using Xunit;

namespace InterfaceFE.Tests.Reports;

public class FigureTests
{
    [Fact]
    public void A_run_gets_all_its_figures_as_png_and_svg()
    {
        using TemporaryFolder folder = new();
        RunHistory history = InventedRun.Peel(points: 21);
        FigureOutcome outcome = FigureWriter.WriteAll(history, InventedRun.PeelSummary(history), folder.Folder);
        Assert.Empty(outcome.Messages);
        Assert.Equal(
            ["force-displacement-upper-block", "front-bond", "tractions-bond", "energy-release-bond", "front-map-bond", "deformed", "deformed-at-peak"],
            outcome.Figures.Select(figure => figure.FileName));
        HashSet<(int, int, int)> contents = [];
        foreach (WrittenFigure figure in outcome.Figures)
        {
            using SKBitmap picture = SKBitmap.Decode(folder.File(figure.FileName + ".png"));
            int inked = Inked(picture, 0, picture.Height);
            Assert.True(inked > picture.Width * picture.Height / 200, $"{figure.FileName} is nearly blank: {inked} dots");
            Assert.True(contents.Add((picture.Width, picture.Height, inked)), $"{figure.FileName} looks like another figure");
            XElement svg = XDocument.Load(folder.File(figure.FileName + ".svg")).Root!;
            Assert.Equal("svg", svg.Name.LocalName);
            Assert.Contains(svg.Descendants(), one => one.Name.LocalName == "text" && one.Value.Trim() == figure.Title);
        }
        Assert.Equal(2 * outcome.Figures.Count, Directory.GetFiles(folder.Folder).Length);
    }

    [Fact]
    public void Names_of_grips_with_strokes_and_umlauts_make_safe_files()
    {
        using TemporaryFolder folder = new();
        RunHistory history = InventedRun.Hat(quadratic: false);
        FigureOutcome outcome = FigureWriter.WriteAll(history, new RunSummary { Status = RunStatus.Finished, Cause = "", Title = history.Title }, folder.Folder);
        Assert.Contains(outcome.Figures, figure => figure.Of == "hinge/Öse" && figure.FileName == "force-displacement-hinge-Ose");
        Assert.True(File.Exists(folder.File("force-displacement-hinge-Ose.png")));
    }

    [Fact]
    public void A_joint_without_any_J_leaves_a_message_and_the_other_figures()
    {
        using TemporaryFolder folder = new();
        RunHistory history = InventedRun.Hat();
        List<string> log = [];
        FigureOutcome outcome = FigureWriter.WriteAll(history, new RunSummary { Status = RunStatus.Finished, Cause = "", Title = history.Title }, folder.Folder, log.Add);
        Assert.Contains("energy-release-left-strip: not drawn, no J has a meaning at left strip", outcome.Messages);
        Assert.Equal(outcome.Messages, log);
        Assert.Contains(outcome.Figures, figure => figure.FileName == "front-left-strip");
        Assert.DoesNotContain(outcome.Figures, figure => figure.Kind == "energy-release");
    }

    [Fact]
    public void A_run_of_one_point_is_drawn()
    {
        using TemporaryFolder folder = new();
        RunHistory history = InventedRun.Peel(points: 1);
        FigureOutcome outcome = FigureWriter.WriteAll(history, InventedRun.PeelSummary(history), folder.Folder);
        Assert.Contains(outcome.Figures, figure => figure.Kind == "force-displacement");
        Assert.Contains(outcome.Figures, figure => figure.Kind == "deformed");
        Assert.Contains(outcome.Figures, figure => figure.Kind == "front-map");
        Assert.DoesNotContain(outcome.Messages, message => message.Contains("could not", StringComparison.Ordinal));
    }

    [Fact]
    public void A_run_without_points_leaves_messages_only()
    {
        using TemporaryFolder folder = new();
        RunHistory history = InventedRun.Peel(points: 0);
        FigureOutcome outcome = FigureWriter.WriteAll(history, new RunSummary { Status = RunStatus.StoppedEarly, Cause = "no start", Title = "" }, folder.Folder);
        Assert.Empty(outcome.Figures);
        Assert.Equal(6, outcome.Messages.Count);
        Assert.All(outcome.Messages, message => Assert.Contains("not drawn, ", message, StringComparison.Ordinal));
    }

    [Fact]
    public void Fields_that_are_not_finite_spoil_their_own_figure_only()
    {
        using TemporaryFolder folder = new();
        RunHistory history = InventedRun.Peel(points: 9);
        foreach (FieldSnapshot fields in history.Snapshots)
            fields.DisplacementX[3] = double.NaN;
        FigureOutcome outcome = FigureWriter.WriteAll(history, InventedRun.PeelSummary(history), folder.Folder);
        Assert.Contains(outcome.Messages, message => message.StartsWith("deformed: not drawn, the fields of point 8 are not finite", StringComparison.Ordinal));
        Assert.Contains(outcome.Figures, figure => figure.Kind == "tractions");
        Assert.False(File.Exists(folder.File("deformed.png")));
    }

    [Fact]
    public void A_folder_that_cannot_be_made_leaves_messages()
    {
        using TemporaryFolder folder = new();
        File.WriteAllText(folder.File("taken"), "");
        RunHistory history = InventedRun.Peel(points: 3);
        FigureOutcome outcome = FigureWriter.WriteAll(history, InventedRun.PeelSummary(history), folder.File("taken"));
        Assert.Empty(outcome.Figures);
        Assert.All(outcome.Messages, message => Assert.Contains("could not be drawn", message, StringComparison.Ordinal));
    }

    [Fact]
    public void A_curve_breaks_at_values_that_are_not_finite()
    {
        using TemporaryFolder folder = new();
        OverlayCurve[] curves = [new("a", [0, 1, double.NaN, 3], [0, 5, 6, double.PositiveInfinity]), new("b", [0, 2], [1, 2])];
        FigureOutcome outcome = FigureWriter.WriteOverlay(curves, "invented", folder.Folder);
        Assert.Empty(outcome.Messages);
        Assert.True(File.Exists(folder.File("overlay.svg")));
    }

    [Fact]
    public void An_overlay_without_a_finite_value_leaves_a_message()
    {
        using TemporaryFolder folder = new();
        FigureOutcome outcome = FigureWriter.WriteOverlay([new("a", [double.NaN], [1])], "invented", folder.Folder);
        Assert.Equal(["overlay: not drawn, no variant has a finite reading"], outcome.Messages);
        Assert.Single(FigureWriter.WriteOverlay([], "none", folder.Folder).Messages);
        Assert.Single(FigureWriter.WriteOverlay([new("a", [1, 2], [1])], "uneven", folder.Folder).Messages);
    }

    [Fact]
    public void Many_long_names_stay_inside_the_figure()
    {
        using TemporaryFolder folder = new();
        string longName = string.Join(' ', Enumerable.Repeat("a very long name", 20));
        FigureOutcome outcome = FigureWriter.WriteOverlay([.. Enumerable.Range(0, 12).Select(i => new OverlayCurve(longName + i, [0, 1], [0, i]))], longName, folder.Folder);
        Assert.Empty(outcome.Messages);
        using SKBitmap picture = SKBitmap.Decode(folder.File("overlay.png"));
        int atEdge = 0;
        for (int y = 0; y < picture.Height; y++)
            for (int x = picture.Width - 8; x < picture.Width; x++)
                atEdge += picture.GetPixel(x, y) != SKColors.White ? 1 : 0;
        Assert.Equal(0, atEdge);
    }

    [Fact]
    public void The_model_as_built_is_drawn_for_both_kinds_of_element()
    {
        using TemporaryFolder folder = new();
        foreach (bool quadratic in new[] { true, false })
        {
            RunHistory history = InventedRun.Hat(quadratic);
            Assert.Empty(FigureWriter.WriteModel(history.Mesh, history.Title, folder.Folder).Messages);
            using SKBitmap picture = SKBitmap.Decode(folder.File("model.png"));
            SKColor tint = new((byte)(Style.Tints[1] >> 16), (byte)(Style.Tints[1] >> 8), (byte)Style.Tints[1]);
            Assert.True(picture.Pixels.Count(dot => dot == tint) > 2000, "the hat is not filled with its tint");
        }
    }

    [Theory]
    [InlineData(PictureField.EquivalentStress)]
    [InlineData(PictureField.StressXx)]
    [InlineData(PictureField.StressYy)]
    [InlineData(PictureField.StressXy)]
    [InlineData(PictureField.PlasticStrain)]
    [InlineData(PictureField.Temperature)]
    public void Each_field_can_be_shown(PictureField field)
    {
        using TemporaryFolder folder = new();
        RunHistory history = InventedRun.Peel(points: 5);
        Assert.Empty(FigureWriter.WriteDeformed(history, history.Snapshots[^1], field, folder.Folder, "f").Messages);
        Assert.True(new FileInfo(folder.File("f.png")).Length > 5000);
    }

    [Fact]
    public void Small_displacements_are_shown_larger_by_a_round_number_and_large_ones_true_to_scale()
    {
        RunHistory history = InventedRun.Peel();
        Assert.Equal(1, ModelFigure.Enlargement(history.Mesh, history.Snapshots[^1]));
        FieldSnapshot small = InventedRun.Peel(points: 41).Snapshots[^1];
        for (int i = 0; i < small.DisplacementY.Length; i++)
            (small.DisplacementX[i], small.DisplacementY[i]) = (0, i == 5 ? 0.3 : 0);
        Close.To(20, ModelFigure.Enlargement(history.Mesh, small));
        small.DisplacementY[5] = 0;
        Assert.Equal(1, ModelFigure.Enlargement(history.Mesh, small));
    }

    [Fact]
    public void Text_is_set_in_the_embedded_faces_whatever_is_asked_for()
    {
        foreach (string family in new[] { "DejaVu Sans", "Arial", "no such family" })
        {
            Assert.True(Plotting.IsEmbedded(family, bold: false), family);
            Assert.True(Plotting.IsEmbedded(family, bold: true), family);
        }
    }

    [Fact]
    public void The_title_is_drawn_in_dark_ink()
    {
        Panel panel = new() { XTitle = "x", YTitle = "y", Curves = [new Curve("", [0, 1], [0, 1], 0)] };
        using SKBitmap with = SKBitmap.Decode(Plotting.Png(new Figure { Title = "Force–displacement, µ, °C, σ, kJ/m²", Panels = [panel] }));
        using SKBitmap without = SKBitmap.Decode(Plotting.Png(new Figure { Title = " ", Panels = [panel] }));
        Assert.Equal(0, Inked(without, 0, 60));
        Assert.True(Inked(with, 0, 60) > 1500, "no text was drawn");
    }

    private static int Inked(SKBitmap picture, int top, int bottom)
    {
        int count = 0;
        SKColor[] dots = picture.Pixels;
        for (int i = top * picture.Width; i < bottom * picture.Width; i++)
            count += dots[i] != SKColors.White ? 1 : 0;
        return count;
    }
}
