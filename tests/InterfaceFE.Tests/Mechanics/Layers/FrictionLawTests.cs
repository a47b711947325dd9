using InterfaceFE.Mechanics.Layers;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

/// <summary>Coulomb friction at a point, by hand.</summary>
public class FrictionLawTests
{
    private const double Contact = 1000, Onset = 1e-4, Coefficient = 0.4;

    private static FrictionLaw NeverBonded => new(new ClosingLaw(Contact, Onset), Coefficient, neverBonded: true);

    [Fact]
    public void Tangent_is_the_derivative_where_faces_stick_and_where_they_slip()
    {
        Random random = new(11);
        int stuck = 0, slipped = 0;
        for (int trial = 0; trial < 2000; trial++)
        {
            var walk = new LawWalk(NeverBonded);
            for (int i = random.Next(0, 4); i > 0; i--)
                walk.To(-0.003 * random.NextDouble(), 0.004 * (random.NextDouble() - 0.5));
            double w = -0.0002 - 0.003 * random.NextDouble(), v = 0.004 * (random.NextDouble() - 0.5);
            LayerResponse here = walk.Try(w, v), near = walk.Try(w, v + 1e-6), before = walk.Try(w, v - 1e-6);
            if (here.ShearBySliding != near.ShearBySliding || here.ShearBySliding != before.ShearBySliding || Math.Sign(near.Shear) != Math.Sign(before.Shear))
                continue;
            if (here.ShearBySliding > 0)
                stuck++;
            else
                slipped++;
            walk.CheckDerivatives(w, v, 1e-3, 1e-5, "friction");
        }
        Assert.True(stuck > 200 && slipped > 200, $"{stuck} stuck, {slipped} slipped");
    }

    [Fact]
    public void A_loop_at_constant_pressure_spends_twice_the_limit_times_its_width_less_the_sticking()
    {
        const double w = -0.002, amplitude = 0.01;
        double pressure = -new ClosingLaw(Contact, Onset).Update(new Separation(w, 0), default, [], []).Peel, limit = Coefficient * pressure;
        LawWalk walk = new LawWalk(NeverBonded).To(w, 0).To(w, amplitude);
        double start = walk.Answer.SpentInFriction;
        Close.To(limit * (amplitude - limit / Contact), start, 1e-12);
        // From slip one way to slip the other way 2·limit/k stick in between.
        walk.To(w, -amplitude);
        Close.To(-limit, walk.Answer.Shear, 1e-12);
        walk.To(w, amplitude);
        Close.To(limit, walk.Answer.Shear, 1e-12);
        Close.To(2 * limit * (2 * amplitude - 2 * limit / Contact), walk.Answer.SpentInFriction - start, 1e-12);
        // Half of the sticking range back: elastic, nothing spent.
        double before = walk.Answer.SpentInFriction;
        walk.To(w, amplitude - limit / Contact);
        Close.To(0, walk.Answer.Shear, 0, 1e-12);
        Close.To(before, walk.Answer.SpentInFriction, 1e-14);
    }

    [Fact]
    public void Work_in_many_strides_is_what_is_stored_and_spent_while_the_pressure_changes()
    {
        var walk = new LawWalk(NeverBonded);
        double work = 0;
        foreach ((double w, double v) in ((double, double)[])[(-0.002, 0.001), (-0.0005, 0.004), (-0.003, 0.0035), (-0.001, -0.002), (0.001, -0.004), (-0.002, -0.004), (-0.002, 0)])
        {
            double spent = walk.Answer.SpentInFriction;
            work += walk.AcceptedWorkTo(w, v, 4000);
            Assert.True(walk.Answer.SpentInFriction >= spent);
        }
        Close.To(work, walk.Answer.Stored + walk.Answer.SpentInFriction, 2e-4);
    }

    [Fact]
    public void Faces_that_come_apart_meet_again_without_shear_where_they_stand()
    {
        LawWalk walk = new LawWalk(NeverBonded).To(-0.002, 0).To(-0.002, 0.02).To(0.001, 0.03).To(-0.002, 0.03);
        Close.To(0, walk.Answer.Shear, 0, 1e-12);
        walk.To(-0.002, 0.0301);
        Close.To(Contact * 0.0001, walk.Answer.Shear, 1e-9);
    }

    [Fact]
    public void Bonded_faces_know_friction_only_once_they_are_separated()
    {
        var bonded = new IndependentModesLaw(new BilinearCurve(500, 5, 0.2), new BilinearCurve(300, 4, 0.5), Contact, 0.05, EnergyCounting.LargestSeparation);
        LawWalk with = new(new FrictionLaw(bonded, Coefficient, neverBonded: false)), without = new(bonded);
        foreach (double v in (double[])[0.005, 0.05, 0.15, 0.1, 0.2])
            Close.To(without.To(-0.002, v).Answer.Shear, with.To(-0.002, v).Answer.Shear, 1e-14, 1e-14);
        with.To(-0.002, 0.4);
        Assert.Equal(LawBranch.Separated, with.Answer.Branch);
        Close.To(0, with.Answer.Shear, 0, 1e-12);
        double dissipated = with.Answer.Dissipated;
        with.To(-0.002, 0.5);
        Close.To(Coefficient * 0.002 * Contact, with.Answer.Shear, 1e-12);
        Close.To(dissipated, with.Answer.Dissipated, 1e-14);
        Assert.True(with.Answer.SpentInFriction > 0);
    }
}
