using InterfaceFE.Sparse;
using MathNet.Numerics.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra.Double;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

/// <summary>Comparisons that several test classes use.</summary>
internal static class Checks
{
    public static double[] RandomVector(int count, Random random)
    {
        var values = new double[count];
        for (int i = 0; i < count; i++)
            values[i] = random.NextDouble() - 0.5;
        return values;
    }

    /// <summary>A factor with the model's numbers, not yet made.</summary>
    public static MultifrontalFactor Loaded(SparseModel model, bool general = false, PlanOptions? options = null)
    {
        SparsePlan plan = SparsePlan.Analyze(model.Pattern, options);
        MultifrontalFactor factor = general ? new GeneralFactor(plan) : new WorkingFactor(plan);
        model.Load(factor);
        return factor;
    }

    public static MultifrontalFactor Factored(SparseModel model, bool general = false, PlanOptions? options = null)
    {
        MultifrontalFactor factor = Loaded(model, general, options);
        factor.Factor();
        return factor;
    }

    /// <summary>Largest |b - K x| over free unknowns relative to largest row sum of |K| times largest |x|, plus largest |b|: normwise backward error.</summary>
    public static double BackwardError(SparseModel model, double[] b, double[] x, int[] held)
    {
        var residual = (double[])b.Clone();
        var rowSum = new double[b.Length];
        for (int slot = 0; slot < model.Pattern.SlotCount; slot++)
        {
            ReadOnlySpan<int> unknowns = model.Pattern.Unknowns(slot);
            int m = unknowns.Length;
            for (int r = 0; r < m; r++)
                for (int c = 0; c < m; c++)
                {
                    residual[unknowns[r]] -= model.Matrices[slot][r * m + c] * x[unknowns[c]];
                    rowSum[unknowns[r]] += Math.Abs(model.Matrices[slot][r * m + c]);
                }
        }
        double worst = 0;
        for (int i = 0; i < b.Length; i++)
            if (!held.Contains(i))
                worst = Math.Max(worst, double.IsNaN(residual[i]) ? double.PositiveInfinity : Math.Abs(residual[i]));
        return worst / (rowSum.Max() * x.Max(Math.Abs) + b.Max(Math.Abs));
    }

    /// <summary>Largest |b - K x| / (|K| |x| + |b|) over free unknowns, entry by entry of the slots' matrices: componentwise backward error.</summary>
    public static double ComponentwiseError(SparseModel model, ReadOnlySpan<double> b, ReadOnlySpan<double> x, int[] held)
    {
        double[] residual = b.ToArray(), size = Array.ConvertAll(residual, Math.Abs);
        for (int slot = 0; slot < model.Pattern.SlotCount; slot++)
        {
            ReadOnlySpan<int> unknowns = model.Pattern.Unknowns(slot);
            int m = unknowns.Length;
            for (int r = 0; r < m; r++)
                for (int c = 0; c < m; c++)
                {
                    double product = model.Matrices[slot][r * m + c] * x[unknowns[c]];
                    residual[unknowns[r]] -= product;
                    size[unknowns[r]] += Math.Abs(product);
                }
        }
        double worst = 0;
        for (int i = 0; i < b.Length; i++)
            if (!held.Contains(i) && residual[i] != 0)
                worst = Math.Max(worst, double.IsFinite(residual[i]) ? Math.Abs(residual[i]) / size[i] : double.PositiveInfinity);
        return worst;
    }

    /// <summary>Solves with held values and compares with the dense solution of the free part.</summary>
    public static void SolvesAsDense(SparseModel model, IWorkingFactor factor, int[] held, Random random, double relative)
    {
        double[] b = RandomVector(model.Unknowns, random), given = RandomVector(model.Unknowns, random), x = (double[])given.Clone();
        factor.Solve(b, x, held);
        int[] free = Enumerable.Range(0, model.Unknowns).Except(held).ToArray();
        Matrix<double> k = model.Dense();
        var right = Vector<double>.Build.Dense(free.Length, i => b[free[i]] - held.Sum(h => k[free[i], h] * given[h]));
        var expected = (double[])given.Clone();
        if (free.Length > 0)
        {
            Vector<double> solution = Reduced(k, free).Solve(right);
            for (int i = 0; i < free.Length; i++)
                expected[free[i]] = solution[i];
        }
        double largest = expected.Max(Math.Abs);
        for (int i = 0; i < x.Length; i++)
            Close.To(expected[i], x[i], relative: 0, absolute: relative * largest, what: $"unknown {i} of {x.Length}");
        foreach (int h in held)
            Close.To(given[h], x[h], relative: 0, what: "held value");
        Close.To(0, BackwardError(model, b, x, held), absolute: 1e-13, what: "backward error");
    }

    /// <summary>Two factors solve a random right side to the same bits and tell the same of it.</summary>
    public static void SameBytes(MultifrontalFactor expected, MultifrontalFactor actual, int[] held, Random random)
    {
        double[] b = Checks.RandomVector(expected.Size, random), x = Checks.RandomVector(expected.Size, random), y = (double[])x.Clone();
        expected.Solve(b, x, held);
        actual.Solve(b, y, held);
        Assert.Equal(Array.ConvertAll(x, BitConverter.DoubleToInt64Bits), Array.ConvertAll(y, BitConverter.DoubleToInt64Bits));
        Assert.Equal((expected.Growth, expected.LiftedPivots, expected.Inertia(held)), (actual.Growth, actual.LiftedPivots, actual.Inertia(held)));
        Assert.Equal((expected.RefinementSteps, expected.BackwardError), (actual.RefinementSteps, actual.BackwardError));
    }

    /// <summary>Compares the inertia with the signs of the dense eigenvalues of the free part.</summary>
    public static void HasDenseInertia(SparseModel model, IWorkingFactor factor, int[] held)
    {
        int[] free = Enumerable.Range(0, model.Unknowns).Except(held).ToArray();
        int positive = 0, negative = 0;
        if (free.Length > 0)
        {
            Vector<double> values = Reduced(model.Dense(), free).Evd(Symmetricity.Symmetric).EigenValues.Map(v => v.Real);
            double limit = 1e-11 * values.AbsoluteMaximum();
            Assert.True(values.AbsoluteMinimum() > limit, "the test's matrix is too close to singular to compare signs");
            positive = values.Count(v => v > 0);
            negative = values.Count(v => v < 0);
        }
        Assert.Equal(new Inertia(positive, negative, 0), factor.Inertia(held));
    }

    private static Matrix<double> Reduced(Matrix<double> k, int[] free) => DenseMatrix.Create(free.Length, free.Length, (i, j) => k[free[i], free[j]]);
}
