using System.Globalization;
using InterfaceFE.Geometry;
using InterfaceFE.Results;

namespace InterfaceFE.Reports;

/// <summary>Where a joint has come apart, and when: the joint unrolled from left to right, points downwards, damage as shade.</summary>
internal static class FrontMapFigure
{
    /// <summary>Makes the figure.</summary>
    /// <exception cref="NoDataException">No damage of the joint was told.</exception>
    public static Figure Of(RunHistory history, RunSummary summary, int joint)
    {
        MeshedJoint mesh = history.Mesh.Joints[joint];
        DamageRow[] rows = [.. history.Damage.Where(row => row.Joint == joint).OrderBy(row => row.Point)];
        if (rows.Length == 0)
            throw new NoDataException($"no damage along {mesh.Name} was told");
        double[] bounds = new double[rows.Length + 1];
        for (int i = 0; i < rows.Length; i++)
            bounds[i] = rows[i].Point - 0.5;
        bounds[^1] = rows[^1].Point + 0.5;
        Panel panel = new()
        {
            XTitle = $"Position along {mesh.Name} (mm)",
            YTitle = "Point",
            Height = 440,
            WholeNumbersY = true,
            Grid = false,
            Limits = new Limits(mesh.Position[0], mesh.Position[^1], bounds[^1], bounds[0]),
            Map = new DamageMap(mesh.Position, bounds, [.. rows.Select(row => row.Damage)]),
            StageLines = Stages(history, bounds[0], bounds[^1]),
        };
        List<Key> keys = [];
        if (rows.Any(row => row.Damage.Any(damage => damage >= 1)))
            keys.Add(new Key(KeyKind.Separated, "separated: white with a dark edge"));
        if (mesh.Bonded.Contains(false))
            keys.Add(new Key(KeyKind.Area, "never bonded", Style.NeverBonded));
        return new Figure
        {
            Title = $"Front map of {mesh.Name}",
            Subtitles = [history.Title, .. LoadFigure.EndWords(summary)],
            Panels = [panel],
            Keys = keys,
            Bar = new ColourBar(ColourMap.Softening, 0, 1, "Damage while the layer softens (0 intact, towards 1 separated)"),
        };
    }

    private static List<StageLine> Stages(RunHistory history, double first, double last)
    {
        List<StageLine> lines = [];
        int stage = 0;
        foreach (PointRow point in history.Points)
        {
            if (point.Stage == stage)
                continue;
            stage = point.Stage;
            string words = stage >= 1 && stage <= history.Stages.Count ? history.Stages[stage - 1] : "";
            if (point.Point - 0.5 >= first && point.Point - 0.5 <= last)
                lines.Add(new StageLine(point.Point - 0.5, string.Create(CultureInfo.InvariantCulture, $"stage {stage}: {words}")));
        }
        return lines;
    }
}
