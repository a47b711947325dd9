using System.Globalization;
using InterfaceFE.Results;

namespace InterfaceFE.Validation.Cases;

/// <summary>A double cantilever beam loaded by couples on the left ends of its two equal arms, cracked from the left; deck text and steady growth.</summary>
internal sealed record MomentCoupon
{
    /// <summary>Young's modulus of the arms [MPa].</summary>
    public double Young { get; init; } = 70_000;

    /// <summary>Poisson's ratio of the arms.</summary>
    public double Poisson { get; init; } = 0.3;

    /// <summary>Thickness of an arm [mm].</summary>
    public double Thickness { get; init; } = 3;

    /// <summary>Width of the arms [mm].</summary>
    public double ArmWidth { get; init; } = 25;

    /// <summary>Width of the layer [mm].</summary>
    public double LayerWidth { get; init; } = 25;

    /// <summary>Whether the arms are held out of plane.</summary>
    public bool Held { get; init; }

    /// <summary>Length of the arms [mm].</summary>
    public double Length { get; init; } = 100;

    /// <summary>Starter crack [mm].</summary>
    public double Crack { get; init; } = 20;

    /// <summary>Element length along the bond [mm]; null: the program's choice.</summary>
    public double? ElementLength { get; init; }

    /// <summary>Lines of the layer, one key each, without indent.</summary>
    public required string Layer { get; init; }

    /// <summary>The turning stage.</summary>
    public required string Turn { get; init; }

    /// <summary>What holds the specimen.</summary>
    public required string Fix { get; init; }

    /// <summary>Further keys of the model, each led by a comma.</summary>
    public string ModelKeys { get; init; } = "";

    /// <summary>Further blocks of the deck.</summary>
    public string More { get; init; } = "";

    /// <summary>E or E/(1-ν²) [MPa].</summary>
    public double PlaneModulus => Held ? Young / (1 - Poisson * Poisson) : Young;

    /// <summary>J for couples M1 on the upper and M2 on the lower arm, counter-clockwise positive, in a layer narrower than the arms or not [N/mm].</summary>
    /// <remarks>J = B/b·[21(m1² + m2²) - 6·m1·m2]/(4E'h³) with m = M/B; for m2 = -m1 this is 12m²/(E'h³).</remarks>
    public double EnergyReleaseRate(double upper, double lower) =>
        (21 * (upper * upper + lower * lower) - 6 * upper * lower) / (4 * PlaneModulus * Thickness * Thickness * Thickness * ArmWidth * LayerWidth);

    /// <summary>The deck.</summary>
    public string Deck()
    {
        string layer = string.Join("\n", Layer.Split('\n', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries).Select(line => "    " + line));
        string elements = ElementLength is { } length ? string.Create(CultureInfo.InvariantCulture, $", element length: {length} mm") : "";
        return string.Create(CultureInfo.InvariantCulture, $$"""
            title: Double cantilever beam turned by couples
            model: {width: {{ArmWidth}} mm, out of plane: {{(Held ? "held" : "free")}}, rotation: small{{ModelKeys}}}
            materials:
              metal: {young: {{Young}} MPa, poisson: {{Poisson}}}
            layers:
              glue:
            {{layer}}
            adherends:
              lower arm: {of: metal, rectangle: {corner: [0 mm, 0 mm], size: [{{Length}} mm, {{Thickness}} mm]} }
              upper arm: {of: metal, rectangle: {corner: [0 mm, {{Thickness}} mm], size: [{{Length}} mm, {{Thickness}} mm]} }
            joints:
              bond: {layer: glue, upper: bottom of upper arm, lower: top of lower arm, width: {{LayerWidth}} mm, starter crack: {from: start, length: {{Crack}} mm}{{elements}} }
            grips:
              upper: {on: left end of upper arm}
              lower: {on: left end of lower arm}
              root: {on: right end of lower arm}
            sequence:
              - fix: {{Fix}}
              - turn: {{Turn}}
            keep: {fields: none}
            {{More}}
            """);
    }

    /// <summary>Growth of the crack from the left, at each point.</summary>
    public IReadOnlyList<MomentPoint> Growth(RunHistory history)
    {
        int upper = Grip(history, "upper"), lower = Grip(history, "lower");
        FrontRow[] fronts = [.. history.Fronts.Where(f => f.Front == 1)];
        return
        [
            .. history.Points.Select((p, i) => new MomentPoint(p.Point, p.Grips[upper].Moment ?? double.NaN, p.Grips[lower].Moment ?? double.NaN,
                (fronts[i].CrackTip ?? double.NaN) - Crack, fronts[i])),
        ];
    }

    /// <summary>The points of steady growth: the crack has grown by its process zone and more, and the zone is farther from the bond's end than a given distance.</summary>
    /// <param name="growth">Growth at all points.</param>
    /// <param name="clear">Distance of the zone's start from the end of the arms [mm].</param>
    /// <param name="least">Least growth [mm].</param>
    public IReadOnlyList<MomentPoint> Plateau(IReadOnlyList<MomentPoint> growth, double clear, double least) =>
        [.. growth.Where(g => g.Growth >= least && g.Front.ProcessZone is { } zone && g.Growth >= zone && g.Front.ProcessZoneStart <= Length - clear)];

    private static int Grip(RunHistory history, string name) => history.Grips.ToList().FindIndex(g => g.Name == name);
}

/// <summary>A point of a moment coupon's run.</summary>
/// <param name="Point">Number of the point.</param>
/// <param name="Upper">Couple on the upper arm [N·mm].</param>
/// <param name="Lower">Couple on the lower arm [N·mm].</param>
/// <param name="Growth">Growth of the crack [mm].</param>
/// <param name="Front">Row of the front.</param>
internal sealed record MomentPoint(int Point, double Upper, double Lower, double Growth, FrontRow Front);
