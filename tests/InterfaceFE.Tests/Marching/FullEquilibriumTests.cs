using InterfaceFE.Marching;
using InterfaceFE.Model;
using InterfaceFE.Tests.Model;
using MathNet.Numerics.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra.Double;
using Xunit;

namespace InterfaceFE.Tests.Marching;

/// <summary>The equilibrium of a small joint against differences of its own force and dense algebra.</summary>
public class FullEquilibriumTests
{
    private const double Step = 1e-7;
    private const string Sequence = "  - fix: {base: [x, y, rotation], head: [rotation]}\n  - heat to: 60 °C";

    public static TheoryData<string, string, double> Cases { get; } = new()
    {
        { DeckOf.IndependentGlue, "four-node", 0.003 },
        { DeckOf.IndependentGlue, "four-node", 0.05 },
        { DeckOf.IndependentGlue, "eight-node", 0.15 },
        { DeckOf.OneDamageGlue, "four-node", 0.003 },
        { DeckOf.OneDamageGlue, "four-node", 0.03 },
        { DeckOf.OneDamageGlue, "eight-node", 0.08 },
    };

    [Theory]
    [MemberData(nameof(Cases))]
    public void Correction_is_that_of_the_differenced_tangent_solved_densely(string layer, string elements, double size)
    {
        FullEquilibrium equilibrium = AtRandomState(layer, elements, size, 11);
        double[] u = equilibrium.Displacement.ToArray(), force = equilibrium.InternalForce.ToArray();
        int[] free = Free(equilibrium);
        Matrix<double> tangent = Differences(equilibrium, u);
        equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate);
        Correction correction = equilibrium.Solve(new OwnControl(0.5, 0.5));
        Assert.True(correction.Finite && correction.Singular < 0);
        equilibrium.Move(1);
        double[] moved = equilibrium.Displacement.ToArray();

        Vector<double> right = DenseVector.Create(free.Length, i => -force[free[i]]);
        foreach (int held in equilibrium.HeldUnknowns)
            for (int i = 0; i < free.Length; i++)
                right[i] += tangent[free[i], held] * u[held];
        Vector<double> expected = DenseMatrix.Create(free.Length, free.Length, (i, j) => tangent[free[i], free[j]]).Solve(right);
        double scale = expected.AbsoluteMaximum();
        for (int i = 0; i < free.Length; i++)
            Close.To(expected[i], moved[free[i]] - u[free[i]], 0, 2e-6 * scale, equilibrium.Model.Unknowns.Describe(free[i]));
        foreach (int held in equilibrium.HeldUnknowns)
            Close.To(0, moved[held], 0, 1e-15, "held unknowns go where they are held");
    }

    [Theory]
    [MemberData(nameof(Cases))]
    public void Correction_under_layer_work_solves_the_bordered_system(string layer, string elements, double size)
    {
        // The border's column holds the change of force with progress (here by temperature), by differences; its row is the differenced layer work.
        FullEquilibrium equilibrium = AtRandomState(layer, elements, size, 5);
        double[] u = equilibrium.Displacement.ToArray(), force = equilibrium.InternalForce.ToArray();
        double work = ((IEquilibrium)equilibrium).LayerWork, byProgress = equilibrium.LayerWorkByProgress;
        double[] gradient = equilibrium.LayerForce.ToArray();
        int[] free = Free(equilibrium);
        int n = free.Length;
        Matrix<double> tangent = Differences(equilibrium, u);
        double[] rate = ProgressRate(equilibrium, u);
        equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate);
        double target = 1.05 * work;
        equilibrium.Solve(new LayerWorkControl(target, 0.05 * work));
        equilibrium.Move(1);
        double[] moved = equilibrium.Displacement.ToArray();

        var bordered = DenseMatrix.Create(n + 1, n + 1, 0);
        Vector<double> right = DenseVector.Create(n + 1, 0);
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < n; j++)
                bordered[i, j] = tangent[free[i], free[j]];
            bordered[i, n] = rate[free[i]];
            bordered[n, i] = gradient[free[i]];
            right[i] = -force[free[i]];
            foreach (int held in equilibrium.HeldUnknowns)
                right[i] += tangent[free[i], held] * u[held];
        }
        bordered[n, n] = byProgress;
        right[n] = target - work;
        foreach (int held in equilibrium.HeldUnknowns)
            right[n] += gradient[held] * u[held];
        Vector<double> expected = bordered.Solve(right);
        Close.To(expected[n], equilibrium.Progress - 0.5, 1e-5, 0, "progress");
        double scale = expected.SubVector(0, n).AbsoluteMaximum();
        for (int i = 0; i < n; i++)
            Close.To(expected[i], moved[free[i]] - u[free[i]], 0, 1e-5 * scale);
    }

    [Fact]
    public void Tangents_are_skew_in_some_of_the_cases_and_symmetric_in_others()
    {
        List<double> skew = [];
        foreach (TheoryDataRow<string, string, double> row in Cases)
        {
            FullEquilibrium equilibrium = AtRandomState(row.Data.Item1, row.Data.Item2, row.Data.Item3, 11);
            Matrix<double> tangent = Differences(equilibrium, equilibrium.Displacement.ToArray());
            skew.Add((tangent - tangent.Transpose()).Enumerate().Max(Math.Abs) / tangent.Enumerate().Max(Math.Abs));
        }
        Assert.Contains(skew, s => s < 1e-6);
        Assert.Contains(skew, s => s > 1e-4);
    }

    [Theory]
    [InlineData("four-node", 0.003)]
    [InlineData("four-node", 0.05)]
    [InlineData("eight-node", 0.05)]
    public void Layer_force_is_the_gradient_of_layer_work(string elements, double size)
    {
        FullEquilibrium equilibrium = AtRandomState(DeckOf.IndependentGlue.Replace("toughness: 0.2", "toughness: 2", StringComparison.Ordinal).Replace("toughness: 0.5", "toughness: 2", StringComparison.Ordinal), elements, size, 3);
        double[] u = equilibrium.Displacement.ToArray(), gradient = equilibrium.LayerForce.ToArray();
        double scale = gradient.Max(Math.Abs);
        Assert.True(scale > 0);
        for (int i = 0; i < u.Length; i++)
        {
            double saved = u[i];
            double[] work = new double[2];
            for (int side = 0; side < 2; side++)
            {
                u[i] = saved + (side == 0 ? -Step : Step);
                Put(equilibrium, u);
                equilibrium.Evaluate(Wanted.Force);
                work[side] = ((IEquilibrium)equilibrium).LayerWork;
            }
            u[i] = saved;
            Close.To((work[1] - work[0]) / (2 * Step), gradient[i], 0, 1e-6 * scale, equilibrium.Model.Unknowns.Describe(i));
        }
    }

    [Theory]
    [MemberData(nameof(Cases))]
    public void Unstable_directions_are_the_negative_eigenvalues_of_the_symmetric_part(string layer, string elements, double size)
    {
        int found = 0;
        for (int turn = 1; turn <= 6; turn++)
        {
            FullEquilibrium equilibrium = AtRandomState(layer, elements, size, turn);
            (int negative, int singular) = equilibrium.Stability();
            int[] free = Free(equilibrium);
            Matrix<double> tangent = Differences(equilibrium, equilibrium.Displacement.ToArray());
            var symmetric = DenseMatrix.Create(free.Length, free.Length, (i, j) => 0.5 * (tangent[free[i], free[j]] + tangent[free[j], free[i]]));
            double[] values = [.. symmetric.Evd(Symmetricity.Symmetric).EigenValues.Select(v => v.Real)];
            double largest = values.Max(Math.Abs);
            if (values.Min(Math.Abs) < 1e-6 * largest)
                continue;
            Assert.Equal(values.Count(v => v < 0), negative);
            Assert.Equal(-1, singular);
            found++;
        }
        Assert.True(found >= 3, "most random states must be regular");
    }

    [Fact]
    public void Evaluating_twice_gives_the_same_bytes_and_rolling_back_restores_the_accepted_point()
    {
        FullEquilibrium equilibrium = AtRandomState(DeckOf.IndependentGlue, "eight-node", 0.02, 7);
        equilibrium.Accept();
        double[] accepted = equilibrium.AcceptedDisplacement.ToArray(), force = equilibrium.InternalForce.ToArray();
        EnergyState energy = equilibrium.Energy;
        double progress = equilibrium.AcceptedProgress;
        double[] way = Random(equilibrium, 0.1, 8);
        double[][] forces = new double[2][];
        for (int i = 0; i < 2; i++)
        {
            equilibrium.Guess(way, 0.2, 1);
            equilibrium.Evaluate(Wanted.Force | Wanted.Tangent);
            forces[i] = equilibrium.InternalForce.ToArray();
            equilibrium.RollBack();
            equilibrium.Evaluate(Wanted.Force | Wanted.Tangent);
            // The accepted state has been reached before, so the answer now is that of unloading from it: the same force and energy.
            Close.To(energy.Total, equilibrium.Energy.Total, 1e-12);
            for (int j = 0; j < force.Length; j++)
                Close.To(force[j], equilibrium.InternalForce[j], 0, 1e-12 * force.Max(Math.Abs));
        }
        Assert.Equal(forces[0], forces[1]);
        Assert.Equal(accepted, equilibrium.Displacement.ToArray());
        Assert.Equal(progress, equilibrium.Progress);
    }

    [Fact]
    public void Damage_is_kept_only_when_accepted()
    {
        FullEquilibrium equilibrium = AtRandomState(DeckOf.IndependentGlue, "four-node", 0.05, 7);
        double spent = equilibrium.Energy.SpentInLayers;
        Assert.True(spent > 0);
        Put(equilibrium, new double[equilibrium.Displacement.Length]);
        equilibrium.Evaluate(Wanted.Force);
        Assert.Equal(0, equilibrium.Energy.SpentInLayers);
        double[] state = Random(equilibrium, 0.05, 7);
        Put(equilibrium, state);
        equilibrium.Evaluate(Wanted.Force);
        equilibrium.Accept();
        equilibrium.Guess([.. state.Select(v => -v)], 0, 1);
        equilibrium.Evaluate(Wanted.Force);
        Close.To(spent, equilibrium.Energy.SpentInLayers, 1e-12);
    }

    /// <summary>Tentative random displacement at half the heating stage; nothing accepted but the start.</summary>
    private static FullEquilibrium AtRandomState(string layer, string elements, double size, int seed)
    {
        string text = DeckOf.Blocks(Sequence, layer.Replace("thickness: 0.2 mm,", "thickness: 0.2 mm, bulk: {young: 0.1 GPa, poisson: 0.3, expansion: 100e-6 1/K},", StringComparison.Ordinal), elements);
        SpecimenModel model = DeckOf.Model(DeckOf.Yaml(text));
        var equilibrium = new FullEquilibrium(model);
        foreach (LoadStage stage in model.Stages)
            equilibrium.StartStage(stage);
        equilibrium.Guess(Random(equilibrium, size, seed), 0.5, 1);
        equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate);
        return equilibrium;
    }

    private static double[] Random(FullEquilibrium equilibrium, double size, int seed)
    {
        var random = new Random(seed);
        return [.. Enumerable.Range(0, equilibrium.Displacement.Length).Select(_ => size * (2 * random.NextDouble() - 1))];
    }

    private static void Put(FullEquilibrium equilibrium, double[] u)
    {
        double[] way = [.. u.Select((value, i) => value - equilibrium.AcceptedDisplacement[i])];
        double progress = equilibrium.Progress;
        equilibrium.Guess(way, 0, 1);
        equilibrium.Progress = progress;
    }

    private static int[] Free(FullEquilibrium equilibrium) => [.. Enumerable.Range(0, equilibrium.Displacement.Length).Except(equilibrium.HeldUnknowns.ToArray())];

    private static DenseMatrix Differences(FullEquilibrium equilibrium, double[] at)
    {
        int n = at.Length;
        var tangent = new DenseMatrix(n, n);
        double[] u = [.. at];
        for (int j = 0; j < n; j++)
        {
            u[j] = at[j] + Step;
            Put(equilibrium, u);
            equilibrium.Evaluate(Wanted.Force);
            double[] plus = equilibrium.InternalForce.ToArray();
            u[j] = at[j] - Step;
            Put(equilibrium, u);
            equilibrium.Evaluate(Wanted.Force);
            for (int i = 0; i < n; i++)
                tangent[i, j] = (plus[i] - equilibrium.InternalForce[i]) / (2 * Step);
            u[j] = at[j];
        }
        Put(equilibrium, u);
        return tangent;
    }

    private static double[] ProgressRate(FullEquilibrium equilibrium, double[] u)
    {
        const double Share = 1e-5;
        double progress = equilibrium.Progress;
        equilibrium.Progress = progress + Share;
        equilibrium.Evaluate(Wanted.Force);
        double[] plus = equilibrium.InternalForce.ToArray();
        equilibrium.Progress = progress - Share;
        equilibrium.Evaluate(Wanted.Force);
        double[] rate = [.. plus.Select((value, i) => (value - equilibrium.InternalForce[i]) / (2 * Share))];
        equilibrium.Progress = progress;
        Put(equilibrium, u);
        return rate;
    }
}
