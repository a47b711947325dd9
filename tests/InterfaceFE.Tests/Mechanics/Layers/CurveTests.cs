using InterfaceFE.Mechanics.Layers;
using MathNet.Numerics.Integration;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

public sealed class CurveTests
{
    [Fact]
    public void Area_is_the_integral_of_traction_and_ends_at_the_toughness()
    {
        foreach (ITractionCurve curve in Laws.Curves)
        {
            double[] kinks = [0, .. Enumerable.Range(1, 400).Select(i => curve.FinalSeparation * i / 400)];
            double sum = 0;
            for (int i = 1; i < kinks.Length; i++)
            {
                // A piece may hold a kink: an error of 1e-6 of the area at most.
                sum += GaussLegendreRule.Integrate(curve.Traction, kinks[i - 1], kinks[i], 10);
                Close.To(sum, curve.Area(kinks[i]), 1e-5, 1e-5 * curve.Toughness, curve.GetType().Name);
            }
            Close.To(curve.Toughness, curve.Area(curve.FinalSeparation * (1 - 1e-13)), 1e-12);
            Close.To(curve.Toughness, curve.Area(2 * curve.FinalSeparation));
            Close.To(0, curve.Traction(curve.FinalSeparation), 0, 0);
            Close.To(curve.Strength, curve.Traction(curve.PeakSeparation), 1e-14);
            Close.To(curve.Stiffness, curve.Slope(0), 1e-15);
        }
    }

    [Fact]
    public void Slope_is_the_derivative_of_traction_and_traction_that_of_area()
    {
        foreach (ITractionCurve curve in Laws.Curves)
        {
            for (int i = 0; i < 97; i++)
            {
                double w = curve.FinalSeparation * (i + 0.37) / 95, h = 1e-6 * curve.FinalSeparation;
                Close.To((curve.Traction(w + h) - curve.Traction(w - h)) / (2 * h), curve.Slope(w), 1e-6, 1e-6 * curve.Stiffness, curve.GetType().Name);
                Close.To((curve.Area(w + h) - curve.Area(w - h)) / (2 * h), curve.Traction(w), 1e-6, 1e-6 * curve.Strength, curve.GetType().Name);
            }
        }
    }

    [Fact]
    public void Traction_over_separation_never_rises()
    {
        foreach (ITractionCurve curve in Laws.Curves)
        {
            double last = curve.Stiffness * (1 + 1e-12);
            for (int i = 1; i < 1000; i++)
            {
                double w = curve.FinalSeparation * i / 990, secant = curve.Traction(w) / w;
                Assert.True(secant <= last * (1 + 1e-14), curve.GetType().Name);
                last = secant;
            }
        }
    }

    [Fact]
    public void Trapezoid_left_to_itself_has_its_plateau_to_two_thirds()
    {
        TrapezoidCurve curve = new(1.5, 0.45, 2.0);
        Close.To(curve.FinalSeparation * 2 / 3, curve.PlateauEnd);
        Close.To(2.0, curve.Toughness, 1e-14);
        Close.To(0.6 * (2 * 2.0 / 0.45 + 0.3), curve.FinalSeparation, 1e-14);
    }

    [Fact]
    public void Trapezoid_solves_the_length_left_out_from_the_toughness()
    {
        Close.To(5, new TrapezoidCurve(2.5, 0.5, 2, 3.2).FinalSeparation, 1e-14);
        Close.To(3.2, new TrapezoidCurve(2.5, 0.5, 2, double.NaN, 5).PlateauEnd, 1e-14);
        Assert.Contains("agree", Assert.Throws<ArgumentOutOfRangeException>(() => new TrapezoidCurve(2.5, 0.5, 2.1, 3.2, 5)).Message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(1e-4)]
    [InlineData(0.03)]
    [InlineData(0.3)]
    [InlineData(0.4999999)]
    [InlineData(0.5)]
    [InlineData(0.5000001)]
    [InlineData(0.52)]
    [InlineData(0.8)]
    [InlineData(0.9999)]
    public void Exponential_meets_its_toughness_at_any_decay(double share)
    {
        double k = 10, s = 2, wf = 3, w0 = s / k, toughness = 0.5 * s * w0 + s * (wf - w0) * share;
        ExponentialCurve curve = new(k, s, toughness, wf);
        // Pieces fine enough for the fastest decay tried here.
        double sum = 0.5 * s * w0, fine = Math.Min(1, 40 * Math.Min(share, 1 - share));
        Assert.True(curve.Decay * (0.5 - share) >= 0);
        sum += Pieces(w0, w0 + fine * (wf - w0)) + Pieces(w0 + fine * (wf - w0), wf - fine * 0.5 * (wf - w0 - fine * (wf - w0))) + Pieces(wf - fine * 0.5 * (wf - w0 - fine * (wf - w0)), wf);
        Close.To(toughness, sum, 1e-10, 0, "integral");
        Close.To(toughness, curve.Area(wf * (1 - 1e-14)), 1e-12);
        Close.To(0.5 * s * w0, curve.Area(w0 * (1 + 1e-14)), 1e-10, 1e-12 * toughness);
        Close.To(s, curve.Traction(w0 * (1 + 1e-14)), 1e-8);

        double Pieces(double from, double to)
        {
            double total = 0;
            for (int i = 0; i < 200; i++)
                total += GaussLegendreRule.Integrate(curve.Traction, from + (to - from) * i / 200, from + (to - from) * (i + 1) / 200, 20);
            return total;
        }
    }

    [Fact]
    public void Exponential_follows_its_formula()
    {
        ExponentialCurve curve = new(10, 2, 1.1, 3);
        double a = curve.Decay, xi = 0.4;
        Close.To(2 * (Math.Exp(-a * xi) - Math.Exp(-a)) / (1 - Math.Exp(-a)), curve.Traction(0.2 + xi * 2.8), 1e-12);
    }

    [Fact]
    public void Nonsense_is_refused_with_value_and_range()
    {
        foreach (double bad in new[] { 0, -1, double.NaN, double.PositiveInfinity })
        {
            Assert.ThrowsAny<ArgumentException>(() => new BilinearCurve(bad, 1, 1));
            Assert.ThrowsAny<ArgumentException>(() => new BilinearCurve(1, bad, 1));
            Assert.ThrowsAny<ArgumentException>(() => new BilinearCurve(1, 1, bad));
            Assert.ThrowsAny<ArgumentException>(() => new TrapezoidCurve(bad, 1, 1));
            Assert.ThrowsAny<ArgumentException>(() => new ExponentialCurve(10, 2, 1, bad));
            Assert.ThrowsAny<ArgumentException>(() => new IndependentModesLaw(Laws.PeelLine, Laws.ShearLine, bad));
            Assert.ThrowsAny<ArgumentException>(() => new IndependentModesLaw(Laws.PeelLine, Laws.ShearLine, 1, bad));
            Assert.ThrowsAny<ArgumentException>(() => new BenzeggaghKenaneLaw(Laws.PeelLine, Laws.ShearLine, bad, 1));
        }
        Assert.Contains("0.05", Assert.Throws<ArgumentOutOfRangeException>(() => new BilinearCurve(10, 1, 0.05)).Message, StringComparison.Ordinal);
        Assert.Contains("0.2 and 5.8", Assert.Throws<ArgumentOutOfRangeException>(() => new ExponentialCurve(10, 2, 6, 3)).Message, StringComparison.Ordinal);
        Assert.ThrowsAny<ArgumentException>(() => new TrapezoidCurve(0.01, 1, 1));
        Assert.ThrowsAny<ArgumentException>(() => new IndependentModesLaw(new BilinearCurve(1, 1, 0.52), Laws.ShearLine, 1, 0.05));
    }

    [Fact]
    public void Tables_that_break_a_rule_are_refused()
    {
        Refuse("start", [0, 1, 2], [0.1, 1, 0]);
        Refuse("start", [0.1, 1, 2], [0, 1, 0]);
        Refuse("end at traction 0", [0, 1, 2], [0, 1, 0.5]);
        Refuse("rise", [0, 1, 1, 2], [0, 1, 0.5, 0]);
        Refuse("must not rise", [0, 1, 2, 3], [0, 1, 2.1, 0]);
        Refuse("above 0", [0, 1, 2, 3], [0, 1, 0, 0]);
        Refuse("finite", [0, 1, double.NaN], [0, 1, 0]);
        Refuse("at least 3", [0, 1], [0, 0]);
        Refuse("as many", [0, 1, 2], [0, 0]);
        Close.To(2, new TableCurve([0, 1, 2, 3], [0, 1, 2, 0]).Traction(2));

        static void Refuse(string words, double[] w, double[] t) => Assert.Contains(words, Assert.Throws<ArgumentException>(() => new TableCurve(w, t)).Message, StringComparison.Ordinal);
    }
}
