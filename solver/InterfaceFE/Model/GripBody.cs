namespace InterfaceFE.Model;

/// <summary>
/// Nodes that a grip holds: either one rigid body with three unknowns (ux, uy of its pin and rotation) on which its nodes depend, or points that keep their own unknowns.
/// </summary>
public sealed class GripBody
{
    /// <summary>Name for messages: the edge it sits on.</summary>
    public required string Name { get; init; }

    /// <summary>Whether the nodes move as one rigid body.</summary>
    public required bool Rigid { get; init; }

    /// <summary>Nodes, in order along the edge.</summary>
    public required int[] Nodes { get; init; }

    /// <summary>x of the pin [mm].</summary>
    public required double PinX { get; init; }

    /// <summary>y of the pin [mm].</summary>
    public required double PinY { get; init; }
}

/// <summary>A grip of the deck: its bodies.</summary>
/// <param name="Name">Name in the deck.</param>
/// <param name="Bodies">Indices of its bodies; one, unless the deck lists several edges.</param>
public sealed record Grip(string Name, IReadOnlyList<int> Bodies)
{
    /// <summary>Its load trains, one for each axis along which it is pulled; empty when the grip itself is driven.</summary>
    public IReadOnlyList<LoadTrain> LoadTrains { get; init; } = [];
}
