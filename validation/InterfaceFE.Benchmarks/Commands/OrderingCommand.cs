using InterfaceFE.Benchmarks.Engine;
using InterfaceFE.Benchmarks.Models;
using InterfaceFE.Benchmarks.Reporting;
using InterfaceFE.Benchmarks.Rivals;
using InterfaceFE.Sparse;

namespace InterfaceFE.Benchmarks.Commands;

/// <summary>
/// The command `ordering`: arithmetic and entries of the factor under the engine's order against those under METIS's and AMD's, all counted by CHOLMOD's symbolic analysis of the
/// same matrix, without explicit zeros. Nothing is timed, so that the figures are exact.
/// </summary>
/// <param name="output">Where the figures go.</param>
public sealed class OrderingCommand(TextWriter output)
{
    /// <summary>Counts and prints.</summary>
    /// <param name="isQuick">Whether to take the smaller strips only.</param>
    public int Run(bool isQuick)
    {
        using TemporaryFolder folder = new();
        try
        {
            CholmodProgram program = CholmodProgram.Compile(folder);
            foreach (CatalogueEntry entry in MeshCatalogue.All.Where(entry => entry.IsQuick || !isQuick))
                Count(program, folder, entry);
        }
        catch (RivalException missing)
        {
            output.WriteLine($"skipped ordering: {missing.Message}");
        }
        return 0;
    }

    private void Count(CholmodProgram program, TemporaryFolder folder, CatalogueEntry entry)
    {
        BenchmarkModel model = new(entry.Build());
        SparsePlan plan = SparsePlan.Analyze(model.Pattern);
        AssembledMatrix matrix = AssembledMatrix.From(model);
        using CholmodSession session = new(program, folder, matrix, matrix.Restrict(model.RightSide()));
        session.Analyze();
        (double nonZeros, double flops) = session.CountOrder(EngineUnderTest.OrderOf(plan, matrix));
        foreach (CholmodConfiguration other in session.Configurations.Where(c => c.Name.StartsWith("simplicial", StringComparison.Ordinal)))
        {
            string order = other.Name[(other.Name.IndexOf('-', StringComparison.Ordinal) + 1)..].ToLowerInvariant();
            output.WriteLine(new Ratio($"{entry.Name}.order-flops.{order}", flops / other.Flops));
            output.WriteLine(new Ratio($"{entry.Name}.order-entries.{order}", nonZeros / other.FactorNonZeros));
        }
        output.WriteLine(new Ratio($"{entry.Name}.merged-flops.own-order", plan.Flops / flops));
    }
}
