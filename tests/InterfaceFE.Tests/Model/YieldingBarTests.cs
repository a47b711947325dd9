using System.Globalization;
using InterfaceFE.Decks;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using Xunit;

namespace InterfaceFE.Tests.Model;

/// <summary>Bars that yield, from the deck to the results, against closed forms. Materials are invented.</summary>
public class YieldingBarTests(ITestOutputHelper output)
{
    private const double Young = 70000, Expansion = 20e-6, Yield = 60;

    [Theory]
    [InlineData(0.98)]
    [InlineData(0.95)]
    public void Bent_beyond_yield_and_let_go_it_keeps_the_curvature_of_the_closed_form(double share)
    {
        double moment = share * BentBar.PlasticMoment;
        RunResult run = DeckOf.Run(DeckOf.Yaml(BentBar.Deck("free", Words(moment), Words(0))));
        Assert.Equal(RunStatus.Finished, run.Summary.Status);
        double bent = CurvatureAtEndOf(run, 2), left = CurvatureAtEndOf(run, 3);
        output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"bent {bent / BentBar.Curvature(moment):F5}, let go {left / (BentBar.Curvature(moment) - 12 * moment / (BentBar.Young * 64)):F5} of the closed form"));
        Close.To(BentBar.Curvature(moment), bent, 0.005);
        Close.To(BentBar.Curvature(moment) - 12 * moment / (BentBar.Young * Math.Pow(BentBar.Height, 3)), left, 0.005);
        Assert.True(run.Summary.SelfCheck.Balance < 1e-9 && run.Summary.SelfCheck.PathError < 1e-3);
        Assert.NotNull(run.Summary.FirstYield);
        Assert.True(run.Summary.FirstYield.Stage == 2 && run.Summary.FirstYield.Progress > BentBar.ElasticMoment / moment - 0.05);
    }

    [Theory]
    [InlineData("free", 1)]
    [InlineData("held", 1.1547005)]
    public void Whole_section_yields_at_the_plastic_moment(string outOfPlane, double factor)
    {
        RunResult run = DeckOf.Run(DeckOf.Yaml(BentBar.Deck(outOfPlane, "angle: 0.6 rad")));
        double moment = run.History.Points[^1].Grips[1].Moment!.Value;
        output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{outOfPlane}: {moment / (factor * BentBar.PlasticMoment):F5} of the plastic moment"));
        Assert.Equal(RunStatus.Finished, run.Summary.Status);
        Close.To(factor * BentBar.PlasticMoment, moment, 0.005);
    }

    [Theory]
    [InlineData(0, "")]
    [InlineData(2000, "")]
    [InlineData(2000, ", temperature: [-100 °C, 20 °C, 150 °C], share of stress: [1.2, 1, 0.8]")]
    public void Strip_between_walls_follows_the_loop_of_cooling_and_heating(double slope, string shares)
    {
        RunResult run = DeckOf.Run(DeckOf.Yaml(BetweenWalls("free", slope, shares, "cool to: -80 °C", "heat to: 120 °C", "cool to: -80 °C", "heat to: 20 °C")));
        Assert.Equal(RunStatus.Finished, run.Summary.Status);
        double plastic = 0, temperature = 20;
        foreach (PointRow row in run.History.Points)
        {
            // Closed form of a bar whose length is held: elastic from the plastic strain so far unless that passes yield at the temperature.
            temperature = row.Temperature - 273.15;
            double share = shares.Length == 0 ? 1 : temperature < 20 ? 1 + 0.2 * (20 - temperature) / 120 : 1 - 0.2 * (temperature - 20) / 130;
            double shifted = -Young * (Expansion * (temperature - 20) + plastic) - slope * plastic;
            plastic += Math.Sign(shifted) * Math.Max(Math.Abs(shifted) - share * Yield, 0) / (Young + slope);
            double stress = -Young * (Expansion * (temperature - 20) + plastic);
            Close.To(-stress * 4 * 2, row.Grips[0].ForceX, 1e-9, 1e-7, "force of a wall");
            Close.To((0.5 * stress * stress / Young + 0.5 * slope * plastic * plastic) * 160, run.History.Energies[row.Point].StoredInAdherends, 1e-9, 1e-7, "stored");
        }
        EnergyRow end = run.History.Energies[^1];
        output.WriteLine($"{run.History.Points.Count} points, balance {end.Balance:E1}, path error {end.PathError:E1}, spent {end.SpentInYielding:G6}");
        Assert.True(end.Balance < 1e-9 && run.Summary.SelfCheck.PathError < 1e-3);
        Assert.Equal(0, end.PutIn, 1e-9);
        Assert.True(end.SpentInYielding > 0);
    }

    [Fact]
    public void Without_hardening_the_spent_energy_is_yield_stress_times_plastic_strain()
    {
        RunResult run = DeckOf.Run(DeckOf.Yaml(BetweenWalls("free", 0, "", "cool to: -80 °C", "heat to: 120 °C")));
        // Plastic strain of the first way 100·alpha - Y/E, of the second 200·alpha - 2Y/E.
        double kappa = 300 * Expansion - 3 * Yield / Young;
        Close.To(Yield * kappa * 160, run.History.Energies[^1].SpentInYielding, 1e-8);
        Close.To(kappa, run.History.Snapshots[^1].PlasticStrain[0], 1e-8);
        Close.To(Yield, run.History.Snapshots[^1].EquivalentStress[0], 1e-8);
    }

    [Fact]
    public void Path_error_is_of_second_order_in_the_stride()
    {
        double[] errors = new double[3];
        for (int i = 0; i < errors.Length; i++)
        {
            double stride = 0.05 / (1 << i);
            Deck deck = DeckOf.Yaml(BentBar.Deck("held", "angle: 0.2 rad"));
            deck = deck with { March = new MarchDeck { FirstStride = stride, LargestStride = stride, PathError = 0.1 } };
            errors[i] = DeckOf.Run(deck).History.Energies[^1].PathError;
        }
        output.WriteLine(string.Join(", ", errors));
        Assert.True(errors[0] / errors[1] > 3 && errors[1] / errors[2] > 3, string.Join(", ", errors));
    }

    [Fact]
    public void Level_extension_of_the_curve_is_said_once_and_elastic_elements_keep_their_tangents()
    {
        List<string> lines = [];
        string yaml = BetweenWalls("held", 0, "", "cool to: -80 °C", "heat to: 120 °C").Replace("plastic strain: [0], stress: [60 MPa]", "plastic strain: [0, 0.0005], stress: [60 MPa, 70 MPa]", StringComparison.Ordinal);
        RunResult run = DeckRun.Execute(DeckOf.Yaml(yaml), _ => new Lines(lines), TestContext.Current.CancellationToken);
        Assert.Single(lines, line => line.Contains("where its yield curve ends", StringComparison.Ordinal));
        Assert.Single(lines, line => line.Contains("begins to yield", StringComparison.Ordinal));
        Assert.Contains(run.Summary.Remarks, line => line.Contains("beyond the end of the yield curve in 'strip'", StringComparison.Ordinal));
        int point = run.History.Points.First(p => run.History.Energies[p.Point].SpentInYielding > 0).Point;
        Assert.All(run.History.Iterations.Where(i => i.Point < point), i => Assert.Equal(0, i.ChangedElements));
    }

    private static string BetweenWalls(string outOfPlane, double slope, string shares, params string[] stages) => $$"""
        title: Strip between two walls, cooled and heated
        model: {width: 2 mm, out of plane: {{outOfPlane}}, rotation: small}
        materials:
          metal:
            young: 70 GPa
            poisson: 0.33
            expansion: 20e-6 1/K
            yield curve: {plastic strain: [0], stress: [60 MPa], kinematic hardening: {{slope.ToString(CultureInfo.InvariantCulture)}} MPa{{shares}} }
        adherends:
          strip: {of: metal, rectangle: {corner: [0 mm, 0 mm], size: [20 mm, 4 mm]}, elements: {along: 5, through: 2} }
        grips:
          left: {on: left end of strip, hold: each point}
          right: {on: right end of strip, hold: each point}
          foot: {on: left end of strip, at: start}
        sequence:
          - fix: {left: [x], right: [x], foot: [y]}
        {{string.Join("\n", stages.Select(stage => "  - " + stage))}}
        keep: {fields: every 1 points}
        """;

    private static string Words(double moment) => string.Create(CultureInfo.InvariantCulture, $"moment: {moment:R} N*mm");

    private static double CurvatureAtEndOf(RunResult run, int stage) => BentBar.Curvature(run.History.Mesh, run.History.Snapshots.Last(s => s.Stage == stage));

    private sealed class Lines(List<string> lines) : IRecordSink
    {
        public void Write(PointRow point, IReadOnlyList<FrontRow> fronts, EnergyRow energy)
        {
        }

        public void Write(IterationRow iteration)
        {
        }

        public void Write(FieldSnapshot fields)
        {
        }

        public void Say(string line) => lines.Add(line);
    }
}
