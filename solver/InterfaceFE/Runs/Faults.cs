using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Results;

namespace InterfaceFE.Runs;

/// <summary>Turns exceptions into lines for the user and an exit code.</summary>
internal static class Faults
{
    /// <summary>Does something with a deck that was read.</summary>
    /// <param name="reading">Where the deck's keys stand.</param>
    /// <param name="folder">Folder that is written.</param>
    /// <param name="action">What is done.</param>
    /// <param name="fail">Makes the outcome of a failure from its code and its lines.</param>
    public static T Guard<T>(DeckReading reading, string folder, Func<T> action, Func<ExitCode, IReadOnlyList<string>, T> fail)
    {
        try
        {
            return action();
        }
        catch (DeckException e)
        {
            return fail(ExitCode.WrongDeckOrCall, [.. e.Problems.Select(p => reading.Describe(p).ToString())]);
        }
        catch (ReplayException e)
        {
            return fail(ExitCode.WrongDeckOrCall, [OneLine(e)]);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            return fail(ExitCode.WrongDeckOrCall, [$"{folder}: cannot be written: {OneLine(e)}"]);
        }
        catch (OutOfMemoryException)
        {
            return fail(ExitCode.WrongDeckOrCall, ["the model does not fit into the memory of this machine: use longer elements, or keep fields at fewer points (`check` tells sizes)"]);
        }
        catch (Exception e)
        {
            string log = Path.Join(folder, "run.log");
            return fail(ExitCode.ProgramError, [$"this is an error in the program: {OneLine(e)} ({e.GetType().Name})" + (File.Exists(log) ? $"; details are in {log}" : "")]);
        }
    }

    private static string OneLine(Exception e) => e.Message.ReplaceLineEndings(" ");
}
