namespace InterfaceFE.Model;

/// <summary>
/// Load trains as springs: force = k·(crosshead - grip) on the grip, its opposite on the crosshead, ½·k·(crosshead - grip)² stored. The crosshead is what the sequence holds, so that stability under
/// given travel is that with the machine's compliance.
/// </summary>
public sealed class LoadTrainBlock : IElementBlock
{
    private readonly double[] _stiffness;
    private readonly int[] _unknowns, _nodes;

    /// <summary>Makes the springs of all load trains of a map.</summary>
    public LoadTrainBlock(UnknownMap map)
    {
        _stiffness = [.. map.LoadTrains.Select(t => t.Stiffness)];
        _unknowns = [.. map.LoadTrains.SelectMany(t => (int[])[map.OfCrosshead(t), map.OfBody(t.Body, t.Component)])];
        _nodes = [.. map.LoadTrains.Select(t => map.Bodies[t.Body].Nodes[0])];
    }

    /// <inheritdoc/>
    public string Name => "load train";

    /// <inheritdoc/>
    public int Count => _stiffness.Length;

    /// <inheritdoc/>
    public int NodesPerElement => 1;

    /// <inheritdoc/>
    public int StateSize => 0;

    /// <inheritdoc/>
    public TangentKind Kind => TangentKind.Constant;

    /// <summary>A node of the grip, which says where the spring acts.</summary>
    public ReadOnlySpan<int> Nodes(int element) => _nodes.AsSpan(element, 1);

    /// <summary>Crosshead and grip.</summary>
    public ReadOnlySpan<int> OwnUnknowns(int element) => _unknowns.AsSpan(2 * element, 2);

    /// <inheritdoc/>
    public ElementAnswer Evaluate(int element, in PathPoint at, ReadOnlySpan<double> displacement, ReadOnlySpan<double> accepted, Span<double> tentative, Wanted wanted, in ElementBuffers into)
    {
        double k = _stiffness[element], stretch = displacement[0] - displacement[1];
        into.Force[0] = k * stretch;
        into.Force[1] = -k * stretch;
        if ((wanted & Wanted.Tangent) != 0)
        {
            into.Tangent[0] = into.Tangent[3] = k;
            into.Tangent[1] = into.Tangent[2] = -k;
        }
        if ((wanted & Wanted.LoadRate) != 0)
            into.LoadRate.Clear();
        if ((wanted & Wanted.Dissipation) != 0)
            into.Dissipation.Clear();
        return new ElementAnswer(0.5 * k * stretch * stretch, 0, 0, 0, 0, 0, false);
    }
}
