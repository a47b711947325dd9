using System.Globalization;
using System.Reflection;
using System.Runtime.InteropServices;
using System.Text;
using InterfaceFE.Results;
using ScottPlot;
using ScottPlot.Plottables;
using ScottPlot.TickGenerators;
using SkiaSharp;

namespace InterfaceFE.Reports;

/// <summary>
/// Draws figures with ScottPlot (axes, curves) and SkiaSharp (header, legend, pictures of the model, colour bar). The only file that knows either library. Text is set
/// in the DejaVu faces that the library carries, so a machine without fonts draws the same figure.
/// </summary>
internal static class Plotting
{
    private const string Family = "DejaVu Sans";
    private const float Width = 880;
    private const float Margin = 18;
    private const float AxisLeft = 78;
    private const float AxisRight = 26;
    private const float AxisBottom = 54;
    private const float AxisTop = 10;
    private const float LineHeight = 17;
    private const float PixelsPerUnit = 2;
    private const int TrianglesAtOnce = 20000;

    private static readonly SKTypeface Regular = Load("font.DejaVuSans");
    private static readonly SKTypeface Bold = Load("font.DejaVuSans-Bold");

    static Plotting()
    {
        Fonts.FontResolvers.Clear();
        Fonts.FontResolvers.Add(new EmbeddedFaces());
        Fonts.Reset();
        Fonts.Default = Fonts.Sans = Fonts.Serif = Fonts.Monospace = Family;
    }

    /// <summary>Width of the data area of a panel in the figure's pixels.</summary>
    public static double DataWidth => Width - 2 * Margin - AxisLeft - AxisRight;

    /// <summary>Height of a panel around its data area in the figure's pixels.</summary>
    public static double AxesHeight => AxisBottom + AxisTop;

    /// <summary>Whether text of a family and weight is set in the embedded face of that weight.</summary>
    internal static bool IsEmbedded(string family, bool bold) => ReferenceEquals(Fonts.GetTypeface(family, bold, italic: false), bold ? Bold : Regular);

    /// <summary>Writes a figure as PNG and SVG.</summary>
    /// <param name="figure">The figure.</param>
    /// <param name="path">Path without extension; its folder must exist.</param>
    public static void Save(Figure figure, string path)
    {
        WholeFile.Write(path + ".png", stream => stream.Write(Png(figure)));
        WholeFile.Write(path + ".svg", Svg(figure));
    }

    /// <summary>The figure as PNG, at two dots per pixel of its own.</summary>
    public static byte[] Png(Figure figure)
    {
        float height = HeightOf(figure);
        SKImageInfo size = new((int)(Width * PixelsPerUnit), (int)(height * PixelsPerUnit));
        using SKSurface surface = SKSurface.Create(size);
        surface.Canvas.Scale(PixelsPerUnit);
        Draw(surface.Canvas, figure, height);
        using SKImage image = surface.Snapshot();
        using SKData data = image.Encode(SKEncodedImageFormat.Png, 100);
        return data.ToArray();
    }

    /// <summary>The figure as SVG.</summary>
    public static string Svg(Figure figure)
    {
        float height = HeightOf(figure);
        using MemoryStream stream = new();
        using (SKCanvas canvas = SKSvgCanvas.Create(new SKRect(0, 0, Width, height), stream))
            Draw(canvas, figure, height);
        return Encoding.UTF8.GetString(stream.ToArray());
    }

    private static float HeightOf(Figure figure)
    {
        float height = Header(null, figure) + Legend(null, figure, 0);
        foreach (Panel panel in figure.Panels)
            height += CaptionHeight(panel) + (float)panel.Height;
        return MathF.Ceiling(height + Keys(null, figure, 0) + (figure.Bar is null ? 0 : 58) + 8);
    }

    private static void Draw(SKCanvas canvas, Figure figure, float height)
    {
        using (SKPaint white = Paint(0xFFFFFF))
            canvas.DrawRect(0, 0, Width, height, white);
        float y = Header(canvas, figure);
        y += Legend(canvas, figure, y);
        foreach (Panel panel in figure.Panels)
        {
            if (panel.Caption is { } caption)
                Write(canvas, caption, Margin + AxisLeft, y + 13, 12, Style.Grey, bold: true);
            y += CaptionHeight(panel);
            DrawPanel(canvas, panel, new PixelRect(Margin, Width - Margin, y + (float)panel.Height, y));
            y += (float)panel.Height;
        }
        y += Keys(canvas, figure, y);
        if (figure.Bar is { } bar)
            DrawBar(canvas, bar, y);
    }

    private static float CaptionHeight(Panel panel) => panel.Caption is null ? 0 : 20;

    // ---- header, legend, keys, colour bar ----------------------------------------------------------------------------------------------------------------------

    /// <summary>Draws the header (nothing without a canvas) and returns its height.</summary>
    private static float Header(SKCanvas? canvas, Figure figure)
    {
        float y = Margin + 12;
        foreach (string line in Broken(figure.Title, 16, bold: true))
        {
            Write(canvas, line, Margin, y, 16, Style.Ink, bold: true);
            y += 21;
        }
        foreach (string subtitle in figure.Subtitles)
        {
            foreach (string line in Broken(subtitle, 12, bold: false))
            {
                Write(canvas, line, Margin, y - 2, 12, Style.Grey, bold: false);
                y += LineHeight;
            }
        }
        return y - 6;
    }

    private static float Legend(SKCanvas? canvas, Figure figure, float top)
    {
        List<(string Name, Action<SKCanvas, float, float> Sample)> entries = [];
        HashSet<string> seen = [];
        foreach (Panel panel in figure.Panels)
        {
            foreach (Curve curve in panel.Curves)
                if (curve.Name.Length > 0 && seen.Add(curve.Name))
                    entries.Add((curve.Name, (to, x, y) => CurveSample(to, curve, x, y)));
            foreach (Band band in panel.Bands)
                if (band.Name.Length > 0 && seen.Add(band.Name))
                    entries.Add((band.Name, (to, x, y) => AreaSample(to, Style.Colour(band.Style), 45, x, y)));
        }
        return Entries(canvas, entries, top);
    }

    private static float Keys(SKCanvas? canvas, Figure figure, float top) =>
        Entries(canvas, [.. figure.Keys.Select(key => (key.Text, (Action<SKCanvas, float, float>)((to, x, y) => KeySample(to, key, x, y))))], top);

    private static float Entries(SKCanvas? canvas, List<(string Name, Action<SKCanvas, float, float> Sample)> entries, float top)
    {
        if (entries.Count == 0)
            return 0;
        using SKFont font = new(Regular, 12);
        float x = Margin, y = top + 12;
        foreach ((string full, Action<SKCanvas, float, float> sample) in entries)
        {
            string name = Fitted(full, font, Width - 2 * Margin - 62);
            float wide = 40 + font.MeasureText(name) + 22;
            if (x > Margin && x + wide > Width - Margin)
            {
                x = Margin;
                y += 19;
            }
            if (canvas is not null)
            {
                sample(canvas, x, y);
                Write(canvas, name, x + 40, y + 4, 12, Style.Ink, bold: false);
            }
            x += wide;
        }
        return y + 12 - top;
    }

    private static void CurveSample(SKCanvas canvas, Curve curve, float x, float y)
    {
        using SKPaint line = Paint(Style.Colour(curve.Style), stroke: 2);
        float[] dash = DashOf(curve);
        if (dash.Length > 0)
            line.PathEffect = SKPathEffect.CreateDash(dash, 0);
        canvas.DrawLine(x, y, x + 34, y, line);
        if (curve.Marking == Marking.None)
            return;
        Marker(canvas, curve, x + 17, y);
    }

    private static void AreaSample(SKCanvas canvas, uint colour, byte alpha, float x, float y)
    {
        using SKPaint fill = Paint(colour, alpha: alpha);
        canvas.DrawRect(x + 4, y - 6, 26, 12, fill);
    }

    private static void KeySample(SKCanvas canvas, Key key, float x, float y)
    {
        SKRect box = new(x + 4, y - 6, x + 30, y + 6);
        switch (key.Kind)
        {
            case KeyKind.Area:
                AreaSample(canvas, key.Colour, 255, x, y);
                using (SKPaint edge = Paint(Style.Grey, stroke: 0.7f))
                    canvas.DrawRect(box, edge);
                break;
            case KeyKind.Hatched:
                using (SKPath path = new())
                {
                    path.AddRect(box);
                    Hatch(canvas, path);
                }
                using (SKPaint edge = Paint(Style.Grey, stroke: 0.7f))
                    canvas.DrawRect(box, edge);
                break;
            default:
                LayerState state = key.Kind == KeyKind.Intact ? LayerState.Intact : key.Kind == KeyKind.Softening ? LayerState.Softening : LayerState.Separated;
                using (SKPath path = new())
                {
                    path.MoveTo(box.Left, y);
                    path.LineTo(box.Right, y);
                    StrokeLayer(canvas, path, state);
                }
                break;
        }
    }

    private static void DrawBar(SKCanvas canvas, ColourBar bar, float top)
    {
        const float Left = Margin + AxisLeft, High = 13;
        float wide = (float)DataWidth;
        using SKBitmap strip = new(256, 1);
        for (int i = 0; i < 256; i++)
            strip.SetPixel(i, 0, Colour(bar.Map.At(i / 255.0)));
        using SKImage image = SKImage.FromBitmap(strip);
        canvas.DrawImage(image, new SKRect(Left, top + 4, Left + wide, top + 4 + High), new SKSamplingOptions(SKFilterMode.Linear));
        using SKPaint edge = Paint(Style.Grey, stroke: 0.7f);
        canvas.DrawRect(Left, top + 4, wide, High, edge);
        foreach (double tick in NiceNumbers.Ticks(bar.Least, bar.Largest, 6))
        {
            float x = Left + wide * (float)((tick - bar.Least) / (bar.Largest - bar.Least));
            canvas.DrawLine(x, top + 4 + High, x, top + 8 + High, edge);
            Write(canvas, Number(tick), x, top + 20 + High, 11, Style.Ink, bold: false, SKTextAlign.Center);
        }
        Write(canvas, bar.Words, Left + wide / 2, top + 37 + High, 12, Style.Ink, bold: false, SKTextAlign.Center);
    }

    // ---- axes and curves -----------------------------------------------------------------------------------------------------------------------------------------

    private static void DrawPanel(SKCanvas canvas, Panel panel, PixelRect place)
    {
        using Plot plot = new();
        plot.Axes.Title.IsVisible = false;
        Frame(plot, panel);
        if (panel.Picture is { } picture)
            plot.Add.Plottable(new Layer(pack => DrawPicture(pack.Canvas, picture, pack)));
        if (panel.Map is { } map)
            plot.Add.Plottable(new Layer(pack => DrawMap(pack.Canvas, map, pack)));
        foreach (Band band in panel.Bands)
            Add(plot, band);
        foreach (Curve curve in panel.Curves)
            Add(plot, curve);
        if (panel.Notes.Count > 0 || panel.StageLines.Count > 0)
            plot.Add.Plottable(new Layer(pack => Annotate(pack.Canvas, panel, pack)));
        SetLimits(plot, panel);
        plot.Axes.Left.TickLabelStyle.OffsetY = 3;
        plot.Layout.Fixed(new PixelPadding(AxisLeft, AxisRight, AxisBottom, AxisTop));
        // A plot clears the whole canvas first, and with it the header and the panels above.
        plot.RenderManager.ClearCanvasBeforeEachRender = false;
        plot.Render(canvas, place);
    }

    private static void Frame(Plot plot, Panel panel)
    {
        plot.FigureBackground.Color = Colors.Transparent;
        plot.DataBackground.Color = Colors.White;
        plot.Axes.Top.IsVisible = plot.Axes.Right.IsVisible = false;
        plot.Grid.MajorLineColor = ScottColour(Style.PaleLine);
        plot.Grid.MajorLineWidth = 1;
        plot.Grid.IsVisible = panel.Grid;
        using SKFont font = new(Regular, 13);
        foreach ((IAxis axis, string title, bool whole) in new[] { ((IAxis)plot.Axes.Bottom, panel.XTitle, false), (plot.Axes.Left, panel.YTitle, panel.WholeNumbersY) })
        {
            axis.Label.Text = Fitted(title, font, axis is IYAxis ? (float)panel.Height - 8 : Width - 2 * Margin - AxisLeft);
            axis.Label.FontSize = 13;
            axis.Label.Bold = false;
            axis.Label.ForeColor = ScottColour(Style.Ink);
            axis.Label.FontName = Family;
            axis.TickLabelStyle.FontSize = 12;
            axis.TickLabelStyle.FontName = Family;
            axis.TickLabelStyle.ForeColor = ScottColour(Style.Ink);
            axis.FrameLineStyle.Color = axis.MajorTickStyle.Color = axis.MinorTickStyle.Color = ScottColour(Style.Grey);
            axis.FrameLineStyle.Width = 1;
            axis.MinorTickStyle.Length = 0;
            axis.TickGenerator = new NumericAutomatic { LabelFormatter = Number, IntegerTicksOnly = whole, TickDensity = 0.7 };
        }
    }

    private static void SetLimits(Plot plot, Panel panel)
    {
        if (panel.Limits is { } set)
        {
            plot.Axes.SetLimits(set.Left, set.Right, set.Bottom, set.Top);
            return;
        }
        double left = double.PositiveInfinity, right = double.NegativeInfinity, bottom = left, top = right;
        foreach (Curve curve in panel.Curves)
        {
            for (int i = 0; i < curve.X.Length; i++)
            {
                if (!double.IsFinite(curve.X[i]) || !double.IsFinite(curve.Y[i]))
                    continue;
                (left, right) = (Math.Min(left, curve.X[i]), Math.Max(right, curve.X[i]));
                (bottom, top) = (Math.Min(bottom, curve.Y[i]), Math.Max(top, curve.Y[i]));
            }
        }
        (left, right) = Widened(left, right, 0.03, 0.03);
        (bottom, top) = Widened(bottom, top, 0.05, panel.Notes.Count > 0 ? 0.16 : 0.07);
        plot.Axes.SetLimits(left, right, bottom, top);
    }

    private static (double Low, double High) Widened(double low, double high, double below, double above)
    {
        double range = high - low;
        if (!(range > 1e-12 * Math.Max(Math.Abs(low), Math.Abs(high))))
            range = low == 0 ? 1 : Math.Abs(low);
        return (low - below * range, high + above * range);
    }

    private static void Add(Plot plot, Band band)
    {
        List<Coordinates> around = [];
        for (int i = 0; i < band.X.Length; i++)
            around.Add(new Coordinates(band.X[i], band.Low[i]));
        for (int i = band.X.Length - 1; i >= 0; i--)
            around.Add(new Coordinates(band.X[i], band.High[i]));
        Polygon area = plot.Add.Polygon([.. around]);
        area.FillColor = ScottColour(Style.Colour(band.Style)).WithAlpha(45);
        area.LineWidth = 0;
        area.MarkerSize = 0;
    }

    private static void Add(Plot plot, Curve curve)
    {
        Color colour = ScottColour(Style.Colour(curve.Style));
        float[] dash = DashOf(curve);
        List<Coordinates> all = [];
        foreach (Coordinates[] piece in Pieces(curve))
        {
            all.AddRange(piece);
            Scatter line = plot.Add.Scatter(piece, colour);
            line.LineWidth = 2;
            line.MarkerSize = 0;
            if (dash.Length > 0)
                line.LinePattern = new LinePattern(dash, 0, "own");
        }
        if (curve.Marking == Marking.None || all.Count == 0)
            return;
        Coordinates[] marked = curve.Marking == Marking.Hollow ? Thinned(all, 60, 0) : Thinned(all, 12, curve.Style % 4 * 0.25);
        plot.Add.Plottable(new Layer(pack =>
        {
            foreach (Coordinates place in marked)
            {
                SKPoint at = At(place.X, place.Y, pack);
                Marker(pack.Canvas, curve, at.X, at.Y);
            }
        }));
    }

    /// <summary>Circle, square, triangle, diamond or cross, filled or hollow.</summary>
    private static void Marker(SKCanvas canvas, Curve curve, float x, float y)
    {
        const float R = 4.2f;
        using SKPaint fill = Paint(curve.Marking == Marking.Hollow ? 0xFFFFFF : Style.Colour(curve.Style));
        using SKPaint edge = Paint(Style.Colour(curve.Style), stroke: 1.6f);
        if (Style.Form(curve.Style) == 0)
        {
            // As a circle and not as a path: a path of arcs takes a hundred times the room in SVG.
            canvas.DrawCircle(x, y, R, fill);
            canvas.DrawCircle(x, y, R, edge);
            return;
        }
        using SKPath shape = new();
        switch (Style.Form(curve.Style))
        {
            case 1: shape.AddRect(new SKRect(x - R + 0.4f, y - R + 0.4f, x + R - 0.4f, y + R - 0.4f)); break;
            case 2: shape.AddPoly([new SKPoint(x, y - R - 0.6f), new SKPoint(x + R + 0.4f, y + R - 0.8f), new SKPoint(x - R - 0.4f, y + R - 0.8f)]); break;
            case 3: shape.AddPoly([new SKPoint(x, y - R - 1), new SKPoint(x + R + 1, y), new SKPoint(x, y + R + 1), new SKPoint(x - R - 1, y)]); break;
            default:
                Segment(shape, x - R, y - R, x + R, y + R);
                Segment(shape, x - R, y + R, x + R, y - R);
                break;
        }
        canvas.DrawPath(shape, fill);
        canvas.DrawPath(shape, edge);
    }

    private static float[] DashOf(Curve curve) => curve.Dotted ? [2, 2.5f] : Style.Dashes[Style.Form(curve.Style)];

    private static IEnumerable<Coordinates[]> Pieces(Curve curve)
    {
        List<Coordinates> piece = [];
        for (int i = 0; i < curve.X.Length; i++)
        {
            if (double.IsFinite(curve.X[i]) && double.IsFinite(curve.Y[i]))
            {
                piece.Add(new Coordinates(curve.X[i], curve.Y[i]));
            }
            else if (piece.Count > 0)
            {
                yield return [.. piece];
                piece.Clear();
            }
        }
        if (piece.Count > 0)
            yield return [.. piece];
    }

    /// <summary>So many points spread along a curve, moved on by a share of their distance so that the markers of close curves do not hide each other.</summary>
    private static Coordinates[] Thinned(List<Coordinates> all, int limit, double shift)
    {
        if (all.Count <= limit)
            return [.. all];
        Coordinates[] some = new Coordinates[limit];
        for (int i = 0; i < limit; i++)
            some[i] = all[Math.Min(all.Count - 1, (int)((i + shift) * (all.Count - 1) / (limit - 1)))];
        return some;
    }

    private static void Annotate(SKCanvas canvas, Panel panel, RenderPack pack)
    {
        SKRect data = pack.DataRect.ToSKRect();
        foreach (StageLine stage in panel.StageLines)
        {
            float y = pack.Plot.Axes.Left.GetPixel(stage.Y, pack.DataRect);
            using SKPaint line = Paint(Style.Ink, stroke: 1);
            line.PathEffect = SKPathEffect.CreateDash([5, 4], 0);
            canvas.DrawLine(data.Left, y, data.Right, y, line);
            Boxed(canvas, stage.Text, data.Right - 8, Math.Min(y + 15, data.Bottom - 5), SKTextAlign.Right, data);
        }
        foreach (Note note in panel.Notes)
        {
            float x = pack.Plot.Axes.Bottom.GetPixel(note.X, pack.DataRect), y = pack.Plot.Axes.Left.GetPixel(note.Y, pack.DataRect);
            using SKPaint ring = Paint(Style.Ink, stroke: 1.6f);
            canvas.DrawCircle(x, y, 7, ring);
            Boxed(canvas, note.Text, x < data.MidX ? x + 12 : x - 12, y - 12, x < data.MidX ? SKTextAlign.Left : SKTextAlign.Right, data);
        }
    }

    // ---- pictures ------------------------------------------------------------------------------------------------------------------------------------------------

    private static void DrawPicture(SKCanvas canvas, Picture picture, RenderPack pack)
    {
        SKRect data = pack.DataRect.ToSKRect();
        canvas.Save();
        canvas.ClipRect(data);
        Fill(canvas, picture, pack, data);
        if (picture.Hatched.Count > 0)
        {
            using SKPath areas = new();
            foreach (Polyline area in picture.Hatched)
                Trace(areas, area, pack, close: true);
            Hatch(canvas, areas);
        }
        using SKPaint edge = Paint(Style.Ink, stroke: 1);
        using (SKPath outline = new())
        {
            foreach (Polyline line in picture.Outlines)
                Trace(outline, line, pack, close: false);
            canvas.DrawPath(outline, edge);
        }
        foreach (LayerStretch stretch in picture.Layers)
            DrawLayer(canvas, stretch, pack);
        canvas.Restore();
    }

    /// <summary>
    /// Triangles go through an image at several dots per pixel: one call draws thousands with colours that run evenly inside each, and no seam shows between
    /// neighbours, which separate vector areas would have.
    /// </summary>
    private static void Fill(SKCanvas canvas, Picture picture, RenderPack pack, SKRect data)
    {
        const float Dots = PixelsPerUnit;
        SKImageInfo size = new((int)Math.Ceiling(data.Width * Dots), (int)Math.Ceiling(data.Height * Dots), SKColorType.Rgba8888, SKAlphaType.Premul);
        using SKSurface surface = SKSurface.Create(size);
        surface.Canvas.Clear(SKColors.Transparent);
        surface.Canvas.Scale(Dots);
        surface.Canvas.Translate(-data.Left, -data.Top);
        using SKPaint paint = new() { IsAntialias = false };
        int triangles = picture.TriangleX.Length / 3;
        for (int first = 0; first < triangles; first += TrianglesAtOnce)
        {
            int count = 3 * Math.Min(TrianglesAtOnce, triangles - first);
            SKPoint[] corners = new SKPoint[count];
            SKColor[] colours = new SKColor[count];
            for (int i = 0; i < count; i++)
            {
                int k = 3 * first + i;
                corners[i] = At(picture.TriangleX[k], picture.TriangleY[k], pack);
                colours[i] = Colour(picture.TriangleColour is { } own ? own[k / 3] : picture.Map.At(picture.TrianglePlace[k]));
            }
            using SKVertices vertices = SKVertices.CreateCopy(SKVertexMode.Triangles, corners, colours);
            surface.Canvas.DrawVertices(vertices, SKBlendMode.Dst, paint);
        }
        using SKImage image = surface.Snapshot();
        canvas.DrawImage(image, data, new SKSamplingOptions(SKFilterMode.Linear, SKMipmapMode.Linear));
    }

    private static void Hatch(SKCanvas canvas, SKPath areas)
    {
        canvas.Save();
        canvas.ClipPath(areas, SKClipOperation.Intersect, antialias: true);
        SKRect bounds = areas.Bounds;
        using SKPaint line = Paint(0xFFFFFF, stroke: 0.9f);
        using SKPaint shadow = Paint(Style.Ink, stroke: 1.1f);
        float from = MathF.Floor((bounds.Left - bounds.Height) / 5) * 5;
        for (float x = from; x < bounds.Right; x += 5)
        {
            canvas.DrawLine(x, bounds.Bottom, x + bounds.Height, bounds.Top, shadow);
            canvas.DrawLine(x + 1.2f, bounds.Bottom, x + 1.2f + bounds.Height, bounds.Top, line);
        }
        canvas.Restore();
    }

    /// <summary>
    /// Fills the gap between the faces in the colour of the layer's state. Where the faces are closer than a few dots, a line of even width on the middle stands for
    /// the layer instead, so that it is seen in a slender model.
    /// </summary>
    private static void DrawLayer(SKCanvas canvas, LayerStretch stretch, RenderPack pack)
    {
        const float Narrow = 4;
        int n = stretch.Lower.X.Length;
        using SKPath area = new(), middle = new(), faces = new();
        SKPoint[] lower = new SKPoint[n], upper = new SKPoint[n];
        for (int i = 0; i < n; i++)
        {
            lower[i] = At(stretch.Lower.X[i], stretch.Lower.Y[i], pack);
            upper[i] = At(stretch.Upper.X[i], stretch.Upper.Y[i], pack);
        }
        int from = -1;
        for (int i = 1; i < n; i++)
        {
            bool wide = Gap(lower, upper, i - 1) >= Narrow && Gap(lower, upper, i) >= Narrow;
            if (wide)
            {
                from = from < 0 ? i - 1 : from;
                Segment(faces, lower[i - 1].X, lower[i - 1].Y, lower[i].X, lower[i].Y);
                Segment(faces, upper[i - 1].X, upper[i - 1].Y, upper[i].X, upper[i].Y);
            }
            else
            {
                Continue(middle, Between(lower[i - 1], upper[i - 1]), Between(lower[i], upper[i]));
            }
            if (from >= 0 && (!wide || i == n - 1))
            {
                int end = wide ? i + 1 : i;
                area.AddPoly([.. lower[from..end], .. upper[from..end].Reverse()]);
                from = -1;
            }
        }
        using (SKPaint fill = Paint(ColourOf(stretch.State)))
            canvas.DrawPath(area, fill);
        StrokeLayer(canvas, middle, stretch.State);
        using SKPaint edge = Paint(Style.Ink, stroke: stretch.State == LayerState.Separated ? 1.4f : 0.8f);
        canvas.DrawPath(faces, edge);
    }

    /// <summary>
    /// Distance of the faces at a station in pixels, negative where they have passed each other (contact shown larger than it is). A joint runs with the upper face
    /// to the left of its direction; y of a canvas points down.
    /// </summary>
    private static float Gap(SKPoint[] lower, SKPoint[] upper, int i)
    {
        SKPoint along = lower[Math.Min(i + 1, lower.Length - 1)] - lower[Math.Max(i - 1, 0)], across = upper[i] - lower[i];
        float length = along.Length;
        return length > 0 ? (along.Y * across.X - along.X * across.Y) / length : 0;
    }

    private static SKPoint Between(SKPoint a, SKPoint b) => new(0.5f * (a.X + b.X), 0.5f * (a.Y + b.Y));

    private static uint ColourOf(LayerState state) => state switch
    {
        LayerState.Intact => Style.IntactLayer,
        LayerState.Softening => Style.SofteningLayer,
        _ => 0xFFFFFF,
    };

    /// <summary>Adds a piece to a path, joined to the last one if that ended here.</summary>
    private static void Continue(SKPath path, SKPoint from, SKPoint to)
    {
        if (path.IsEmpty || path.LastPoint != from)
            path.MoveTo(from);
        path.LineTo(to);
    }

    private static void StrokeLayer(SKCanvas canvas, SKPath path, LayerState state)
    {
        using SKPaint edge = Paint(Style.Ink, stroke: 4.8f);
        canvas.DrawPath(path, edge);
        using SKPaint core = Paint(ColourOf(state), stroke: state == LayerState.Separated ? 2.2f : 3.4f);
        canvas.DrawPath(path, core);
    }

    private static void DrawMap(SKCanvas canvas, DamageMap map, RenderPack pack)
    {
        int columns = map.Positions.Length - 1;
        float[] x = [.. map.Positions.Select(position => pack.Plot.Axes.Bottom.GetPixel(position, pack.DataRect))];
        float[] y = [.. map.Rows.Select(row => pack.Plot.Axes.Left.GetPixel(row, pack.DataRect))];
        SKRect whole = new(x[0], Math.Min(y[0], y[^1]), x[^1], Math.Max(y[0], y[^1]));
        int wide = Math.Max(1, (int)(whole.Width * PixelsPerUnit)), high = Math.Max(1, (int)(whole.Height * PixelsPerUnit));
        using SKBitmap bitmap = new(new SKImageInfo(wide, high, SKColorType.Bgra8888, SKAlphaType.Opaque));
        Span<uint> dots = MemoryMarshal.Cast<byte, uint>(bitmap.GetPixelSpan());
        int[] columnOf = Places(map.Positions, wide), rowOf = Places(map.Rows, high);
        for (int j = 0; j < high; j++)
            for (int i = 0; i < wide; i++)
                dots[j * wide + i] = 0xFF000000 | ShadeOf(map.Damage[rowOf[j]][columnOf[i]]);
        using SKImage image = SKImage.FromBitmap(bitmap);
        canvas.DrawImage(image, whole, new SKSamplingOptions(SKFilterMode.Nearest));

        using SKPath edges = new();
        for (int row = 0; row < map.Damage.Count; row++)
        {
            for (int column = 0; column < columns; column++)
            {
                bool separated = IsSeparated(map.Damage[row][column]);
                if (column + 1 < columns && separated != IsSeparated(map.Damage[row][column + 1]))
                    Segment(edges, x[column + 1], y[row], x[column + 1], y[row + 1]);
                if (row + 1 < map.Damage.Count && separated != IsSeparated(map.Damage[row + 1][column]))
                    Segment(edges, x[column], y[row + 1], x[column + 1], y[row + 1]);
            }
        }
        using SKPaint edge = Paint(Style.Ink, stroke: 1.3f);
        edge.StrokeCap = SKStrokeCap.Square;
        canvas.DrawPath(edges, edge);
    }

    private static bool IsSeparated(float damage) => damage >= 1;

    private static uint ShadeOf(float damage) => float.IsNaN(damage) ? Style.NeverBonded : IsSeparated(damage) ? 0xFFFFFF : ColourMap.Softening.At(damage);

    private static int[] Places(double[] bounds, int count)
    {
        int[] places = new int[count];
        int at = 0;
        for (int i = 0; i < count; i++)
        {
            double value = bounds[0] + (bounds[^1] - bounds[0]) * (i + 0.5) / count;
            while (at < bounds.Length - 2 && value > bounds[at + 1])
                at++;
            places[i] = at;
        }
        return places;
    }

    private static void Segment(SKPath path, float fromX, float fromY, float toX, float toY)
    {
        path.MoveTo(fromX, fromY);
        path.LineTo(toX, toY);
    }

    private static void Trace(SKPath path, Polyline line, RenderPack pack, bool close)
    {
        for (int i = 0; i < line.X.Length; i++)
        {
            SKPoint point = At(line.X[i], line.Y[i], pack);
            if (i == 0)
                path.MoveTo(point);
            else
                path.LineTo(point);
        }
        if (close)
            path.Close();
    }

    private static SKPoint At(double x, double y, RenderPack pack) =>
        new(pack.Plot.Axes.Bottom.GetPixel(x, pack.DataRect), pack.Plot.Axes.Left.GetPixel(y, pack.DataRect));

    // ---- text and paint ------------------------------------------------------------------------------------------------------------------------------------------

    private static void Write(SKCanvas? canvas, string text, float x, float y, float size, uint colour, bool bold, SKTextAlign align = SKTextAlign.Left)
    {
        if (canvas is null)
            return;
        using SKFont font = new(bold ? Bold : Regular, size);
        using SKPaint paint = Paint(colour);
        canvas.DrawText(text, x, y, align, font, paint);
    }

    /// <summary>Text on a pale ground, moved so that it stays inside the data area.</summary>
    private static void Boxed(SKCanvas canvas, string text, float x, float y, SKTextAlign align, SKRect data)
    {
        using SKFont font = new(Regular, 12);
        float wide = font.MeasureText(text);
        float left = Math.Clamp(align == SKTextAlign.Right ? x - wide : x, data.Left + 4, Math.Max(data.Left + 4, data.Right - wide - 4));
        float bottom = Math.Clamp(y, data.Top + 14, data.Bottom - 4);
        using SKPaint ground = Paint(0xFFFFFF, alpha: 215);
        canvas.DrawRect(left - 3, bottom - 12, wide + 6, 16, ground);
        Write(canvas, text, left, bottom, 12, Style.Ink, bold: false);
    }

    /// <summary>The text, or as much of it as fits with an ellipsis.</summary>
    private static string Fitted(string text, SKFont font, float wide)
    {
        string fitted = text;
        for (int length = text.Length - 1; length > 0 && font.MeasureText(fitted) > wide; length--)
            fitted = text[..length].TrimEnd() + "…";
        return fitted;
    }

    private static List<string> Broken(string text, float size, bool bold)
    {
        using SKFont font = new(bold ? Bold : Regular, size);
        List<string> lines = [];
        string line = "";
        foreach (string word in text.Split(' '))
        {
            string longer = line.Length == 0 ? word : line + " " + word;
            if (line.Length > 0 && font.MeasureText(longer) > Width - 2 * Margin)
            {
                lines.Add(line);
                line = word;
            }
            else
            {
                line = longer;
            }
        }
        lines.Add(line);
        return lines.ConvertAll(one => Fitted(one, font, Width - 2 * Margin));
    }

    private static string Number(double value)
    {
        double rounded = double.Parse(value.ToString("G10", CultureInfo.InvariantCulture), CultureInfo.InvariantCulture) + 0.0;
        double size = Math.Abs(rounded);
        return rounded.ToString(size is 0 or (>= 1e-4 and < 1e7) ? "0.##########" : "0.####e0", CultureInfo.InvariantCulture);
    }

    private static SKPaint Paint(uint colour, float stroke = 0, byte alpha = 255) =>
        new() { Color = Colour(colour, alpha), IsAntialias = true, Style = stroke > 0 ? SKPaintStyle.Stroke : SKPaintStyle.Fill, StrokeWidth = stroke };

    private static SKColor Colour(uint colour, byte alpha = 255) => new((byte)(colour >> 16), (byte)(colour >> 8), (byte)colour, alpha);

    private static Color ScottColour(uint colour) => new((byte)(colour >> 16), (byte)(colour >> 8), (byte)colour);

    private static SKTypeface Load(string name)
    {
        using Stream stream = Assembly.GetExecutingAssembly().GetManifestResourceStream(name) ?? throw new InvalidOperationException($"the font {name} is missing from the library");
        using SKData data = SKData.Create(stream);
        return SKTypeface.FromData(data) ?? throw new InvalidOperationException($"the font {name} cannot be read");
    }

    /// <summary>Gives the embedded faces for every family asked for.</summary>
    private sealed class EmbeddedFaces : IFontResolver
    {
        public SKTypeface? CreateTypeface(string fontName, FontWeight weight, FontSlant slant, FontSpacing spacing) => (int)weight >= 600 ? Bold : Regular;

        public SKTypeface? CreateTypeface(string fontName, bool bold, bool italic) => bold ? Bold : Regular;
    }

    /// <summary>Something drawn by own code in the order of the plot's curves.</summary>
    private sealed class Layer(Action<RenderPack> draw) : IPlottable
    {
        public bool IsVisible { get; set; } = true;

        public IAxes Axes { get; set; } = new Axes();

        public IEnumerable<LegendItem> LegendItems => [];

        public AxisLimits GetAxisLimits() => AxisLimits.NoLimits;

        public void Render(RenderPack rp) => draw(rp);
    }
}
