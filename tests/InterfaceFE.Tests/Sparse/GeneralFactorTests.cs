using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

public class GeneralFactorTests
{
    [Fact]
    public void Random_unsymmetric_systems_solve_as_the_dense_matrix_with_the_sign_of_its_determinant()
    {
        for (int seed = 0; seed < 300; seed++)
        {
            var random = new Random(1000 + seed);
            SparseModel model = WorkingFactorTests.RandomModel(random, symmetric: false);
            if (model.Unknowns == 0 || model.Dense().ConditionNumber() > 1e8)
                continue;
            MultifrontalFactor factor = Checks.Factored(model, general: true, options: new PlanOptions(LeafVertices: 1 + seed % 7));
            Checks.SolvesAsDense(model, factor, [], random, 1e-6);
            Inertia signs = factor.Inertia([]);
            if (signs.Zero == 0)
                Assert.Equal(Math.Sign(model.Dense().Determinant()), signs.Negative % 2 == 0 ? 1 : -1);
        }
    }

    [Fact]
    public void A_strip_with_skew_tangents_solves_as_the_dense_matrix()
    {
        var random = new Random(8);
        var strip = new StripModel(20, 3, true, 1e3);
        SparseModel model = strip.Model;
        foreach (int slot in strip.LayerSlots)
        {
            int m = model.Pattern.Unknowns(slot).Length;
            double[] matrix = model.Matrices[slot];
            for (int r = 0; r < m; r++)
                for (int c = 0; c < m; c++)
                    matrix[r * m + c] += 30 * (random.NextDouble() - 0.5);
        }
        MultifrontalFactor factor = Checks.Factored(model, general: true);
        int[] root = model.RootUnknowns();
        Checks.SolvesAsDense(model, factor, [], random, 1e-8);
        Checks.SolvesAsDense(model, factor, root, random, 1e-8);
        Checks.SolvesAsDense(model, factor, root[1..], random, 1e-8);
    }

    [Fact]
    public void Symmetric_matrices_give_the_symmetric_factors_answer()
    {
        SparseModel model = new StripModel(30, 2, false, 100).Model;
        double[] b = Checks.RandomVector(model.Unknowns, new Random(1)), x = new double[b.Length], y = new double[b.Length];
        Checks.Factored(model).Solve(b, x, []);
        MultifrontalFactor general = Checks.Factored(model, general: true);
        general.Solve(b, y, []);
        Assert.Equal(new Inertia(model.Unknowns, 0, 0), general.Inertia([]));
        Close.To(0, general.BackwardError, absolute: 1e-15);
        double largest = x.Max(Math.Abs);
        for (int i = 0; i < x.Length; i++)
            Close.To(x[i], y[i], relative: 0, absolute: 1e-10 * largest);
    }
}
