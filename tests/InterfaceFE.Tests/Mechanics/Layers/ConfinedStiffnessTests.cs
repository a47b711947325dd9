using InterfaceFE.Mechanics.Layers;
using MathNet.Numerics.LinearAlgebra;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

public sealed class ConfinedStiffnessTests
{
    private const double Young = 2400, Thickness = 0.2, Expansion = 60e-6;

    /// <summary>Strain through the thickness by Hooke's law in full: compliance with stresses where free, strains where held.</summary>
    private static double Through(double poisson, bool alongFree, bool acrossFree, double pull, double free, double along, double across)
    {
        // Unknowns: strain y, stress x, stress z. Equations of strain x, y, z in that order.
        Matrix<double> a = Matrix<double>.Build.Dense(3, 3);
        Vector<double> b = Vector<double>.Build.Dense(3);
        a[0, 1] = 1 / Young;
        a[0, 2] = -poisson / Young;
        b[0] = along - free + poisson * pull / Young;
        a[1, 0] = 1;
        a[1, 1] = poisson / Young;
        a[1, 2] = poisson / Young;
        b[1] = free + pull / Young;
        a[2, 1] = -poisson / Young;
        a[2, 2] = 1 / Young;
        b[2] = across - free + poisson * pull / Young;
        if (alongFree)
            Zero(0, 1);
        if (acrossFree)
            Zero(2, 2);
        return a.Solve(b)[0];

        void Zero(int row, int stress)
        {
            a.ClearRow(row);
            a[row, stress] = 1;
            b[row] = 0;
        }
    }

    [Theory]
    [InlineData(LayerRestraint.Confined, false, false)]
    [InlineData(LayerRestraint.UnconfinedHeld, true, false)]
    [InlineData(LayerRestraint.UnconfinedFree, true, true)]
    public void Stiffness_and_free_opening_agree_with_hookes_law(LayerRestraint restraint, bool alongFree, bool acrossFree)
    {
        foreach (double poisson in new[] { 0, 0.2, 0.38, 0.45, 0.49, -0.3 })
        {
            ConfinedStiffness layer = new(Young, poisson, Expansion, Thickness, restraint);
            Close.To(1 / (Through(poisson, alongFree, acrossFree, 1, 0, 0, 0) * Thickness), layer.Peel, 1e-10);
            Close.To(Young / 2 / (1 + poisson) / Thickness, layer.Shear, 1e-14);
            double along = -80 * 31e-6, across = -80 * 23e-6;
            Close.To(Thickness * Through(poisson, alongFree, acrossFree, 0, -80 * Expansion, along, across), layer.FreeOpening(-80, along, across), 1e-9);
        }
    }

    [Fact]
    public void Limits_are_as_known()
    {
        Close.To(Young / Thickness, new ConfinedStiffness(Young, 0, Expansion, Thickness, LayerRestraint.Confined).Peel, 1e-15);
        Close.To(3.8, new ConfinedStiffness(Young, 0.45, Expansion, Thickness, LayerRestraint.Confined).Peel * Thickness / Young, 0.01);
        Close.To(17, new ConfinedStiffness(Young, 0.49, Expansion, Thickness, LayerRestraint.Confined).Peel * Thickness / Young, 0.02);
        Assert.True(new ConfinedStiffness(Young, 0.46, 0, Thickness, LayerRestraint.Confined).IsSensitive);
        Assert.False(new ConfinedStiffness(Young, 0.46, 0, Thickness, LayerRestraint.UnconfinedFree).IsSensitive);
        Assert.False(new ConfinedStiffness(Young, 0.45, 0, Thickness, LayerRestraint.Confined).IsSensitive);
    }

    [Fact]
    public void Layer_and_adherends_of_one_material_open_by_free_expansion_alone()
    {
        double free = Expansion * 50;
        Close.To(Thickness * free, new ConfinedStiffness(Young, 0.3, Expansion, Thickness, LayerRestraint.Confined).FreeOpening(50, free, free), 1e-13);
        // Held out of plane: along (1 + nu) times as much, across none, so through (1 + nu) times as much.
        Close.To(Thickness * 1.3 * free, new ConfinedStiffness(Young, 0.3, Expansion, Thickness, LayerRestraint.Confined).FreeOpening(50, 1.3 * free, 0), 1e-13);
        Close.To(Thickness * 1.3 * free, new ConfinedStiffness(Young, 0.3, Expansion, Thickness, LayerRestraint.UnconfinedHeld).FreeOpening(50, 1.3 * free, 0), 1e-13);
        Close.To(Thickness * free, new ConfinedStiffness(Young, 0.3, Expansion, Thickness, LayerRestraint.UnconfinedFree).FreeOpening(50, free, free), 1e-13);
    }

    [Fact]
    public void Nonsense_is_refused()
    {
        foreach (double bad in new[] { 0.5, -1, double.NaN, 0.7 })
            Assert.ThrowsAny<ArgumentException>(() => new ConfinedStiffness(Young, bad, Expansion, Thickness, LayerRestraint.Confined));
        Assert.ThrowsAny<ArgumentException>(() => new ConfinedStiffness(0, 0.3, Expansion, Thickness, LayerRestraint.Confined));
        Assert.ThrowsAny<ArgumentException>(() => new ConfinedStiffness(Young, 0.3, Expansion, double.NaN, LayerRestraint.Confined));
        Assert.ThrowsAny<ArgumentException>(() => new ConfinedStiffness(Young, 0.3, double.NaN, Thickness, LayerRestraint.Confined));
    }
}
