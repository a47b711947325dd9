using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>An edge found by its text, with the adherend it belongs to.</summary>
/// <param name="Adherend">Index into <see cref="Mesh.Adherends"/>.</param>
/// <param name="Name">Name of the edge on the adherend.</param>
/// <param name="Edge">The edge.</param>
public readonly record struct FoundEdge(int Adherend, string Name, MeshedEdge Edge);

/// <summary>Finds edges of a mesh by the text of a deck, <c>EDGE of ADHEREND</c>. Thread safe.</summary>
public sealed class EdgeFinder
{
    private readonly Mesh _mesh;
    private readonly Dictionary<string, int> _adherends;

    /// <summary>A finder for a mesh.</summary>
    public EdgeFinder(Mesh mesh)
    {
        _mesh = mesh;
        _adherends = [];
        for (int i = 0; i < mesh.Adherends.Count; i++)
            _adherends[mesh.Adherends[i].Name] = i;
    }

    /// <summary>The edge of a text such as <c>top of panel</c>; a stretch of a sheet alone stands for its upper face.</summary>
    /// <param name="text">Text as in the deck.</param>
    /// <param name="path">Key path for the error, for example <c>grips.crown.on</c>.</param>
    /// <exception cref="DeckException">When there is no such adherend or edge; the message lists what there is.</exception>
    public FoundEdge Find(string text, string path)
    {
        EdgeName name = EdgeName.Parse(text, path);
        if (!_adherends.TryGetValue(name.Adherend, out int adherend))
            throw EdgeName.NoAdherend(text, path, name.Adherend, _mesh.Adherends.Select(a => a.Name));
        if (!_mesh.Adherends[adherend].Edges.TryGetValue(name.Edge, out MeshedEdge? edge))
            throw EdgeName.NoEdge(text, path, name.Edge, name.Adherend, _mesh.Adherends[adherend].Edges.Keys);
        return new FoundEdge(adherend, name.Edge, edge);
    }
}
