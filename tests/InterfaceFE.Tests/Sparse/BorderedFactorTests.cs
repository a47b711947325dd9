using InterfaceFE.Sparse;
using MathNet.Numerics.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra.Double;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

/// <summary>A bordered factor solves as the dense bordered matrix does (MathNet.Numerics), with its signs of eigenvalues.</summary>
public class BorderedFactorTests
{
    [Theory]
    [InlineData(1, 1)]
    [InlineData(2, 3)]
    [InlineData(3, 11)]
    public void Multiplier_rows_give_the_dense_solution_and_the_dense_signs(int seed, int rows)
    {
        var random = new Random(seed);
        var strip = new StripModel(14, 2, seed == 2, 50);
        SparseModel model = strip.Model;
        WorkingFactor factor = Factored(model);
        var border = new BorderedFactor(factor);
        int[] root = model.RootUnknowns();
        foreach (int[] held in new[] { [], root, root[1..3] })
        {
            border.Clear();
            var dense = DenseMatrix.Create(model.Unknowns + rows, model.Unknowns + rows, 0);
            dense.SetSubMatrix(0, 0, model.Dense());
            for (int row = 0; row < rows; row++)
            {
                int[] unknowns = Enumerable.Range(0, 4).Select(_ => random.Next(model.Unknowns)).Distinct().ToArray();
                double[] values = unknowns.Select(_ => random.NextDouble() - 0.5).ToArray();
                // Constraints have no corner; a contact has its compliance there.
                double corner = row % 3 == 2 ? -0.1 : 0;
                Assert.Equal(row, border.AddSymmetricRow(unknowns, values, corner));
                for (int i = 0; i < unknowns.Length; i++)
                    dense[model.Unknowns + row, unknowns[i]] = dense[unknowns[i], model.Unknowns + row] = values[i];
                dense[model.Unknowns + row, model.Unknowns + row] = corner;
            }
            border.Factor(held);
            SolvesAsDense(border, dense, model.Unknowns, held, [], random, 1e-9);
            int[] free = Free(dense.RowCount, held);
            double[] values2 = [.. Part(dense, free).Evd(Symmetricity.Symmetric).EigenValues.Select(value => value.Real)];
            Assert.Equal(new Inertia(values2.Count(v => v > 0), values2.Count(v => v < 0), 0), border.Inertia);
            Assert.Equal(rows, border.Inertia.Negative);
        }
    }

    [Fact]
    public void Softening_and_multipliers_together_give_the_dense_signs()
    {
        var random = new Random(6);
        for (int trial = 0; trial < 12; trial++)
        {
            var strip = new StripModel(10, 2, false, 100);
            SparseModel model = strip.Model;
            foreach (int slot in strip.LayerSlots.Skip(2))
                model.Matrices[slot] = strip.LayerMatrix(100 * (random.NextDouble() - 0.6) * 0.2);
            var border = new BorderedFactor(Factored(model));
            int[] held = trial % 2 == 0 ? model.RootUnknowns() : [];
            var dense = DenseMatrix.Create(model.Unknowns + 2, model.Unknowns + 2, 0);
            dense.SetSubMatrix(0, 0, model.Dense());
            for (int row = 0; row < 2; row++)
            {
                int unknown = random.Next(model.Unknowns - 8);
                border.AddSymmetricRow([unknown], [1], 0);
                dense[model.Unknowns + row, unknown] = dense[unknown, model.Unknowns + row] = 1;
            }
            border.Factor(held);
            double[] values = [.. Part(dense, Free(dense.RowCount, held)).Evd(Symmetricity.Symmetric).EigenValues.Select(value => value.Real)];
            if (values.Min(Math.Abs) < 1e-9)
                continue;
            Assert.Equal(new Inertia(values.Count(v => v > 0), values.Count(v => v < 0), 0), border.Inertia);
            SolvesAsDense(border, dense, model.Unknowns, held, [], random, 1e-7);
        }
    }

    [Fact]
    public void A_floating_body_is_held_by_its_constraints()
    {
        var strip = new StripModel(12, 2, supported: false, grips: false);
        SparseModel model = strip.Model;
        WorkingFactor factor = Factored(model);
        Assert.Equal(3, factor.Inertia([]).Zero);
        var border = new BorderedFactor(factor);
        var dense = DenseMatrix.Create(model.Unknowns + 3, model.Unknowns + 3, 0);
        dense.SetSubMatrix(0, 0, model.Dense());
        foreach ((int row, int unknown) in new[] { (0, 0), (1, 1), (2, model.Unknowns - 1) })
        {
            border.AddSymmetricRow([unknown], [1], 0);
            dense[model.Unknowns + row, unknown] = dense[unknown, model.Unknowns + row] = 1;
        }
        border.Factor([]);
        SolvesAsDense(border, dense, model.Unknowns, [], [], new Random(1), 1e-6);
    }

    [Theory]
    [InlineData(3)]
    [InlineData(20)]
    public void Skew_parts_of_tangents_give_the_general_factors_solution(int count)
    {
        var random = new Random(count);
        var strip = new StripModel(40, 3, false, 100);
        SparseModel model = strip.Model;
        var border = new BorderedFactor(Factored(model));
        int[] slots = strip.LayerSlots.Skip(10).Take(count).ToArray();
        int[] unknowns = slots.SelectMany(slot => model.Pattern.Unknowns(slot).ToArray()).Distinct().ToArray();
        int n = unknowns.Length;
        var sum = new double[n * n];
        foreach (int slot in slots)
        {
            int[] own = model.Pattern.Unknowns(slot).ToArray();
            int m = own.Length;
            double[] skewed = (double[])model.Matrices[slot].Clone();
            for (int i = 0; i < m; i++)
                for (int j = 0; j < i; j++)
                {
                    double skew = 5 * (random.NextDouble() - 0.5);
                    skewed[i * m + j] += skew;
                    skewed[j * m + i] -= skew;
                    sum[Array.IndexOf(unknowns, own[i]) * n + Array.IndexOf(unknowns, own[j])] += skew;
                    sum[Array.IndexOf(unknowns, own[j]) * n + Array.IndexOf(unknowns, own[i])] -= skew;
                }
            model.Matrices[slot] = skewed;
        }
        border.AddToMatrix(unknowns, sum);
        Assert.Equal(n, border.Rows);
        MultifrontalFactor general = Checks.Factored(model, general: true);
        int[] root = model.RootUnknowns();
        foreach (int[] held in new[] { [], root })
        {
            border.Factor(held);
            double[] b = Checks.RandomVector(model.Unknowns, random), x = Checks.RandomVector(model.Unknowns, random), y = new double[n], expected = (double[])x.Clone();
            border.Solve(b, new double[n], x, y);
            general.Solve(b, expected, held);
            double largest = expected.Max(Math.Abs);
            for (int i = 0; i < x.Length; i++)
                Close.To(expected[i], x[i], relative: 0, absolute: 1e-10 * largest);
        }
    }

    [Fact]
    public void A_control_row_that_moves_held_unknowns_solves_as_the_dense_system()
    {
        var random = new Random(3);
        var strip = new StripModel(20, 2, false, 30);
        SparseModel model = strip.Model;
        var border = new BorderedFactor(Factored(model));
        int[] held = model.RootUnknowns()[..3];
        double[] rates = [0.3, -1, 2], control = new double[model.Unknowns], load = new double[model.Unknowns];
        foreach (int slot in strip.LayerSlots)
            foreach (int unknown in model.Pattern.Unknowns(slot))
                control[unknown] = random.NextDouble() - 0.5;
        for (int i = 0; i < load.Length; i++)
            load[i] = 0.01 * (random.NextDouble() - 0.5);
        int controlVector = border.AddVector(control), loadVector = border.AddVector(load), row = border.AddRow(0.7);
        border.AddToRow(row, controlVector, 1);
        border.AddToColumn(row, loadVector, -1);
        for (int i = 0; i < held.Length; i++)
            border.AddHeldMove(row, held[i], rates[i]);
        border.Factor(held);
        int n = model.Unknowns;
        var dense = DenseMatrix.Create(n + 1, n + 1, 0);
        dense.SetSubMatrix(0, 0, model.Dense());
        for (int i = 0; i < n; i++)
        {
            dense[n, i] = control[i];
            dense[i, n] = -load[i];
        }
        dense[n, n] = 0.7;
        SolvesAsDense(border, dense, n, held, rates, random, 1e-9);
    }

    [Fact]
    public void At_a_limit_point_the_border_is_regular_where_the_factor_is_not()
    {
        // The end's stiffness vanishes once the middle follows in balance; the control row holds it.
        var model = new SparseModel();
        int middle = model.Vertex(0, 0, 1), end = model.Vertex(1, 0, 1, root: true);
        model.Slot([middle, end], [2, 1, 1, 0.5]);
        WorkingFactor factor = Factored(model);
        var border = new BorderedFactor(factor);
        int load = border.AddVector([end], [1]), control = border.AddVector([end], [1]), row = border.AddRow(0);
        border.AddToColumn(row, load, -1);
        border.AddToRow(row, control, 1);
        border.Factor([]);
        double[] x = new double[2], y = new double[1];
        border.Solve([0, 0], [1], x, y);
        Assert.Equal(1, factor.Inertia([]).Zero);
        Close.To(1, x[end], 1e-12);
        Close.To(-0.5, x[middle], 1e-12);
        Close.To(0, y[0], absolute: 1e-12);
    }

    [Fact]
    public void An_empty_border_solves_as_the_factor_alone()
    {
        SparseModel model = new StripModel(10, 2).Model;
        WorkingFactor factor = Factored(model);
        var border = new BorderedFactor(factor);
        double[] b = Checks.RandomVector(model.Unknowns, new Random(1)), x = new double[b.Length], expected = new double[b.Length];
        border.Factor([]);
        border.Solve(b, [], x, []);
        factor.Solve(b, expected, []);
        double largest = expected.Max(Math.Abs);
        for (int i = 0; i < b.Length; i++)
            Close.To(expected[i], x[i], relative: 0, absolute: 1e-12 * largest);
        Assert.Equal(factor.Inertia([]), border.Inertia);
    }

    [Fact]
    public void A_border_of_a_factor_that_has_changed_is_refused()
    {
        var strip = new StripModel(10, 2);
        WorkingFactor factor = Factored(strip.Model);
        var border = new BorderedFactor(factor);
        double[] b = new double[factor.Size], x = new double[factor.Size];
        Assert.Throws<InvalidOperationException>(() => border.Solve(b, [], x, []));
        border.Factor([]);
        border.Solve(b, [], x, []);
        factor.Replace(strip.LayerSlots[3], strip.LayerMatrix(7));
        factor.Factor();
        Assert.Throws<InvalidOperationException>(() => border.Solve(b, [], x, []));
    }

    private static WorkingFactor Factored(SparseModel model)
    {
        var factor = new WorkingFactor(SparsePlan.Analyze(model.Pattern));
        model.Load(factor);
        factor.Factor();
        return factor;
    }

    private static int[] Free(int count, int[] held) => Enumerable.Range(0, count).Except(held).ToArray();

    private static Matrix<double> Part(Matrix<double> matrix, int[] free) => DenseMatrix.Create(free.Length, free.Length, (i, j) => matrix[free[i], free[j]]);

    /// <summary>Random right sides and held values; the last column moves held unknowns by the rates where there are any.</summary>
    private static void SolvesAsDense(BorderedFactor border, Matrix<double> dense, int unknowns, int[] held, double[] rates, Random random, double relative)
    {
        int rows = dense.RowCount - unknowns;
        double[] b = Checks.RandomVector(unknowns, random), g = Checks.RandomVector(rows, random), x = Checks.RandomVector(unknowns, random), y = new double[rows], given = (double[])x.Clone();
        border.Solve(b, g, x, y);
        int[] free = Free(dense.RowCount, held);
        Matrix<double> moved = dense.Clone();
        for (int i = 0; i < rates.Length; i++)
            moved.SetColumn(dense.ColumnCount - 1, moved.Column(dense.ColumnCount - 1) + rates[i] * dense.Column(held[i]));
        double[] right = [.. b, .. g];
        var free1 = Vector<double>.Build.Dense(free.Length, i => right[free[i]] - held.Sum(h => dense[free[i], h] * given[h]));
        Vector<double> solution = Part(moved, free).Solve(free1);
        double largest = solution.AbsoluteMaximum();
        for (int i = 0; i < free.Length; i++)
            Close.To(solution[i], free[i] < unknowns ? x[free[i]] : y[free[i] - unknowns], relative: 0, absolute: relative * largest, what: $"unknown {free[i]}");
        for (int i = 0; i < rates.Length; i++)
            Close.To(given[held[i]] + rates[i] * y[^1], x[held[i]], 1e-12, 1e-12);
    }
}
