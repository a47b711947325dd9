using InterfaceFE.Decks;
using InterfaceFE.Geometry;

namespace InterfaceFE.Model;

/// <summary>Pressures of a deck's sequence: one block for each pressed edge. A pressure stays on until another stage changes it.</summary>
public static class PressurePlanner
{
    /// <summary>Plans the pressures.</summary>
    /// <exception cref="DeckException">An edge does not exist.</exception>
    public static IReadOnlyList<PressureBlock> Plan(Deck deck, Mesh mesh)
    {
        var finder = new EdgeFinder(mesh);
        var levels = new Dictionary<string, double[]>();
        for (int stage = 0; stage < deck.Sequence.Count; stage++)
        {
            if (deck.Sequence[stage].Press is not { } press)
                continue;
            foreach (string edge in press.On)
            {
                if (!levels.TryGetValue(edge, out double[]? level))
                    levels.Add(edge, level = new double[deck.Sequence.Count + 1]);
                Array.Fill(level, press.Pressure, stage + 1, level.Length - stage - 1);
            }
        }
        var blocks = new List<PressureBlock>();
        foreach ((string edge, double[] level) in levels)
        {
            FoundEdge found = finder.Find(edge, "sequence");
            blocks.Add(new PressureBlock(edge, mesh, found.Adherend, found.Edge, level, deck.Model.Rotation == RotationSetting.Finite));
        }
        return blocks;
    }
}
