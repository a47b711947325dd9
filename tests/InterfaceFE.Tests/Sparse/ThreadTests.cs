using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

/// <summary>Two threads leave the bytes of one on trees of every shape, and factors of one plan may work at the same time.</summary>
public class ThreadTests
{
    // Below this many operations the work stays on one thread.
    private const double Shared = 2e7;

    [Theory]
    [InlineData("one front", 0, 0)]
    [InlineData("giant and dwarf", 1, 1)]
    [InlineData("pieces", 2, 400)]
    [InlineData("pieces on a root", 2, 400)]
    [InlineData("path of cliques", 0, 400)]
    public void Two_threads_leave_the_bytes_of_one_on_odd_trees(string shape, int leastBranches, int mostBranches)
    {
        foreach (bool general in new[] { false, true })
        {
            var random = new Random(shape.Length);
            SparseModel model = Shape(shape, random);
            MultifrontalFactor one = Checks.Loaded(model, general), two = general ? new GeneralFactor(one.Plan) : new WorkingFactor(one.Plan);
            Assert.True(one.Plan.Flops > Shared, $"too small to be shared: {one.Plan.Flops}");
            Assert.InRange(one.Plan.Branches.Branches.Length, leastBranches, mostBranches);
            two.Threads = 2;
            model.Load(two);
            for (int change = 0; change < 4; change++)
            {
                FactorOutcome expected = one.Factor();
                Assert.Equal(expected, two.Factor());
                if (expected.Status != FactorStatus.NotFinite)
                {
                    Checks.SameBytes(one, two, [], random);
                    Checks.SameBytes(one, two, model.RootUnknowns(), random);
                }
                int slot = random.Next(model.Matrices.Count);
                double share = change == 1 ? 0 : change == 2 ? 1e200 : -random.NextDouble();
                double[] matrix = Array.ConvertAll(model.Matrices[slot], value => share * value);
                one.Replace(slot, matrix);
                two.Replace(slot, matrix);
                if (change % 2 == 0)
                    two.ForgetFactor();
            }
        }
    }

    [Fact]
    public async Task Factors_of_one_plan_work_at_the_same_time_and_leave_the_bytes_that_each_leaves_alone()
    {
        var strip = new StripModel(300, 6, true, 1e3);
        SparseModel model = strip.Model;
        SparsePlan plan = SparsePlan.Analyze(model.Pattern);
        Assert.True(plan.Flops > Shared, $"too small to be shared: {plan.Flops}");
        double[][] alone = [Work(strip, plan, 0, 1), Work(strip, plan, 1, 1), Work(strip, plan, 2, 1)];
        double[][] together = await Task.WhenAll(Enumerable.Range(0, 3).Select(seed => Task.Run(() => Work(strip, plan, seed, 2), TestContext.Current.CancellationToken)));
        Assert.Equal(alone[0], together[0]);
        Assert.Equal(alone[1], together[1]);
        Assert.Equal(alone[2], together[2]);
        Assert.NotEqual(alone[0], alone[1]);
    }

    /// <summary>Solutions after each of some random changes.</summary>
    private static double[] Work(StripModel strip, SparsePlan plan, int seed, int threads)
    {
        var random = new Random(seed);
        MultifrontalFactor factor = seed == 2 ? new GeneralFactor(plan) : new WorkingFactor(plan);
        factor.Threads = threads;
        strip.Model.Load(factor);
        var solutions = new List<double>();
        var x = new double[plan.UnknownCount];
        for (int change = 0; change < 4; change++)
        {
            foreach (int slot in strip.LayerSlots.Skip(random.Next(290)).Take(random.Next(10)))
                factor.Replace(slot, strip.LayerMatrix(-random.NextDouble()));
            if (change == 2)
                factor.ForgetFactor();
            factor.Factor();
            factor.Solve(Checks.RandomVector(x.Length, random), x, []);
            solutions.AddRange(x);
        }
        return [.. solutions];
    }

    private static SparseModel Shape(string shape, Random random)
    {
        var model = new SparseModel();
        switch (shape)
        {
            case "one front":
                Clique(model, Vertices(model, 84, 0, random), random);
                break;
            case "giant and dwarf":
                Clique(model, Vertices(model, 84, 0, random), random);
                Clique(model, Vertices(model, 4, 5, random), random);
                break;
            case "pieces":
            case "pieces on a root":
                int[] root = shape == "pieces" ? [] : Enumerable.Range(model.Vertex(0, 0, 4, root: true), 4).ToArray();
                for (int piece = 0; piece < 25; piece++)
                    Clique(model, [.. Vertices(model, 30, 2 * piece, random), .. root], random);
                break;
            default:
                int[] before = Vertices(model, 12, 0, random);
                for (int clique = 1; clique < 60; clique++)
                {
                    int[] next = Vertices(model, 12, 2 * clique, random);
                    Clique(model, [.. before, .. next], random);
                    before = next;
                }
                break;
        }
        return model;
    }

    /// <summary>Some vertices of five unknowns each; returns the unknowns.</summary>
    private static int[] Vertices(SparseModel model, int count, double x, Random random)
    {
        int first = model.Unknowns;
        for (int v = 0; v < count; v++)
            model.Vertex(x + random.NextDouble(), random.NextDouble(), 5, changeable: random.Next(3) == 0);
        return [.. Enumerable.Range(first, 5 * count)];
    }

    private static void Clique(SparseModel model, int[] unknowns, Random random)
    {
        int m = unknowns.Length;
        var matrix = new double[m * m];
        for (int r = 0; r < m; r++)
            for (int c = 0; c <= r; c++)
                matrix[r * m + c] = matrix[c * m + r] = random.NextDouble() - 0.5 + (r == c ? 4 * (r % 5 == 0 ? -1 : 1) : 0);
        model.Slot(unknowns, matrix);
    }
}
