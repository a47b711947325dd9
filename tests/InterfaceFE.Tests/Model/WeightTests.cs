using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using Xunit;

namespace InterfaceFE.Tests.Model;

/// <summary>Weight of adherends against closed forms. Materials are invented.</summary>
public class WeightTests
{
    private const double Specific = 2700e-12 * 9806.65;

    [Theory]
    [InlineData("eight-node")]
    [InlineData("four-node")]
    public void A_hanging_bar_grows_by_half_its_weight_over_its_stiffness(string elements)
    {
        RunResult run = DeckOf.Run(DeckOf.Yaml(Bar("-y", elements, "[4 mm, 60 mm]", "ceiling: {on: top of bar, hold: each point}\n  corner: {on: top of bar, at: start}", "  - fix: {ceiling: [y], corner: [x]}\n  - wait: 1 h")));
        Assert.Equal(RunStatus.Finished, run.Summary.Status);
        MeshedEdge bottom = run.History.Mesh.Adherends[0].Edges["bottom"];
        Close.To(-Specific * 60 * 60 / (2 * 70000), run.History.Snapshots[^1].DisplacementY[bottom.Nodes[0]], elements == "eight-node" ? 1e-8 : 0.002);
        Close.To(Specific * 60 * 4 * 3, run.History.Points[^1].Grips[0].ForceY, 1e-8);
        Assert.True(run.Summary.SelfCheck.Balance < 1e-9 && run.Summary.SelfCheck.PathError < 1e-9);
        // Elastic energy of the stress rho·g·y: (rho·g)²·A·L³/(6E).
        Close.To(Specific * Specific * 12 * Math.Pow(60, 3) / (6 * 70000), run.History.Energies[^1].StoredInAdherends, elements == "eight-node" ? 1e-8 : 0.002);
    }

    [Fact]
    public void A_cantilever_sags_as_a_beam_and_its_clamp_takes_weight_and_moment()
    {
        RunResult run = DeckOf.Run(DeckOf.Yaml(Bar("-y", "eight-node", "[200 mm, 4 mm]", "clamp: {on: left end of bar}", "  - fix: {clamp: [x, y, rotation]}\n  - wait: 1 h")));
        double line = Specific * 4 * 3, bending = 70000 * 3 * 64 / 12.0, shear = 5.0 / 6 * 35000 * 12;
        MeshedEdge tip = run.History.Mesh.Adherends[0].Edges["right end"];
        double sag = run.History.Snapshots[^1].DisplacementY[tip.Nodes[tip.Nodes.Length / 2]];
        Close.To(-(line * Math.Pow(200, 4) / (8 * bending) + line * 200 * 200 / (2 * shear)), sag, 1e-3);
        GripReading clamp = run.History.Points[^1].Grips[0];
        Close.To(line * 200, clamp.ForceY, 1e-9);
        Close.To(line * 200 * 200 / 2, clamp.Moment!.Value, 1e-9);
    }

    [Fact]
    public void Weight_stays_through_later_stages_and_a_released_prop_hands_it_over()
    {
        string grips = "clamp: {on: left end of bar}\n  prop: {on: bottom of bar, at: end}";
        RunResult run = DeckOf.Run(DeckOf.Yaml(Bar("-y", "eight-node", "[200 mm, 4 mm]", grips, "  - fix: {clamp: [x, y, rotation], prop: [y]}\n  - wait: 1 h\n  - let go: [prop]\n  - pull: {grip: prop, along: +y, force: 0.02 N}")));
        Assert.Equal(RunStatus.Finished, run.Summary.Status);
        double line = Specific * 12;
        PointRow propped = run.History.Points.Last(p => p.Stage == 2), let = run.History.Points.Last(p => p.Stage == 3), pulled = run.History.Points[^1];
        // Propped cantilever: the prop takes 3/8 of the weight.
        Close.To(3 * line * 200 / 8, propped.Grips[1].ForceY, 2e-3);
        Close.To(line * 200, propped.Grips[0].ForceY + propped.Grips[1].ForceY, 1e-9);
        Close.To(line * 200, let.Grips[0].ForceY, 1e-9);
        Close.To(0, let.Grips[1].ForceY, 0, 1e-12);
        Close.To(0.02, pulled.Grips[1].Force, 1e-9);
        Close.To(line * 200 - 0.02, pulled.Grips[0].ForceY, 1e-9);
        Assert.True(run.Summary.SelfCheck.Balance < 1e-9 && run.Summary.SelfCheck.PathError < 1e-3);
    }

    [Fact]
    public void Plies_weigh_what_their_materials_weigh_whichever_way_gravity_acts()
    {
        foreach ((string direction, double x, double y) in ((string, double, double)[])[("+x", -1, 0), ("-x", 1, 0), ("+y", 0, -1)])
        {
            string yaml = Bar(direction, "eight-node", "[50 mm, 4 mm]", "clamp: {on: left end of bar}", "  - fix: {clamp: [x, y, rotation]}\n  - wait: 1 h")
                .Replace("stuff: {", "heavy: {young: 210 GPa, poisson: 0.3, density: 7800 kg/m^3}\n  stuff: {", StringComparison.Ordinal)
                .Replace("elements: {length: 2 mm} }", "elements: {length: 2 mm}, plies: [{thickness: 1 mm, of: heavy}, {thickness: 3 mm}] }", StringComparison.Ordinal);
            GripReading clamp = DeckOf.Run(DeckOf.Yaml(yaml)).History.Points[^1].Grips[0];
            double weight = 9806.65e-12 * 50 * 3 * (7800 * 1 + 2700 * 3);
            Close.To(x * weight, clamp.ForceX, 1e-9, 1e-12);
            Close.To(y * weight, clamp.ForceY, 1e-9, 1e-12);
        }
    }

    private static string Bar(string gravity, string elements, string size, string grips, string stages) => $$"""
        title: Bar under its own weight
        model: {width: 3 mm, out of plane: free, rotation: small, gravity: {{gravity}}, elements: {{elements}} }
        materials:
          stuff: {young: 70 GPa, poisson: 0, density: 2700 kg/m^3}
        adherends:
          bar: {of: stuff, rectangle: {corner: [0 mm, 0 mm], size: {{size}} }, elements: {length: 2 mm} }
        grips:
          {{grips}}
        sequence:
        {{stages}}
        keep: {fields: every 1 points}
        """;
}
