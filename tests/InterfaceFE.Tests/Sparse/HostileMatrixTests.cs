using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

/// <summary>Matrices that no sound model has: each ends in the right status, names the right place, and leaves the factor fit for a sound matrix again.</summary>
public class HostileMatrixTests
{
    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public void Every_kind_of_bad_slot_is_named_after_a_sound_matrix_and_gone_after_the_next(bool general)
    {
        var strip = new StripModel(30, 3, false, 100);
        SparseModel model = strip.Model;
        MultifrontalFactor factor = Checks.Factored(model, general), sound = Checks.Factored(model, general);
        var random = new Random(3);
        foreach (double bad in new[] { double.NaN, double.PositiveInfinity, double.NegativeInfinity, double.NaN })
            for (int trial = 0; trial < 6; trial++)
            {
                int slot = random.Next(model.Matrices.Count), later = random.Next(slot, model.Matrices.Count), m = model.Pattern.Unknowns(slot).Length, row = random.Next(m);
                double[] matrix = (double[])model.Matrices[slot].Clone();
                matrix[row * m + random.Next(m)] = bad;
                factor.Replace(slot, matrix);
                if (later > slot)
                    factor.Replace(later, Array.ConvertAll(model.Matrices[later], _ => bad));
                FactorOutcome outcome = factor.Factor();
                Assert.Equal((FactorStatus.NotFinite, slot, model.Pattern.Unknowns(slot)[row]), (outcome.Status, outcome.Slot, outcome.Unknown));
                Assert.Equal(outcome, factor.Factor());
                Assert.False(factor.IsUpToDate);
                Assert.Throws<InvalidOperationException>(() => factor.Inertia([]));
                // Mending one of two leaves the other.
                factor.Replace(slot, model.Matrices[slot]);
                if (later > slot)
                    Assert.Equal((FactorStatus.NotFinite, later), (factor.Factor().Status, factor.Factor().Slot));
                factor.Replace(later, model.Matrices[later]);
                Assert.Equal(sound.Factor(), factor.Factor());
                Checks.SameBytes(sound, factor, [], new Random(1));
            }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(4)]
    [InlineData(15)]
    public void Saddle_points_with_blocks_of_zeros_are_solved_and_counted(int multipliers)
    {
        var random = new Random(multipliers);
        var strip = new StripModel(16, 2, false, 100);
        SparseModel model = strip.Model;
        int bodies = model.Unknowns;
        int[] moved = Enumerable.Range(4, bodies - 12).ToArray();
        random.Shuffle(moved);
        for (int row = 0; row < multipliers; row++)
        {
            int multiplier = model.Vertex(random.Next(17), random.Next(-2, 3), 1, root: row % 5 == 4);
            model.Slot([multiplier, moved[3 * row], moved[3 * row + 1], moved[3 * row + 2]], Constraint(random));
        }
        int[] root = model.RootUnknowns();
        foreach (bool general in new[] { false, true })
        {
            MultifrontalFactor factor = Checks.Loaded(model, general);
            FactorOutcome outcome = factor.Factor();
            // A multiplier that is eliminated before what it holds has a pivot of zero, lifted upwards: the place is named though the whole is regular.
            Assert.Equal(FactorStatus.ZeroPivot, outcome.Status);
            Assert.InRange(outcome.Unknown, bodies, model.Unknowns - 1);
            foreach (int[] held in new[] { [], root[..3] })
            {
                Checks.SolvesAsDense(model, factor, held, random, 1e-7);
                Inertia signs = factor.Inertia(held);
                if (!general)
                    Assert.Equal((multipliers, bodies - held.Length), (signs.Negative, signs.Positive + signs.Zero));
            }
        }
    }

    [Fact]
    public void Zero_diagonals_everywhere_are_solved()
    {
        // Pairs of unknowns tied by an off-diagonal number, and weak links among the pairs.
        foreach (int pairs in new[] { 1, 2, 30, 200 })
        {
            var random = new Random(pairs);
            var model = new SparseModel();
            for (int u = 0; u < 2 * pairs; u++)
                model.Vertex(u, 0, 1, changeable: u % 3 == 0);
            for (int p = 0; p < pairs; p++)
                model.Slot([2 * p, 2 * p + 1], [0, 1 + random.NextDouble(), 1, 0]);
            for (int slot = 0; slot < pairs; slot++)
                model.Matrices[slot][2] = model.Matrices[slot][1];
            for (int p = 0; p + 1 < pairs; p++)
                model.Slot([2 * p, 2 * p + 2], [0, 0.1, 0.1, 0]);
            foreach (bool general in new[] { false, true })
            {
                MultifrontalFactor factor = Checks.Loaded(model, general);
                Assert.NotEqual(FactorStatus.NotFinite, factor.Factor().Status);
                Checks.SolvesAsDense(model, factor, [], random, 1e-9);
            }
        }
    }

    [Theory]
    [InlineData(1, 1)]
    [InlineData(500, 3)]
    public void A_matrix_of_zeros_is_singular_in_every_unknown(int vertices, int unknowns)
    {
        foreach (bool general in new[] { false, true })
        {
            var model = new SparseModel();
            for (int v = 0; v < vertices; v++)
                model.Vertex(v % 25, v / 25, unknowns, root: v % 100 == 99, changeable: v % 2 == 0);
            for (int v = 0; v + 1 < vertices; v++)
                model.Slot([unknowns * v, unknowns * (v + 1)], new double[4]);
            MultifrontalFactor factor = Checks.Loaded(model, general);
            Assert.Equal(FactorStatus.ZeroPivot, factor.Factor().Status);
            Assert.Equal(new Inertia(0, 0, model.Unknowns), factor.Inertia([]));
            int[] root = model.RootUnknowns();
            Assert.Equal(new Inertia(0, 0, model.Unknowns - root.Length), factor.Inertia(root));
            double[] b = Checks.RandomVector(model.Unknowns, new Random(1)), x = new double[b.Length];
            factor.Solve(b, x, []);
            Assert.All(x, value => Assert.True(double.IsFinite(value)));
        }
    }

    [Fact]
    public void An_empty_row_a_mechanism_and_a_floating_part_are_reached_and_left_by_replacing_slots()
    {
        var strip = new StripModel(24, 2, false, 10, grips: false);
        SparseModel model = strip.Model;
        int alone = model.Vertex(30, 0, 1), spring = model.Slot([alone], [2]);
        // The last column hangs on by one bar: a mechanism (it can turn) once its layer and solids are gone.
        int bar = model.Slot([model.Unknowns - 3, alone], [1, -1, -1, 1]);
        foreach (bool general in new[] { false, true })
        {
            MultifrontalFactor factor = Checks.Loaded(model, general), sound = Checks.Loaded(model, general);
            Assert.Equal(FactorStatus.Done, factor.Factor().Status);
            sound.Factor();
            int all = model.Unknowns;

            Gone(factor, model, [spring, bar]);
            FactorOutcome empty = factor.Factor();
            Assert.Equal((FactorStatus.ZeroPivot, alone, -1), (empty.Status, empty.Unknown, empty.Slot));
            Assert.Equal(new Inertia(all - 1, 0, 1), factor.Inertia([]));
            Back(factor, model, [spring, bar], sound);

            // Without the 13th column of solids and layer the right half floats: three free movements, held by a bar to the spring but for two.
            int[] column = [.. Enumerable.Range(4 * 12, 4), strip.LayerSlots[12]];
            Gone(factor, model, [.. column, bar]);
            FactorOutcome floating = factor.Factor();
            Assert.Equal(FactorStatus.ZeroPivot, floating.Status);
            Assert.Equal(new Inertia(all - 3, 0, 3), factor.Inertia([]));
            int vertex = model.Pattern.VertexOfUnknown[floating.Unknown];
            Assert.InRange(model.Pattern.VertexX[vertex], 13, 24);
            factor.Replace(bar, model.Matrices[bar]);
            Assert.Equal(FactorStatus.ZeroPivot, factor.Factor().Status);
            Assert.Equal(new Inertia(all - 2, 0, 2), factor.Inertia([]));
            Back(factor, model, column, sound);

            // Without the layer's outer half the upper arm stays on the clamped end; without all of it too: no mechanism.
            Gone(factor, model, [.. strip.LayerSlots]);
            Assert.Equal(FactorStatus.Done, factor.Factor().Status);
            Back(factor, model, [.. strip.LayerSlots], sound);
        }
    }

    [Fact]
    public void Thousands_of_lone_vertices_and_disconnected_pieces_are_solved_and_the_one_at_fault_is_named()
    {
        var random = new Random(5);
        var model = new SparseModel();
        const int Lone = 3000, Pieces = 400;
        for (int v = 0; v < Lone; v++)
        {
            model.Vertex(random.NextDouble(), random.NextDouble(), 1, changeable: v % 2 == 0);
            model.Slot([v], [v % 3 == 0 ? -2 : 4]);
        }
        for (int p = 0; p < Pieces; p++)
        {
            int a = model.Vertex(random.NextDouble(), 0, 2), b = model.Vertex(random.NextDouble(), 0, 1);
            model.Slot([a, a + 1, b], [3, 1, 0, 1, 3, 1, 0, 1, 3]);
        }
        foreach (bool general in new[] { false, true })
        {
            MultifrontalFactor factor = Checks.Loaded(model, general);
            Assert.Equal(FactorStatus.Done, factor.Factor().Status);
            Assert.Equal(new Inertia(Lone - Lone / 3 + 3 * Pieces, Lone / 3, 0), factor.Inertia([]));
            double[] b = Checks.RandomVector(model.Unknowns, random), x = new double[b.Length];
            factor.Solve(b, x, []);
            Close.To(0, Checks.ComponentwiseError(model, b, x, []), absolute: 1e-15);
            factor.Replace(1717, [0]);
            FactorOutcome outcome = factor.Factor();
            Assert.Equal((FactorStatus.ZeroPivot, 1717), (outcome.Status, outcome.Unknown));
            factor.Replace(1717, [double.NaN]);
            outcome = factor.Factor();
            Assert.Equal((FactorStatus.NotFinite, 1717, 1717), (outcome.Status, outcome.Unknown, outcome.Slot));
            // A piece that is singular: the last of its unknowns in the order has nothing left.
            factor.Replace(1717, model.Matrices[1717]);
            factor.Replace(Lone + 7, [1, 1, 1, 1, 1, 1, 1, 1, 1]);
            outcome = factor.Factor();
            Assert.Equal(FactorStatus.ZeroPivot, outcome.Status);
            Assert.InRange(outcome.Unknown, Lone + 21, Lone + 23);
            factor.Replace(Lone + 7, model.Matrices[Lone + 7]);
            Assert.Equal(FactorStatus.Done, factor.Factor().Status);
        }
    }

    [Fact]
    public void A_root_of_two_hundred_unknowns_and_slots_of_one_and_of_forty_are_solved_as_the_dense_matrix()
    {
        var random = new Random(8);
        var model = new SparseModel();
        for (int v = 0; v < 60; v++)
            model.Vertex(v % 12, v / 12, 5, root: v >= 20, changeable: v % 7 == 0);
        for (int slot = 0; slot < 40; slot++)
        {
            int[] unknowns = Enumerable.Range(0, model.Unknowns).ToArray();
            random.Shuffle(unknowns);
            var matrix = new double[1600];
            for (int r = 0; r < 40; r++)
                for (int c = 0; c <= r; c++)
                    matrix[r * 40 + c] = matrix[c * 40 + r] = random.NextDouble() - 0.5;
            model.Slot(unknowns[..40], matrix);
        }
        for (int u = 0; u < model.Unknowns; u++)
            model.Slot([u], [random.NextDouble() - 0.3]);
        model.Slot([], []);
        int[] root = model.RootUnknowns();
        Assert.Equal(200, root.Length);
        MultifrontalFactor factor = Checks.Loaded(model, general: false);
        Assert.NotEqual(FactorStatus.NotFinite, factor.Factor().Status);
        foreach (int[] held in new[] { [], root[..77], root })
        {
            Checks.SolvesAsDense(model, factor, held, random, 1e-6);
            Checks.HasDenseInertia(model, factor, held);
        }
    }

    [Fact]
    public void A_matrix_that_is_not_symmetric_counts_by_its_mean_and_leaves_no_trace()
    {
        var model = new SparseModel();
        int a = model.Vertex(0, 0, 1), b = model.Vertex(1, 0, 1);
        int link = model.Slot([a, b], [0, 2, 2, 0]);
        MultifrontalFactor sound = Checks.Factored(model), factor = Checks.Loaded(model);
        factor.Replace(link, [0, 1, 3, 0]);
        factor.Factor();
        // The mean stays; what the rows of the first matrix said of the unknowns' scales does not.
        factor.Replace(link, model.Matrices[link]);
        Assert.Equal(sound.Factor(), factor.Factor());
        Checks.SameBytes(sound, factor, [], new Random(1));
    }

    [Fact]
    public void A_pattern_without_vertices_has_an_empty_factor()
    {
        var model = new SparseModel();
        foreach (bool general in new[] { false, true })
        {
            MultifrontalFactor factor = Checks.Loaded(model, general);
            Assert.Equal(FactorStatus.Done, factor.Factor().Status);
            factor.Solve([], [], []);
            factor.SolveMany([], [], []);
            factor.Multiply([], []);
            Assert.Equal(new Inertia(0, 0, 0), factor.Inertia([]));
        }
    }

    /// <summary>Three unknowns with random shares in a row that a multiplier holds.</summary>
    private static double[] Constraint(Random random)
    {
        double a = 0.5 + random.NextDouble(), b = random.NextDouble() - 0.5, c = random.NextDouble() - 0.5;
        return [0, a, b, c, a, 0, 0, 0, b, 0, 0, 0, c, 0, 0, 0];
    }

    private static void Gone(MultifrontalFactor factor, SparseModel model, int[] slots)
    {
        foreach (int slot in slots)
            factor.Replace(slot, new double[model.Matrices[slot].Length]);
    }

    /// <summary>Puts slots back and compares with a factor that never lost them.</summary>
    private static void Back(MultifrontalFactor factor, SparseModel model, int[] slots, MultifrontalFactor sound)
    {
        foreach (int slot in slots)
            factor.Replace(slot, model.Matrices[slot]);
        Assert.Equal(sound.Factor(), factor.Factor());
        Checks.SameBytes(sound, factor, [], new Random(1));
    }
}
