using InterfaceFE.Decks;
using InterfaceFE.Marching;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Model;
using InterfaceFE.Results;
using InterfaceFE.Tests.Model;
using Xunit;

namespace InterfaceFE.Tests.Results.Observers;

/// <summary>Fronts on invented samples: damage and traction written in by hand.</summary>
public class BondFrontTests
{
    [Fact]
    public void A_virgin_joint_has_its_tips_at_the_starter_tips_and_no_zone()
    {
        (BondFront[] fronts, LayerSample sample, FullEquilibrium equilibrium) = Make();
        Follow(fronts, sample, equilibrium, _ => 0, _ => 0);
        Assert.Equal(2, fronts.Length);
        Assert.Equal((0.0, 6.0, 1), (fronts[0].CrackTip, fronts[0].StretchEnd, fronts[0].Sense));
        Assert.Equal((6.0, 0.0, -1), (fronts[1].CrackTip, fronts[1].StretchEnd, fronts[1].Sense));
        Assert.All(fronts, f => Assert.True(f.ZoneStart is null && f.ModeMixDegrees is null && !f.RunThrough));
    }

    [Theory]
    [InlineData(1.23)]
    [InlineData(2.5)]
    [InlineData(4.9)]
    public void The_tip_lies_where_damage_reaches_one_between_points(double tip)
    {
        // Damage falls in a straight line from 1 at the tip over 0.9 mm; the zone starts at the largest traction.
        (BondFront[] fronts, LayerSample sample, FullEquilibrium equilibrium) = Make();
        Follow(fronts, sample, equilibrium, x => Math.Clamp(1 - (x - tip) / 0.9, 0, 1), x => x < tip ? 0 : Math.Exp(-Math.Abs(x - tip - 0.6) / 0.4));
        Close.To(tip, fronts[0].CrackTip, 1e-9);
        double spacing = sample.Position.Zip(sample.Position.Skip(1), (a, b) => b - a).Max();
        Close.To(tip + 0.6, fronts[0].ZoneStart!.Value, 0, spacing, "zone start");
        Close.To(6, fronts[1].CrackTip, 1e-12);
        // Mirrored for the front that comes from the end.
        Follow(fronts, sample, equilibrium, x => Math.Clamp(1 - (6 - x - tip) / 0.9, 0, 1), x => 6 - x < tip ? 0 : Math.Exp(-Math.Abs(6 - x - tip - 0.6) / 0.4));
        Close.To(6 - tip, fronts[1].CrackTip, 1e-9);
        Close.To(6 - tip - 0.6, fronts[1].ZoneStart!.Value, 0, spacing, "zone start");
        Close.To(0, fronts[0].CrackTip, 0, 1e-12);
    }

    [Fact]
    public void On_a_plateau_the_zone_starts_at_its_end_on_the_intact_side()
    {
        (BondFront[] fronts, LayerSample sample, FullEquilibrium equilibrium) = Make();
        Follow(fronts, sample, equilibrium, x => Math.Clamp(1 - (x - 1) / 3, 0, 1), x => x < 1 ? 0 : x < 2 ? x - 1 : x < 4 ? 1 : Math.Exp(4 - x));
        Assert.InRange(fronts[0].ZoneStart!.Value, 3.8, 4.0);
    }

    [Fact]
    public void A_crack_through_the_whole_stretch_ends_at_its_far_end_for_both_fronts()
    {
        (BondFront[] fronts, LayerSample sample, FullEquilibrium equilibrium) = Make();
        Follow(fronts, sample, equilibrium, _ => 1, _ => 0);
        Assert.All(fronts, f => Assert.True(f.RunThrough && f.ZoneStart is null));
        Assert.Equal((6.0, 0.0), (fronts[0].CrackTip, fronts[1].CrackTip));
    }

    [Fact]
    public void Damage_inside_a_stretch_moves_no_tip()
    {
        (BondFront[] fronts, LayerSample sample, FullEquilibrium equilibrium) = Make();
        Follow(fronts, sample, equilibrium, x => x is > 2 and < 4 ? 1 : 0, x => x is > 2 and < 4 ? 0 : 1);
        Assert.Equal((0.0, 6.0), (fronts[0].CrackTip, fronts[1].CrackTip));
        Assert.All(fronts, f => Assert.Null(f.ZoneStart));
    }

    [Theory]
    [InlineData(1, 0, 0)]
    [InlineData(0, 1, 90)]
    [InlineData(0.3, 0.3, 45)]
    [InlineData(0.3, 0.1, 30)]
    public void Mode_mix_is_the_angle_of_the_energies_at_the_tip(double peel, double shear, double degrees)
    {
        (BondFront[] fronts, LayerSample sample, FullEquilibrium equilibrium) = Make();
        for (int i = 0; i < sample.Response.Length; i++)
            sample.Response[i] = new LayerResponse { Damage = sample.Position[i] < 2 ? 1 : 0, EnergyPeel = peel, EnergyShear = shear };
        Follow(fronts, sample, equilibrium);
        Close.To(degrees, fronts[0].ModeMixDegrees!.Value, 1e-12, 1e-12);
        Assert.Null(fronts[1].ModeMixDegrees);
    }

    [Fact]
    public void A_gap_in_the_bond_makes_four_fronts()
    {
        Deck deck = DeckOf.Yaml(DeckOf.Blocks("  - wait: 1 s").Replace("element length: 2 mm}", "element length: 1 mm, unbonded: [{from: 2 mm, to: 4 mm}]}", StringComparison.Ordinal).Replace("along: 3,", "along: 6,", StringComparison.Ordinal));
        SpecimenModel model = DeckOf.Model(deck);
        BondFront[] fronts = [.. BondFront.Of(model.Layers[0], 0)];
        Assert.Equal([1, 2, 3, 4], fronts.Select(f => f.Number));
        double[] tips = [.. fronts.Select(f => f.StarterTip)], ends = [.. fronts.Select(f => f.StretchEnd)];
        double[] expectedTips = [0, 2, 4, 6], expectedEnds = [2, 0, 6, 4];
        for (int i = 0; i < 4; i++)
        {
            Close.To(expectedTips[i], tips[i], 0, 1e-12);
            Close.To(expectedEnds[i], ends[i], 0, 1e-12);
            Close.To(expectedTips[i], model.Mesh.X[fronts[i].TipNode], 0, 1e-12);
        }
        Assert.Equal([1, -1, 1, -1], fronts.Select(f => f.Sense));
    }

    private static (BondFront[] Fronts, LayerSample Sample, FullEquilibrium Equilibrium) Make()
    {
        SpecimenModel model = DeckOf.Model(DeckOf.Yaml(DeckOf.Blocks("  - wait: 1 s")));
        var equilibrium = new FullEquilibrium(model);
        var zeros = new double[model.Mesh.NodeCount];
        return ([.. BondFront.Of(model.Layers[0], 0)], new LayerSample(model.Layers[0], 0, equilibrium, zeros, zeros), equilibrium);
    }

    private static void Follow(BondFront[] fronts, LayerSample sample, FullEquilibrium equilibrium, Func<double, double> damage, Func<double, double> traction)
    {
        for (int i = 0; i < sample.Response.Length; i++)
            sample.Response[i] = new LayerResponse { Damage = damage(sample.Position[i]), Peel = traction(sample.Position[i]) };
        Follow(fronts, sample, equilibrium);
    }

    private static void Follow(BondFront[] fronts, LayerSample sample, FullEquilibrium equilibrium)
    {
        var zeros = new double[equilibrium.Model.Mesh.NodeCount];
        foreach (BondFront front in fronts)
            front.Follow(sample, equilibrium.Model.Mesh, zeros, zeros, 293.15);
    }
}
