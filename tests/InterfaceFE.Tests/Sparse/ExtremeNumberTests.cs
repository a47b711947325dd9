using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

/// <summary>Numbers at the ends of the range of doubles: what can be computed is computed as in any other unit, and what cannot is told.</summary>
public class ExtremeNumberTests
{
    [Theory]
    [InlineData(1e-285)]
    [InlineData(1e-250)]
    [InlineData(1e-160)]
    [InlineData(1e150)]
    [InlineData(1e290)]
    public void Units_of_stiffness_change_nothing_but_the_size_of_the_solution(double unit)
    {
        // An even power of two changes no digit, nor do its roots: status, names, inertia and solution are the same.
        double power = Math.Pow(4, Math.Round(Math.Log2(unit) / 2));
        foreach (bool general in new[] { false, true })
            foreach (int kind in new[] { 0, 1, 2 })
            {
                SparseModel model = Kind(kind), other = Kind(kind);
                for (int slot = 0; slot < other.Matrices.Count; slot++)
                    other.Matrices[slot] = Array.ConvertAll(model.Matrices[slot], value => power * value);
                MultifrontalFactor factor = Checks.Loaded(model, general), scaled = Checks.Loaded(other, general);
                FactorOutcome expected = factor.Factor(), actual = scaled.Factor();
                Assert.Equal((kind, expected), (kind, actual));
                Assert.Equal((factor.LiftedPivots, factor.Growth, factor.Inertia([])), (scaled.LiftedPivots, scaled.Growth, scaled.Inertia([])));
                double[] b = Checks.RandomVector(model.Unknowns, new Random(2)), x = new double[b.Length], y = new double[b.Length];
                factor.Solve(b, x, []);
                scaled.Solve(Array.ConvertAll(b, value => value * power), y, []);
                Assert.Equal(x, y);
            }
    }

    [Theory]
    [InlineData(double.MaxValue)]
    [InlineData(1e308)]
    [InlineData(1e-308)]
    [InlineData(1e-310)]
    [InlineData(5e-324)]
    public void One_unknown_of_any_size_is_solved_or_told_to_be_beyond_computing(double stiffness)
    {
        foreach (bool general in new[] { false, true })
            foreach (bool isRoot in new[] { false, true })
                foreach (double sign in new[] { 1.0, -1 })
                {
                    var model = new SparseModel();
                    model.Vertex(0, 0, 1, root: isRoot);
                    model.Slot([0], [sign * stiffness]);
                    MultifrontalFactor factor = Checks.Loaded(model, general);
                    FactorOutcome outcome = factor.Factor();
                    if (outcome.Status == FactorStatus.NotFinite)
                    {
                        Assert.Equal((0, -1), (outcome.Unknown, outcome.Slot));
                        Assert.True(stiffness < 1e-308);
                        continue;
                    }
                    double[] x = [0];
                    factor.Solve([stiffness], x, []);
                    Close.To(sign, x[0], 1e-10, what: $"root {isRoot} general {general}");
                    Assert.Equal(sign > 0 ? new Inertia(1, 0, 0) : new Inertia(0, 1, 0), factor.Inertia([]));
                }
    }

    [Fact]
    public void Slots_that_cancel_leave_what_no_slot_leaves()
    {
        foreach (double size in new[] { 1, 1e-300, 1.2e308 })
        {
            var model = new SparseModel();
            int a = model.Vertex(0, 0, 1), b = model.Vertex(1, 0, 1), c = model.Vertex(2, 0, 1);
            model.Slot([a], [2]);
            model.Slot([c], [3]);
            model.Slot([b], [size]);
            model.Slot([b], [-size]);
            foreach (bool general in new[] { false, true })
            {
                MultifrontalFactor factor = Checks.Loaded(model, general);
                FactorOutcome outcome = factor.Factor();
                Assert.Equal((FactorStatus.ZeroPivot, b), (outcome.Status, outcome.Unknown));
                Assert.Equal(new Inertia(2, 0, 1), factor.Inertia([]));
                double[] x = new double[3];
                factor.Solve([2, 0, 3], x, []);
                Assert.Equal([1, 0, 1], x);
            }
        }
    }

    [Fact]
    public void Large_slots_of_both_signs_leave_their_sound_sum()
    {
        var model = new SparseModel();
        int a = model.Vertex(0, 0, 1), b = model.Vertex(1, 0, 1);
        model.Slot([a], [1e308]);
        model.Slot([a], [-0.5e308]);
        model.Slot([a], [1e308]);
        model.Slot([a, b], [1e307, 1e306, 1e306, 1e307]);
        foreach (bool general in new[] { false, true })
        {
            MultifrontalFactor factor = Checks.Loaded(model, general);
            Assert.Equal(FactorStatus.Done, factor.Factor().Status);
            Assert.Equal(new Inertia(2, 0, 0), factor.Inertia([]));
        }
    }

    [Fact]
    public void Finite_numbers_that_overflow_name_an_unknown_of_theirs_and_no_slot()
    {
        foreach (bool isRoot in new[] { false, true })
        {
            var model = new SparseModel();
            model.Vertex(0, 0, 1);
            int bad = model.Vertex(1, 0, 1, root: isRoot);
            model.Slot([0], [1]);
            model.Slot([bad], [1.5e308]);
            model.Slot([bad], [1.5e308]);
            foreach (bool general in new[] { false, true })
            {
                MultifrontalFactor factor = Checks.Loaded(model, general);
                FactorOutcome outcome = factor.Factor();
                Assert.Equal((FactorStatus.NotFinite, bad, -1), (outcome.Status, outcome.Unknown, outcome.Slot));
                factor.Replace(2, [-1.5e308]);
                factor.Replace(1, [1]);
                Assert.Equal(FactorStatus.Done, factor.Factor().Status);
                factor.Replace(2, [2]);
                Assert.Equal(FactorStatus.Done, factor.Factor().Status);
                double[] x = new double[2];
                factor.Solve([1, 3], x, []);
                Close.To(1, x[bad]);
            }
        }
    }

    /// <summary>0: a sound indefinite matrix with cancelled diagonals; 1: a floating strip; 2: a saddle point with a block of zeros.</summary>
    private static SparseModel Kind(int kind)
    {
        if (kind == 1)
            return new StripModel(20, 2, false, 10, supported: false, grips: false).Model;
        SparseModel model = new StripModel(20, 2, false, 10).Model;
        var random = new Random(kind);
        if (kind == 0)
        {
            var dense = model.Dense();
            for (int u = 20; u < model.Unknowns - 20; u += 13)
                model.Slot([u], [-dense[u, u]]);
            return model;
        }
        for (int row = 0; row < 5; row++)
        {
            int multiplier = model.Vertex(random.Next(20), 0, 1), moved = random.Next(model.Unknowns - 10);
            model.Slot([multiplier, moved], [0, 1, 1, 0]);
        }
        return model;
    }
}
