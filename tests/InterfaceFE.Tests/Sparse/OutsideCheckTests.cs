using System.ComponentModel;
using System.Diagnostics;
using System.Text.Json;
using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

/// <summary>Solutions and inertia against SciPy (splu) and NumPy (eigvalsh), two libraries that share no code with the engine; skipped where python3 has no SciPy.</summary>
public class OutsideCheckTests
{
    private static readonly TimeSpan Limit = TimeSpan.FromSeconds(60);
    private static readonly JsonSerializerOptions Names = new() { PropertyNamingPolicy = JsonNamingPolicy.CamelCase };

    [Fact]
    public async Task Layered_strips_with_softening_and_multipliers_agree_with_SciPy()
    {
        (OutsideSystem System, double[] Solution, Inertia Signs)[] own =
        [
            Strip(1, 1e3, quadratic: false, multipliers: 0, isHeld: true),
            Strip(2, 1e2, quadratic: true, multipliers: 3, isHeld: false),
            Strip(3, 1e6, quadratic: false, multipliers: 5, isHeld: true),
            General(4),
        ];
        string answer = await Run(JsonSerializer.Serialize(Array.ConvertAll(own, o => o.System), Names), TestContext.Current.CancellationToken);
        OutsideAnswer[] outside = JsonSerializer.Deserialize<OutsideAnswer[]>(answer, Names)!;
        Assert.Equal(own.Length, outside.Length);
        for (int k = 0; k < own.Length; k++)
        {
            double largest = outside[k].Solution.Max(Math.Abs);
            for (int i = 0; i < own[k].Solution.Length; i++)
                Close.To(outside[k].Solution[i], own[k].Solution[i], relative: 0, absolute: 1e-7 * largest, what: $"system {k} unknown {i}");
            if (!own[k].System.Symmetric)
                continue;
            Assert.True(outside[k].Smallest > 1e-13, $"system {k} is too close to singular to compare signs: {outside[k].Smallest}");
            Assert.Equal(new Inertia(outside[k].Positive, outside[k].Negative, 0), own[k].Signs);
            Assert.True(outside[k].Negative > 0, "the layer must soften");
        }
    }

    private static (OutsideSystem System, double[] Solution, Inertia Signs) Strip(int seed, double penalty, bool quadratic, int multipliers, bool isHeld)
    {
        var random = new Random(seed);
        var strip = new StripModel(20, 2, quadratic, penalty);
        SparseModel model = strip.Model;
        foreach (int slot in strip.LayerSlots.Skip(4).Take(12))
            model.Matrices[slot] = strip.LayerMatrix(penalty * 0.1 * (random.NextDouble() - 0.7));
        int n = model.Unknowns;
        var border = new BorderedFactor((WorkingFactor)Checks.Factored(model));
        int[] held = isHeld ? model.RootUnknowns() : [];
        List<(int Row, int Column, double Value)> entries = Entries(model);
        for (int row = 0; row < multipliers; row++)
        {
            int[] unknowns = Enumerable.Range(10 + 7 * row, 3).ToArray();
            double[] values = Checks.RandomVector(3, random);
            border.AddSymmetricRow(unknowns, values, 0);
            for (int i = 0; i < 3; i++)
                entries.AddRange([(n + row, unknowns[i], values[i]), (unknowns[i], n + row, values[i])]);
        }
        border.Factor(held);
        double[] b = Checks.RandomVector(n, random), g = Checks.RandomVector(multipliers, random), x = Checks.RandomVector(n, random), y = new double[multipliers];
        OutsideSystem system = Free(entries, [.. b, .. g], x, held, symmetric: true);
        border.Solve(b, g, x, y);
        double[] solution = [.. x, .. y];
        return (system, [.. Enumerable.Range(0, n + multipliers).Except(held).Select(i => solution[i])], border.Inertia);
    }

    private static (OutsideSystem System, double[] Solution, Inertia Signs) General(int seed)
    {
        var random = new Random(seed);
        var strip = new StripModel(40, 3, false, 1e3);
        SparseModel model = strip.Model;
        foreach (int slot in strip.LayerSlots.Skip(8).Take(20))
            model.Matrices[slot] = Array.ConvertAll(strip.LayerMatrix(-20), value => value * (1 + random.NextDouble()));
        double[] b = Checks.RandomVector(model.Unknowns, random), x = new double[b.Length];
        MultifrontalFactor factor = Checks.Factored(model, general: true);
        factor.Solve(b, x, []);
        return (Free(Entries(model), b, x, [], symmetric: false), x, factor.Inertia([]));
    }

    private static List<(int Row, int Column, double Value)> Entries(SparseModel model)
    {
        var entries = new List<(int, int, double)>();
        for (int slot = 0; slot < model.Matrices.Count; slot++)
        {
            int[] unknowns = model.Pattern.Unknowns(slot).ToArray();
            for (int i = 0; i < model.Matrices[slot].Length; i++)
                entries.Add((unknowns[i / unknowns.Length], unknowns[i % unknowns.Length], model.Matrices[slot][i]));
        }
        return entries;
    }

    /// <summary>The system without held unknowns, whose values go to the right side.</summary>
    private static OutsideSystem Free(List<(int Row, int Column, double Value)> entries, double[] right, double[] given, int[] held, bool symmetric)
    {
        double[] moved = (double[])right.Clone();
        foreach ((int row, int column, double value) in entries)
            if (held.Contains(column))
                moved[row] -= value * given[column];
        int[] free = [.. Enumerable.Range(0, right.Length).Except(held)];
        var number = new Dictionary<int, int>();
        foreach (int i in free)
            number.Add(i, number.Count);
        (int Row, int Column, double Value)[] kept = [.. entries.Where(e => number.ContainsKey(e.Row) && number.ContainsKey(e.Column))];
        return new OutsideSystem(free.Length, [.. kept.Select(e => number[e.Row])], [.. kept.Select(e => number[e.Column])], [.. kept.Select(e => e.Value)], [.. free.Select(i => moved[i])], symmetric);
    }

    /// <summary>Runs the script; skips the test where python3 or SciPy is missing or does not answer in time.</summary>
    private static async Task<string> Run(string input, CancellationToken cancellation)
    {
        (int code, _, string missing) = await Python(["-c", "import scipy.sparse.linalg"], "", cancellation);
        if (code != 0)
            Assert.Skip($"python3 has no SciPy here (apt-get install python3-scipy brings it): {missing.Trim().Split('\n')[^1]}");
        (code, string answer, string errors) = await Python([Repository.Path("tests", "InterfaceFE.Tests", "Sparse", "outside_check.py")], input, cancellation);
        Assert.True(code == 0, errors);
        return answer;
    }

    private static async Task<(int Code, string Output, string Errors)> Python(string[] arguments, string input, CancellationToken cancellation)
    {
        var start = new ProcessStartInfo("python3", arguments) { RedirectStandardInput = true, RedirectStandardOutput = true, RedirectStandardError = true };
        using var process = new Process { StartInfo = start };
        try
        {
            process.Start();
        }
        catch (Win32Exception)
        {
            Assert.Skip("there is no python3 here");
        }
        using var limit = CancellationTokenSource.CreateLinkedTokenSource(cancellation);
        limit.CancelAfter(Limit);
        try
        {
            Task<string> output = process.StandardOutput.ReadToEndAsync(limit.Token), errors = process.StandardError.ReadToEndAsync(limit.Token);
            await Send(process, input, limit.Token);
            await process.WaitForExitAsync(limit.Token);
            return (process.ExitCode, await output, await errors);
        }
        catch (OperationCanceledException) when (!cancellation.IsCancellationRequested)
        {
            process.Kill(entireProcessTree: true);
            Assert.Skip($"python3 did not answer within {Limit.TotalSeconds} s");
            throw;
        }
    }

    private static async Task Send(Process process, string input, CancellationToken cancellation)
    {
        try
        {
            await process.StandardInput.WriteAsync(input.AsMemory(), cancellation);
            process.StandardInput.Close();
        }
        catch (IOException)
        {
            // The process ended before it read all: its exit code and words tell why.
        }
    }

    private sealed record OutsideSystem(int Size, int[] Rows, int[] Columns, double[] Values, double[] Right, bool Symmetric);

    private sealed record OutsideAnswer(double[] Solution, int Positive, int Negative, double Smallest);
}
