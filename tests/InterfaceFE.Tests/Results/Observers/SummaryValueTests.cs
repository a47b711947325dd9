using InterfaceFE.Decks;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Tests.Marching;
using InterfaceFE.Tests.Model;
using Xunit;

namespace InterfaceFE.Tests.Results.Observers;

/// <summary>Values of the summary and the numbers of rows of a run that is known in closed form.</summary>
public class SummaryValueTests
{
    private const double Area = BarDeck.Length * BarDeck.Width;

    [Fact]
    public void Summary_of_the_bar_holds_its_closed_form()
    {
        RunResult run = DeckOf.Run(BarDeck.Make(0.6));
        RunSummary summary = run.Summary;
        Assert.Equal(RunStatus.Severed, summary.Status);
        GripSummary head = summary.Grips[1];
        Assert.InRange(head.PeakForce!.Value, 0.98 * BarDeck.Strength * Area, 1.02 * BarDeck.Strength * Area);
        double travel = BarDeck.Strength / BarDeck.Stiffness + 2 * BarDeck.Height * BarDeck.Strength / BarDeck.Young;
        Close.To(travel, head.DisplacementAtPeak!.Value, 0.02);
        Close.To(0, head.FinalForce!.Value, 0, 1e-3 * BarDeck.Strength * Area);
        Assert.Equal(run.History.Points.MaxBy(p => p.Grips[1].Force)!.Point, head.PeakPoint);
        JointSummary joint = Assert.Single(summary.Joints);
        Close.To(BarDeck.Length, joint.SeparatedLength, 1e-9);
        Close.To(1, joint.LargestDamage, 1e-12);
        Assert.Equal(joint.LargestOpening / 0.2, joint.LargestPeelStrain, 1e-12);
        Assert.InRange(joint.LargestOpening, 0.08 * 0.999, 0.2);
        Close.To(0, joint.LargestSliding, 0, 1e-9);
        Assert.True(joint.LargestPeel is <= BarDeck.Strength * (1 + 1e-9) and > 0.95 * BarDeck.Strength);
        Close.To(2, joint.ElementLength, 1e-12);
        Assert.Equal("joint 'bond'", summary.FirstDamage!.Where[..12]);
        // First damage: the first point beyond the onset.
        Assert.Equal(run.History.Points.First(p => run.History.Damage[p.Point].Damage.Max() > 0).Point, summary.FirstDamage.Point);
        Close.To(BarDeck.Toughness * Area, run.History.Energies[^1].SpentInLayers, 1e-6);
        Assert.True(summary.SelfCheck.UnstablePoints == run.History.Points.Count(p => !p.Stable) && summary.SelfCheck.UnstablePoints > 0);
        Assert.Equal(run.History.Points.Count, summary.Counts["points"]);
    }

    [Fact]
    public void Every_point_has_its_rows()
    {
        RunResult run = DeckOf.Run(DeckOf.Yaml(DeckOf.Blocks("  - fix: {base: [x, y, rotation], head: [x, rotation]}\n  - pull: {grip: head, along: +y, travel: 0.03 mm}\n  - wait: 1 s", elements: "eight-node",
            more: "keep: {fields: every 3 points}").Replace("element length: 2 mm}", "element length: 1 mm, unbonded: [{from: 2 mm, to: 4 mm}]}", StringComparison.Ordinal).Replace("along: 3,", "along: 6,", StringComparison.Ordinal)));
        RunHistory history = run.History;
        int points = history.Points.Count;
        Assert.Equal(Enumerable.Range(0, points), history.Points.Select(p => p.Point));
        Assert.Equal(points, history.Energies.Count);
        Assert.Equal(4 * points, history.Fronts.Count);
        Assert.Equal(points, history.Damage.Count);
        Assert.All(history.Damage, row => Assert.Equal([false, false, true, true, false, false], row.Damage.Select(float.IsNaN)));
        int[] kept = [.. history.Snapshots.Select(s => s.Point)];
        int[] ends = [0, history.Points.Last(p => p.Stage == 2).Point, points - 1];
        Assert.Equal([.. Enumerable.Range(0, points).Where(p => p % 3 == 0 || ends.Contains(p))], kept);
        LayerField field = history.Snapshots[^1].Layers[0];
        Assert.Equal(18, field.Position.Length);
        Assert.Equal([.. Enumerable.Range(0, 18).Select(i => i / 3 is 2 or 3 ? 1.0 : field.Damage[i])], field.Damage);
        for (int i = 6; i < 12; i++)
            Assert.Equal((0.0, 0.0), (field.Peel[i], field.Shear[i]));
    }

    [Fact]
    public void Layer_fields_at_stations_are_those_of_the_separation_there()
    {
        // Elastic: traction = stiffness × separation at each station, on both kinds of joint ends.
        RunResult run = DeckOf.Run(DeckOf.Yaml(DeckOf.Blocks("  - fix: {base: [x, y, rotation]}\n  - pull: {grip: head, along: +y, force: 3 N}\n  - pull: {grip: head, along: +x, force: 2 N}", elements: "eight-node")));
        LayerField field = run.History.Snapshots[^1].Layers[0];
        double peel = 0, shear = 0;
        for (int i = 0; i < field.Position.Length; i++)
        {
            // Between the outermost integration point and the end of an element the straight line differs from the parabola a little.
            Close.To(500 * field.Opening[i], field.Peel[i], 0.01, 0.005, $"peel at {field.Position[i]}");
            Close.To(300 * field.Sliding[i], field.Shear[i], 0.01, 0.005, $"shear at {field.Position[i]}");
            peel = Math.Max(peel, field.Peel[i]);
            shear = Math.Max(shear, field.Shear[i]);
        }
        Assert.True(peel > 0.2 && shear > 0.1);
        ILayerLaw law = run.Equilibrium.Model.Layers[0].Law;
        Assert.Equal(500, law.Stiffness.Contact);
        // Equilibrium of the upper block: the layer carries the grip's forces.
        double sumPeel = 0, sumShear = 0;
        for (int e = 0; e < 3; e++)
        {
            sumPeel += 2 * 2 * (field.Peel[3 * e] + 4 * field.Peel[3 * e + 1] + field.Peel[3 * e + 2]) / 6;
            sumShear += 2 * 2 * (field.Shear[3 * e] + 4 * field.Shear[3 * e + 1] + field.Shear[3 * e + 2]) / 6;
        }
        Close.To(3, sumPeel, 0.01);
        Close.To(2, sumShear, 0.01);
    }
}
