namespace InterfaceFE.Model;

/// <summary>
/// Accepted and tentative state of all elements, flat arrays per block. Tentative state is always computed from accepted state, so going back is free;
/// only the march accepts.
/// </summary>
public sealed class StateStore
{
    private readonly double[][] _accepted;
    private readonly double[][] _tentative;
    private readonly int[] _size;

    /// <summary>Makes a store of virgin state (zeros) for the blocks.</summary>
    public StateStore(IReadOnlyList<IElementBlock> blocks)
    {
        _size = [.. blocks.Select(b => b.StateSize)];
        _accepted = [.. blocks.Select(b => new double[checked(b.Count * b.StateSize)])];
        _tentative = [.. blocks.Select(b => new double[checked(b.Count * b.StateSize)])];
    }

    /// <summary>State of an element at the accepted point.</summary>
    public ReadOnlySpan<double> Accepted(int block, int element) => _accepted[block].AsSpan(element * _size[block], _size[block]);

    /// <summary>State of an element at the tentative separation.</summary>
    public Span<double> Tentative(int block, int element) => _tentative[block].AsSpan(element * _size[block], _size[block]);

    /// <summary>Makes the tentative state of every element the accepted one.</summary>
    public void Accept()
    {
        for (int block = 0; block < _accepted.Length; block++)
            Array.Copy(_tentative[block], _accepted[block], _accepted[block].Length);
    }
}
