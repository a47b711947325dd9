namespace InterfaceFE.Sparse;

/// <summary>Graph of the vertices that carry unknowns: two are neighbours when a slot has unknowns of both. Checks the pattern on the way.</summary>
internal sealed class VertexGraph
{
    private VertexGraph(int[] firstUnknown, int[] weight, bool[] isChangeable, int[] slotVertexStart, int[] slotVertices)
    {
        IsChangeable = isChangeable;
        FirstUnknown = firstUnknown;
        Weight = weight;
        (Start, Neighbours) = Connect(weight.Length, slotVertexStart, slotVertices);
    }

    /// <summary>Number of vertices.</summary>
    public int Count => Weight.Length;

    /// <summary>First unknown of each vertex; meaningless where the weight is 0.</summary>
    public int[] FirstUnknown { get; }

    /// <summary>Number of unknowns of each vertex.</summary>
    public int[] Weight { get; }

    /// <summary>Whether element matrices at a vertex are expected to change.</summary>
    public bool[] IsChangeable { get; }

    /// <summary>Start of each vertex's neighbours; one more entry than vertices.</summary>
    public int[] Start { get; }

    /// <summary>Neighbours, vertex after vertex, without the vertex itself.</summary>
    public int[] Neighbours { get; }

    /// <summary>Builds the graph of a pattern.</summary>
    /// <exception cref="ArgumentException">The pattern contradicts itself; the message says where.</exception>
    public static VertexGraph FromPattern(SlotPattern pattern)
    {
        (int[] firstUnknown, int[] weight) = UnknownsOfVertices(pattern);
        int slots = pattern.SlotStart.Length - 1;
        if (slots < 0 || pattern.SlotStart[0] != 0 || pattern.SlotStart[slots] != pattern.SlotUnknowns.Length)
            throw new ArgumentException("SlotStart must run from 0 to the length of SlotUnknowns.", nameof(pattern));
        var start = new int[slots + 1];
        var vertices = new List<int>(pattern.SlotUnknowns.Length / 2 + 1);
        var vertexSeen = new int[weight.Length];
        var unknownSeen = new int[pattern.UnknownCount];
        for (int slot = 0; slot < slots; slot++)
        {
            if (pattern.SlotStart[slot + 1] < pattern.SlotStart[slot])
                throw new ArgumentException($"SlotStart falls at slot {slot}.", nameof(pattern));
            foreach (int unknown in pattern.Unknowns(slot))
            {
                if ((uint)unknown >= (uint)pattern.UnknownCount)
                    throw new ArgumentException($"Slot {slot} names unknown {unknown}; there are {pattern.UnknownCount}.", nameof(pattern));
                if (unknownSeen[unknown] == slot + 1)
                    throw new ArgumentException($"Slot {slot} names unknown {unknown} twice.", nameof(pattern));
                unknownSeen[unknown] = slot + 1;
                int vertex = pattern.VertexOfUnknown[unknown];
                if (vertexSeen[vertex] == slot + 1)
                    continue;
                vertexSeen[vertex] = slot + 1;
                vertices.Add(vertex);
            }
            start[slot + 1] = vertices.Count;
        }
        return new VertexGraph(firstUnknown, weight, pattern.IsChangeable, start, vertices.ToArray());
    }

    private static (int[] FirstUnknown, int[] Weight) UnknownsOfVertices(SlotPattern pattern)
    {
        int count = pattern.VertexX.Length;
        if (pattern.VertexY.Length != count || pattern.IsRoot.Length != count || pattern.IsChangeable.Length != count)
            throw new ArgumentException($"VertexX, VertexY, IsRoot and IsChangeable must have one length; VertexX has {count}.", nameof(pattern));
        if (pattern.VertexOfUnknown.Length != pattern.UnknownCount)
            throw new ArgumentException($"VertexOfUnknown has {pattern.VertexOfUnknown.Length} entries for {pattern.UnknownCount} unknowns.", nameof(pattern));
        for (int v = 0; v < count; v++)
            if (!double.IsFinite(pattern.VertexX[v]) || !double.IsFinite(pattern.VertexY[v]))
                throw new ArgumentException($"Vertex {v} has a coordinate that is not finite.", nameof(pattern));
        var first = new int[count];
        var weight = new int[count];
        for (int unknown = 0; unknown < pattern.UnknownCount; unknown++)
        {
            int vertex = pattern.VertexOfUnknown[unknown];
            if ((uint)vertex >= (uint)count)
                throw new ArgumentException($"Unknown {unknown} names vertex {vertex}; there are {count}.", nameof(pattern));
            if (weight[vertex] == 0)
                first[vertex] = unknown;
            else if (first[vertex] + weight[vertex] != unknown)
                throw new ArgumentException($"Unknowns of vertex {vertex} are not numbered without gap (unknown {unknown}).", nameof(pattern));
            weight[vertex]++;
        }
        return (first, weight);
    }

    private static (int[] Start, int[] Neighbours) Connect(int count, int[] slotStart, int[] slotVertices)
    {
        var ofVertex = new int[count + 1];
        foreach (int v in slotVertices)
            ofVertex[v + 1]++;
        for (int v = 0; v < count; v++)
            ofVertex[v + 1] += ofVertex[v];
        var slotsOf = new int[slotVertices.Length];
        int[] fill = ofVertex.AsSpan(0, count).ToArray();
        for (int slot = 0; slot + 1 < slotStart.Length; slot++)
            for (int p = slotStart[slot]; p < slotStart[slot + 1]; p++)
                slotsOf[fill[slotVertices[p]]++] = slot;
        var start = new int[count + 1];
        var neighbours = new List<int>(slotVertices.Length * 3);
        var seen = new int[count];
        for (int v = 0; v < count; v++)
        {
            seen[v] = v + 1;
            for (int q = ofVertex[v]; q < ofVertex[v + 1]; q++)
                for (int p = slotStart[slotsOf[q]]; p < slotStart[slotsOf[q] + 1]; p++)
                {
                    int w = slotVertices[p];
                    if (seen[w] == v + 1)
                        continue;
                    seen[w] = v + 1;
                    neighbours.Add(w);
                }
            start[v + 1] = neighbours.Count;
        }
        return (start, neighbours.ToArray());
    }
}
