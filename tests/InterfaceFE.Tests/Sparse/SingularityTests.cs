using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

public class SingularityTests
{
    [Fact]
    public void One_unknown_is_solved()
    {
        var model = new SparseModel();
        model.Vertex(0, 0, 1);
        model.Slot([0], [-4]);
        MultifrontalFactor factor = Checks.Factored(model);
        double[] x = [0];
        factor.Solve([2], x, []);
        Close.To(-0.5, x[0]);
        Assert.Equal(new Inertia(0, 1, 0), factor.Inertia([]));
    }

    [Fact]
    public void No_unknown_at_all_is_no_error()
    {
        var model = new SparseModel();
        model.Vertex(0, 0, 0);
        MultifrontalFactor factor = Checks.Factored(model);
        factor.Solve([], [], []);
        Assert.Equal(new Inertia(0, 0, 0), factor.Inertia([]));
    }

    [Theory]
    [InlineData(1)]
    [InlineData(12)]
    [InlineData(150)]
    public void A_matrix_may_be_all_root(int vertices)
    {
        var random = new Random(vertices);
        var model = new SparseModel();
        for (int v = 0; v < vertices; v++)
            model.Vertex(0, 0, 2, root: true);
        for (int u = 0; u < 2 * vertices; u++)
            for (int k = 0; k < 3; k++)
                model.Spring(u, random.Next(2 * vertices) is int w && w != u ? w : -1, random.NextDouble() - 0.4);
        foreach (bool general in new[] { false, true })
        {
            MultifrontalFactor factor = Checks.Factored(model, general);
            int[] all = Enumerable.Range(0, 2 * vertices).ToArray();
            Checks.SolvesAsDense(model, factor, [], random, 1e-8);
            Checks.SolvesAsDense(model, factor, all, random, 1e-8);
            Checks.SolvesAsDense(model, factor, all[1..], random, 1e-8);
            if (!general)
                Checks.HasDenseInertia(model, factor, all[..^2]);
            Assert.Equal(new Inertia(0, 0, 0), factor.Inertia(all));
        }
    }

    [Theory]
    [InlineData(20, 2, 1)]
    [InlineData(20, 2, 1e4)]
    [InlineData(60, 4, 1e3)]
    [InlineData(200, 3, 10)]
    [InlineData(60, 4, 1e6)]
    [InlineData(1000, 4, 1e2)]
    public void A_floating_part_has_three_zero_pivots_and_is_named(int columns, int rows, double penalty)
    {
        // Two strips in one model: the first supported, the second floating.
        var model = new SparseModel();
        int supported = Append(model, new StripModel(columns, rows, false, penalty, grips: false).Model);
        Append(model, new StripModel(columns, rows, false, penalty, supported: false, grips: false).Model);
        SparsePlan plan = SparsePlan.Analyze(model.Pattern);
        var factor = new WorkingFactor(plan);
        model.Load(factor);
        FactorOutcome outcome = factor.Factor();
        Assert.Equal(FactorStatus.ZeroPivot, outcome.Status);
        Assert.InRange(outcome.Unknown, supported, model.Unknowns - 1);
        Assert.Equal(new Inertia(model.Unknowns - 3, 0, 3), factor.Inertia([]));
        double[] x = new double[model.Unknowns];
        factor.Solve(Checks.RandomVector(model.Unknowns, new Random(1)), x, []);
        Assert.All(x, value => Assert.True(double.IsFinite(value)));
    }

    [Fact]
    public void Disconnected_sound_parts_are_solved()
    {
        var model = new SparseModel();
        for (int part = 0; part < 5; part++)
            Append(model, new StripModel(5 + 4 * part, 1 + part % 2, false, 10, grips: part != 2).Model);
        MultifrontalFactor factor = Checks.Factored(model);
        Checks.SolvesAsDense(model, factor, [], new Random(1), 1e-9);
        Checks.HasDenseInertia(model, factor, []);
    }

    [Fact]
    public void A_free_grip_without_support_is_a_zero_of_the_root_only_while_free()
    {
        var model = new SparseModel();
        int a = model.Vertex(0, 0, 1), b = model.Vertex(1, 0, 1), grip = model.Vertex(2, 0, 1, root: true);
        model.Spring(a, b, 2);
        model.Spring(b, grip, 3);
        var factor = new WorkingFactor(SparsePlan.Analyze(model.Pattern));
        model.Load(factor);
        Assert.Equal(FactorStatus.Done, factor.Factor().Status);
        Assert.Equal(new Inertia(2, 0, 1), factor.Inertia([]));
        Assert.Equal(new Inertia(2, 0, 0), factor.Inertia([grip]));
        double[] x = [0, 0, 0.25];
        factor.Solve([1, 0, 7], x, [grip]);
        Close.To(0.25 + 1.0 / 3 + 0.5, x[a]);
        factor.Solve([1, 0, 7], x, []);
        Assert.All(x, value => Assert.True(double.IsFinite(value)));
    }

    [Theory]
    [InlineData(false, 0)]
    [InlineData(false, 1e-18)]
    [InlineData(false, -1e-14)]
    [InlineData(false, 1e-10)]
    [InlineData(false, -1e-9)]
    [InlineData(true, 0)]
    [InlineData(true, 1e-14)]
    [InlineData(true, -1e-9)]
    public void Near_zero_leading_pivots_of_a_sound_matrix_are_refined_to_round_off(bool general, double leading)
    {
        // Diagonals vanish where each unknown is eliminated first: springs of both signs cancel, and the chain's links hold the matrix up.
        var random = new Random(7);
        var model = new SparseModel();
        for (int v = 0; v < 30; v++)
            model.Vertex(v, 0, 1);
        for (int v = 0; v < 30; v++)
            model.Slot([v], [v % 3 == 0 ? leading : 1 + random.NextDouble()]);
        for (int v = 0; v + 1 < 30; v++)
            model.Slot([v, v + 1], [0, 1, 1, 0]);
        MultifrontalFactor factor = Checks.Factored(model, general);
        Checks.SolvesAsDense(model, factor, [], random, 1e-10);
        Close.To(0, factor.BackwardError, absolute: 1e-15);
    }

    [Fact]
    public void Random_sound_matrices_with_many_zero_diagonals_are_refined_to_round_off()
    {
        int lifted = 0;
        for (int seed = 0; seed < 200; seed++)
        {
            var random = new Random(seed);
            var model = new SparseModel();
            int count = random.Next(2, 40);
            for (int u = 0; u < count; u++)
                model.Vertex(u, 0, 1, root: u % 9 == 8);
            for (int slot = 0; slot < 3 * count; slot++)
            {
                int a = random.Next(count), b = random.Next(count);
                double link = random.NextDouble() - 0.5;
                if (a == b)
                    model.Slot([a], [link]);
                else
                    model.Slot([a, b], [0, link, link, 0]);
            }
            if (model.Dense().ConditionNumber() > 1e6)
                continue;
            foreach (bool general in new[] { false, true })
            {
                MultifrontalFactor factor = Checks.Factored(model, general);
                lifted += factor.LiftedPivots > 0 ? 1 : 0;
                Checks.SolvesAsDense(model, factor, [], random, 1e-8);
            }
        }
        Assert.True(lifted > 50, "the matrices of this test must need lifting");
    }

    [Fact]
    public void A_cancelled_diagonal_in_a_strip_is_refined_to_round_off()
    {
        var random = new Random(9);
        SparseModel model = new StripModel(30, 3, false, 1e3).Model;
        MathNet.Numerics.LinearAlgebra.Matrix<double> dense = model.Dense();
        // Many unknowns of one row get a diagonal of zero: the matrix stays regular, its first pivots do not.
        for (int u = 40; u < model.Unknowns - 40; u += 17)
            model.Slot([u], [-dense[u, u]]);
        MultifrontalFactor factor = Checks.Factored(model);
        Assert.True(factor.LiftedPivots > 0);
        Checks.SolvesAsDense(model, factor, [], random, 1e-7);
        Close.To(0, factor.BackwardError, absolute: 1e-14);
    }

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    [InlineData(double.NegativeInfinity)]
    public void An_entry_that_is_not_finite_is_named_and_can_be_mended(double bad)
    {
        SparseModel model = new StripModel(8, 2).Model;
        MultifrontalFactor factor = Checks.Factored(model);
        double[] matrix = (double[])model.Matrices[13].Clone();
        int m = model.Pattern.Unknowns(13).Length;
        matrix[2 * m + 5] = bad;
        factor.Replace(13, matrix);
        FactorOutcome outcome = factor.Factor();
        Assert.Equal((FactorStatus.NotFinite, 13, model.Pattern.Unknowns(13)[2]), (outcome.Status, outcome.Slot, outcome.Unknown));
        Assert.Throws<InvalidOperationException>(() => factor.Solve(new double[factor.Size], new double[factor.Size], []));
        factor.Replace(13, model.Matrices[13]);
        Assert.Equal(FactorStatus.Done, factor.Factor().Status);
        Checks.SolvesAsDense(model, factor, [], new Random(1), 1e-9);
    }

    [Fact]
    public void Overflow_within_the_factor_is_found()
    {
        var model = new SparseModel();
        int a = model.Vertex(0, 0, 1), b = model.Vertex(1, 0, 1), c = model.Vertex(2, 0, 1, root: true);
        model.Slot([a, b], [1, 1e300, 1e300, 1]);
        model.Slot([b, c], [1, 1e200, 1e200, 1]);
        Assert.Equal(FactorStatus.NotFinite, Outcome(model).Status);
    }

    [Fact]
    public void An_unknown_without_any_stiffness_is_a_zero_pivot()
    {
        var model = new SparseModel();
        model.Vertex(0, 0, 2);
        model.Slot([0], [5]);
        FactorOutcome outcome = Outcome(model);
        Assert.Equal((FactorStatus.ZeroPivot, 1), (outcome.Status, outcome.Unknown));
    }

    [Fact]
    public void Wrong_calls_are_refused()
    {
        SparseModel model = new StripModel(4, 1).Model;
        MultifrontalFactor factor = Checks.Factored(model);
        double[] x = new double[factor.Size];
        Assert.Throws<ArgumentException>(() => factor.Replace(0, new double[3]));
        Assert.Throws<ArgumentOutOfRangeException>(() => factor.Replace(-1, new double[3]));
        Assert.Throws<ArgumentException>(() => factor.Solve(x, x.AsSpan(1), []));
        Assert.Throws<ArgumentException>(() => factor.Solve(x, new double[factor.Size], [0]));
        Assert.Throws<ArgumentException>(() => factor.Inertia([-1]));
        Assert.Throws<InvalidOperationException>(() => new WorkingFactor(factor.Plan).Inertia([]));
    }

    private static FactorOutcome Outcome(SparseModel model)
    {
        var factor = new WorkingFactor(SparsePlan.Analyze(model.Pattern));
        model.Load(factor);
        return factor.Factor();
    }

    /// <summary>Adds a copy of a model to another, at the same place; returns the number of unknowns after it.</summary>
    private static int Append(SparseModel target, SparseModel part)
    {
        int offset = target.Unknowns;
        SlotPattern pattern = part.Pattern;
        int[] counts = new int[pattern.VertexX.Length];
        foreach (int v in pattern.VertexOfUnknown)
            counts[v]++;
        for (int v = 0; v < counts.Length; v++)
            target.Vertex(pattern.VertexX[v], pattern.VertexY[v], counts[v], pattern.IsRoot[v], pattern.IsChangeable[v]);
        for (int slot = 0; slot < pattern.SlotCount; slot++)
            target.Slot(pattern.Unknowns(slot).ToArray().Select(u => u + offset).ToArray(), part.Matrices[slot]);
        return target.Unknowns;
    }
}
