using InterfaceFE.Sparse;
using MathNet.Numerics.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra.Double;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

/// <summary>Estimated against computed condition numbers (MathNet.Numerics' dense inverse).</summary>
public class ConditionTests
{
    [Theory]
    [InlineData(6, 2, 1)]
    [InlineData(12, 2, 1e4)]
    [InlineData(30, 1, 1e2)]
    public void Estimates_are_close_to_the_dense_condition(int columns, int rows, double penalty)
    {
        SparseModel model = new StripModel(columns, rows, false, penalty).Model;
        var factor = (WorkingFactor)Checks.Factored(model);
        int[] root = model.RootUnknowns();
        foreach (int[] held in new[] { [], root[..2], root })
        {
            int[] free = Enumerable.Range(0, model.Unknowns).Except(held).ToArray();
            Matrix<double> k = model.Dense();
            Matrix<double> scaled = DenseMatrix.Create(free.Length, free.Length, (i, j) => k[free[i], free[j]] / Math.Sqrt(k[free[i], free[i]] * k[free[j], free[j]]));
            double exact = scaled.L1Norm() * scaled.Inverse().L1Norm(), estimate = factor.Condition(held);
            // The matrix's norm is taken from magnitudes of slots, an upper bound; the inverse's is a lower bound.
            Assert.InRange(estimate, 0.3 * exact, 3 * exact);
        }
    }

    [Fact]
    public void One_unknown_has_condition_one()
    {
        var model = new SparseModel();
        model.Spring(model.Vertex(0, 0, 1), -1, 7);
        Close.To(1, ((WorkingFactor)Checks.Factored(model)).Condition([]), 1e-14);
    }

    [Fact]
    public void Without_free_unknowns_it_is_one()
    {
        var model = new SparseModel();
        int only = model.Vertex(0, 0, 1, root: true);
        model.Spring(only, -1, 7);
        Assert.Equal(1, ((WorkingFactor)Checks.Factored(model)).Condition([only]));
    }
}
