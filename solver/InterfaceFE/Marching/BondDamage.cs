using InterfaceFE.Model;

namespace InterfaceFE.Marching;

/// <summary>Damage of all layer elements at the tentative and the accepted point, and what follows from it: which separations give way, which bodies still hang together.</summary>
public sealed class BondDamage
{
    /// <summary>Damage from which a point counts as separated; what it still carries is lost in the tolerance of equilibrium.</summary>
    public const double Separated = 1 - 1e-9;

    private readonly SpecimenModel _model;
    private readonly double[] _largest, _least, _acceptedLargest, _acceptedLeast;

    /// <summary>Virgin bonds of a model.</summary>
    public BondDamage(SpecimenModel model)
    {
        _model = model;
        int elements = model.Layers.Sum(l => l.Count);
        _largest = new double[elements];
        _least = new double[elements];
        _acceptedLargest = new double[elements];
        _acceptedLeast = new double[elements];
    }

    /// <summary>Takes the tentative answer of a layer element, numbered over all joints.</summary>
    internal void Take(int element, in ElementAnswer answer)
    {
        _largest[element] = answer.LargestDamage;
        _least[element] = answer.LeastDamage;
    }

    /// <summary>Makes the tentative damage the accepted one.</summary>
    internal void Accept()
    {
        Array.Copy(_largest, _acceptedLargest, _largest.Length);
        Array.Copy(_least, _acceptedLeast, _least.Length);
    }

    /// <summary>
    /// Separations that arc length watches, as pairs of unknowns: those of layer elements that are giving way at the accepted point, or of all that still carry while none is.
    /// </summary>
    public IReadOnlyList<(int Upper, int Lower)> WatchedSeparations()
    {
        List<(int, int)> pairs = Separations(e => _acceptedLargest[e] > 0 && _acceptedLeast[e] < Separated);
        return pairs.Count > 0 ? pairs : Separations(e => _acceptedLeast[e] < Separated);
    }

    private List<(int, int)> Separations(Func<int, bool> watched)
    {
        var pairs = new SortedSet<(int, int)>();
        int index = 0;
        foreach (LayerBlock layer in _model.Layers)
        {
            for (int e = 0; e < layer.Count; e++, index++)
            {
                if (!watched(index))
                    continue;
                ReadOnlySpan<int> nodes = layer.Nodes(e);
                for (int i = 0; i < layer.Stations; i++)
                {
                    int lower = _model.Unknowns.OfNode(nodes[i]), upper = _model.Unknowns.OfNode(nodes[layer.Stations + i]);
                    if (lower < 0 || upper < 0)
                        continue;
                    pairs.Add((upper, lower));
                    pairs.Add((upper + 1, lower + 1));
                }
            }
        }
        return [.. pairs];
    }

    /// <summary>
    /// Bodies of the specimen that hang together: adherends joined by at least one layer element that still carries at the accepted point. Second: length of bond that still carries,
    /// as a share of the bond at the start (1 when there is none).
    /// </summary>
    /// <param name="separated">Damage from which a point counts as separated.</param>
    public (int Bodies, double CarryingShare) Connections(double separated = Separated)
    {
        int adherends = _model.Solids.Count, bodies = adherends, index = 0;
        var parent = Enumerable.Range(0, adherends).ToArray();
        double carrying = 0, all = 0;
        foreach (LayerBlock layer in _model.Layers)
        {
            for (int e = 0; e < layer.Count; e++, index++)
            {
                all += layer.Length(e);
                if (_acceptedLeast[index] > separated)
                    continue;
                carrying += layer.Length(e);
                int a = Root(parent, layer.LowerAdherend), b = Root(parent, layer.UpperAdherend);
                if (a == b)
                    continue;
                parent[a] = b;
                bodies--;
            }
        }
        return (bodies, all > 0 ? carrying / all : 1);
    }

    /// <summary>Joints none of whose layer elements carries any more at the accepted point.</summary>
    public IReadOnlyList<string> Parted()
    {
        List<string> parted = [];
        int index = 0;
        foreach (LayerBlock layer in _model.Layers)
        {
            bool carries = layer.Count == 0;
            for (int e = 0; e < layer.Count; e++, index++)
                carries |= _acceptedLeast[index] <= Separated;
            if (!carries)
                parted.Add(layer.Name);
        }
        return parted;
    }

    private static int Root(int[] parent, int i)
    {
        while (parent[i] != i)
            i = parent[i];
        return i;
    }
}
