using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using InterfaceFE.Marching;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Model;
using InterfaceFE.Tests.Model;
using Xunit;

namespace InterfaceFE.Tests.Marching;

/// <summary>The two energy checks: they close where they must, and each sees what it is there to see.</summary>
public class EnergyLedgerTests
{
    private const string FixBase = "  - fix: {base: [x, y, rotation]}\n";

    [Fact]
    public void Elastic_cycle_closes_exactly()
    {
        Recording run = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(FixBase + "  - pull: {grip: head, along: +y, travel: 0.004 mm}\n  - pull: {grip: head, along: +x, travel: 0.003 mm}\n"
            + "  - push: {grip: head, along: -y, travel: 0.004 mm}\n  - let go: [head]")));
        Assert.True(run.Outcome.Status == MarchStatus.Finished, run.Outcome.Cause);
        double turnover = run.Points.Max(p => p.Energy.State.Total);
        EnergyAccount end = run.Points[^1].Energy;
        Close.To(0, end.PutIn, 0, 1e-10 * turnover);
        Close.To(0, end.State.Total, 0, 1e-10 * turnover);
        Assert.True(end.Balance < 1e-10 && end.PathError < 1e-10, end.ToString());
    }

    [Fact]
    public void Thermal_cycle_with_restraint_closes_exactly()
    {
        string layer = DeckOf.IndependentGlue.Replace("thickness: 0.2 mm,", "thickness: 0.2 mm, bulk: {young: 0.1 GPa, poisson: 0.3, expansion: 100e-6 1/K},", StringComparison.Ordinal);
        Recording run = Recording.Of(DeckOf.Yaml(DeckOf.Blocks("  - fix: {base: [x, y, rotation], head: [x, y, rotation]}\n  - cool to: 10 °C\n  - heat to: 20 °C", layer)));
        Assert.True(run.Outcome.Status == MarchStatus.Finished, run.Outcome.Cause);
        double turnover = run.Points.Max(p => p.Energy.State.Total);
        Assert.True(turnover > 0);
        Assert.Equal(0, run.Points[^1].Energy.State.SpentInLayers);
        EnergyAccount end = run.Points[^1].Energy;
        Close.To(0, end.Thermal, 0, 1e-10 * turnover);
        Close.To(0, end.State.Total, 0, 1e-10 * turnover);
        Assert.True(end.Balance < 1e-10 && end.PathError < 1e-10, end.ToString());
    }

    [Fact]
    public void Path_error_sees_a_law_whose_energies_do_not_belong_to_its_tractions_and_balance_does_not()
    {
        Deck deck = DeckOf.Yaml(DeckOf.Blocks("  - fix: {base: [x, y, rotation], head: [x, rotation]}\n  - pull: {grip: head, along: +y, travel: 0.04 mm}"));
        foreach (bool stored in (ReadOnlySpan<bool>)[true, false])
        {
            (FullEquilibrium equilibrium, EnergyAccount account) = MarchWithLaw(deck, law => new Sabotaged(law, stored ? 0.05 : 0, stored ? 0 : 0.05));
            Assert.True(equilibrium.Energy.SpentInLayers > 0);
            Assert.True(account.PathError > 3e-3, account.ToString());
            Assert.True(account.Balance < 1e-9, account.ToString());
        }
        (_, EnergyAccount honest) = MarchWithLaw(deck, law => new Sabotaged(law, 0, 0));
        Assert.True(honest.PathError < 1e-3 && honest.Balance < 1e-9, honest.ToString());
    }

    [Fact]
    public void Balance_sees_points_that_are_not_in_equilibrium()
    {
        SpecimenModel model = DeckOf.Model(DeckOf.Yaml(DeckOf.Blocks(FixBase + "  - pull: {grip: head, along: +y, travel: 0.004 mm}")));
        var equilibrium = new FullEquilibrium(model);
        foreach (LoadStage stage in model.Stages)
            equilibrium.StartStage(stage);
        equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate);
        var ledger = new EnergyLedger(equilibrium);
        equilibrium.Progress = 1;
        Assert.True(new Newton(1e-10).Search(equilibrium, new OwnControl(1, 1), _ => { }).Usable);
        double[] found = equilibrium.Displacement.ToArray();
        int free = Enumerable.Range(0, found.Length).First(i => !equilibrium.HeldUnknowns.Contains(i));
        found[free] += 0.05 * found.Max(Math.Abs);
        equilibrium.Guess(found, 1, 1);
        equilibrium.Evaluate(Wanted.Force);
        double balance = ledger.Book().Balance;
        Assert.True(balance > 1e-4, $"{balance}");
    }

    [Fact]
    public void Path_error_falls_by_four_when_strides_are_halved()
    {
        // The layer's onset falls on the end of a stride, so that only the smooth fall of the exponential curve is left between points.
        double[] errors = new double[3];
        for (int i = 0; i < errors.Length; i++)
        {
            double stride = 0.05 / (1 << i);
            Deck deck = BarDeck.Make(0.1, height: 0.5);
            // Onset at w = 0.005 mm and 2·H·σ/E = 0.005 mm: a tenth of the travel.
            CurveDeck curve = new() { Law = CurveShape.Exponential, Stiffness = 1000, Strength = 5, Toughness = 0.2, FinalSeparation = 0.3 };
            deck = deck with { Layers = new Dictionary<string, LayerDeck> { ["glue"] = deck.Layers!["glue"] with { Peel = curve, Shear = curve } } };
            Recording run = Recording.Of(deck, s => s with { FirstStride = stride, LargestStride = stride, PathError = 1, Path = PathControl.None });
            Assert.True(run.Outcome.Status == MarchStatus.Finished, run.Outcome.Cause);
            Assert.Equal(20 << i, run.Points.Count - 1);
            errors[i] = run.Points[^1].Energy.PathError;
        }
        Assert.InRange(errors[0] / errors[1], 3.4, 4.6);
        Assert.InRange(errors[1] / errors[2], 3.7, 4.3);
    }

    private static (FullEquilibrium Equilibrium, EnergyAccount Account) MarchWithLaw(Deck deck, Func<ILayerLaw, ILayerLaw> wrap)
    {
        SpecimenModel model = DeckOf.Model(deck);
        LayerBlock layer = model.Layers[0];
        var changed = new SpecimenModel
        {
            Mesh = model.Mesh,
            Unknowns = model.Unknowns,
            Solids = model.Solids,
            OpenFaces = model.OpenFaces,
            Layers = [new LayerBlock(model.Mesh, model.Mesh.Joints[0], wrap(layer.Law), layer.Thickness, LayerRule.SubIntervals(2), 0, model.StressFreeTemperature, bonded: true)],
            Grips = model.Grips,
            Stages = model.Stages,
            StressFreeTemperature = model.StressFreeTemperature,
        };
        var equilibrium = new FullEquilibrium(changed);
        foreach (LoadStage stage in changed.Stages)
            equilibrium.StartStage(stage);
        equilibrium.Evaluate(Wanted.Force | Wanted.Tangent | Wanted.LoadRate);
        var ledger = new EnergyLedger(equilibrium);
        for (int i = 1; i <= 200; i++)
        {
            equilibrium.Progress = i / 200.0;
            Assert.True(new Newton(1e-10).Search(equilibrium, new OwnControl(i / 200.0, 1 / 200.0), _ => { }).Usable);
            ledger.Book();
            equilibrium.Accept();
        }
        return (equilibrium, ledger.Account());
    }

    private sealed class Sabotaged(ILayerLaw inner, double stored, double dissipated) : WrappedLaw(inner)
    {
        public override LayerResponse Update(in Separation separation, in LawPoint at, ReadOnlySpan<double> accepted, Span<double> tentative)
        {
            LayerResponse answer = Inner.Update(separation, at, accepted, tentative);
            answer.Stored *= 1 + stored;
            answer.Dissipated *= 1 + dissipated;
            return answer;
        }
    }
}
