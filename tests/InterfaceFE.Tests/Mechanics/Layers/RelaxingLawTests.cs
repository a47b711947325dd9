using InterfaceFE.Mechanics.Layers;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

public sealed class RelaxingLawTests
{
    private const double Room = 296.15;

    private static RelaxingLaw Maxwell(double share, double time, TimeShift? shift = null) => new(new IndependentModesLaw(Laws.PeelLine, Laws.ShearLine, 30), [share], [time], shift ?? TimeShift.None);

    [Theory]
    [InlineData(1.0)]
    [InlineData(0.6)]
    public void Ramp_and_hold_follow_the_closed_form(double share)
    {
        const double Tau = 40, Ramp = 25, End = 0.09;
        RelaxingLaw law = Maxwell(share, Tau);
        Walk walk = new(law);
        for (int i = 1; i <= 10; i++)
        {
            double t = Ramp * i / 10, rate = End / Ramp;
            walk.To(rate * t, -rate * t, Ramp / 10, Room);
            Close.To(20 * ((1 - share) * rate * t + share * rate * Tau * (1 - Math.Exp(-t / Tau))), walk.Answer.Peel, 1e-12, 0, "ramp");
            Close.To(-8 * ((1 - share) * rate * t + share * rate * Tau * (1 - Math.Exp(-t / Tau))), walk.Answer.Shear, 1e-12, 0, "ramp in shear");
        }
        double start = End / Ramp * Tau * (1 - Math.Exp(-Ramp / Tau));
        foreach (double hold in new[] { 1.0, 30, 200, 5000 })
        {
            walk.To(End, -End, hold, Room);
            start *= Math.Exp(-hold / Tau);
            Close.To(20 * ((1 - share) * End + share * start), walk.Answer.Peel, 1e-12, 1e-13, "hold");
        }
        Close.To(0, walk.Answer.Damage, 0, 0);
    }

    [Fact]
    public void Without_time_the_law_is_the_inner_one()
    {
        Random random = new(3);
        foreach (ILayerLaw inner in Laws.Secant)
        {
            RelaxingLaw law = new(inner, [0.4, 0.3], [10, 1000], TimeShift.None);
            LawWalk plain = new(inner);
            Walk walk = new(law);
            for (int i = 0; i < 40; i++)
            {
                double w = inner.FinalOpening * 0.03 * i * (random.NextDouble() - 0.1), v = inner.FinalSliding * 0.03 * i * (2 * random.NextDouble() - 1);
                plain.To(w, v);
                walk.To(w, v, 0, Room);
                Close.To(plain.Answer.Peel, walk.Answer.Peel, 1e-10, 1e-12);
                Close.To(plain.Answer.Shear, walk.Answer.Shear, 1e-10, 1e-12);
                Close.To(plain.Answer.Dissipated, walk.Answer.Dissipated, 1e-10, 1e-12);
                Close.To(plain.Answer.Stored, walk.Answer.Stored, 1e-10, 1e-12);
            }
        }
    }

    [Fact]
    public void Shifts_follow_their_formulas_and_speed_up_the_decay()
    {
        TimeShift wlf = TimeShift.Wlf(Room, 17.4, 51.6), arrhenius = TimeShift.Arrhenius(Room, 9600);
        Close.To(1, wlf.Speed(Room));
        Close.To(1, arrhenius.Speed(Room));
        Close.To(Math.Pow(10, 17.4 * 20 / 71.6), wlf.Speed(Room + 20));
        Close.To(0, wlf.Speed(Room - 52), 0, 0);
        Close.To(Math.Exp(9600 * (1 / Room - 1 / 253.15)), arrhenius.Speed(253.15));
        foreach (TimeShift shift in new[] { wlf, arrhenius })
        {
            double warm = Room + 15;
            Walk walk = new(Maxwell(1, 100, shift));
            walk.To(0.05, 0, 0, warm);
            walk.To(0.05, 0, 3, warm);
            Close.To(20 * 0.05 * Math.Exp(-3 * shift.Speed(warm) / 100), walk.Answer.Peel, 1e-12, 1e-30);
            // Frozen: in the cold the traction of a sudden load stays.
            Walk cold = new(Maxwell(1, 100, wlf));
            cold.To(0.05, 0, 0, 240);
            Close.To(1, cold.To(0.05, 0, 1e6, 240).Answer.Peel);
        }
    }

    [Fact]
    public void Tangent_and_gradient_are_derivatives_and_books_close_at_second_order()
    {
        Random random = new(9);
        foreach (ILayerLaw inner in Laws.Secant)
        {
            RelaxingLaw law = new(inner, [0.4, 0.3], [2, 30], TimeShift.None);
            Walk walk = new(law);
            double scale = Math.Max(law.Stiffness.Peel, law.Stiffness.Shear), h = 1e-7 * Math.Min(law.FinalOpening, law.FinalSliding);
            int tried = 0;
            for (int i = 0; i < 60; i++)
            {
                double w = inner.FinalOpening * 0.012 * i * (random.NextDouble() - 0.15), v = inner.FinalSliding * 0.008 * i * (2 * random.NextDouble() - 1);
                LayerResponse here = walk.Try(w, v, 1.5), wp = walk.Try(w + h, v, 1.5), wm = walk.Try(w - h, v, 1.5), vp = walk.Try(w, v + h, 1.5), vm = walk.Try(w, v - h, 1.5);
                if (Math.Abs(w) > h && new[] { wp, wm, vp, vm }.All(n => n.Branch == here.Branch && Math.Abs(n.PeelByOpening - here.PeelByOpening) + Math.Abs(n.ShearBySliding - here.ShearBySliding) < 1e-3 * scale))
                {
                    tried++;
                    Close.To((wp.Peel - wm.Peel) / (2 * h), here.PeelByOpening, 1e-4, 1e-4 * scale, "peel by opening");
                    Close.To((vp.Peel - vm.Peel) / (2 * h), here.PeelBySliding, 1e-4, 1e-4 * scale, "peel by sliding");
                    Close.To((wp.Shear - wm.Shear) / (2 * h), here.ShearByOpening, 1e-4, 1e-4 * scale, "shear by opening");
                    Close.To((vp.Shear - vm.Shear) / (2 * h), here.ShearBySliding, 1e-4, 1e-4 * scale, "shear by sliding");
                    if (wp.Dissipated > walk.Answer.Dissipated && wm.Dissipated > walk.Answer.Dissipated)
                        Close.To((wp.Dissipated - wm.Dissipated) / (2 * h), here.DissipatedByOpening, 1e-3, 1e-3 * law.PeelToughness / law.FinalOpening, "dissipated by opening");
                }
                walk.To(w, v, 1.5, Room);
            }
            Assert.True(tried > 20);
            double coarse = Books(law, 50), fine = Books(law, 400);
            TestContext.Current.TestOutputHelper?.WriteLine(FormattableString.Invariant($"{inner.GetType().Name}: books {coarse:e2} to {fine:e2}, order {Math.Log2(coarse / fine) / 3:f2}"));
            // Strides that pass a kink scatter.
            Assert.True(fine < 2e-3 && fine < 0.3 * coarse);
        }

        static double Books(RelaxingLaw law, int strides)
        {
            Walk walk = new(law);
            double work = 0, worst = 0, dissipated = 0;
            for (int i = 1; i <= 4 * strides; i++)
            {
                double p = (double)i / strides, w = law.FinalOpening * 0.4 * Math.Abs(Math.Sin(1.5 * p)), v = law.FinalSliding * 0.3 * Math.Sin(2 * p);
                work += walk.WorkTo(w, v, 20.0 / strides);
                worst = Math.Max(worst, Math.Abs(work - walk.Answer.Stored - walk.Answer.Dissipated) / law.PeelToughness);
                Assert.True(walk.Answer.Dissipated >= dissipated && walk.Answer.Stored >= 0);
                dissipated = walk.Answer.Dissipated;
            }
            return worst;
        }
    }

    [Fact]
    public void Nonsense_is_refused()
    {
        IndependentModesLaw inner = new(Laws.PeelLine, Laws.ShearLine, 30);
        Assert.Throws<ArgumentException>(() => new RelaxingLaw(inner, [0.6, 0.5], [1, 2], TimeShift.None));
        Assert.Throws<ArgumentException>(() => new RelaxingLaw(inner, [0.6], [1, 2], TimeShift.None));
        Assert.Throws<ArgumentException>(() => new RelaxingLaw(inner, [], [], TimeShift.None));
        Assert.ThrowsAny<ArgumentException>(() => new RelaxingLaw(inner, [0.5], [0], TimeShift.None));
        Assert.ThrowsAny<ArgumentException>(() => TimeShift.Wlf(Room, 0, 50));
        Assert.ThrowsAny<ArgumentException>(() => TimeShift.Arrhenius(Room, double.NaN));
    }

    /// <summary>Walks with time.</summary>
    private sealed class Walk(RelaxingLaw law)
    {
        private double[] _accepted = new double[law.StateSize];
        private Separation _at;

        public LayerResponse Answer { get; private set; }

        public Walk To(double w, double v, double time, double temperature)
        {
            double[] tentative = new double[law.StateSize];
            Answer = law.Update(new Separation(w, v), new LawPoint(temperature, time), _accepted, tentative);
            (_accepted, _at) = (tentative, new Separation(w, v));
            return this;
        }

        public LayerResponse Try(double w, double v, double time) => law.Update(new Separation(w, v), new LawPoint(Room, time), _accepted, new double[law.StateSize]);

        public double WorkTo(double w, double v, double time)
        {
            (LayerResponse last, Separation from) = (Answer, _at);
            To(w, v, time, Room);
            return 0.5 * ((last.Peel + Answer.Peel) * (w - from.Opening) + (last.Shear + Answer.Shear) * (v - from.Sliding));
        }
    }
}
