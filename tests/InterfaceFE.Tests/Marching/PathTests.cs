using InterfaceFE.Decks;
using InterfaceFE.Marching;
using InterfaceFE.Model;
using InterfaceFE.Tests.Model;
using Xunit;

namespace InterfaceFE.Tests.Marching;

/// <summary>The bar across a layer, whose path is known (u = w + 2·H·σ(w)/E), under all kinds of control, laws and contrasts.</summary>
public class PathTests
{
    private const double Area = BarDeck.Length * BarDeck.Width;

    [Fact]
    public void A_compliant_layer_is_followed_to_the_end_by_travel_alone()
    {
        Recording run = Recording.Of(BarDeck.Make(0.07, height: 1, control: ControlSetting.Own));
        Assert.True(run.Outcome.Status == MarchStatus.Finished, run.Outcome.Cause);
        Assert.All(run.Iterations, i => Assert.Equal("own", i.Control));
        CheckPath(run, 1, Bilinear);
        Close.To(0.07, run.Displacements[^1][Head(run)], 1e-12);
    }

    [Fact]
    public void By_force_own_control_stops_at_the_limit_point_and_automatic_goes_on()
    {
        Deck deck = BarDeck.Make(1, height: 1);
        deck = deck with { Sequence = [deck.Sequence[0], new StageDeck { Pull = new PullDeck { Grip = "head", Along = PullDirection.PlusY, Force = 1.5 * BarDeck.Strength * Area } }] };
        Recording stopped = Recording.Of(deck with { March = new MarchDeck { Control = ControlSetting.Own } });
        Assert.Equal(MarchStatus.StoppedEarly, stopped.Outcome.Status);
        Assert.Contains("control: automatic", stopped.Outcome.Cause, StringComparison.Ordinal);
        Close.To(1 / 1.5, stopped.Points[^1].Progress, 1e-3, 0, "limit point");
        foreach (ControlSetting control in (ReadOnlySpan<ControlSetting>)[ControlSetting.Automatic, ControlSetting.ArcLength])
        {
            Recording run = Recording.Of(deck with { March = new MarchDeck { Control = control } });
            Assert.True(run.Outcome.Status == MarchStatus.Severed, control + ": " + run.Outcome.Cause + string.Join("\n", run.Lines));
            CheckPath(run, 1, Bilinear);
            Assert.Contains(run.Points, p => !p.Stable);
            Assert.True(run.Points[^1].Progress < 0.1, "the force must fall");
            Close.To(BarDeck.Toughness * Area, run.Points[^1].Energy.State.SpentInLayers, 1e-6, 0, "dissipation");
        }
    }

    [Theory]
    [InlineData(ControlSetting.Automatic)]
    [InlineData(ControlSetting.ArcLength)]
    public void Path_control_is_left_again_where_the_path_is_stable(ControlSetting control)
    {
        // A table that falls steeply, then rises again: snap-back, then a stable branch to the end of the stage.
        double[] opening = [0, 0.005, 0.01, 0.5, 1], traction = [0, 5, 1, 1.2, 0];
        Deck deck = WithCurve(BarDeck.Make(0.6, control: control), new CurveDeck { Law = CurveShape.Table, Opening = opening, Traction = traction });
        Recording run = Recording.Of(deck);
        Assert.True(run.Outcome.Status == MarchStatus.Finished, run.Outcome.Cause + string.Join("\n", run.Lines));
        CheckPath(run, BarDeck.Height, w => Table(opening, traction, w));
        int taken = run.Lines.FindIndex(l => l.Contains("takes over", StringComparison.Ordinal)), left = run.Lines.FindIndex(l => l.Contains("the stage's own", StringComparison.Ordinal));
        Assert.True(taken >= 0 && left > taken, string.Join("\n", run.Lines));
        Close.To(0.6, run.Displacements[^1][Head(run)], 1e-10);
        Assert.True(run.Points[^1].Stable);
    }

    [Theory]
    [InlineData(2)]
    [InlineData(20)]
    public void A_plateau_is_walked_along_and_left(double height)
    {
        CurveDeck curve = new() { Law = CurveShape.Trapezoid, Stiffness = 1000, Strength = 5, Toughness = 0.4, PlateauUntil = 0.07 };
        // Area = S/2·(final + plateau end - onset): final = 2·0.4/5 - 0.07 + 0.005.
        double[] opening = [0, 0.005, 0.07, 0.095], traction = [0, 5, 5, 0];
        Recording run = Recording.Of(WithCurve(BarDeck.Make(0.4, height), curve));
        Assert.True(run.Outcome.Status is MarchStatus.Severed or MarchStatus.Finished, run.Outcome.Cause + string.Join("\n", run.Lines));
        CheckPath(run, height, w => Table(opening, traction, w));
        Close.To(0.4 * Area, run.Points[^1].Energy.State.SpentInLayers, 1e-6, 0, "dissipation");
        Assert.True(run.Points.Max(p => p.Energy.PathError) < 1e-3);
    }

    [Theory]
    [InlineData(1e-3)]
    [InlineData(1)]
    [InlineData(1e3)]
    [InlineData(1e7)]
    public void Contrasts_of_stiffness_between_bar_and_layer_do_no_harm(double contrast)
    {
        // Layer stiffness times height over Young's modulus is the contrast.
        double stiffness = contrast * BarDeck.Young / 10;
        CurveDeck curve = new() { Law = CurveShape.Bilinear, Stiffness = stiffness, Strength = 5, Toughness = 2 * 25 / stiffness };
        double elastic = 2 * 10 * 5 / BarDeck.Young + 5 / stiffness;
        Recording run = Recording.Of(WithCurve(BarDeck.Make(6 * elastic, 10), curve));
        Assert.True(run.Outcome.Status is MarchStatus.Severed or MarchStatus.Finished, run.Outcome.Cause + string.Join("\n", run.Lines));
        double limit = 5 / stiffness, final = 4 * 5 / stiffness;
        double largest = 0;
        for (int i = 0; i < run.Points.Count; i++)
        {
            double travel = run.Displacements[i][Head(run)], traction = run.Forces[i][Head(run)] / Area, opening = travel - 20 * traction / BarDeck.Young;
            // The opening follows by difference: the tolerance of equilibrium, 1e-10 of the force, moves the bar by as much of its travel.
            double slack = 1e-8 * 5 + stiffness * 1e-9 * travel;
            double law = opening <= limit ? stiffness * opening : opening >= final ? 0 : 5 * (final - opening) / (final - limit);
            Close.To(law, traction, 1e-7, slack, $"point {i}");
            largest = Math.Max(largest, traction);
        }
        Close.To(5, largest, 0.05, 0, "peak");
        Close.To(2 * 25 / stiffness * Area, run.Points[^1].Energy.State.SpentInLayers, 1e-5, 0, "dissipation");
        Assert.True(run.Points.Max(p => p.Energy.Balance) < 1e-8, $"{run.Points.Max(p => p.Energy.Balance)}");
    }

    [Theory]
    [InlineData(ElementKind.FourNode)]
    [InlineData(ElementKind.EightNode)]
    public void A_single_layer_element_is_enough(ElementKind kind)
    {
        Deck deck = BarDeck.Make(0.6, elements: kind);
        ElementsDeck one = new() { Along = 1, Through = 3 };
        deck = deck with
        {
            Adherends = deck.Adherends.ToDictionary(a => a.Key, a => a.Value with { Elements = one }),
            Joints = new Dictionary<string, JointDeck> { ["bond"] = deck.Joints!["bond"] with { ElementLength = BarDeck.Length } },
        };
        Recording run = Recording.Of(deck);
        Assert.Equal(1, run.Equilibrium.Model.Layers[0].Count);
        Assert.True(run.Outcome.Status == MarchStatus.Severed, run.Outcome.Cause);
        CheckPath(run, BarDeck.Height, Bilinear);
    }

    [Fact]
    public void Heat_first_then_pull_follows_the_shifted_path()
    {
        // u = w + 2·H·(σ/E + α·ΔT); cooled between held ends the layer carries 2·H·α·40 K / (2·H/E + 1/k).
        Deck deck = BarDeck.Make(0.6);
        deck = deck with
        {
            Materials = new Dictionary<string, MaterialDeck> { ["stuff"] = deck.Materials["stuff"] with { ShearModulus = new ShearModuli { Xy = BarDeck.Young / 2 }, Expansion = new Directional(0, 25e-6, 0) } },
            Sequence =
            [
                new StageDeck { Fix = new Dictionary<string, IReadOnlyList<GripComponent>> { ["base"] = [GripComponent.X, GripComponent.Y, GripComponent.Rotation], ["head"] = [GripComponent.X, GripComponent.Y, GripComponent.Rotation] } },
                new StageDeck { CoolTo = 253.15, Over = 100 },
                deck.Sequence[1],
            ],
        };
        Recording run = Recording.Of(deck);
        Assert.True(run.Outcome.Status == MarchStatus.Severed, run.Outcome.Cause + string.Join("\n", run.Lines));
        int cooled = run.Points.FindLastIndex(p => p.Stage == 2);
        double free = 100 * 25e-6 * 40;
        Close.To(free / (100 / BarDeck.Young + 1 / BarDeck.Stiffness), run.Forces[cooled][Head(run)] / Area, 1e-9, 0, "traction of cooling");
        for (int i = cooled; i < run.Points.Count; i++)
        {
            double traction = run.Forces[i][Head(run)] / Area, opening = run.Displacements[i][Head(run)] + free - 100 * traction / BarDeck.Young;
            Close.To(Bilinear(opening), traction, 1e-8, 1e-8 * BarDeck.Strength, $"point {i}");
        }
        Assert.True(run.Points.Max(p => p.Energy.PathError) < 1e-3 && run.Points.Max(p => p.Energy.Balance) < 1e-9);
    }

    private static int Head(Recording run) => run.Equilibrium.Model.Unknowns.OfBody(1) + 1;

    private static void CheckPath(Recording run, double height, Func<double, double> law)
    {
        for (int i = 0; i < run.Points.Count; i++)
        {
            double traction = run.Forces[i][Head(run)] / Area, opening = run.Displacements[i][Head(run)] - 2 * height * traction / BarDeck.Young;
            Close.To(law(opening), traction, 1e-8, 1e-8 * BarDeck.Strength, $"point {i}, opening {opening}");
        }
    }

    private static Deck WithCurve(Deck deck, CurveDeck curve) => deck with
    {
        Layers = new Dictionary<string, LayerDeck> { ["glue"] = deck.Layers!["glue"] with { Peel = curve, Shear = curve with { Opening = null, Sliding = curve.Opening } } },
    };

    private static double Bilinear(double opening)
    {
        double limit = BarDeck.Strength / BarDeck.Stiffness, final = 2 * BarDeck.Toughness / BarDeck.Strength;
        return Table([0, limit, final], [0, BarDeck.Strength, 0], opening);
    }

    private static double Table(double[] x, double[] y, double at)
    {
        if (at < 0)
            return y[1] / x[1] * at;
        for (int i = 1; i < x.Length; i++)
            if (at <= x[i])
                return y[i - 1] + (y[i] - y[i - 1]) * (at - x[i - 1]) / (x[i] - x[i - 1]);
        return 0;
    }
}
