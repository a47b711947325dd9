using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;

namespace InterfaceFE.Runs;

/// <summary>Turns exceptions into lines for the user and an exit code.</summary>
internal static class Faults
{
    /// <summary>Does something with a deck that was read.</summary>
    /// <param name="reading">Where the deck's keys stand.</param>
    /// <param name="folder">Folder that is written.</param>
    /// <param name="action">What is done.</param>
    public static FileRunOutcome Guard(DeckReading reading, string folder, Func<FileRunOutcome> action)
    {
        try
        {
            return action();
        }
        catch (DeckException e)
        {
            return new FileRunOutcome(ExitCode.WrongDeckOrCall, [.. e.Problems.Select(p => reading.Describe(p).ToString())], null);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            return new FileRunOutcome(ExitCode.WrongDeckOrCall, [$"{folder}: cannot be written: {OneLine(e)}"], null);
        }
        catch (OutOfMemoryException)
        {
            return new FileRunOutcome(ExitCode.WrongDeckOrCall, ["the model does not fit into the memory of this machine: use longer elements, or keep fields at fewer points (`check` tells sizes)"], null);
        }
        catch (Exception e)
        {
            string log = Path.Join(folder, "run.log");
            return new FileRunOutcome(ExitCode.ProgramError, [Words(e) + (File.Exists(log) ? $"; details are in {log}" : "")], null);
        }
    }

    /// <summary>An error in the program in one line, without its place in the code.</summary>
    public static string Words(Exception e) => $"this is an error in the program: {OneLine(e)} ({e.GetType().Name})";

    private static string OneLine(Exception e) => e.Message.ReplaceLineEndings(" ");
}
