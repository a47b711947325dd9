using InterfaceFE.Benchmarks.Models;

namespace InterfaceFE.Benchmarks.Engine;

/// <summary>Runs the engine on small strips until the runtime has compiled its loops for good, so that no measurement meets code that is still being compiled.</summary>
public static class WarmUp
{
    private const int Passes = 4, RoundsPerPass = 2;

    // The runtime compiles in the background once calls have been quiet for a tenth of a second.
    private static readonly TimeSpan BackgroundCompilation = TimeSpan.FromMilliseconds(250);

    /// <summary>Does so, for both kinds of elements.</summary>
    public static void Run()
    {
        foreach (int nodes in (ReadOnlySpan<int>)[4, 8])
        {
            EngineRun run = new(new BenchmarkModel(MeshCatalogue.Strip("warm-up", nodes, 400, 4)), isQuick: true);
            for (int pass = 0; pass < Passes; pass++)
            {
                for (int round = 0; round < RoundsPerPass; round++)
                    run.Round();
                Thread.Sleep(BackgroundCompilation);
            }
        }
    }
}
