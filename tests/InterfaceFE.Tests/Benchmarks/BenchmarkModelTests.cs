using InterfaceFE.Benchmarks.Models;
using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Benchmarks;

public class BenchmarkModelTests
{
    [Theory]
    [InlineData(4, 2 * 2 * 21 * 3)]
    [InlineData(8, 2 * 2 * (21 * 3 + 20 * 3 + 21 * 2))]
    public void Strip_has_two_unknowns_for_each_node_that_is_not_supported(int nodesPerSolid, int all)
    {
        BenchmarkModel model = new(MeshCatalogue.Strip("strip", nodesPerSolid, 20, 2));
        int supported = 2 * 2 * (nodesPerSolid == 4 ? 3 : 5);
        Assert.Equal(all - supported, model.Pattern.UnknownCount);
        Assert.Equal(2, model.Held.Length);
    }

    [Fact]
    public void Hat_has_three_joints_without_a_starter_crack()
    {
        BenchmarkMesh mesh = MeshCatalogue.Hat("hat", 1);
        Assert.Equal([160, 40, 40], mesh.Joints.Select(joint => joint.Bonded));
        Assert.Equal(240, mesh.LayerCount);
    }

    [Fact]
    public void Matrices_sum_to_what_the_engine_multiplies_with()
    {
        BenchmarkModel model = new(MeshCatalogue.Strip("strip", 4, 40, 2));
        AssembledMatrix matrix = AssembledMatrix.From(model);
        WorkingFactor factor = new(SparsePlan.Analyze(model.Pattern));
        for (int slot = 0; slot < model.Matrices.Length; slot++)
            factor.Replace(slot, model.Matrices[slot]);
        Assert.Equal(FactorStatus.Done, factor.Factor().Status);
        double[] b = model.RightSide(), x = new double[b.Length];
        factor.Solve(b, x, model.Held);
        Close.To(0, matrix.BackwardError(matrix.Restrict(b), matrix.Restrict(x)), absolute: 1e-15);
        Assert.Equal(0, factor.Inertia(model.Held).Negative);
    }

    [Fact]
    public void Hat_is_definite_with_its_grip_held()
    {
        BenchmarkModel model = new(MeshCatalogue.Hat("hat", 4));
        WorkingFactor factor = new(SparsePlan.Analyze(model.Pattern));
        for (int slot = 0; slot < model.Matrices.Length; slot++)
            factor.Replace(slot, model.Matrices[slot]);
        Assert.Equal(FactorStatus.Done, factor.Factor().Status);
        Assert.Equal(0, factor.Inertia(model.Held).Negative);
    }

    [Fact]
    public void Upper_triangle_has_each_entry_once_with_rising_rows()
    {
        AssembledMatrix matrix = AssembledMatrix.From(new BenchmarkModel(MeshCatalogue.Hat("hat", 1)));
        for (int column = 0; column < matrix.Size; column++)
        {
            ReadOnlySpan<int> rows = matrix.Rows.AsSpan(matrix.Start[column], matrix.Start[column + 1] - matrix.Start[column]);
            Assert.Equal(column, rows[^1]);
            for (int k = 1; k < rows.Length; k++)
                Assert.True(rows[k - 1] < rows[k]);
        }
    }

    [Fact]
    public void Softening_tangent_is_negative_in_opening_and_an_open_element_carries_nothing()
    {
        BenchmarkMesh mesh = MeshCatalogue.Strip("strip", 4, 20, 2);
        ElementMatrices matrices = new(mesh);
        // Entry of the first lower node's y with itself.
        int entry = 8 + 1;
        Assert.True(matrices.Layer(0, 0)[entry] > 0);
        Assert.True(matrices.Layer(0, 32)[entry] < 0);
        Assert.All(matrices.Layer(0, ElementMatrices.OpenLevel), value => Assert.Equal(0, value));
    }

    [Theory]
    [InlineData(4)]
    [InlineData(8)]
    public void Layer_tangents_are_symmetric_at_each_level(int nodesPerSolid)
    {
        BenchmarkMesh mesh = MeshCatalogue.Strip("strip", nodesPerSolid, 20, 2);
        ElementMatrices matrices = new(mesh);
        int size = 4 * mesh.NodesPerFace;
        for (int level = 0; level < ElementMatrices.OpenLevel; level++)
        {
            double[] tangent = matrices.Layer(0, level);
            for (int r = 0; r < size; r++)
                for (int c = 0; c < r; c++)
                    Close.To(tangent[r * size + c], tangent[c * size + r], absolute: 1e-12 * Math.Abs(tangent[0]));
        }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(10)]
    [InlineData(100)]
    public void Changed_layer_elements_are_neighbours_of_one_joint_and_bonded(int count)
    {
        BenchmarkModel model = new(MeshCatalogue.Hat("hat", 4));
        foreach (ElementChange change in ElementChange.OfLayer(model, count, 9))
        {
            Assert.Equal(count, change.Slots.Length);
            Assert.Equal(count - 1, change.Slots[^1] - change.Slots[0]);
            Assert.Single(model.Mesh.Joints, joint =>
                model.LayerSlot(joint.FirstElement + joint.FirstBonded) <= change.Slots[0] && change.Slots[^1] < model.LayerSlot(joint.FirstElement + joint.Count));
            Assert.All(change.Matrices, set => Assert.Equal(count, set.Length));
        }
    }

    [Theory]
    [InlineData(4, 1)]
    [InlineData(4, 50)]
    [InlineData(8, 10)]
    public void Each_change_gives_each_element_other_numbers_than_it_had(int nodesPerSolid, int count)
    {
        BenchmarkModel model = new(MeshCatalogue.Strip("strip", nodesPerSolid, 100, 2));
        foreach (ElementChange change in (ElementChange[])[.. ElementChange.OfLayer(model, count, 3), ElementChange.OfColumns(model, 5, 55)])
            for (int i = 0; i < change.Slots.Length; i++)
            {
                double[] had = model.Matrices[change.Slots[i]];
                for (int set = 0; set <= change.Matrices.Length; set++)
                {
                    double[] gets = change.Matrices[set % change.Matrices.Length][i];
                    Assert.True(gets.Zip(had, (a, b) => Math.Abs(a - b)).Max() > 1e-3 * had.Max(Math.Abs));
                    had = gets;
                }
            }
    }

    [Fact]
    public void Yielding_columns_take_the_solid_and_layer_elements_of_their_width()
    {
        BenchmarkModel model = new(MeshCatalogue.Strip("strip", 4, 100, 2));
        ElementChange change = ElementChange.OfColumns(model, 10, 55);
        Assert.Equal(10 * (2 * 2 + 1), change.Slots.Length);
    }
}
