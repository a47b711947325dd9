namespace InterfaceFE.Decks.Reading;

/// <summary>Collects problems while a deck is read. Far more than a person can use are counted only.</summary>
internal sealed class ProblemList
{
    private const int MostKept = 300;
    private readonly List<ReadProblem> _problems = [];
    private readonly HashSet<(TextPlace Place, string Path, string Message)> _known = [];
    private int _dropped;

    /// <summary>Whether nothing was found.</summary>
    public bool IsEmpty => _problems.Count == 0;

    /// <summary>Adds a problem; the same one twice is kept once.</summary>
    public void Add(TextPlace place, string path, string? written, string message)
    {
        if (_problems.Count >= MostKept)
            _dropped++;
        else if (_known.Add((place, path, message)))
            _problems.Add(new ReadProblem(place, path, written, message));
    }

    /// <summary>All problems in the order of the text, those of the first file first.</summary>
    public IReadOnlyList<ReadProblem> InOrder(string firstFile)
    {
        List<ReadProblem> sorted =
        [
            .. _problems.OrderBy(p => p.Place.File == firstFile ? 0 : 1).ThenBy(p => p.Place.File, StringComparer.Ordinal).ThenBy(p => p.Place.Line).ThenBy(p => p.Place.Column),
        ];
        if (_dropped > 0)
            sorted.Add(new ReadProblem(new TextPlace(firstFile, 0, 0), "", null, string.Create(System.Globalization.CultureInfo.InvariantCulture, $"and {_dropped} more; these come once the first are right")));
        return sorted;
    }
}
