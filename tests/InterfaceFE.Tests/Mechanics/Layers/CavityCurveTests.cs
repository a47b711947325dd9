using InterfaceFE.Mechanics.Layers;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

public sealed class CavityCurveTests
{
    [Fact]
    public void Traction_gains_pressure_times_share_and_toughness_its_integral()
    {
        CavityCurve curve = new(Laws.Plateau, [0.3, 0.9, 3, 4], [0, 0.6, 0.6, 0], -0.07);
        Close.To(Laws.Plateau.Traction(2) - 0.07 * 0.6, curve.Traction(2));
        Close.To(Laws.Plateau.Traction(0.6) - 0.07 * 0.3, curve.Traction(0.6));
        Close.To(Laws.Plateau.Traction(0.2), curve.Traction(0.2), 0, 0);
        Close.To(Laws.Plateau.Traction(4.5), curve.Traction(4.5), 0, 0);
        // Integral of the share by trapezoids: 0.6·(0.6/2 + 2.1 + 1/2).
        Close.To(2 - 0.07 * 0.6 * 2.9, curve.Toughness);
        LawWalk walk = new(new IndependentModesLaw(curve, Laws.ShearLine, 5));
        for (int i = 1; i <= 50; i++)
            walk.To(0.02 * i * 1.01 * curve.FinalSeparation, 0);
        Close.To(curve.Toughness, walk.Answer.Dissipated);
    }

    [Fact]
    public void No_change_of_pressure_changes_nothing()
    {
        CavityCurve curve = new(Laws.Tape, [0.5, 1, 3], [0, 0.8, 0], 0);
        for (int i = 0; i < 100; i++)
        {
            Close.To(Laws.Tape.Traction(0.08 * i), curve.Traction(0.08 * i), 0, 0);
            Close.To(Laws.Tape.Area(0.08 * i), curve.Area(0.08 * i), 0, 0);
        }
        Close.To(Laws.Tape.Strength, curve.Strength);
    }

    [Fact]
    public void Shares_that_pull_the_traction_below_zero_or_let_damage_fall_are_refused()
    {
        Refuse("falls to", [0.3, 0.9, 3, 4], [0, 0.6, 0.6, 0], -0.8);
        Refuse("traction over opening rises", [0.3, 0.35, 3, 4], [0, 0.9, 0.9, 0], 0.3);
        Refuse("vented", [0.3, 0.9, 7], [0, 0.6, 0], 0.1);
        Refuse("must be 0", [0.3, 0.9, 3], [0, 0.6, 0.1], 0.1);
        Refuse("above an opening of 0", [0, 0.9, 3], [0, 0.6, 0], 0.1);
        Refuse("rise", [0.9, 0.9, 3], [0, 0.6, 0], 0.1);
        Refuse("as many", [0.9, 3], [0, 0.6, 0], 0.1);
        Refuse("share from 0 to 1", [0.3, 0.9, 3], [0, 1.6, 0], 0.1);

        static void Refuse(string words, double[] w, double[] share, double pressure) =>
            Assert.Contains(words, Assert.ThrowsAny<ArgumentException>(() => new CavityCurve(Laws.Plateau, w, share, pressure)).Message, StringComparison.Ordinal);
    }
}
