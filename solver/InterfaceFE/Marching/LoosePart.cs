using InterfaceFE.Geometry;
using InterfaceFE.Model;

namespace InterfaceFE.Marching;

/// <summary>Says in an engineer's words what a numerically zero pivot means: which part can still move, where, in which direction, and the usual causes.</summary>
internal static class LoosePart
{
    /// <summary>Share of the largest movement from which a part counts as moving.</summary>
    private const double Moving = 1e-2;

    /// <summary>What most often leaves a part free to move.</summary>
    private const string UsualCauses = "Usual causes: a grip that should be fixed in the sequence (x, y or rotation) and is not; a part held at one point alone, about which it turns; "
        + "an adherend that no joint connects, or whose joint has no bonded length left; faces that only meet when they are pressed together";

    /// <summary>The free movement in words.</summary>
    /// <param name="equilibrium">The equilibrium, its tangent factored at the latest evaluation.</param>
    /// <param name="unknown">The unknown that stability found loose.</param>
    public static string Describe(FullEquilibrium equilibrium, int unknown)
    {
        SpecimenModel model = equilibrium.Model;
        double[] movement = equilibrium.FreeMovement(unknown);
        double[] reach = [.. model.Mesh.Adherends.Select(a => Furthest(model, a, movement).Size)];
        double largest = reach.Max();
        if (!double.IsFinite(largest) || largest == 0)
            return $"{model.Unknowns.Describe(unknown)} can still move freely: nothing holds it. {UsualCauses}";
        int first = Array.IndexOf(reach, largest);
        MeshedAdherend part = model.Mesh.Adherends[first];
        (int node, _) = Furthest(model, part, movement);
        (double ux, double uy) = model.Unknowns.Displacement(node, movement);
        string[] others = [.. model.Mesh.Adherends.Where((_, i) => i != first && reach[i] > Moving * largest).Select(a => a.Name)];
        return Text($"{Place(model.Mesh, part, node)} can still move freely along {(Math.Abs(ux) > Math.Abs(uy) ? "x" : "y")}: {part.Name} {Motion(model, part, movement)}")
            + (others.Length > 0 ? ", and with it " + string.Join(", ", others) : "") + ". " + UsualCauses;
    }

    private static (int Node, double Size) Furthest(SpecimenModel model, MeshedAdherend part, double[] movement)
    {
        (int Node, double Size) furthest = (part.FirstNode, 0);
        for (int node = part.FirstNode; node < part.FirstNode + part.NodeCount; node++)
        {
            (double ux, double uy) = model.Unknowns.Displacement(node, movement);
            // The margin keeps rounding from choosing among places that move alike.
            if (Math.Sqrt(ux * ux + uy * uy) is var size && !(size <= 1.000001 * furthest.Size))
                furthest = (node, size);
        }
        return furthest;
    }

    /// <summary>The edge that a node lies on, an end before a face, or the adherend; and its place.</summary>
    private static string Place(Mesh mesh, MeshedAdherend part, int node)
    {
        string edge = part.Edges.Where(e => e.Value.Nodes.Contains(node)).OrderBy(e => e.Key.EndsWith("end", StringComparison.Ordinal) ? 0 : 1).Select(e => $"the {e.Key} of {part.Name}").FirstOrDefault() ?? part.Name;
        return Text($"{edge} at ({mesh.X[node]:G6} mm, {mesh.Y[node]:G6} mm)");
    }

    /// <summary>Slides or turns: the rigid movement nearest to that of the part, by least squares about its middle.</summary>
    private static string Motion(SpecimenModel model, MeshedAdherend part, double[] movement)
    {
        double x = 0, y = 0, ux = 0, uy = 0, polar = 0, moment = 0;
        for (int node = part.FirstNode; node < part.FirstNode + part.NodeCount; node++)
        {
            (double u, double v) = model.Unknowns.Displacement(node, movement);
            x += model.Mesh.X[node] / part.NodeCount;
            y += model.Mesh.Y[node] / part.NodeCount;
            ux += u / part.NodeCount;
            uy += v / part.NodeCount;
        }
        for (int node = part.FirstNode; node < part.FirstNode + part.NodeCount; node++)
        {
            (double u, double v) = model.Unknowns.Displacement(node, movement);
            (double dx, double dy) = (model.Mesh.X[node] - x, model.Mesh.Y[node] - y);
            polar += dx * dx + dy * dy;
            moment += dx * (v - uy) - dy * (u - ux);
        }
        double turn = moment / polar, reach = Math.Sqrt(polar / part.NodeCount);
        if (Math.Abs(turn) * reach < 0.05 * Math.Sqrt(ux * ux + uy * uy))
            return Math.Abs(uy) < 0.01 * Math.Abs(ux) ? "slides along x and nothing stops it" : Math.Abs(ux) < 0.01 * Math.Abs(uy) ? "slides along y and nothing stops it" : "slides and nothing stops it";
        return Text($"turns about ({Tidy(x - uy / turn):G4} mm, {Tidy(y + ux / turn):G4} mm) and nothing stops it");

        double Tidy(double value) => Math.Abs(value) < 1e-6 * reach ? 0 : value;
    }

    private static string Text(FormattableString text) => FormattableString.Invariant(text);
}
