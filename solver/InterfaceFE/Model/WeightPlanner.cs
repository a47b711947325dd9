using InterfaceFE.Decks;
using InterfaceFE.Geometry;

namespace InterfaceFE.Model;

/// <summary>Weight of the adherends as forces on the unknowns. What sits on a rigid grip acts on it with its lever about the pin, before deformation also where rotations are finite.</summary>
internal static class WeightPlanner
{
    /// <summary>Conventional acceleration of free fall [mm/s²] (ISO 80000-3).</summary>
    private const double Acceleration = 9806.65;

    /// <summary>Forces of the full weight; none when the deck has no gravity.</summary>
    public static IReadOnlyList<ForceTarget> Plan(Deck deck, Mesh mesh, UnknownMap unknowns, IReadOnlyList<SolidBlock> solids)
    {
        if (deck.Model.Gravity is not { } direction)
            return [];
        (GripComponent component, int sense) = SequencePlanner.Of(direction);
        double[] sum = new double[unknowns.Count];
        Span<double> volumes = stackalloc double[mesh.NodesPerSolid];
        foreach (SolidBlock solid in solids)
        {
            double[] densities = Densities(deck, solid.Adherend);
            for (int e = 0; e < solid.Count; e++)
            {
                solid.VolumeShares(e, volumes);
                ReadOnlySpan<int> nodes = solid.Nodes(e);
                for (int i = 0; i < nodes.Length; i++)
                    Add(mesh, unknowns, nodes[i], component, sense * Acceleration * densities[e % densities.Length] * volumes[i], sum);
            }
        }
        return [.. Enumerable.Range(0, sum.Length).Where(i => sum[i] != 0).Select(i => new ForceTarget(i, sum[i]))];
    }

    private static void Add(Mesh mesh, UnknownMap unknowns, int node, GripComponent component, double force, double[] sum)
    {
        int body = unknowns.BodyOfNode(node);
        if (body < 0)
        {
            sum[unknowns.OfNode(node) + (int)component] += force;
            return;
        }
        GripBody grip = unknowns.Bodies[body];
        int first = unknowns.OfBody(body);
        sum[first + (int)component] += force;
        sum[first + 2] += component == GripComponent.X ? -force * (mesh.Y[node] - grip.PinY) : force * (mesh.X[node] - grip.PinX);
    }

    private static double[] Densities(Deck deck, MeshedAdherend adherend)
    {
        if (deck.Adherends[adherend.Name].Plies is not { } plies)
            return [Density(deck, adherend.Material)];
        return [.. adherend.PlyOfRow.Select(ply => Density(deck, plies[ply].Of ?? adherend.Material))];
    }

    private static double Density(Deck deck, string material) =>
        deck.Materials[material].Density ?? throw new DeckException($"materials.{material}.density", "is needed, since the model has gravity");
}
