using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

/// <summary>Residuals of solves at high contrasts of stiffness, in softening zones and next to singular leading pivots.</summary>
public class RefinementTests
{
    private const double Limit = 1e-12;
    private const double Penalty = 1e6;

    [Theory]
    [InlineData(1, 1, false, false)]
    [InlineData(2, 10, true, false)]
    [InlineData(3, 40, false, true)]
    [InlineData(4, 100, false, false)]
    [InlineData(5, 100, true, true)]
    public void Softening_zones_in_layers_a_million_times_stiffer_leave_residuals_of_round_off(int seed, int zone, bool quadratic, bool general)
    {
        var random = new Random(seed);
        var strip = new StripModel(Math.Max(30, zone + 4), 2, quadratic, Penalty);
        SparseModel model = strip.Model;
        int[] root = model.RootUnknowns();
        MultifrontalFactor factor = Checks.Factored(model, general);
        for (int change = 0; change < 4; change++)
        {
            int from = random.Next(1, strip.LayerSlots.Count - zone + 1);
            foreach (int slot in strip.LayerSlots.Skip(from).Take(zone))
                Change(factor, model, slot, Softened(strip, general, random));
            Assert.NotEqual(FactorStatus.NotFinite, factor.Factor().Status);
            foreach (int[] held in new[] { root, [], root[..2] })
                LeavesRoundOff(strip, factor, held, random, strip.LayerSlots[from]);
        }
    }

    [Theory]
    [InlineData(5, 3, false)]
    [InlineData(14, 1, false)]
    [InlineData(8, 10, false)]
    [InlineData(8, 10, true)]
    public void A_leading_pivot_bisected_to_nothing_costs_a_sound_matrix_no_figure(int at, int zone, bool general)
    {
        var random = new Random(at);
        var strip = new StripModel(24, 2, false, 100);
        SparseModel model = strip.Model;
        int[] root = model.RootUnknowns();
        MultifrontalFactor factor = Checks.Factored(model, general);
        int[] slots = strip.LayerSlots.Skip(at).Take(zone).ToArray();
        (double vanishing, double slope) = VanishingPivot(strip, factor, slots);
        foreach (double target in new[] { 1e-8, -1e-9, 1e-10, -7e-12 })
        {
            foreach (int slot in slots)
                Change(factor, model, slot, strip.LayerMatrix(vanishing + target / slope));
            FactorOutcome outcome = factor.Factor();
            Assert.InRange(outcome.SmallestPivotRatio, 0.01 * Math.Abs(target), 100 * Math.Abs(target));
            LeavesRoundOff(strip, factor, [], random, slots[0]);
            LeavesRoundOff(strip, factor, root, random, slots[0]);
            Checks.SolvesAsDense(model, factor, root, random, 1e-9);
            if (!general)
                Checks.HasDenseInertia(model, factor, root);
        }
    }

    /// <summary>The stiffness of a zone of the layer at which a pivot vanishes, and how fast the pivot's ratio grows beside it.</summary>
    private static (double Stiffness, double Slope) VanishingPivot(StripModel strip, MultifrontalFactor factor, int[] slots)
    {
        const int Steps = 600;
        double best = double.PositiveInfinity, at = 0;
        for (int i = 0; i < Steps; i++)
        {
            double ratio = Ratio(-Math.Pow(10, -2 + 4.5 * i / Steps));
            if (ratio < best)
                (best, at) = (ratio, i);
        }
        double low = -Math.Pow(10, -2 + 4.5 * (at + 1) / Steps), high = -Math.Pow(10, -2 + 4.5 * (at - 1) / Steps);
        while (high - low > 4e-16 * Math.Abs(low))
        {
            double left = low + (high - low) / 3, right = high - (high - low) / 3;
            if (!(left > low && right < high && left < right))
                break;
            (low, high) = Ratio(left) < Ratio(right) ? (low, right) : (left, high);
        }
        double step = 1e-6 * Math.Abs(low);
        return (low, Ratio(low + step) / step);

        double Ratio(double stiffness)
        {
            foreach (int slot in slots)
                factor.Replace(slot, strip.LayerMatrix(stiffness));
            return factor.Factor().SmallestPivotRatio;
        }
    }

    [Fact]
    public void What_is_told_of_the_last_solve_is_not_that_of_an_earlier_one()
    {
        SparseModel model = new StripModel(20, 2, false, 10).Model;
        int n = model.Unknowns;
        int[] unknowns = Enumerable.Range(2, n / 17 - 4).Select(k => 17 * k).ToArray(), slots = Array.ConvertAll(unknowns, u => model.Slot([u], [0]));
        MathNet.Numerics.LinearAlgebra.Matrix<double> dense = model.Dense();
        MultifrontalFactor factor = Checks.Factored(model);
        double[] b = Checks.RandomVector(2 * n, new Random(1)), x = new double[2 * n];
        for (int k = 0; k < slots.Length; k++)
            factor.Replace(slots[k], [-dense[unknowns[k], unknowns[k]]]);
        factor.Factor();
        factor.SolveMany(b, x, []);
        Assert.True(factor.RefinementSteps > 0 && factor.BackwardError < Limit, $"{factor.RefinementSteps} {factor.BackwardError}");
        foreach (int slot in slots)
            factor.Replace(slot, [0]);
        factor.Factor();
        factor.SolveMany(b, x, []);
        Assert.Equal((0, double.NaN), (factor.RefinementSteps, factor.BackwardError));
    }

    private static void Change(MultifrontalFactor factor, SparseModel model, int slot, double[] matrix)
    {
        model.Matrices[slot] = matrix;
        factor.Replace(slot, matrix);
    }

    /// <summary>A tangent between none and a tenth of the penalty with a random sign, mostly softening; for a general factor with a skew part.</summary>
    private static double[] Softened(StripModel strip, bool general, Random random)
    {
        double size = Penalty * Math.Pow(10, -1 - 6 * random.NextDouble());
        double[] matrix = strip.LayerMatrix(random.Next(4) == 0 ? size : random.Next(10) == 0 ? 0 : -size);
        int m = (int)Math.Sqrt(matrix.Length);
        if (general)
            for (int r = 0; r < m; r++)
                for (int c = 0; c < r; c++)
                {
                    double skew = 0.1 * size * (random.NextDouble() - 0.5);
                    matrix[r * m + c] += skew;
                    matrix[c * m + r] -= skew;
                }
        return matrix;
    }

    /// <summary>Whole solves, solves along a path and solves of many right sides.</summary>
    private static void LeavesRoundOff(StripModel strip, MultifrontalFactor factor, int[] held, Random random, int slot)
    {
        SparseModel model = strip.Model;
        const int Count = 3;
        int n = model.Unknowns;
        double[] b = Checks.RandomVector(Count * n, random), x = Checks.RandomVector(Count * n, random), single = x[..n];
        factor.SolveMany(b, x, held);
        for (int c = 0; c < Count; c++)
            IsRoundOff(model, b[(c * n)..((c + 1) * n)], x[(c * n)..((c + 1) * n)], held);
        factor.Solve(b.AsSpan(0, n), single, held);
        IsRoundOff(model, b[..n], single, held);
        Assert.True(double.IsNaN(factor.BackwardError) || factor.BackwardError < Limit, $"told {factor.BackwardError}");
        // Along a path the other values are the whole solve's, so that the residual is that of all rows.
        int[] unknowns = model.Pattern.Unknowns(slot).ToArray();
        double[] load = new double[n], along;
        foreach (int unknown in unknowns)
            load[unknown] = random.NextDouble() - 0.5;
        factor.Solve(load, single, held);
        along = (double[])single.Clone();
        foreach (int unknown in unknowns)
            along[unknown] = double.NaN;
        factor.Solve(load, along, held, factor.Plan.PathOf(unknowns));
        IsRoundOff(model, load, along, held);
    }

    private static void IsRoundOff(SparseModel model, double[] b, double[] x, int[] held)
    {
        Close.To(0, Checks.BackwardError(model, b, x, held), absolute: Limit, what: "normwise");
        Close.To(0, Checks.ComponentwiseError(model, b, x, held), absolute: Limit, what: "componentwise");
    }
}
