using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

public class WorkingFactorTests
{
    [Theory]
    [InlineData(7, 2, false, 1)]
    [InlineData(30, 3, false, 1e3)]
    [InlineData(6, 2, true, 10)]
    [InlineData(9, 3, true, 1e2)]
    public void Layered_strips_solve_as_the_dense_matrix(int columns, int rows, bool quadratic, double penalty)
    {
        var random = new Random(columns);
        SparseModel model = new StripModel(columns, rows, quadratic, penalty).Model;
        MultifrontalFactor factor = Checks.Factored(model);
        int[] root = model.RootUnknowns();
        foreach (int[] held in new[] { [], root, [root[1]], root[..3] })
        {
            // Condition numbers here are below 1e8.
            Checks.SolvesAsDense(model, factor, held, random, 1e-8);
            Checks.HasDenseInertia(model, factor, held);
        }
    }

    [Theory]
    [InlineData(1e0)]
    [InlineData(1e2)]
    [InlineData(1e4)]
    [InlineData(1e5)]
    [InlineData(1e6)]
    [InlineData(1e7)]
    public void Stiff_layers_leave_a_small_backward_error(double penalty)
    {
        SparseModel model = new StripModel(60, 4, false, penalty).Model;
        SparsePlan plan = SparsePlan.Analyze(model.Pattern);
        var factor = new WorkingFactor(plan);
        model.Load(factor);
        FactorOutcome outcome = factor.Factor();
        Assert.Equal(FactorStatus.Done, outcome.Status);
        var random = new Random(3);
        double[] b = Checks.RandomVector(model.Unknowns, random), x = new double[b.Length];
        factor.Solve(b, x, []);
        Close.To(0, Checks.BackwardError(model, b, x, []), absolute: 1e-14);
        Assert.Equal(new Inertia(model.Unknowns, 0, 0), factor.Inertia([]));
    }

    [Theory]
    [InlineData(1, 1e0)]
    [InlineData(2, 1e1)]
    [InlineData(3, 1e3)]
    [InlineData(4, 1e3)]
    [InlineData(5, 1e2)]
    public void Softening_layers_give_the_signs_of_the_dense_eigenvalues(int seed, double penalty)
    {
        var random = new Random(seed);
        var strip = new StripModel(seed % 2 == 0 ? 9 : 18, 2, seed % 2 == 0, penalty);
        SparseModel model = strip.Model;
        MultifrontalFactor factor = Checks.Factored(model);
        int[] root = model.RootUnknowns();
        for (int change = 0; change < 4; change++)
        {
            foreach (int slot in strip.LayerSlots.Skip(1))
                if (random.NextDouble() < 0.6)
                {
                    model.Matrices[slot] = strip.LayerMatrix(penalty * (random.NextDouble() - 0.7) * 0.3);
                    factor.Replace(slot, model.Matrices[slot]);
                }
            factor.Factor();
            foreach (int[] held in new[] { [], root, root[..2] })
            {
                Checks.HasDenseInertia(model, factor, held);
                Checks.SolvesAsDense(model, factor, held, random, 1e-6);
            }
        }
    }

    [Fact]
    public void Order_of_slots_does_not_matter()
    {
        var random = new Random(11);
        SparseModel model = new StripModel(25, 3, true, 100).Model, shuffled = model.Shuffled(random);
        double[] b = Checks.RandomVector(model.Unknowns, random), x = new double[b.Length], y = new double[b.Length];
        int[] held = model.RootUnknowns();
        foreach (int h in held)
            x[h] = y[h] = 1e-2 * h;
        Checks.Factored(model).Solve(b, x, held);
        Checks.Factored(shuffled).Solve(b, y, held);
        double largest = x.Max(Math.Abs);
        for (int i = 0; i < x.Length; i++)
            Close.To(x[i], y[i], relative: 0, absolute: 1e-12 * largest, what: $"unknown {i}");
    }

    [Fact]
    public void Same_numbers_give_the_same_bytes()
    {
        SparseModel model = new StripModel(40, 3, false, 1e3).Model;
        double[] b = Checks.RandomVector(model.Unknowns, new Random(5)), x = new double[b.Length], y = new double[b.Length], z = new double[b.Length];
        MultifrontalFactor first = Checks.Factored(model), second = Checks.Factored(model);
        first.Solve(b, x, []);
        second.Solve(b, y, []);
        first.Factor();
        first.Solve(b, z, []);
        Assert.Equal(x, y);
        Assert.Equal(x, z);
    }

    [Fact]
    public void Nothing_is_allocated_after_the_first_call()
    {
        var strip = new StripModel(40, 3, false, 1e3);
        SparseModel model = strip.Model;
        foreach (bool general in new[] { false, true })
        {
            MultifrontalFactor factor = Checks.Factored(model, general);
            double[] b = Checks.RandomVector(model.Unknowns, new Random(5)), x = new double[b.Length], product = new double[b.Length];
            int[] held = model.RootUnknowns();
            Cycle();
            Cycle();
            long before = GC.GetAllocatedBytesForCurrentThread();
            for (int i = 0; i < 5; i++)
                Cycle();
            Assert.Equal(0, GC.GetAllocatedBytesForCurrentThread() - before);

            void Cycle()
            {
                factor.Replace(strip.LayerSlots[3], model.Matrices[strip.LayerSlots[3]]);
                factor.Factor();
                factor.Solve(b, x, held);
                factor.Solve(b, x, []);
                factor.Inertia(held);
                factor.Multiply(x, product);
            }
        }
    }

    [Fact]
    public void Random_small_systems_solve_as_the_dense_matrix()
    {
        for (int seed = 0; seed < 300; seed++)
        {
            var random = new Random(seed);
            SparseModel model = RandomModel(random, symmetric: true);
            if (model.Unknowns == 0 || model.Dense().ConditionNumber() > 1e8)
                continue;
            MultifrontalFactor factor = Checks.Factored(model, options: new PlanOptions(LeafVertices: 1 + seed % 5));
            int[] root = model.RootUnknowns();
            Checks.SolvesAsDense(model, factor, [], random, 1e-6);
            Checks.HasDenseInertia(model, factor, []);
            int[] held = root.Where(_ => random.Next(2) == 0).ToArray();
            if (held.Length < model.Unknowns && Free(model, held) < 1e8)
            {
                Checks.SolvesAsDense(model, factor, held, random, 1e-6);
                Checks.HasDenseInertia(model, factor, held);
            }
        }
    }

    /// <summary>Indefinite random slots on random vertices, mostly scattered; some vertices have no unknown, some are root.</summary>
    internal static SparseModel RandomModel(Random random, bool symmetric)
    {
        var model = new SparseModel();
        int vertices = random.Next(1, 40);
        var unknowns = new List<int[]>();
        for (int v = 0; v < vertices; v++)
        {
            int count = random.Next(0, 5), first = model.Vertex(random.NextDouble(), random.NextDouble() * 0.1, count, random.Next(5) == 0, random.Next(3) == 0);
            unknowns.Add(Enumerable.Range(first, count).ToArray());
        }
        for (int slot = 0; slot < 2 * vertices; slot++)
        {
            int[] members = Enumerable.Range(0, random.Next(1, 5)).Select(_ => random.Next(vertices)).Distinct().SelectMany(v => unknowns[v]).ToArray();
            AddRandom(model, members, random, symmetric);
        }
        for (int u = 0; u < model.Unknowns; u++)
            AddRandom(model, [u], random, symmetric);
        return model;
    }

    private static void AddRandom(SparseModel model, int[] members, Random random, bool symmetric)
    {
        int m = members.Length;
        var matrix = new double[m * m];
        for (int r = 0; r < m; r++)
            for (int c = 0; c < m; c++)
                matrix[r * m + c] = symmetric && c < r ? matrix[c * m + r] : random.NextDouble() - 0.5;
        model.Slot(members, matrix);
    }

    private static double Free(SparseModel model, int[] held)
    {
        int[] free = Enumerable.Range(0, model.Unknowns).Except(held).ToArray();
        var dense = model.Dense();
        return MathNet.Numerics.LinearAlgebra.Double.DenseMatrix.Create(free.Length, free.Length, (i, j) => dense[free[i], free[j]]).ConditionNumber();
    }
}
