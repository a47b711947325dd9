using System.Globalization;
using InterfaceFE.Benchmarks.Commands;
using InterfaceFE.Benchmarks.Models;
using InterfaceFE.Benchmarks.Rivals;

string usage = $"""
    Speed of the sparse engine, as ratios of two things in one run.
      engine [--quick]     against CHOLMOD (where SuiteSparse is installed), MathNet's sparse solvers and the engine's own whole factorisation; prints `ratio NAME VALUE` lines
                           and writes validation/ENGINE.md and .csv. --quick: the two smaller strips, few repeats, below a minute, ENGINE-QUICK.md and .csv
      ordering [--quick]   arithmetic of the engine's order against METIS and AMD, exact counts
      times MODEL [--quick]                          the engine alone, as JSON
      iterate MODEL SOLVER PRECONDITIONER SECONDS    one of MathNet's solvers alone, as JSON
    Models: {string.Join(", ", MeshCatalogue.All.Select(entry => entry.Name))}
    Solvers: {string.Join(", ", IterativeSolvers.Solvers)}; preconditioners: {string.Join(", ", IterativeSolvers.Preconditioners)}
    Example: dotnet run -c Release --project validation/InterfaceFE.Benchmarks -- engine --quick
    """;

CultureInfo.CurrentCulture = CultureInfo.InvariantCulture;
try
{
    return Run(args, usage);
}
catch (Exception fault) when (fault is InvalidOperationException or IOException or UnauthorizedAccessException)
{
    Console.Error.WriteLine(fault.Message);
    return 1;
}

static int Run(string[] args, string usage)
{
    bool isQuick = args.Contains("--quick");
    string[] words = [.. args.Where(argument => argument != "--quick")];
    switch (words)
    {
        case ["--help"] or ["-h"]:
            Console.WriteLine(usage);
            return 0;
        case ["engine"]:
            if (ValidationFolder() is { } folder)
                return new EngineCommand(Console.Out, Console.Error).Run(folder, isQuick);
            Console.Error.WriteLine("InterfaceFE.sln was not found here or in a folder above: run this inside the repository");
            return 1;
        case ["ordering"]:
            return new OrderingCommand(Console.Out).Run(isQuick);
        case ["times", var model] when Find(model) is { } entry:
            return TimesCommand.Run(entry, isQuick, Console.Out);
        case ["iterate", var model, var solver, var preconditioner, var limit]
            when Find(model) is { } entry && IterativeSolvers.Solvers.Contains(solver) && IterativeSolvers.Preconditioners.Contains(preconditioner)
                && double.TryParse(limit, NumberStyles.Float, CultureInfo.InvariantCulture, out double seconds) && seconds > 0 && !isQuick:
            return IterateCommand.Run(entry, solver, preconditioner, seconds, Console.Out);
        default:
            if (words.Length > 0)
                Console.Error.WriteLine($"'{string.Join(' ', args)}' is not understood");
            Console.Error.WriteLine(usage);
            return 1;
    }
}

static CatalogueEntry? Find(string model) => MeshCatalogue.All.FirstOrDefault(entry => entry.Name == model);

static string? ValidationFolder()
{
    for (DirectoryInfo? at = new(Directory.GetCurrentDirectory()); at is not null; at = at.Parent)
        if (File.Exists(Path.Combine(at.FullName, "InterfaceFE.sln")))
            return Path.Combine(at.FullName, "validation");
    return null;
}
