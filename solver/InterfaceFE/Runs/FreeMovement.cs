using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using InterfaceFE.Model;

namespace InterfaceFE.Runs;

/// <summary>
/// Finds adherends that can move as one rigid piece although nothing is stressed: at each stage, the held components of the grips on every bonded group of adherends must
/// stop its two displacements and its rotation. A pure count of directions: no stiffness enters, so no tolerance of the factorisation either.
/// </summary>
internal static class FreeMovement
{
    /// <summary>Share of a unit row below which it adds no new direction: far above round-off, far below any lever arm that could hold.</summary>
    private const double Negligible = 1e-8;

    /// <summary>Refuses a model in which something can move freely at the start of a stage.</summary>
    /// <exception cref="DeckException">One problem per stage and group, at the stage's place.</exception>
    public static void Refuse(SpecimenModel model)
    {
        int[] groupOf = Groups(model);
        List<DeckProblem> problems = [];
        foreach (LoadStage stage in model.Stages.Where(s => s.Marches))
            foreach (int group in groupOf.Distinct())
                if (Describe(model, stage, groupOf, group) is { } words)
                    problems.Add(new DeckProblem(Text.Of($"sequence.{stage.Number}"), words));
        if (problems.Count > 0)
            throw new DeckException(problems);
    }

    private static string? Describe(SpecimenModel model, LoadStage stage, int[] groupOf, int group)
    {
        MeshedAdherend[] members = [.. model.Mesh.Adherends.Where((_, i) => groupOf[i] == group)];
        (double x, double y, double size) = Middle(model.Mesh, members);
        List<double[]> held = [];
        foreach (HeldTarget target in stage.Held)
        {
            if (target.Unknown >= model.Unknowns.FirstOutOfPlane)
                continue;
            (int node, double atX, double atY, int component) = Place(model, target.Unknown);
            if (!members.Any(m => Holds(m, node)))
                continue;
            double[] row = component switch
            {
                0 => [1, 0, -(atY - y) / size],
                1 => [0, 1, (atX - x) / size],
                _ => [0, 0, 1],
            };
            if (Rest(row, held) is { } rest)
                held.Add(rest);
        }
        if (held.Count == 3)
            return null;
        string names = string.Join(" with ", members.Select(m => m.Name));
        return $"{names} can still move freely: {Motion(held, x, y, size)}. Fix a grip on it before this stage (x, y or rotation), or bond it to what is held";
    }

    private static string Motion(List<double[]> held, double x, double y, double size)
    {
        if (held.Count < 2)
            return held.Count == 0 ? "nothing holds it" : "it is held in one direction only";
        double[] a = held[0], b = held[1];
        (double alongX, double alongY, double turn) = (a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]);
        if (Math.Abs(turn) < 1e-6)
            return Math.Abs(alongY) < 1e-6 ? "it can slide along x" : Math.Abs(alongX) < 1e-6 ? "it can slide along y" : "it can slide";
        // A point that stays: 0 = alongX - turn·(y - ym)/size, 0 = alongY + turn·(x - xm)/size.
        return Text.Of($"it can turn about ({Tidy(x - alongY / turn * size):G5} mm, {Tidy(y + alongX / turn * size):G5} mm)");

        double Tidy(double value) => Math.Abs(value) < 1e-9 * size ? 0 : value;
    }

    /// <summary>What a row adds to those held already, at unit length; null when nothing.</summary>
    private static double[]? Rest(double[] row, List<double[]> held)
    {
        double whole = Math.Sqrt(Dot(row, row));
        foreach (double[] known in held)
        {
            double share = Dot(row, known);
            for (int i = 0; i < 3; i++)
                row[i] -= share * known[i];
        }
        double length = Math.Sqrt(Dot(row, row));
        return length <= Negligible * whole ? null : [row[0] / length, row[1] / length, row[2] / length];
    }

    private static double Dot(double[] a, double[] b) => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];

    /// <summary>A node that follows an unknown, the point at which it acts, and its component: x, y or rotation.</summary>
    private static (int Node, double X, double Y, int Component) Place(SpecimenModel model, int unknown)
    {
        UnknownMap map = model.Unknowns;
        for (int b = 0; b < map.Bodies.Count; b++)
        {
            GripBody body = map.Bodies[b];
            if (map.OfBody(b) is >= 0 and int first && unknown >= first && unknown < first + 3)
                return (body.Nodes[0], body.PinX, body.PinY, unknown - first);
            foreach (int node in body.Nodes)
                if (map.OfNode(node) is >= 0 and int own && unknown >= own && unknown <= own + 1)
                    return (node, model.Mesh.X[node], model.Mesh.Y[node], unknown - own);
        }
        foreach (LoadTrain train in map.LoadTrains)
            if (map.OfCrosshead(train) == unknown)
                return Place(model, map.OfBody(train.Body, train.Component));
        throw new InvalidOperationException($"Unknown {unknown} is held but belongs to no grip.");
    }

    /// <summary>Group of each adherend: those with a bonded stretch between them, or with nodes on one rigid grip, move together.</summary>
    private static int[] Groups(SpecimenModel model)
    {
        int[] group = [.. Enumerable.Range(0, model.Mesh.Adherends.Count)];
        foreach (MeshedJoint joint in model.Mesh.Joints.Where(j => j.Bonded.Contains(true)))
            Join(joint.UpperAdherend, joint.LowerAdherend);
        foreach (GripBody body in model.Unknowns.Bodies.Where(b => b.Rigid))
        {
            int[] on = [.. body.Nodes.Select(node => model.Mesh.Adherends.ToList().FindIndex(a => Holds(a, node))).Distinct()];
            foreach (int other in on)
                Join(on[0], other);
        }
        return group;

        void Join(int a, int b)
        {
            (int from, int to) = (group[a], group[b]);
            for (int i = 0; i < group.Length; i++)
                if (group[i] == from)
                    group[i] = to;
        }
    }

    private static (double X, double Y, double Size) Middle(Mesh mesh, MeshedAdherend[] members)
    {
        double lowX = double.PositiveInfinity, lowY = double.PositiveInfinity, highX = double.NegativeInfinity, highY = double.NegativeInfinity;
        foreach (MeshedAdherend member in members)
        {
            for (int node = member.FirstNode; node < member.FirstNode + member.NodeCount; node++)
            {
                (lowX, highX) = (Math.Min(lowX, mesh.X[node]), Math.Max(highX, mesh.X[node]));
                (lowY, highY) = (Math.Min(lowY, mesh.Y[node]), Math.Max(highY, mesh.Y[node]));
            }
        }
        return ((lowX + highX) / 2, (lowY + highY) / 2, Math.Max(highX - lowX, highY - lowY));
    }

    private static bool Holds(MeshedAdherend adherend, int node) => node >= adherend.FirstNode && node < adherend.FirstNode + adherend.NodeCount;
}
