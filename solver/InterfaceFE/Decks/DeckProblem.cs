namespace InterfaceFE.Decks;

/// <summary>
/// Something wrong in a deck, found after reading. <paramref name="Path"/> is the key path by which the reader finds file, line and column,
/// for example <c>layers.tape.peel.traction</c>; list entries are numbered from 1: <c>sequence.2.pull</c>.
/// </summary>
/// <param name="Path">Key path of the place.</param>
/// <param name="Message">What was found and what would be right, one line.</param>
public sealed record DeckProblem(string Path, string Message);

/// <summary>Carries one or more <see cref="DeckProblem"/>s from expansion, meshing or model building to the command line.</summary>
public sealed class DeckException : Exception
{
    /// <summary>Makes the exception for a single problem.</summary>
    public DeckException(string path, string message) : this([new DeckProblem(path, message)])
    {
    }

    /// <summary>Makes the exception for several problems.</summary>
    public DeckException(IReadOnlyList<DeckProblem> problems) : base(string.Join(Environment.NewLine, problems.Select(p => $"{p.Path}: {p.Message}")))
    {
        Problems = problems;
    }

    /// <summary>All problems found, in the order of finding.</summary>
    public IReadOnlyList<DeckProblem> Problems { get; }
}
