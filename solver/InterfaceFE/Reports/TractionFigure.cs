using InterfaceFE.Geometry;
using InterfaceFE.Results;

namespace InterfaceFE.Reports;

/// <summary>Peel and shear traction along a joint at first damage, at the peak and at the end of the run, as far as fields were kept there.</summary>
internal static class TractionFigure
{
    /// <summary>Makes the figure.</summary>
    /// <exception cref="NoDataException">No fields of the joint were kept.</exception>
    public static Figure Of(RunHistory history, RunSummary summary, int joint)
    {
        MeshedJoint mesh = history.Mesh.Joints[joint];
        MainGrip main = new(history);
        List<Curve> peel = [], shear = [];
        foreach ((string when, FieldSnapshot fields) in Moments(history, main))
        {
            LayerField? layer = fields.Layers.FirstOrDefault(one => one.Joint == joint);
            if (layer is null)
                continue;
            string name = $"{when}: {main.Words(fields.Point)}";
            peel.Add(Curve(name, mesh, layer.Position, layer.Peel, history.Mesh.NodesPerFace, peel.Count));
            shear.Add(Curve(name, mesh, layer.Position, layer.Shear, history.Mesh.NodesPerFace, shear.Count));
        }
        if (!peel.Concat(shear).Any(curve => curve.Y.Any(double.IsFinite)))
            throw new NoDataException($"no tractions of {mesh.Name} were kept");
        string position = $"Position along {mesh.Name} (mm)";
        return new Figure
        {
            Title = $"Tractions along {mesh.Name}",
            Subtitles = [history.Title, .. LoadFigure.EndWords(summary)],
            Panels =
            [
                new Panel { XTitle = position, YTitle = "Peel traction (MPa)", Height = 290, Curves = WithoutNoise(peel, shear) },
                new Panel { XTitle = position, YTitle = "Shear traction (MPa)", Height = 290, Curves = WithoutNoise(shear, peel) },
            ],
        };
    }

    /// <summary>Curves of one mode; level at zero where they hold nothing but the rounding of the other mode.</summary>
    private static List<Curve> WithoutNoise(List<Curve> curves, List<Curve> others)
    {
        double Largest(List<Curve> of) => of.SelectMany(curve => curve.Y).Where(double.IsFinite).Select(Math.Abs).DefaultIfEmpty(0).Max();
        return Largest(curves) > 1e-9 * Largest(others) ? curves : [.. curves.Select(curve => curve with { Y = [.. curve.Y.Select(y => double.IsFinite(y) ? 0 : y)] })];
    }

    /// <summary>Kept fields at telling moments, each once, with words for the moment.</summary>
    private static List<(string When, FieldSnapshot Fields)> Moments(RunHistory history, MainGrip main)
    {
        List<(string When, FieldSnapshot Fields)> moments = [];
        void Add(string when, FieldSnapshot? fields)
        {
            if (fields is null)
                return;
            int same = moments.FindIndex(one => ReferenceEquals(one.Fields, fields));
            if (same >= 0)
                moments[same] = ($"{moments[same].When} and {when}", fields);
            else
                moments.Add((when, fields));
        }

        Add("first damage", history.Snapshots.Find(fields => fields.Layers.Any(layer => IsDamaged(history.Mesh, layer))));
        if (main.PeakPoint() is { } peak)
            Add("peak", Nearest(history, peak));
        if (history.Snapshots.Count > 0)
            Add("end", history.Snapshots[^1]);
        moments.Sort((a, b) => a.Fields.Point.CompareTo(b.Fields.Point));
        return moments;
    }

    /// <summary>Kept fields nearest to a point; null when none were kept.</summary>
    internal static FieldSnapshot? Nearest(RunHistory history, int point) => history.Snapshots.MinBy(fields => Math.Abs(fields.Point - point));

    private static bool IsDamaged(Mesh mesh, LayerField layer)
    {
        bool[] bonded = mesh.Joints[layer.Joint].Bonded;
        for (int i = 0; i < layer.Damage.Length; i++)
            if (bonded[i / mesh.NodesPerFace] && layer.Damage[i] > 0)
                return true;
        return false;
    }

    private static Curve Curve(string name, MeshedJoint joint, double[] position, double[] traction, int perFace, int style)
    {
        double[] shown = new double[traction.Length];
        for (int i = 0; i < shown.Length; i++)
            shown[i] = joint.Bonded[i / perFace] ? traction[i] : double.NaN;
        return new Curve(name, position, shown, style);
    }
}
