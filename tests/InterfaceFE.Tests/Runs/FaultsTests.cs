using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Tests.Cli;
using InterfaceFE.Tests.Results;
using Xunit;

namespace InterfaceFE.Tests.Runs;

[Collection(DiskCollection.Name)]
public class FaultsTests
{
    private static readonly DeckReading Reading = DeckReader.ReadText(TinyDeck.Text(), "deck.yaml");

    [Fact]
    public void Faults_become_lines_with_the_code_of_their_kind()
    {
        Assert.Equal((ExitCode.WrongDeckOrCall, "deck.yaml:14:3 joints.bond: no"), Outcome(new DeckException("joints.bond", "no")));
        Assert.Equal((ExitCode.WrongDeckOrCall, "none: cannot be written: full"), Outcome(new IOException("full")));
        Assert.Equal((ExitCode.WrongDeckOrCall, "none: cannot be written: not yours"), Outcome(new UnauthorizedAccessException("not yours")));
        Assert.Equal(ExitCode.WrongDeckOrCall, Outcome(new InsufficientMemoryException()).Code);
        Assert.Equal((ExitCode.ProgramError, "this is an error in the program: two lines (InvalidOperationException)"), Outcome(new InvalidOperationException("two\nlines")));
    }

    [Fact]
    public void Error_in_the_program_leaves_its_details_in_the_log_and_keeps_the_tables()
    {
        using TemporaryFolder temporary = new();
        FolderRun run = new(temporary.File("out"), line =>
        {
            if (line.Contains("point 1:", StringComparison.Ordinal))
                throw new InvalidOperationException("made for the test");
        });
        Assert.Throws<InvalidOperationException>(() => run.Execute(Reading.Deck!, [], TestContext.Current.CancellationToken));
        string log = File.ReadAllText(temporary.File("out/run.log"));
        Assert.Contains("made for the test", log, StringComparison.Ordinal);
        Assert.Contains("   at ", log, StringComparison.Ordinal);
        // Header, the start, point 1.
        Assert.Equal(3, File.ReadLines(temporary.File("out/grips.csv")).Count());
    }

    [Fact]
    public void File_that_the_disk_refuses_stops_the_run_early_and_keeps_the_others()
    {
        using TemporaryFolder temporary = new();
        string taken = temporary.File("out/fields/solids-0010.vtu");
        FolderRun run = new(temporary.File("out"), line =>
        {
            // A folder where a file is due: the disk refuses it, whoever runs the test.
            if (line.Contains("point 1:", StringComparison.Ordinal))
                Directory.CreateDirectory(Path.Join(taken, "in the way"));
        });
        Deck deck = Reading.Deck! with { March = new MarchDeck { FirstStride = 0.02, LargestStride = 0.02 } };
        RunSummary summary = run.Execute(deck, [], TestContext.Current.CancellationToken).Summary;
        Assert.Equal(RunStatus.StoppedEarly, summary.Status);
        Assert.Contains("could not be written", summary.Cause, StringComparison.Ordinal);
        Assert.Equal(12, File.ReadLines(temporary.File("out/grips.csv")).Count());
        Assert.Contains("\"stopped early\"", File.ReadAllText(temporary.File("out/summary.json")), StringComparison.Ordinal);
        Assert.Contains("stopped early", File.ReadAllText(temporary.File("out/run.log")), StringComparison.Ordinal);
    }

    private static (ExitCode Code, string Line) Outcome(Exception fault)
    {
        (ExitCode code, IReadOnlyList<string> lines) = Faults.Guard<(ExitCode, IReadOnlyList<string>)>(Reading, "none", () => throw fault, (c, l) => (c, l));
        return (code, Assert.Single(lines));
    }
}
