namespace InterfaceFE.Sparse;

/// <summary>
/// A few vertices of each large subtree that stand for all of it where a sum over the subtree need only be known within a small factor. Chosen from the tree alone: a large front
/// takes over its children's samples, the middle vertex of each small child and its own middle vertex, and neighbours are merged until four are left. Of each the first two
/// unknowns are looked at (one where it has one only).
/// </summary>
internal sealed class SubtreeSamples
{
    /// <summary>Most samples of a subtree.</summary>
    public const int Most = 4;

    /// <summary>Unknowns of a sample.</summary>
    public const int Unknowns = 2;

    private const int Parts = 64;
    private const int LeastUnknowns = 256;

    private readonly List<Sample> _samples = [];

    /// <summary>Chooses the samples of all large subtrees.</summary>
    public SubtreeSamples(SparsePlan plan)
    {
        int least = Math.Max(LeastUnknowns, plan.InteriorUnknownCount / Parts), fronts = plan.FrontCount;
        Start = new int[fronts + 1];
        IsLarge = new bool[fronts];
        var large = new List<int>();
        var candidates = new List<Sample>();
        for (int front = 0; front < fronts; front++)
        {
            if (SubtreeUnknowns(plan, front) >= least)
            {
                IsLarge[front] = true;
                large.Add(front);
                Gather(plan, front, candidates);
                Thin(candidates);
                _samples.AddRange(candidates);
            }
            Start[front + 1] = _samples.Count;
        }
        Large = large.ToArray();
    }

    /// <summary>Whether a front's subtree is large: its samples are known.</summary>
    public bool[] IsLarge { get; }

    /// <summary>Fronts with a large subtree, rising.</summary>
    public int[] Large { get; }

    /// <summary>First sample of each front; one more entry.</summary>
    public int[] Start { get; }

    /// <summary>A sample.</summary>
    public Sample this[int index] => _samples[index];

    /// <summary>Unknowns eliminated in a subtree.</summary>
    public static int SubtreeUnknowns(SparsePlan plan, int front) => plan.First[front + 1] - plan.First[plan.FirstDescendant[front]];

    private void Gather(SparsePlan plan, int front, List<Sample> candidates)
    {
        candidates.Clear();
        for (int c = plan.ChildStart[front]; c < plan.ChildStart[front + 1]; c++)
        {
            int child = plan.Children[c];
            if (!IsLarge[child])
                candidates.Add(Middle(plan, child, SubtreeUnknowns(plan, child)));
            else
                for (int i = Start[child]; i < Start[child + 1]; i++)
                    candidates.Add(_samples[i] with { Source = child, Number = Unknowns * (i - Start[child]) });
        }
        candidates.Add(Middle(plan, front, plan.Columns(front)));
    }

    private static Sample Middle(SparsePlan plan, int front, double weight)
    {
        int first = plan.First[front], end = plan.First[front + 1], place = (first + end) / 2;
        while (place > first && VertexAt(place - 1) == VertexAt(place))
            place--;
        int count = place + 1 < end && VertexAt(place + 1) == VertexAt(place) ? Unknowns : 1;
        return new Sample(front, place - first, place, count, weight);

        int VertexAt(int at) => plan.Pattern.VertexOfUnknown[plan.OldOf[at]];
    }

    private static void Thin(List<Sample> candidates)
    {
        while (candidates.Count > Most)
        {
            int lightest = 0;
            for (int i = 1; i + 1 < candidates.Count; i++)
                if (Pair(i) < Pair(lightest))
                    lightest = i;
            Sample a = candidates[lightest], b = candidates[lightest + 1];
            candidates[lightest] = (a.Weight >= b.Weight ? a : b) with { Weight = a.Weight + b.Weight };
            candidates.RemoveAt(lightest + 1);
        }

        double Pair(int i) => candidates[i].Weight + candidates[i + 1].Weight;
    }

    /// <summary>A vertex that stands for others.</summary>
    /// <param name="Source">Front it comes from: a child, or the front itself.</param>
    /// <param name="Number">First number among the sampled unknowns of a large child, else the first pivot's number in the source front.</param>
    /// <param name="Place">Place of its first unknown.</param>
    /// <param name="Count">How many of its unknowns are looked at, 1 or 2; their places follow each other.</param>
    /// <param name="Weight">Number of unknowns it stands for.</param>
    public readonly record struct Sample(int Source, int Number, int Place, int Count, double Weight);
}
