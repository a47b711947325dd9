using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

/// <summary>A factorisation along changed paths leaves the bytes of a whole one, whatever was changed before.</summary>
public class ChangedPathTests
{
    [Theory]
    [InlineData(1, false, false)]
    [InlineData(2, false, true)]
    [InlineData(3, true, false)]
    [InlineData(4, true, true)]
    public void Random_changes_of_layers_and_solids_leave_the_bytes_of_a_whole_factorisation(int seed, bool quadratic, bool general)
    {
        var random = new Random(seed);
        var strip = new StripModel(40, 4, quadratic, 1e3);
        SparseModel model = strip.Model;
        SparsePlan plan = SparsePlan.Analyze(model.Pattern);
        MultifrontalFactor partial = New(plan, general), whole = New(plan, general);
        model.Load(partial);
        model.Load(whole);
        double flops = 0, least = double.PositiveInfinity;
        for (int change = 0; change < 40; change++)
        {
            foreach (int slot in Chosen(strip, random))
            {
                double[] matrix = Changed(model.Matrices[slot], general, random);
                partial.Replace(slot, matrix);
                whole.Replace(slot, matrix);
            }
            whole.ForgetFactor();
            FactorOutcome expected = whole.Factor();
            Assert.Equal(expected, partial.Factor());
            SameBytes(whole, partial, model, random);
            flops = Math.Max(flops, partial.LastFlops);
            if (partial.LastFlops > 0)
                least = Math.Min(least, partial.LastFlops);
        }
        Assert.True(least < 0.5 * flops, $"least {least}, most {flops}");
        Assert.Equal(plan.Flops, whole.LastFlops, 1e-6 * plan.Flops);
    }

    [Fact]
    public void Random_changes_of_random_indefinite_systems_leave_the_bytes_of_a_whole_factorisation()
    {
        for (int seed = 0; seed < 150; seed++)
        {
            var random = new Random(500 + seed);
            bool general = seed % 3 == 0;
            SparseModel model = WorkingFactorTests.RandomModel(random, symmetric: !general);
            if (model.Unknowns == 0)
                continue;
            SparsePlan plan = SparsePlan.Analyze(model.Pattern, new PlanOptions(LeafVertices: 1 + seed % 4));
            MultifrontalFactor partial = New(plan, general), whole = New(plan, general);
            model.Load(partial);
            model.Load(whole);
            for (int change = 0; change < 10; change++)
            {
                int slot = random.Next(model.Matrices.Count);
                // Zeroed slots make pivots vanish: lifted ones must be lifted alike.
                double[] matrix = random.Next(4) == 0 ? new double[model.Matrices[slot].Length] : Changed(model.Matrices[slot], general, random);
                partial.Replace(slot, matrix);
                whole.Replace(slot, matrix);
                whole.ForgetFactor();
                Assert.Equal(whole.Factor(), partial.Factor());
                SameBytes(whole, partial, model, random);
            }
        }
    }

    [Fact]
    public void One_thread_and_two_leave_the_same_bytes()
    {
        var random = new Random(9);
        var strip = new StripModel(700, 8, false, 1e3);
        SparseModel model = strip.Model;
        SparsePlan plan = SparsePlan.Analyze(model.Pattern);
        Assert.True(plan.Flops > 3e7, $"too small to be shared: {plan.Flops}");
        WorkingFactor one = new(plan), two = new(plan) { Threads = 2 };
        model.Load(one);
        model.Load(two);
        for (int change = 0; change < 5; change++)
        {
            Assert.Equal(one.Factor(), two.Factor());
            SameBytes(one, two, model, random);
            foreach (int slot in Chosen(strip, random))
            {
                double[] matrix = Changed(model.Matrices[slot], false, random);
                one.Replace(slot, matrix);
                two.Replace(slot, matrix);
            }
            one.ForgetFactor();
            two.ForgetFactor();
        }
    }

    [Fact]
    public void Three_threads_are_refused() =>
        Assert.Throws<ArgumentOutOfRangeException>(() => new WorkingFactor(SparsePlan.Analyze(new StripModel(2, 1).Model.Pattern)).Threads = 3);

    [Fact]
    public void One_changed_layer_costs_its_path_only()
    {
        var strip = new StripModel(400, 6, false, 10);
        MultifrontalFactor factor = Checks.Factored(strip.Model);
        int slot = strip.LayerSlots[200];
        factor.Replace(slot, strip.LayerMatrix(3));
        factor.Factor();
        FrontPath path = factor.Plan.PathOf(strip.Model.Pattern.Unknowns(slot));
        Assert.True(factor.LastFlops <= factor.Plan.FlopsOf(path));
        Assert.True(factor.LastFlops < 0.1 * factor.Plan.Flops, $"{factor.LastFlops} of {factor.Plan.Flops}");
        factor.Replace(slot, strip.LayerMatrix(3));
        factor.Factor();
        Assert.Equal(0, factor.LastFlops);
    }

    [Fact]
    public void Yielding_that_spreads_is_paid_for_once()
    {
        var strip = new StripModel(400, 6, false, 10);
        SparseModel model = strip.Model;
        MultifrontalFactor factor = Checks.Factored(model);
        int solid = 12 * 200;
        factor.Replace(solid, Scaled(model.Matrices[solid], 0.5));
        factor.Factor();
        double first = factor.LastFlops;
        factor.Replace(solid, Scaled(model.Matrices[solid], 0.4));
        factor.Factor();
        Assert.True(factor.LastFlops <= first, $"{factor.LastFlops} after {first}");
        Assert.True(factor.LastFlops < 0.1 * factor.Plan.Flops, $"{factor.LastFlops} of {factor.Plan.Flops}");
    }

    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public void A_solve_along_a_path_gives_the_whole_solves_bytes_there_and_leaves_the_rest_alone(bool general)
    {
        var random = new Random(4);
        var strip = new StripModel(60, 4, true, 1e2);
        SparseModel model = strip.Model;
        MultifrontalFactor factor = Checks.Factored(model, general);
        int[] unknowns = strip.LayerSlots.Skip(20).Take(6).SelectMany(slot => model.Pattern.Unknowns(slot).ToArray()).Distinct().ToArray();
        FrontPath path = factor.Plan.PathOf(unknowns);
        int[] root = model.RootUnknowns();
        foreach (int[] held in new[] { [], root, root[..1] })
        {
            double[] b = new double[model.Unknowns], x = Checks.RandomVector(model.Unknowns, random);
            foreach (int unknown in unknowns.Concat(root))
                b[unknown] = random.NextDouble() - 0.5;
            double[] part = (double[])x.Clone(), before = (double[])x.Clone();
            factor.Solve(b, x, held);
            factor.Solve(b, part, held, path);
            int given = 0;
            for (int i = 0; i < x.Length; i++)
            {
                bool isOn = part[i] == x[i];
                Assert.True(isOn || part[i] == before[i], $"unknown {i}");
                given += isOn ? 1 : 0;
            }
            Assert.True(given >= path.UnknownCount, $"{given} of {path.UnknownCount}");
            Assert.True(path.UnknownCount < 0.6 * model.Unknowns, $"{path.UnknownCount} of {model.Unknowns}");
            foreach (int unknown in unknowns)
                Assert.Equal(x[unknown], part[unknown]);
        }
    }

    [Theory]
    [InlineData(1, false)]
    [InlineData(8, false)]
    [InlineData(13, true)]
    public void Many_right_sides_are_solved_as_single_ones(int count, bool general)
    {
        var random = new Random(count);
        SparseModel model = new StripModel(30, 3, false, 1e2).Model;
        MultifrontalFactor factor = Checks.Factored(model, general);
        int[] held = model.RootUnknowns()[..2];
        double[] b = Checks.RandomVector(count * model.Unknowns, random), x = Checks.RandomVector(count * model.Unknowns, random), single = (double[])x.Clone();
        factor.SolveMany(b, x, held);
        for (int c = 0; c < count; c++)
            factor.Solve(b.AsSpan(c * model.Unknowns, model.Unknowns), single.AsSpan(c * model.Unknowns, model.Unknowns), held);
        double largest = single.Max(Math.Abs);
        for (int i = 0; i < x.Length; i++)
            Close.To(single[i], x[i], relative: 0, absolute: 1e-11 * largest);
    }

    [Fact]
    public void Many_right_sides_along_a_path_are_solved_as_whole_ones()
    {
        var strip = new StripModel(50, 3, false, 1e2);
        SparseModel model = strip.Model;
        MultifrontalFactor factor = Checks.Factored(model);
        int[] unknowns = model.Pattern.Unknowns(strip.LayerSlots[25]).ToArray();
        const int count = 8;
        double[] b = new double[count * model.Unknowns], x = new double[b.Length], part = new double[b.Length];
        for (int c = 0; c < count; c++)
            b[c * model.Unknowns + unknowns[c]] = 1;
        factor.SolveMany(b, x, []);
        factor.SolveMany(b, part, [], factor.Plan.PathOf(unknowns));
        for (int c = 0; c < count; c++)
            foreach (int unknown in unknowns)
                Assert.Equal(x[c * model.Unknowns + unknown], part[c * model.Unknowns + unknown]);
    }

    [Fact]
    public void After_a_number_that_is_not_finite_the_next_factorisation_is_sound_again()
    {
        var strip = new StripModel(60, 4, false, 10);
        SparseModel model = strip.Model;
        MultifrontalFactor factor = Checks.Factored(model), fresh = Checks.Factored(model);
        int slot = strip.LayerSlots[30];
        double[] broken = (double[])model.Matrices[slot].Clone();
        broken[1] = double.NaN;
        factor.Replace(slot, broken);
        Assert.Equal(FactorStatus.NotFinite, factor.Factor().Status);
        double[] huge = Scaled(model.Matrices[slot], 1e305);
        factor.Replace(slot, huge);
        factor.Replace(12 * 20, Scaled(model.Matrices[12 * 20], 1e308));
        factor.Factor();
        factor.Replace(slot, model.Matrices[slot]);
        factor.Replace(12 * 20, model.Matrices[12 * 20]);
        Assert.Equal(FactorStatus.Done, factor.Factor().Status);
        SameBytes(fresh, factor, model, new Random(1));
    }

    [Fact]
    public void Nothing_is_allocated_along_changed_paths()
    {
        var strip = new StripModel(60, 4, false, 10);
        SparseModel model = strip.Model;
        MultifrontalFactor factor = Checks.Factored(model);
        FrontPath path = factor.Plan.PathOf(model.Pattern.Unknowns(strip.LayerSlots[30]));
        double[][] matrices = [strip.LayerMatrix(3), strip.LayerMatrix(4)];
        double[] b = new double[model.Unknowns], x = new double[b.Length], many = new double[3 * b.Length], rights = new double[3 * b.Length];
        int[] held = model.RootUnknowns();
        Cycle(0);
        Cycle(1);
        long before = GC.GetAllocatedBytesForCurrentThread();
        for (int i = 0; i < 6; i++)
            Cycle(i);
        Assert.Equal(0, GC.GetAllocatedBytesForCurrentThread() - before);

        void Cycle(int i)
        {
            factor.Replace(strip.LayerSlots[30], matrices[i % 2]);
            factor.Factor();
            factor.Solve(b, x, held, path);
            factor.SolveMany(rights, many, held, path);
        }
    }

    private static MultifrontalFactor New(SparsePlan plan, bool general) => general ? new GeneralFactor(plan) : new WorkingFactor(plan);

    /// <summary>A few neighbouring layers, now and then solids anywhere, or nothing.</summary>
    private static IEnumerable<int> Chosen(StripModel strip, Random random)
    {
        int from = random.Next(strip.LayerSlots.Count), count = random.Next(0, 6);
        IEnumerable<int> chosen = strip.LayerSlots.Skip(from).Take(count);
        return random.Next(3) == 0 ? chosen.Append(random.Next(strip.LayerSlots[0])) : chosen;
    }

    private static double[] Changed(double[] matrix, bool general, Random random)
    {
        double[] changed = Scaled(matrix, random.Next(4) == 0 ? -0.1 * random.NextDouble() : random.NextDouble());
        if (general)
            for (int i = 0; i < changed.Length; i++)
                changed[i] *= 1 + 0.1 * random.NextDouble();
        return changed;
    }

    private static double[] Scaled(double[] matrix, double factor) => Array.ConvertAll(matrix, value => factor * value);

    private static void SameBytes(MultifrontalFactor expected, MultifrontalFactor actual, SparseModel model, Random random)
    {
        int[] root = model.RootUnknowns();
        Assert.Equal(expected.Growth, actual.Growth);
        Assert.Equal(expected.LiftedPivots, actual.LiftedPivots);
        foreach (int[] held in new[] { [], root })
        {
            double[] b = Checks.RandomVector(model.Unknowns, random), x = new double[b.Length], y = new double[b.Length];
            expected.Solve(b, x, held);
            actual.Solve(b, y, held);
            Assert.Equal(x, y);
            Assert.Equal(expected.Inertia(held), actual.Inertia(held));
        }
    }
}
