using System.Globalization;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// Random separation paths at one point of the law of independent modes. Work per mode is summed outside the law by the trapezoidal rule: at separation the shares of the
/// toughnesses must add up to 1, at second order in the stride; and dissipation must never fall.
/// </summary>
public sealed class LawCriterionCase : ICase
{
    private const int Paths = 200;
    private static readonly LawPoint Point = new(293.15, 0);

    /// <inheritdoc/>
    public string Name => "law-criterion";

    /// <inheritdoc/>
    public string Group => "Layer laws";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        int[] strides = [250, 500, 1000, 2000, 4000, 8000];
        List<CaseCurve> curves = [];
        foreach (EnergyCounting counting in (EnergyCounting[])[EnergyCounting.LargestSeparation, EnergyCounting.NetWork])
        {
            foreach (double release in (double[])[0.1, 0.05, 0.02])
            {
                var law = new IndependentModesLaw(new ExponentialCurve(10, 2, 1.1, 3), new BilinearCurve(8, 4, 2.2), 10, release, counting);
                string name = string.Create(CultureInfo.InvariantCulture, $"{(counting == EnergyCounting.NetWork ? "net work" : "largest separation")}, release length {release:0.00}");
                double[] errors = [.. strides.Select(n => MeanError(law, n))];
                double order = Math.Log2(errors[0] / errors[^1]) / (strides.Length - 1);
                yield return new CaseLine(name + ": order at which the sum of work shares tends to 1", 2, order, 0.1, "", "trapezoidal rule; criterion of Yang and Thouless 2001");
                yield return CaseLine.Reported($"{name}: mean error of the sum with {strides[^1]} strides", errors[^1], "", $"mean of {Paths} random paths");
                if (counting == EnergyCounting.LargestSeparation)
                    curves.Add(new CaseCurve(string.Create(CultureInfo.InvariantCulture, $"release length {release:0.00}"), [.. strides.Select(n => Math.Log10(n))], [.. errors.Select(Math.Log10)], Points: true));
            }
        }
        (double sum, double fall, double largest) = Wander();
        yield return CaseLine.AtMost("random walks with unloading: sum of the law's own shares at separation, distance from 1", 1e-12, sum, "", "criterion of Yang and Thouless 2001, exact by the release branch");
        yield return CaseLine.AtMost("random walks with unloading: largest fall of dissipation in a stride", 0, fall, "N/mm", "dissipation never falls");
        yield return CaseLine.AtMost("random walks with unloading: largest sum of the shares on the way", 1 + 1e-12, largest, "", "criterion of Yang and Thouless 2001");
        context.Draw(new CaseFigure("law-criterion", "Sum of work shares at separation", $"mean distance from 1 over {Paths} random paths; slope -2 is second order", "log10 of strides per path", "log10 of the error", curves));
    }

    private static double MeanError(IndependentModesLaw law, int strides)
    {
        var random = new Random(17);
        double sum = 0;
        for (int i = 0; i < Paths; i++)
            sum += Error(law, random.NextDouble(), random.NextDouble(), random.NextDouble(), strides) / Paths;
        return sum;
    }

    /// <summary>A path that never unloads, so that both ways of counting agree with the work.</summary>
    private static double Error(IndependentModesLaw law, double a, double b, double c, int strides)
    {
        double[] accepted = new double[law.StateSize], tentative = new double[law.StateSize];
        double sum = 0, lastW = 0, lastV = 0;
        LayerResponse last = default;
        for (int i = 1; i <= strides && last.Branch != LawBranch.Separated; i++)
        {
            double p = (double)i / strides, w = law.FinalOpening * p * (0.3 + 0.7 * a + 0.3 * c * p), v = law.FinalSliding * (0.2 + 0.8 * b) * (p + c / 3 * Math.Sin(3 * p));
            LayerResponse now = law.Update(new Separation(w, v), Point, accepted, tentative);
            sum += 0.5 * (last.Peel + now.Peel) * (w - lastW) / law.PeelToughness + 0.5 * (last.Shear + now.Shear) * (v - lastV) / law.ShearToughness;
            (last, lastW, lastV) = (now, w, v);
            (accepted, tentative) = (tentative, accepted);
        }
        return last.Branch == LawBranch.Separated ? Math.Abs(sum - 1) : double.NaN;
    }

    /// <summary>Walks at random, unloading too, until separated.</summary>
    private static (double Sum, double Fall, double Largest) Wander()
    {
        var random = new Random(23);
        double worst = 0, fall = 0, largest = 0;
        for (int trial = 0; trial < Paths; trial++)
        {
            EnergyCounting counting = trial % 2 == 0 ? EnergyCounting.LargestSeparation : EnergyCounting.NetWork;
            var law = new IndependentModesLaw(new BilinearCurve(20, 2.5, 0.8), new TrapezoidCurve(1.5, 0.45, 2), 30, 0.05, counting);
            double[] accepted = new double[law.StateSize], tentative = new double[law.StateSize];
            double w = 0, v = 0, dissipated = 0, size = trial % 4 < 2 ? 0.02 : 0.2;
            LayerResponse now = default;
            while (now.Branch != LawBranch.Separated)
            {
                w = Math.Max(-0.05, w + law.FinalOpening * size * (random.NextDouble() - 0.4));
                v += law.FinalSliding * size * (random.NextDouble() - 0.4);
                now = law.Update(new Separation(w, v), Point, accepted, tentative);
                (accepted, tentative) = (tentative, accepted);
                fall = Math.Max(fall, dissipated - now.Dissipated);
                dissipated = now.Dissipated;
                largest = Math.Max(largest, now.EnergyPeel / law.PeelToughness + now.EnergyShear / law.ShearToughness);
            }
            worst = Math.Max(worst, Math.Abs(now.EnergyPeel / law.PeelToughness + now.EnergyShear / law.ShearToughness - 1));
        }
        return (worst, fall, largest);
    }
}
