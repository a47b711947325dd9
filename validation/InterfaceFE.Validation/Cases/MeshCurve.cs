using InterfaceFE.Results;
using InterfaceFE.Runs;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// A force-displacement curve through the points of a run, and how far two of them lie apart: the largest distance of a point of one from the other's line, in the box in which the
/// reference's peak force and last displacement are 1.
/// </summary>
/// <param name="Displacement">Displacements [mm].</param>
/// <param name="Force">Forces [N].</param>
public sealed record MeshCurve(double[] Displacement, double[] Force)
{
    /// <summary>Curve of a grip of a run.</summary>
    public static MeshCurve Of(RunResult run, string grip)
    {
        ArgumentNullException.ThrowIfNull(run);
        int index = run.History.Grips.ToList().FindIndex(g => g.Name == grip);
        GripReading[] readings = [.. run.History.Points.Select(p => p.Grips[index])];
        return new MeshCurve([.. readings.Select(r => r.Displacement)], [.. readings.Select(r => r.Force)]);
    }

    /// <summary>Largest distance of this curve's points from the reference's line: what the mesh does.</summary>
    public double PointsFrom(MeshCurve reference)
    {
        ArgumentNullException.ThrowIfNull(reference);
        return Farthest(this, reference, reference);
    }

    /// <summary>Largest distance of the reference's points from this curve's line: what the mesh does and, between the points, the strides.</summary>
    public double LineFrom(MeshCurve reference)
    {
        ArgumentNullException.ThrowIfNull(reference);
        return Farthest(reference, this, reference);
    }

    private static double Farthest(MeshCurve points, MeshCurve line, MeshCurve box)
    {
        double scaleX = 1 / box.Displacement[^1], scaleY = 1 / box.Force.Max(), farthest = 0;
        for (int i = 0; i < points.Force.Length; i++)
        {
            double x = points.Displacement[i] * scaleX, y = points.Force[i] * scaleY, nearest = double.PositiveInfinity;
            for (int j = 0; j + 1 < line.Force.Length; j++)
            {
                double startX = line.Displacement[j] * scaleX, startY = line.Force[j] * scaleY;
                double alongX = line.Displacement[j + 1] * scaleX - startX, alongY = line.Force[j + 1] * scaleY - startY;
                double square = alongX * alongX + alongY * alongY;
                double share = square > 0 ? Math.Clamp(((x - startX) * alongX + (y - startY) * alongY) / square, 0, 1) : 0;
                nearest = Math.Min(nearest, double.Hypot(x - startX - share * alongX, y - startY - share * alongY));
            }
            farthest = Math.Max(farthest, nearest);
        }
        return farthest;
    }
}
