using System.Globalization;
using InterfaceFE.Geometry;
using InterfaceFE.Results;

namespace InterfaceFE.Reports;

/// <summary>A figure that was written.</summary>
/// <param name="Kind">force-displacement, front, tractions, energy-release, deformed, front-map, overlay or model.</param>
/// <param name="Of">Name of the grip or joint as in the deck; empty for the whole model.</param>
/// <param name="FileName">Name of its files without folder and extension; .png and .svg exist.</param>
/// <param name="Title">Title of the figure.</param>
public sealed record WrittenFigure(string Kind, string Of, string FileName, string Title);

/// <summary>What came of drawing: the figures on disk, and one line for each that could not be drawn.</summary>
/// <param name="Figures">Figures in the order of drawing.</param>
/// <param name="Messages">Lines for the log, without line breaks; empty when all went well.</param>
public sealed record FigureOutcome(IReadOnlyList<WrittenFigure> Figures, IReadOnlyList<string> Messages);

/// <summary>One run of an overlay.</summary>
/// <param name="Name">Name in the legend.</param>
/// <param name="Displacement">Displacement at each point [mm].</param>
/// <param name="Force">Force at each point [N], same length.</param>
public sealed record OverlayCurve(string Name, IReadOnlyList<double> Displacement, IReadOnlyList<double> Force);

/// <summary>
/// Writes figures as PNG and SVG. A figure that cannot be drawn never stops the others and never throws out: it leaves a line in the messages. Not for several
/// threads at once.
/// </summary>
public sealed class FigureWriter
{
    private readonly string _folder;
    private readonly Action<string>? _log;
    private readonly List<WrittenFigure> _written = [];
    private readonly List<string> _messages = [];

    private FigureWriter(string folder, Action<string>? log)
    {
        _folder = folder;
        _log = log;
    }

    private FigureOutcome Outcome => new(_written, _messages);

    /// <summary>
    /// Writes all figures of a run: force-displacement-GRIP for each curve asked for, front-, tractions-, energy-release- and front-map-JOINT for each joint, deformed
    /// (the last fields kept) and deformed-at-peak where other fields were kept nearer to the peak.
    /// </summary>
    /// <param name="history">History of the run.</param>
    /// <param name="summary">Its summary.</param>
    /// <param name="folder">Folder of the figures; made if there is none.</param>
    /// <param name="log">Takes each message as it comes; may be null.</param>
    public static FigureOutcome WriteAll(RunHistory history, RunSummary summary, string folder, Action<string>? log = null)
    {
        ArgumentNullException.ThrowIfNull(history);
        ArgumentNullException.ThrowIfNull(summary);
        FigureWriter writer = new(folder, log);
        string[] grips = FileNames.Safe(history.CurvesOf);
        for (int i = 0; i < grips.Length; i++)
        {
            string grip = history.CurvesOf[i];
            writer.Draw("force-displacement", grip, grips[i], () => LoadFigure.Of(history, summary, grip));
        }
        writer.WriteJoints(history, summary);
        writer.WriteDeformed(history);
        return writer.Outcome;
    }

    /// <summary>Writes one picture of the deformed model.</summary>
    /// <param name="history">History of the run.</param>
    /// <param name="fields">Fields to show.</param>
    /// <param name="field">What is shown in colour.</param>
    /// <param name="folder">Folder of the figure; made if there is none.</param>
    /// <param name="fileName">Name of its files without extension.</param>
    /// <param name="log">Takes each message as it comes; may be null.</param>
    public static FigureOutcome WriteDeformed(RunHistory history, FieldSnapshot fields, PictureField field, string folder, string fileName, Action<string>? log = null)
    {
        FigureWriter writer = new(folder, log);
        writer.DrawAs("deformed", "", fileName, () => ModelFigure.Deformed(history, fields, field, string.Create(CultureInfo.InvariantCulture, $"at point {fields.Point}")));
        return writer.Outcome;
    }

    /// <summary>Writes the model as built, as `model`: adherends in pale tints, layers bonded or not.</summary>
    /// <param name="mesh">The mesh.</param>
    /// <param name="title">Title of the deck.</param>
    /// <param name="folder">Folder of the figure; made if there is none.</param>
    /// <param name="log">Takes each message as it comes; may be null.</param>
    public static FigureOutcome WriteModel(Mesh mesh, string title, string folder, Action<string>? log = null)
    {
        FigureWriter writer = new(folder, log);
        writer.DrawAs("model", "", "model", () => ModelFigure.AsBuilt(mesh, title));
        return writer.Outcome;
    }

    /// <summary>Writes force against displacement of several runs over each other, as `overlay`.</summary>
    /// <param name="curves">The runs.</param>
    /// <param name="title">Grey line under the title.</param>
    /// <param name="folder">Folder of the figure; made if there is none.</param>
    /// <param name="log">Takes each message as it comes; may be null.</param>
    public static FigureOutcome WriteOverlay(IReadOnlyList<OverlayCurve> curves, string title, string folder, Action<string>? log = null)
    {
        ArgumentNullException.ThrowIfNull(curves);
        FigureWriter writer = new(folder, log);
        writer.DrawAs("overlay", "", "overlay", () => Overlay(curves, title));
        return writer.Outcome;
    }

    private static Figure Overlay(IReadOnlyList<OverlayCurve> curves, string title)
    {
        List<Curve> drawn = [];
        for (int i = 0; i < curves.Count; i++)
        {
            OverlayCurve one = curves[i];
            if (one.Displacement.Count != one.Force.Count)
                throw new NoDataException($"{one.Name} has {one.Displacement.Count} displacements and {one.Force.Count} forces");
            drawn.Add(new Curve(one.Name, [.. one.Displacement], [.. one.Force], i));
        }
        if (!drawn.Any(curve => curve.X.Zip(curve.Y).Any(pair => double.IsFinite(pair.First) && double.IsFinite(pair.Second))))
            throw new NoDataException("no variant has a finite reading");
        return new Figure
        {
            Title = "Force against displacement of the variants",
            Subtitles = [title],
            Panels = [new Panel { XTitle = "Displacement (mm)", YTitle = "Force (N)", Curves = drawn }],
        };
    }

    private void WriteJoints(RunHistory history, RunSummary summary)
    {
        string[] names = [.. history.Mesh.Joints.Select(joint => joint.Name)];
        string[] joints = FileNames.Safe(names);
        for (int i = 0; i < joints.Length; i++)
        {
            int joint = i;
            Draw("front", names[i], joints[i], () => FrontFigures.Growth(history, summary, names[joint]));
            Draw("tractions", names[i], joints[i], () => TractionFigure.Of(history, summary, joint));
            Draw("energy-release", names[i], joints[i], () => FrontFigures.EnergyRelease(history, summary, names[joint]));
            Draw("front-map", names[i], joints[i], () => FrontMapFigure.Of(history, summary, joint));
        }
    }

    private void WriteDeformed(RunHistory history)
    {
        if (history.Snapshots.Count == 0)
        {
            Tell("deformed: not drawn, no fields were kept");
            return;
        }
        FieldSnapshot last = history.Snapshots[^1];
        FieldSnapshot? atPeak = new MainGrip(history).PeakPoint() is { } peak ? TractionFigure.Nearest(history, peak) : null;
        bool isPeak = ReferenceEquals(last, atPeak);
        DrawAs("deformed", "", "deformed", () => ModelFigure.Deformed(history, last, PictureField.EquivalentStress, isPeak ? "at peak and end" : "at the end"));
        if (atPeak is not null && !isPeak)
            DrawAs("deformed", "", "deformed-at-peak", () => ModelFigure.Deformed(history, atPeak, PictureField.EquivalentStress, "at the peak"));
    }

    private void Draw(string kind, string of, string safeName, Func<Figure> make) => DrawAs(kind, of, $"{kind}-{safeName}", make);

    /// <summary>
    /// Draws one figure. Whatever fails stays here: a figure is the least of a run's results, and the drawing libraries document no exceptions of their own, so every
    /// kind is caught and told.
    /// </summary>
    private void DrawAs(string kind, string of, string fileName, Func<Figure> make)
    {
        try
        {
            Directory.CreateDirectory(_folder);
            Figure figure = make();
            Plotting.Save(figure, Path.Combine(_folder, fileName));
            _written.Add(new WrittenFigure(kind, of, fileName, figure.Title));
        }
        catch (NoDataException nothing)
        {
            Tell($"{fileName}: not drawn, {nothing.Message}");
        }
        catch (Exception fault)
        {
            Tell($"{fileName}: could not be drawn: {fault.GetType().Name}: {fault.Message}".ReplaceLineEndings(" "));
        }
    }

    private void Tell(string message)
    {
        _messages.Add(message);
        _log?.Invoke(message);
    }
}
