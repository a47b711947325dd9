using System.Globalization;
using System.Text.Json;
using InterfaceFE.Benchmarks.Models;
using InterfaceFE.Benchmarks.Reporting;
using InterfaceFE.Benchmarks.Rivals;

namespace InterfaceFE.Benchmarks.Commands;

/// <summary>The command `iterate`: one of MathNet's sparse solvers on one model, as one line of JSON. `engine` runs it in a process that it can end.</summary>
public static class IterateCommand
{
    // Wall-clock limits, for a machine that others load as well: for building the model and the matrix, and as a multiple of the processor time.
    private const double PreparationSeconds = 60, WallFactor = 10;

    /// <summary>Solves and prints.</summary>
    public static int Run(CatalogueEntry entry, string solver, string preconditioner, double seconds, TextWriter output)
    {
        ArgumentNullException.ThrowIfNull(entry);
        ArgumentNullException.ThrowIfNull(output);
        BenchmarkModel model = new(entry.Build());
        AssembledMatrix matrix = AssembledMatrix.From(model);
        output.WriteLine(JsonSerializer.Serialize(IterativeSolvers.Solve(solver, preconditioner, matrix, matrix.Restrict(model.RightSide()), seconds)));
        return 0;
    }

    /// <summary>Tries the solvers on a model, with the incomplete factorisation, which is the better helper of the two (measured).</summary>
    /// <param name="model">Model.</param>
    /// <param name="engineMs">Whole factorisation and solve of the engine [ms].</param>
    /// <param name="isQuick">Whether to try two for a few seconds only.</param>
    public static IEnumerable<IterativeTry> TryAll(string model, double engineMs, bool isQuick)
    {
        double seconds = isQuick ? 4 : 60;
        string preconditioner = IterativeSolvers.Preconditioners.First();
        foreach (string solver in IterativeSolvers.Solvers.Take(isQuick ? 2 : int.MaxValue))
        {
            string[] arguments = ["iterate", model, solver, preconditioner, seconds.ToString(CultureInfo.InvariantCulture)];
            string? text = OwnProcess.Run(arguments, new Dictionary<string, string>(), TimeSpan.FromSeconds(WallFactor * seconds + PreparationSeconds));
            IterativeOutcome? outcome = text is null ? null : JsonSerializer.Deserialize<IterativeOutcome>(text);
            yield return new IterativeTry(model, $"{solver}-{preconditioner}", seconds, outcome, engineMs);
        }
    }
}
