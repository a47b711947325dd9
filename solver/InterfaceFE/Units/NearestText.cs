namespace InterfaceFE.Units;

/// <summary>Finds the nearest of several words by the number of letters added, dropped, changed or swapped (Damerau 1964, neighbouring swaps).</summary>
public static class NearestText
{
    private const int LongestCompared = 64;

    /// <summary>The nearest of the candidates; null when none is near enough to be a slip of the pen. The first of equals wins.</summary>
    public static string? Find(string text, IEnumerable<string> candidates)
    {
        string? best = null;
        int least = int.MaxValue;
        foreach (string candidate in candidates)
        {
            int distance = Distance(text, candidate);
            int allowed = Math.Max(1, Math.Max(text.Length, candidate.Length) * 2 / 5);
            if (distance > allowed || distance >= Math.Max(text.Length, candidate.Length) || distance >= least)
                continue;
            least = distance;
            best = candidate;
        }
        return best;
    }

    // Edit distance; stops at long words, which are no slips of the pen.
    private static int Distance(string a, string b)
    {
        if (a.Length > LongestCompared || b.Length > LongestCompared)
            return int.MaxValue;
        int width = b.Length + 1;
        Span<int> cost = stackalloc int[(a.Length + 1) * width];
        for (int i = 0; i <= a.Length; i++)
            cost[i * width] = i;
        for (int j = 0; j <= b.Length; j++)
            cost[j] = j;
        for (int i = 1; i <= a.Length; i++)
            for (int j = 1; j <= b.Length; j++)
            {
                int change = a[i - 1] == b[j - 1] ? 0 : 1;
                int least = Math.Min(Math.Min(cost[(i - 1) * width + j] + 1, cost[i * width + j - 1] + 1), cost[(i - 1) * width + j - 1] + change);
                if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1])
                    least = Math.Min(least, cost[(i - 2) * width + j - 2] + 1);
                cost[i * width + j] = least;
            }
        return cost[a.Length * width + b.Length];
    }
}
