using System.Text.Json;
using InterfaceFE.Benchmarks.Engine;
using InterfaceFE.Benchmarks.Models;

namespace InterfaceFE.Benchmarks.Commands;

/// <summary>Times of the engine alone on one model, and the machine's rates, as one line of JSON.</summary>
/// <param name="Rates">Rates of the machine.</param>
/// <param name="Times">Times of the engine.</param>
public sealed record TimesAnswer(MachineRates Rates, EngineTimes Times);

/// <summary>The command `times`: also how `engine` gets the figures of the 256-bit kernels, from a process in which the runtime is told to leave the wider vectors alone.</summary>
public static class TimesCommand
{
    // The first name is that of current runtimes, the second that of earlier ones.
    private static readonly Dictionary<string, string> NarrowVectors = new() { ["DOTNET_EnableAVX512"] = "0", ["DOTNET_EnableAVX512F"] = "0" };

    private static readonly TimeSpan Limit = TimeSpan.FromMinutes(20);

    /// <summary>Rounds of a run.</summary>
    public static int Rounds(bool isQuick) => isQuick ? 3 : 5;

    /// <summary>Measures and prints.</summary>
    public static int Run(CatalogueEntry entry, bool isQuick, TextWriter output)
    {
        ArgumentNullException.ThrowIfNull(entry);
        ArgumentNullException.ThrowIfNull(output);
        WarmUp.Run();
        EngineRun run = new(new BenchmarkModel(entry.Build()), isQuick);
        for (int round = 0; round < Rounds(isQuick); round++)
            run.Round();
        output.WriteLine(JsonSerializer.Serialize(new TimesAnswer(MachineMeter.Measure(), run.Times())));
        return 0;
    }

    /// <summary>Measures a model with the 256-bit kernels; null where they cannot be chosen.</summary>
    public static TimesAnswer? RunNarrow(string model, bool isQuick)
    {
        string[] arguments = isQuick ? ["times", model, "--quick"] : ["times", model];
        string? text = OwnProcess.Run(arguments, NarrowVectors, Limit);
        TimesAnswer? answer = text is null ? null : JsonSerializer.Deserialize<TimesAnswer>(text);
        return answer?.Rates.KernelWidth == 256 ? answer : null;
    }
}
