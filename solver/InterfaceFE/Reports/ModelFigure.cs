using System.Globalization;
using InterfaceFE.Geometry;
using InterfaceFE.Results;

namespace InterfaceFE.Reports;

/// <summary>Figures of the whole model: as built, or deformed and coloured by a field, with a close-up where the model is too slender to show its layers.</summary>
internal static class ModelFigure
{
    private const double LeastHeight = 110;
    private const double LargestHeight = 430;

    /// <summary>Adherends in pale tints, layers bonded or not.</summary>
    public static Figure AsBuilt(Mesh mesh, string title)
    {
        ModelPicture model = new(mesh, null, 0);
        Picture picture = model.Tinted();
        List<Key> keys = [.. mesh.Adherends.Select((adherend, a) => new Key(KeyKind.Area, $"{adherend.Name} ({adherend.Material})", Style.Tints[a % Style.Tints.Length]))];
        if (mesh.Joints.Any(joint => joint.Bonded.Contains(true)))
            keys.Add(new Key(KeyKind.Intact, "bonded"));
        if (mesh.Joints.Any(joint => joint.Bonded.Contains(false)))
            keys.Add(new Key(KeyKind.Separated, "not bonded"));
        return new Figure { Title = "The model as built", Subtitles = [title], Panels = Panels(mesh, model, picture, null), Keys = keys };
    }

    /// <summary>Deformed model in colours.</summary>
    /// <exception cref="NoDataException">The fields are not finite.</exception>
    public static Figure Deformed(RunHistory history, FieldSnapshot fields, PictureField field, string when)
    {
        Mesh mesh = history.Mesh;
        double enlarged = Enlargement(mesh, fields);
        ModelPicture model = new(mesh, fields, enlarged);
        (double[] values, ColourMap map, double least, double largest, string words) = Values(mesh, fields, field);
        if (!double.IsFinite(largest - least) || !IsFinite(model.Box))
            throw new NoDataException(string.Create(CultureInfo.InvariantCulture, $"the fields of point {fields.Point} are not finite"));
        Picture picture = model.Coloured(values, least, largest, map, fields);
        MainGrip main = new(history);
        string stage = fields.Stage >= 1 && fields.Stage <= history.Stages.Count ? string.Create(CultureInfo.InvariantCulture, $"; stage {fields.Stage}: {history.Stages[fields.Stage - 1]}") : "";
        string scale = enlarged == 1 ? "displacement shown true to scale" : string.Create(CultureInfo.InvariantCulture, $"displacement shown {enlarged} times larger");
        List<Key> keys = [];
        if (picture.Layers.Any(layer => layer.State == LayerState.Intact))
            keys.Add(new Key(KeyKind.Intact, "layer intact"));
        if (picture.Layers.Any(layer => layer.State == LayerState.Softening))
            keys.Add(new Key(KeyKind.Softening, "layer softening"));
        if (picture.Layers.Any(layer => layer.State == LayerState.Separated))
            keys.Add(new Key(KeyKind.Separated, "layer separated"));
        if (picture.Hatched.Count > 0)
            keys.Add(new Key(KeyKind.Hatched, "yielded"));
        return new Figure
        {
            Title = $"Deformed model {when}, {scale}",
            Subtitles = [history.Title, Sentence($"{main.Words(fields.Point)}{stage}")],
            Panels = Panels(mesh, model, picture, fields),
            Keys = keys,
            Bar = new ColourBar(map, least, largest, words),
        };
    }

    private static (double[] Values, ColourMap Map, double Least, double Largest, string Words) Values(Mesh mesh, FieldSnapshot fields, PictureField field)
    {
        switch (field)
        {
            case PictureField.EquivalentStress:
                return Magnitude(fields.EquivalentStress, "Equivalent stress (megapascal)");
            case PictureField.PlasticStrain:
                return Magnitude(fields.PlasticStrain, "Equivalent plastic strain (no unit)");
            case PictureField.StressXx:
                return Signed(fields.StressXx, "Stress along x, tension positive (megapascal)");
            case PictureField.StressYy:
                return Signed(fields.StressYy, "Stress along y, tension positive (megapascal)");
            case PictureField.StressXy:
                return Signed(fields.StressXy, "Shear stress (megapascal)");
            default:
                double celsius = Celsius.From(fields.Temperature);
                double[] even = new double[mesh.NodeCount];
                Array.Fill(even, celsius);
                double half = NiceNumbers.AtLeast(Math.Max(Math.Abs(celsius - 20), 1));
                return (even, ColourMap.Vik, 20 - half, 20 + half, "Temperature (degrees Celsius)");
        }
    }

    private static (double[] Values, ColourMap Map, double Least, double Largest, string Words) Magnitude(double[] values, string words)
    {
        double largest = values.Max();
        return (values, ColourMap.Batlow, 0, double.IsNaN(largest) || largest > 0 ? NiceNumbers.AtLeast(largest) : 1, words);
    }

    private static (double[] Values, ColourMap Map, double Least, double Largest, string Words) Signed(double[] values, string words)
    {
        double size = values.Max(Math.Abs);
        double bound = double.IsNaN(size) || size > 0 ? NiceNumbers.AtLeast(size) : 1;
        return (values, ColourMap.Vik, -bound, bound, words);
    }

    /// <summary>1 when displacements show by themselves, else the nice number that makes the largest about 6 % of the model's size.</summary>
    internal static double Enlargement(Mesh mesh, FieldSnapshot fields)
    {
        double size = double.Hypot(mesh.X.Max() - mesh.X.Min(), mesh.Y.Max() - mesh.Y.Min());
        double largest = 0;
        for (int i = 0; i < mesh.NodeCount; i++)
            largest = Math.Max(largest, double.Hypot(fields.DisplacementX[i], fields.DisplacementY[i]));
        double wanted = 0.06 * size / largest;
        return double.IsFinite(wanted) && wanted >= 2 && wanted < 1e9 ? NiceNumbers.AtMost(wanted) : 1;
    }

    private static List<Panel> Panels(Mesh mesh, ModelPicture model, Picture picture, FieldSnapshot? fields)
    {
        Limits box = model.Box;
        double wide = Math.Max(box.Right - box.Left, 1e-9), high = Math.Max(box.Top - box.Bottom, 1e-9);
        double margin = 0.03 * Math.Max(wide, high);
        List<Panel> panels = [PanelOver(box.Left - margin, box.Right + margin, box.Bottom - margin, box.Top + margin, picture, null)];
        double thinnest = mesh.Adherends.Count > 0 ? mesh.Adherends.Min(adherend => adherend.Thickness) : high;
        if (mesh.Joints.Count > 0 && thinnest * Plotting.DataWidth / wide < 24)
        {
            (double x, double y, string where) = Front(mesh, model, fields);
            double half = 0.5 * Math.Min(wide, Math.Max(24 * thinnest, wide / 12));
            panels.Add(PanelOver(x - half, x + half, y - 0.22 * half, y + 0.22 * half, picture, $"Close-up {where}"));
        }
        return panels;
    }

    /// <summary>Where to look closely: the foremost bonded element that has damage, in the joint with the most damage; else the start of the bond.</summary>
    private static (double X, double Y, string Where) Front(Mesh mesh, ModelPicture model, FieldSnapshot? fields)
    {
        int bestJoint = 0, bestStation = FirstBonded(mesh, 0);
        double best = -1;
        foreach (LayerField layer in fields?.Layers ?? [])
        {
            MeshedJoint joint = mesh.Joints[layer.Joint];
            for (int i = 0; i < layer.Damage.Length; i++)
            {
                // Damage short of 1, so that the view stands in the process zone and not in the open crack.
                if (!joint.Bonded[i / mesh.NodesPerFace] || layer.Damage[i] >= 1 || layer.Damage[i] <= best)
                    continue;
                (best, bestJoint, bestStation) = (layer.Damage[i], layer.Joint, i);
            }
        }
        if (!(best > 0))
            (bestJoint, bestStation) = (0, FirstBonded(mesh, 0));
        MeshedJoint at = mesh.Joints[bestJoint];
        (double lx, double ly) = model.Place(at.LowerNodes[bestStation]);
        (double ux, double uy) = model.Place(at.UpperNodes[bestStation]);
        return (0.5 * (lx + ux), 0.5 * (ly + uy), best > 0 ? $"of the process zone of {at.Name}" : $"of {at.Name}");
    }

    /// <summary>First station of the first bonded element.</summary>
    private static int FirstBonded(Mesh mesh, int joint)
    {
        int first = Array.IndexOf(mesh.Joints[joint].Bonded, true);
        return Math.Max(first, 0) * mesh.NodesPerFace;
    }

    /// <summary>A panel with equal scales along both axes: its height follows from the limits, and the limits are widened where the height is bounded.</summary>
    private static Panel PanelOver(double left, double right, double bottom, double top, Picture picture, string? caption)
    {
        double wide = Plotting.DataWidth;
        double height = Math.Clamp(wide * (top - bottom) / (right - left), LeastHeight, LargestHeight);
        double perPixel = Math.Max((right - left) / wide, (top - bottom) / height);
        double midX = 0.5 * (left + right), midY = 0.5 * (bottom + top);
        return new Panel
        {
            XTitle = "x (mm)",
            YTitle = "y (mm)",
            Height = height + Plotting.AxesHeight,
            Grid = false,
            Picture = picture,
            Caption = caption,
            Limits = new Limits(midX - 0.5 * wide * perPixel, midX + 0.5 * wide * perPixel, midY - 0.5 * height * perPixel, midY + 0.5 * height * perPixel),
        };
    }

    private static bool IsFinite(Limits box) => double.IsFinite(box.Right - box.Left) && double.IsFinite(box.Top - box.Bottom);

    private static string Sentence(string text) => char.ToUpperInvariant(text[0]) + text[1..];
}
