using System.Globalization;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// One point of each law and mixing on paths with reversal: closed forms where there are some, and random closed paths, on which work (trapezoidal rule, outside the law) must equal
/// stored plus dissipated and no energy may be gained.
/// </summary>
public sealed class LawPathsCase : ICase
{
    private static readonly LawPoint Point = new(293.15, 0);
    private static readonly BilinearCurve Peel = new(20, 2.5, 0.8), Shear = new(8, 4, 2.2);
    private static readonly TrapezoidCurve Plateau = new(1.5, 0.45, 2);
    private static readonly LinearParabolicCurve Parabola = new(6, 1.5, 1.4);

    /// <inheritdoc/>
    public string Name => "law-paths";

    /// <inheritdoc/>
    public string Group => "Layer laws";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        yield return new CaseLine("linear-parabolic curve: area by the trapezoidal rule over 1e5 strides", 1.4, Work(new IndependentModesLaw(Parabola, Shear, 6), 100_000, 1, 0), 1e-7, "N/mm",
            "toughness given; area strength·(elastic limit/2 + 2/3·(final - elastic limit)), by integration");
        var power = new PowerLaw(Peel, Shear, 1.4, 30);
        (double worst, double at) = PowerSum(power, 1.4);
        yield return new CaseLine(string.Create(CultureInfo.InvariantCulture, $"power law: sum of the powers of the energy shares at separation, farthest of 41 mixes ({at:0.00} of shear)"), 1, worst, 1e-4, "",
            "(G_I/Γ_I)^1.4 + (G_II/Γ_II)^1.4 = 1; Wu and Reuter 1965, from memory; work by the trapezoidal rule");
        var potential = new CoupledPotentialLaw(new PotentialMode(3, 0.9, 3.4, 0.05), new PotentialMode(4, 2.2, 1.6, 0.12), 30);
        yield return new CaseLine("coupled potential: work of pure peel", 0.9, Work(potential, 20_000, 1, 0), 1e-5, "N/mm", "toughness given; Park, Paulino and Roesler, J. Mech. Phys. Solids 57 (2009) 891-908");
        yield return new CaseLine("coupled potential: work of pure shear", 2.2, Work(potential, 20_000, 0, 1), 1e-5, "N/mm", "toughness given; Park, Paulino and Roesler 2009");
        (string What, ILayerLaw Law)[] laws =
        [
            ("independent modes, largest separation", new IndependentModesLaw(Peel, Plateau, 30)),
            ("independent modes, net work", new IndependentModesLaw(Parabola, Shear, 30, 0.05, EnergyCounting.NetWork)),
            ("independent modes, plastic shares 0.4 and 0.7", new IndependentModesLaw(Parabola, Plateau, 30, 0.05, EnergyCounting.LargestSeparation, 0.4, 0.7)),
            ("benzeggagh-kenane", new BenzeggaghKenaneLaw(Peel, Shear, 2.1, 30)),
            ("power law", power),
            ("coupled potential", potential),
        ];
        foreach ((string what, ILayerLaw law) in laws)
        {
            (double books, double gain, double fall) = ClosedPaths(law);
            yield return CaseLine.AtMost(what + ": closed paths, largest difference of work and stored plus dissipated, in toughnesses", 2e-4, books, "", "energy balance; trapezoidal rule over 1000 strides a leg");
            yield return CaseLine.AtMost(what + ": closed paths, largest gain of energy, in toughnesses", 1e-6, gain, "", "no closed path gains energy");
            yield return CaseLine.AtMost(what + ": closed paths, largest fall of dissipation in a stride", 0, fall, "N/mm", "dissipation never falls");
        }
    }

    private static double Work(ILayerLaw law, int strides, double opening, double sliding)
    {
        var walk = new Walk(law);
        return walk.To(1.2 * opening * law.FinalOpening, 1.2 * sliding * law.FinalSliding, strides);
    }

    private static (double Sum, double Mix) PowerSum(PowerLaw law, double exponent)
    {
        (double worst, double mix) = (1, 0);
        for (int k = 0; k <= 40; k++)
        {
            double angle = 0.5 * Math.PI * k / 40;
            var walk = new Walk(law);
            walk.To(law.FinalOpening * 3 * Math.Cos(angle), law.FinalSliding * 3 * Math.Sin(angle), 20_000);
            double sum = Math.Pow(walk.PeelWork / law.PeelToughness, exponent) + Math.Pow(walk.ShearWork / law.ShearToughness, exponent);
            if (Math.Abs(sum - 1) > Math.Abs(worst - 1))
                (worst, mix) = (sum, walk.ShearWork / (walk.PeelWork + walk.ShearWork));
        }
        return (worst, mix);
    }

    private static (double Books, double Gain, double Fall) ClosedPaths(ILayerLaw law)
    {
        var random = new Random(41);
        double size = Math.Max(law.PeelToughness, law.ShearToughness), books = 0, gain = 0, fall = 0;
        for (int trial = 0; trial < 60; trial++)
        {
            var walk = new Walk(law);
            double work = 0, reach = 0.1 + 0.8 * random.NextDouble();
            for (int leg = 0; leg < 7; leg++)
            {
                work += leg == 6 ? walk.To(0, 0, 1000) : walk.To(law.FinalOpening * reach * (1.2 * random.NextDouble() - 0.2), law.FinalSliding * reach * (2 * random.NextDouble() - 1), 1000);
                books = Math.Max(books, Math.Abs(work - walk.Answer.Stored - walk.Answer.Dissipated) / size);
            }
            gain = Math.Max(gain, -work / size);
            fall = Math.Max(fall, walk.Fall);
        }
        return (books, gain, fall);
    }

    /// <summary>Follows a law stride by stride and keeps the work.</summary>
    private sealed class Walk(ILayerLaw law)
    {
        private double[] _accepted = new double[law.StateSize], _tentative = new double[law.StateSize];
        private Separation _at;

        public LayerResponse Answer { get; private set; }

        public double PeelWork { get; private set; }

        public double ShearWork { get; private set; }

        public double Fall { get; private set; }

        public double To(double opening, double sliding, int strides)
        {
            (Separation from, double before) = (_at, PeelWork + ShearWork);
            for (int i = 1; i <= strides; i++)
            {
                var next = new Separation(from.Opening + (opening - from.Opening) * i / strides, from.Sliding + (sliding - from.Sliding) * i / strides);
                LayerResponse now = law.Update(next, Point, _accepted, _tentative);
                PeelWork += 0.5 * (now.Peel + Answer.Peel) * (next.Opening - _at.Opening);
                ShearWork += 0.5 * (now.Shear + Answer.Shear) * (next.Sliding - _at.Sliding);
                Fall = Math.Max(Fall, Answer.Dissipated - now.Dissipated);
                (Answer, _at) = (now, next);
                (_accepted, _tentative) = (_tentative, _accepted);
            }
            return PeelWork + ShearWork - before;
        }
    }
}
