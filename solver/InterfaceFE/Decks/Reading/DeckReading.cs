namespace InterfaceFE.Decks.Reading;

/// <summary>What came of reading a deck: the deck, or all that is wrong with it; and where each key stands, for problems found later.</summary>
public sealed class DeckReading
{
    private readonly ReadContext _context;

    internal DeckReading(Deck? deck, ReadContext context, IReadOnlyList<string> includedFiles)
    {
        _context = context;
        Problems = context.Problems.InOrder(context.File);
        Warnings = context.Warnings.InOrder(context.File);
        Deck = Problems.Count == 0 ? deck : null;
        IncludedFiles = includedFiles;
    }

    /// <summary>The deck with its included files brought in (<see cref="Deck.Include"/> is null); null when there are problems.</summary>
    public Deck? Deck { get; }

    /// <summary>All errors, in the order of the text. Each prints as one line: <c>file:line:column key.path: "value as written" message</c>.</summary>
    public IReadOnlyList<ReadProblem> Problems { get; }

    /// <summary>Doubtful values and things without effect; the deck can be used all the same.</summary>
    public IReadOnlyList<ReadProblem> Warnings { get; }

    /// <summary>Files brought in by `include`, in order, as found.</summary>
    public IReadOnlyList<string> IncludedFiles { get; }

    /// <summary>The place of a problem found after reading. When its very path is not in the text, the nearest block above it is pointed at.</summary>
    public ReadProblem Describe(DeckProblem problem)
    {
        ArgumentNullException.ThrowIfNull(problem);
        Location location = _context.Find(problem.Path, out bool isExact);
        return new ReadProblem(isExact && location.Written is not null ? location.Value : location.Key, problem.Path, isExact ? location.Written : null, problem.Message);
    }
}
