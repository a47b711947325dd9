using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Tests.Marching;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>Slender parts through large rotations: elastica by end force and end moment, two structures through their limits, a strip bulged by pressure, against elastica and membrane solutions.</summary>
public sealed class TurningBeamCase : ICase
{
    private const double Tolerance = 3e-3;

    /// <inheritdoc/>
    public string Name => "turning-beams";

    /// <inheritdoc/>
    public string Group => "Large rotation";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context) => [.. EndForce(context), .. EndMoment(context), .. Toggle(context), .. Frame(context), .. Bulge(context)];

    private static IEnumerable<CaseLine> EndForce(CaseContext context)
    {
        const string Source = "Bisshopp and Drucker, Q. Appl. Math. 3 (1945) 272-275, and Mattiasson, Int. J. Numer. Meth. Eng. 17 (1981) 145-153; numbers computed by elliptic integrals";
        (double Load, double Across, double Along, double Degrees)[] table =
            [(0.5, 0.162144, 0.015919, 14.0107), (1, 0.301721, 0.056433, 26.4335), (2, 0.493457, 0.160642, 44.7910), (5, 0.713792, 0.387628, 69.6355), (10, 0.810609, 0.554996, 81.9493)];
        foreach ((double load, double across, double along, double degrees) in table)
        {
            string what = $"cantilever, PL²/EI = {load}: ";
            RunResult run = context.Run(what + "end force", TurningDecks.Cantilever(load * TurningDecks.Bending / (TurningDecks.Length * TurningDecks.Length)));
            (double x, double y, double angle) = Tip(run);
            yield return new CaseLine(what + "deflection over length", across, y / TurningDecks.Length, Tolerance, "", Source);
            yield return new CaseLine(what + "shortening over length", along, -x / TurningDecks.Length, Tolerance, "", Source);
            yield return new CaseLine(what + "rotation of the tip", degrees, angle * 180 / Math.PI, Tolerance, "deg", Source);
        }
    }

    private static IEnumerable<CaseLine> EndMoment(CaseContext context)
    {
        const string Source = "closed form: curvature M/EI, tip at L·(sin φ, 1 - cos φ)/φ, φ = ML/EI";
        foreach (double turns in (double[])[0.25, 0.5, 1])
        {
            double angle = 2 * Math.PI * turns, length = TurningDecks.Length;
            string what = $"cantilever, end moment of {turns} turns: ";
            RunResult run = context.Run(what + "end moment", TurningDecks.Cantilever(0, angle * TurningDecks.Bending / length));
            (double x, double y, double rotation) = Tip(run);
            double off = double.Hypot(x + length - length * Math.Sin(angle) / angle, y - length * (1 - Math.Cos(angle)) / angle);
            yield return CaseLine.AtMost(what + "distance of the tip from its place over length", 1e-3, off / length, "", Source);
            yield return new CaseLine(what + "rotation of the tip", 360 * turns, rotation * 180 / Math.PI, Tolerance, "deg", Source);
        }
    }

    private static IEnumerable<CaseLine> Toggle(CaseContext context)
    {
        const string Source = "Williams, Q. J. Mech. Appl. Math. 17 (1964) 451-469; numbers by the extensible elastica";
        List<(double Load, double Travel)> path = Curve(context.Run("toggle, rise 0.386 in", TurningDecks.Toggle(0.386, 45)), "middle", 2);
        Peak upper = Limit(path, 0, 0.3, 1), lower = Limit(path, 0.3, 0.5, -1);
        yield return new CaseLine("toggle, rise 0.386 in: upper limit", 33.861, upper.Value, 1e-2, "lb", Source);
        yield return CaseLine.Reported("toggle, rise 0.386 in: travel there", upper.At, "in", Source, 0.232);
        yield return new CaseLine("toggle, rise 0.386 in: lower limit", 31.263, -lower.Value, 1e-2, "lb", Source);
        foreach ((double travel, double load) in ((double, double)[])[(0.1, 25.200), (0.2, 33.489), (0.5, 36.075), (0.6, 53.286), (0.7, 88.155)])
            yield return new CaseLine($"toggle, rise 0.386 in: load at {travel} in", load, At(path, travel), 1e-2, "lb", Source);
        path = Curve(context.Run("toggle, rise 0.32 in", TurningDecks.Toggle(0.32, 45)), "middle", 2);
        foreach ((double travel, double load) in ((double, double)[])[(0.2, 25.818), (0.4, 32.363), (0.6, 76.570)])
            yield return new CaseLine($"toggle, rise 0.32 in: load at {travel} in", load, At(path, travel), 1e-2, "lb", Source);
    }

    private static IEnumerable<CaseLine> Frame(CaseContext context)
    {
        const string Source = "Lee, Manuel and Rossow, J. Eng. Mech. Div. 94 (1968) 521-547; numbers by the extensible elastica";
        List<(double Load, double Travel)> path = Curve(context.Run("frame", TurningDecks.Frame(2.5)), "load", 1);
        Peak upper = Limit(path, 0, 55, 1), lower = Limit(path, 0, 100, -1);
        int back = path.FindIndex(p => p.Travel > 60.5);
        yield return new CaseLine("frame: upper limit", 1.8557, upper.Value, 1e-2, "", Source);
        yield return CaseLine.Reported("frame: travel there", upper.At, "", Source, 48.74);
        yield return new CaseLine("frame: lower limit", -0.9414, -lower.Value, 1e-2, "", Source);
        yield return CaseLine.Reported("frame: travel there, going down", lower.At, "", Source, 58.2);
        yield return new CaseLine("frame: travel at which it turns back", 61.00, path.Take(back + 20).Max(p => p.Travel), 1e-2, "", Source);
        yield return new CaseLine("frame: travel at which it turns on again", 50.75, path.Skip(back).Min(p => p.Travel), 1e-2, "", Source);
    }

    private static IEnumerable<CaseLine> Bulge(CaseContext context)
    {
        foreach (double pressure in (double[])[0.01, 0.02])
        {
            RunResult run = context.Run($"strip between pins under {pressure} MPa", TurningDecks.Bulge(pressure));
            FieldSnapshot last = run.History.Snapshots[^1];
            var mesh = run.Equilibrium.Model.Mesh;
            int middle = Enumerable.Range(0, mesh.NodeCount).MinBy(i => double.Hypot(mesh.X[i] - TurningDecks.BulgeLength / 2, mesh.Y[i]));
            yield return new CaseLine($"strip between pins, follower pressure of {pressure} MPa: rise", TurningDecks.BulgeRise(pressure), last.DisplacementY[middle], Tolerance, "mm",
                "closed form: circular arc of a membrane, T = p·R, less the share of bending p·EI/T²");
        }
    }

    /// <summary>Movement of the tip: of the point half way up its end.</summary>
    private static (double X, double Y, double Angle) Tip(RunResult run)
    {
        FieldSnapshot last = run.History.Snapshots[^1];
        int node = run.Equilibrium.Model.Unknowns.Bodies[1].Nodes[1];
        return (last.DisplacementX[node], last.DisplacementY[node], run.History.Points[^1].Grips[1].Rotation ?? double.NaN);
    }

    private static List<(double Load, double Travel)> Curve(RunResult run, string grip, int share)
    {
        int index = run.History.Grips.ToList().FindIndex(g => g.Name == grip);
        return [.. run.History.Points.Select(p => (share * p.Grips[index].Force, p.Grips[index].Displacement))];
    }

    private static Peak Limit(List<(double Load, double Travel)> path, double from, double to, int sense)
    {
        List<(double Load, double Travel)> part = [.. path.Where(p => p.Travel >= from && p.Travel <= to)];
        return Peak.Of([.. part.Select(p => p.Travel)], [.. part.Select(p => sense * p.Load)])!;
    }

    private static double At(List<(double Load, double Travel)> path, double travel)
    {
        int next = path.FindIndex(p => p.Travel >= travel);
        ((double loadBefore, double before), (double loadAfter, double after)) = (path[next - 1], path[next]);
        return loadBefore + (loadAfter - loadBefore) * (travel - before) / (after - before);
    }
}
