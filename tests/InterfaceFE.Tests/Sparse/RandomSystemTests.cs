using CsCheck;
using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

/// <summary>Properties of the engine on random graphs with up to five unknowns at a vertex and random flags; CsCheck prints the seed of a system that fails.</summary>
public class RandomSystemTests
{
    private const double Regular = 1e7;

    [Fact]
    public void Random_systems_are_solved_and_counted_as_dense_ones() => Gen.Int[0, int.MaxValue].Sample(seed => SolvesAsDense(seed), iter: 100, threads: 1);

    [Fact]
    public void The_order_of_slots_and_of_unknowns_is_immaterial() => Gen.Int[0, int.MaxValue].Sample(seed => IgnoresOrder(seed), iter: 80, threads: 1);

    [Fact]
    public void Random_histories_leave_the_bytes_of_a_whole_factorisation() => Gen.Int[0, int.MaxValue].Sample(seed => ForgetsHistory(seed), iter: 60, threads: 1);

    [Fact]
    public void Paths_and_many_right_sides_give_the_values_of_whole_solves() => Gen.Int[0, int.MaxValue].Sample(seed => SolvesInParts(seed), iter: 100, threads: 1);

    [Fact]
    public void Bordered_systems_are_solved_to_round_off() => Gen.Int[0, int.MaxValue].Sample(seed => SolvesBordered(seed), iter: 100, threads: 1);

    private static void SolvesAsDense(int seed)
    {
        var random = new Random(seed);
        SparseModel model = RandomSystem(random, out bool general);
        MultifrontalFactor factor = Checks.Factored(model, general, Options(random));
        int[] root = model.RootUnknowns();
        foreach (int[] held in new[] { [], Some(root, random), root })
        {
            if (!IsRegular(model, held))
                continue;
            Checks.SolvesAsDense(model, factor, held, random, 1e-6);
            if (!general && factor.Inertia(held).Zero == 0)
                Checks.HasDenseInertia(model, factor, held);
        }
    }

    private static void IgnoresOrder(int seed)
    {
        var random = new Random(seed);
        SparseModel model = RandomSystem(random, out bool general), shuffled = model.Shuffled(random);
        if (!IsRegular(model, []))
            return;
        PlanOptions options = Options(random);
        MultifrontalFactor factor = Checks.Factored(model, general, options), other = Checks.Factored(shuffled, general, options);
        double[] b = Checks.RandomVector(model.Unknowns, random), x = new double[b.Length], y = new double[b.Length];
        factor.Solve(b, x, []);
        other.Solve(b, y, []);
        double largest = x.Max(Math.Abs);
        for (int i = 0; i < x.Length; i++)
            Close.To(x[i], y[i], relative: 0, absolute: 1e-7 * largest, what: $"unknown {i}");
        if (!general && factor.Inertia([]).Zero == 0 && other.Inertia([]).Zero == 0)
            Assert.Equal(factor.Inertia([]), other.Inertia([]));
    }

    private static void ForgetsHistory(int seed)
    {
        var random = new Random(seed);
        SparseModel model = RandomSystem(random, out bool general);
        MultifrontalFactor partial = Checks.Loaded(model, general, Options(random));
        int[] root = model.RootUnknowns();
        for (int change = 0; change < 8; change++)
        {
            for (int count = random.Next(4); count > 0; count--)
            {
                int slot = random.Next(model.Matrices.Count);
                model.Matrices[slot] = Changed(model.Matrices[slot], general, random);
                partial.Replace(slot, model.Matrices[slot]);
            }
            MultifrontalFactor whole = general ? new GeneralFactor(partial.Plan) : new WorkingFactor(partial.Plan);
            model.Load(whole);
            FactorOutcome expected = whole.Factor();
            Assert.Equal(expected, partial.Factor());
            if (expected.Status == FactorStatus.NotFinite)
                continue;
            Checks.SameBytes(whole, partial, [], random);
            Checks.SameBytes(whole, partial, Some(root, random), random);
        }
    }

    private static void SolvesInParts(int seed)
    {
        var random = new Random(seed);
        SparseModel model = RandomSystem(random, out bool general);
        MultifrontalFactor factor = Checks.Factored(model, general, Options(random));
        int n = model.Unknowns, count = random.Next(1, 12);
        int[] wanted = Some(Enumerable.Range(0, n).ToArray(), random), root = model.RootUnknowns(), held = Some(root, random);
        FrontPath path = factor.Plan.PathOf(wanted);
        double[] b = new double[count * n], x = Checks.RandomVector(count * n, random), many = (double[])x.Clone(), manyAlong = (double[])x.Clone(), along = (double[])x.Clone();
        for (int c = 0; c < count; c++)
            foreach (int unknown in wanted.Concat(root))
                b[c * n + unknown] = random.NextDouble() - 0.5;
        for (int c = 0; c < count; c++)
        {
            factor.Solve(b.AsSpan(c * n, n), x.AsSpan(c * n, n), held);
            factor.Solve(b.AsSpan(c * n, n), along.AsSpan(c * n, n), held, path);
            foreach (int unknown in wanted.Concat(root))
                Assert.Equal(x[c * n + unknown], along[c * n + unknown]);
        }
        factor.SolveMany(b, many, held);
        factor.SolveMany(b, manyAlong, held, path);
        if (!IsRegular(model, held))
            return;
        for (int c = 0; c < count; c++)
        {
            double largest = x.AsSpan(c * n, n).ToArray().Max(Math.Abs);
            for (int i = 0; i < n; i++)
                Close.To(x[c * n + i], many[c * n + i], relative: 0, absolute: 1e-7 * largest, what: $"unknown {i}");
            foreach (int unknown in wanted)
                Assert.Equal(many[c * n + unknown], manyAlong[c * n + unknown]);
        }
    }

    private static void SolvesBordered(int seed)
    {
        var random = new Random(seed);
        SparseModel model = RandomSystem(random, out bool general);
        int n = model.Unknowns, rows = random.Next(1, 6);
        if (general || n < 8)
            return;
        var factor = (WorkingFactor)Checks.Factored(model, options: Options(random));
        var border = new BorderedFactor(factor);
        var whole = new SparseModel();
        whole.Vertex(0, 0, n + rows);
        for (int slot = 0; slot < model.Matrices.Count; slot++)
            whole.Slot(model.Pattern.Unknowns(slot).ToArray(), model.Matrices[slot]);
        for (int row = 0; row < rows; row++)
        {
            int[] unknowns = Some(Enumerable.Range(0, n).ToArray(), random);
            double[] values = Checks.RandomVector(unknowns.Length, random);
            double corner = random.Next(2) == 0 ? 0 : random.NextDouble() - 0.5;
            Assert.Equal(row, border.AddSymmetricRow(unknowns, values, corner));
            int m = unknowns.Length + 1;
            var matrix = new double[m * m];
            for (int i = 0; i + 1 < m; i++)
                matrix[(m - 1) * m + i] = matrix[i * m + m - 1] = values[i];
            matrix[m * m - 1] = corner;
            whole.Slot([.. unknowns, n + row], matrix);
        }
        if (!IsRegular(whole, []))
            return;
        border.Factor([]);
        double[] b = Checks.RandomVector(n, random), g = Checks.RandomVector(rows, random), x = new double[n], y = new double[rows];
        border.Solve(b, g, x, y);
        double[] right = [.. b, .. g], solution = [.. x, .. y];
        double error = Checks.BackwardError(whole, right, solution, []);
        Close.To(0, error, absolute: 1e-12, what: "backward error");
    }

    /// <summary>Vertices with 0 to 5 unknowns, some in pieces of their own, joined by random slots of one to twelve unknowns; definite, indefinite or, where general, unsymmetric.</summary>
    private static SparseModel RandomSystem(Random random, out bool general)
    {
        var model = new SparseModel();
        general = random.Next(3) == 0;
        int vertices = random.Next(1, 32), rootShare = random.Next(0, 6), changeable = random.Next(1, 5), reach = random.Next(2, 50);
        bool isDefinite = random.Next(3) == 0, isFlat = random.Next(4) == 0;
        var unknowns = new List<int[]>();
        for (int v = 0; v < vertices; v++)
        {
            int count = random.Next(0, 6), first = model.Vertex(random.NextDouble(), isFlat ? 0 : random.NextDouble(), count, random.Next(10) < rootShare, random.Next(changeable) == 0);
            unknowns.Add([.. Enumerable.Range(first, count)]);
        }
        for (int slot = random.Next(3 * vertices); slot >= 0; slot--)
        {
            int centre = random.Next(vertices);
            int[] members = [.. Enumerable.Range(0, random.Next(1, 5)).Select(_ => Math.Min(vertices - 1, centre + random.Next(reach))).Distinct().SelectMany(v => unknowns[v])];
            random.Shuffle(members);
            Add(model, members[..Math.Min(members.Length, 12)], random, general, isDefinite);
        }
        for (int u = 0; u < model.Unknowns; u++)
            if (random.Next(20) != 0 || isDefinite)
                Add(model, [u], random, general, isDefinite);
        return model;
    }

    private static void Add(SparseModel model, int[] members, Random random, bool general, bool isDefinite)
    {
        int m = members.Length;
        var matrix = new double[m * m];
        double[] direction = Checks.RandomVector(m, random);
        for (int r = 0; r < m; r++)
            for (int c = 0; c < m; c++)
                matrix[r * m + c] = isDefinite ? direction[r] * direction[c] + (r == c ? 0.1 : 0) : !general && c < r ? matrix[c * m + r] : random.NextDouble() - 0.5;
        model.Slot(members, matrix);
    }

    /// <summary>Other numbers, now and then none, tiny, huge, not finite, or (for a symmetric factor) no longer symmetric.</summary>
    private static double[] Changed(double[] matrix, bool general, Random random)
    {
        double factor = random.Next(12) switch { 0 => 0, 1 => 1e-12, 2 => 1e9, 3 => -0.01, 4 => double.NaN, _ => random.NextDouble() + 0.5 };
        double[] changed = Array.ConvertAll(matrix, value => factor * (double.IsFinite(value) ? value : 1));
        if (general || random.Next(4) == 0)
            for (int i = 0; i < changed.Length; i++)
                changed[i] *= 1 + 0.1 * random.NextDouble();
        return changed;
    }

    private static PlanOptions Options(Random random) => new(LeafVertices: random.Next(1, 12), FrontCost: random.Next(2) * 8000);

    private static int[] Some(int[] all, Random random) => [.. all.Where(_ => random.Next(3) == 0)];

    private static bool IsRegular(SparseModel model, int[] held)
    {
        int[] free = [.. Enumerable.Range(0, model.Unknowns).Except(held)];
        MathNet.Numerics.LinearAlgebra.Matrix<double> dense = model.Dense();
        return free.Length > 0 && MathNet.Numerics.LinearAlgebra.Double.DenseMatrix.Create(free.Length, free.Length, (i, j) => dense[free[i], free[j]]).ConditionNumber() < Regular;
    }
}
