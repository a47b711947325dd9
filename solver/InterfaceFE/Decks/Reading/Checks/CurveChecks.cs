using System.Globalization;
using InterfaceFE.Units;

namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>One curve of a layer: what its shape needs and takes, and whether the numbers make such a shape.</summary>
internal sealed class CurveChecks(CurveDeck curve, LayerDeck layer, string layerPath, bool isPeel, ReadContext context)
{
    private const double AreaAgreement = 1e-3;
    private const double RoundOff = 1e-9;
    private const double SteepestFall = 1e-6;
    private readonly string _path = layerPath + (isPeel ? ".peel" : ".shear");

    /// <summary>Checks the curve and gives its figures as far as they are known.</summary>
    public CurveFigures Run()
    {
        if (!context.IsSound(_path + ".law"))
            return CurveFigures.Unknown;
        RefuseOtherKeys();
        if (curve.Law == CurveShape.Table)
            return CheckTable();
        if (curve.Law == CurveShape.Potential)
            return CheckPotential();
        double? strength = Needed("strength", curve.Strength);
        double? toughness = Needed("toughness", curve.Toughness);
        double? final = curve.Law == CurveShape.Exponential ? Needed("final separation", curve.FinalSeparation) : null;
        double stiffness = curve.Stiffness ?? StiffnessFromBulk();
        if (strength is not { } s || toughness is not { } g)
            return CurveFigures.Unknown with { Stiffness = stiffness };
        double limit = s / stiffness;
        return curve.Law switch
        {
            CurveShape.Bilinear => CheckBilinear(s, g, limit, stiffness),
            CurveShape.Trapezoid => CheckTrapezoid(s, g, limit, stiffness),
            CurveShape.LinearParabolic => CheckParabola(s, g, limit, stiffness),
            _ => CheckExponential(s, g, limit, stiffness, final ?? double.NaN),
        };
    }

    private void RefuseOtherKeys()
    {
        string word = DeckShape.WordsOf(typeof(CurveShape)).First(w => w.Value.Equals(curve.Law)).Text;
        foreach (KeyShape key in DeckShape.Of(typeof(CurveDeck)).Keys)
        {
            string at = ReadContext.Join(_path, key.Name);
            if (!context.IsGiven(at) || Takes(key.Name))
                continue;
            context.Fail(at, key.Name switch
            {
                "opening" when curve.Law == CurveShape.Table => "does not apply to shear; a shear table has `sliding`",
                "sliding" when curve.Law == CurveShape.Table => "does not apply to peel; a peel table has `opening`",
                "stiffness" when curve.Law == CurveShape.Potential => "does not apply to the law potential: it follows from the other values, `initial slope` sets it",
                "final separation" => $"does not apply to the law {word}: it follows from the other values",
                "stiffness" or "strength" => $"does not apply to the law {word}: the points say it",
                _ => $"does not apply to the law {word}",
            });
        }
    }

    private bool Takes(string key) => key switch
    {
        "law" or "toughness" or "plastic share" => true,
        "stiffness" => curve.Law is not (CurveShape.Table or CurveShape.Potential),
        "strength" => curve.Law != CurveShape.Table,
        "exponent" or "initial slope" => curve.Law == CurveShape.Potential,
        "plateau until" => curve.Law == CurveShape.Trapezoid,
        "final separation" => curve.Law is CurveShape.Exponential or CurveShape.Trapezoid,
        "opening" => curve.Law == CurveShape.Table && isPeel,
        "sliding" => curve.Law == CurveShape.Table && !isPeel,
        _ => curve.Law == CurveShape.Table,
    };

    private T? Needed<T>(string key, T? value)
    {
        if (value is null && !context.IsGiven(ReadContext.Join(_path, key)))
        {
            KeyShape shape = DeckShape.Of(typeof(CurveDeck)).Find(key)!;
            string word = DeckShape.WordsOf(typeof(CurveShape)).First(w => w.Value.Equals(curve.Law)).Text;
            context.FailAt(context.Find(_path, out _).Key, ReadContext.Join(_path, key), $"is missing; the law {word} needs it, for example {key}: {shape.Key.Example}");
        }
        return value;
    }

    /// <summary>
    /// Stiffness of a thin layer from its bulk (physics: confined peel E(1-nu)/((1+nu)(1-2nu))/t, unconfined peel E/t, shear G/t); NaN and an error when there is no bulk.
    /// </summary>
    private double StiffnessFromBulk()
    {
        if (layer.Bulk is not { } bulk)
        {
            if (!context.IsGiven(layerPath + ".bulk"))
                context.FailAt(context.Find(_path, out _).Key, _path + ".stiffness", "is missing; give it, for example stiffness: 1.5 MPa/mm, or give the layer's `bulk` from which it follows");
            return double.NaN;
        }
        return isPeel ? LayerChecks.PeelStiffness(bulk, layer.Thickness) : LayerChecks.ShearStiffness(bulk, layer.Thickness);
    }

    private CurveFigures CheckBilinear(double strength, double toughness, double limit, double stiffness)
    {
        double final = 2 * toughness / strength;
        if (final <= limit * (1 + RoundOff))
            FailShape($"the final separation 2·toughness/strength = {Length(final)} must exceed the elastic limit strength/stiffness = {Length(limit)}; raise toughness or stiffness, or lower strength");
        return new CurveFigures(stiffness, strength, toughness, limit, limit, final, 0.5 * strength * limit);
    }

    private CurveFigures CheckParabola(double strength, double toughness, double limit, double stiffness)
    {
        // Area of the rise and of the parabola: strength·limit/2 + 2/3·strength·(final - limit).
        double final = 1.5 * toughness / strength + 0.25 * limit;
        if (final <= limit * (1 + RoundOff))
            FailShape($"is no more than the area {Energy(0.5 * strength * limit)} of the linear rise, strength²/(2·stiffness): nothing is left for the parabola; raise toughness or stiffness, or lower strength");
        return new CurveFigures(stiffness, strength, toughness, limit, limit, final, 0.5 * strength * limit);
    }

    private CurveFigures CheckTrapezoid(double strength, double toughness, double limit, double stiffness)
    {
        // Area of the trapezoid: strength/2·(final + plateau end - elastic limit); with both left out the plateau ends at two thirds of the final separation.
        double sum = 2 * toughness / strength + limit;
        double final = curve.FinalSeparation ?? (curve.PlateauUntil is { } until ? sum - until : 0.6 * sum);
        double plateau = curve.PlateauUntil ?? (curve.FinalSeparation is null ? 0.4 * sum : sum - final);
        double area = 0.5 * strength * (final + plateau - limit);
        string guilty = _path + (curve.PlateauUntil is not null ? ".plateau until" : curve.FinalSeparation is not null ? ".final separation" : ".toughness");
        if (plateau < limit * (1 - RoundOff))
            context.Fail(guilty, $"makes the plateau end at {Length(plateau)}, before the elastic limit strength/stiffness = {Length(limit)}");
        else if (final <= plateau * (1 + RoundOff))
            context.Fail(guilty, $"leaves no room to fall: the plateau would end at {Length(plateau)} and the curve at {Length(final)} with this toughness and strength");
        else if (Math.Abs(area - toughness) > AreaAgreement * toughness)
            context.Fail(_path + ".toughness", $"disagrees with the area {Energy(area)} that strength, stiffness, `plateau until` and `final separation` give; leave one of the last two out");
        return new CurveFigures(stiffness, strength, toughness, limit, limit, final, 0.5 * strength * limit);
    }

    private CurveFigures CheckExponential(double strength, double toughness, double limit, double stiffness, double final)
    {
        double rise = 0.5 * strength * limit;
        double fall = strength * (final - limit);
        double share = (toughness - rise) / fall;
        if (final <= limit)
            context.Fail(_path + ".final separation", $"must exceed the elastic limit strength/stiffness = {Length(limit)}");
        else if (share is <= SteepestFall or >= 1 - SteepestFall)
            context.Fail(_path + ".toughness", $"must lie between {Energy(rise)} (the linear rise alone) and {Energy(rise + fall)} (strength kept up to the final separation)");
        else if (share > 0.5)
            context.Warn(_path + ".toughness", $"is more than {Energy(rise + 0.5 * fall)}, the area under a straight fall: the exponential then bulges outwards; a trapezoid may be meant");
        return new CurveFigures(stiffness, strength, toughness, limit, limit, final, rise);
    }

    private CurveFigures CheckPotential()
    {
        double? strength = Needed("strength", curve.Strength), toughness = Needed("toughness", curve.Toughness), exponent = Needed("exponent", curve.Exponent), slope = Needed("initial slope", curve.InitialSlope);
        if (strength is not { } s || toughness is not { } g || exponent is not { } alpha || slope is not { } lambda)
            return CurveFigures.Unknown;
        double largest = PotentialFigures.LargestInitialSlope(alpha);
        if (lambda > largest)
        {
            context.Fail(_path + ".initial slope", string.Create(CultureInfo.InvariantCulture, $"must be at most 1/√(2·exponent - 1) = {NumberText.Rounded(largest, 4)} with this exponent: above, traction over separation would rise at first and damage would heal"));
            return CurveFigures.Unknown;
        }
        PotentialFigures figures = PotentialFigures.Of(s, g, alpha, lambda);
        return new CurveFigures(figures.Stiffness, s, g, s / figures.Stiffness, lambda * figures.Final, figures.Final, figures.AreaToPeak);
    }

    private CurveFigures CheckTable()
    {
        string separations = isPeel ? "opening" : "sliding";
        IReadOnlyList<double>? w = Needed(separations, isPeel ? curve.Opening : curve.Sliding);
        IReadOnlyList<double>? t = Needed("traction", curve.Traction);
        if (w is null || t is null)
            return CurveFigures.Unknown;
        if (w.Count != t.Count)
        {
            context.Fail(_path + ".traction", string.Create(CultureInfo.InvariantCulture, $"has {t.Count} entries, but `{separations}` has {w.Count}; each separation needs its traction"));
            return CurveFigures.Unknown;
        }
        if (w.Count < 3)
        {
            context.Fail(_path + ".traction", "a table needs at least three points: [0, 0], one with a traction, one where it is gone");
            return CurveFigures.Unknown;
        }
        bool good = CheckPoints(w, t, separations);
        return good ? TableFigures(w, t) : CurveFigures.Unknown;
    }

    private bool CheckPoints(IReadOnlyList<double> w, IReadOnlyList<double> t, string separations)
    {
        bool good = !w.Any(double.IsNaN) && !t.Any(double.IsNaN);
        void Fail(string list, int point, string message)
        {
            good = false;
            context.Fail(ReadContext.Join(ReadContext.Join(_path, list), point + 1), message);
        }
        int last = w.Count - 1;
        if (w[0] > 0)
            Fail(separations, 0, "a table starts at 0 mm");
        if (t[0] > 0)
            Fail("traction", 0, "a table starts at 0 MPa: no traction without separation");
        if (t[last] > 0)
            Fail("traction", last, "a table ends at 0 MPa: the last point is where the traction is gone");
        for (int i = 1; i <= last; i++)
        {
            if (w[i] <= w[i - 1])
                Fail(separations, i, $"must be greater than the entry before it ({Length(w[i - 1])})");
            if (i < last && t[i] == 0)
                Fail("traction", i, "only the first and the last traction may be 0");
        }
        for (int i = 2; i < last; i++)
            if (w[i] > w[i - 1] && t[i] / w[i] > t[i - 1] / w[i - 1] * (1 + RoundOff))
                Fail("traction", i, $"traction over separation rises here, from {Stiffness(t[i - 1] / w[i - 1])} to {Stiffness(t[i] / w[i])}: damage would heal on such a toe; start the table on the steepest line from the origin");
        return good;
    }

    private CurveFigures TableFigures(IReadOnlyList<double> w, IReadOnlyList<double> t)
    {
        double strength = t.Max();
        double area = 0;
        double areaToPeak = double.NaN;
        double peak = double.NaN;
        for (int i = 1; i < w.Count; i++)
        {
            area += 0.5 * (t[i] + t[i - 1]) * (w[i] - w[i - 1]);
            if (double.IsNaN(peak) && t[i] == strength)
                (peak, areaToPeak) = (w[i], area);
        }
        if (curve.Toughness is { } toughness && Math.Abs(toughness - area) > AreaAgreement * area)
            context.Fail(_path + ".toughness", $"disagrees with the area under the table, {Energy(area)}; leave it out or correct the table");
        return new CurveFigures(t[1] / w[1], strength, area, w[1], peak, w[^1], areaToPeak);
    }

    private void FailShape(string message) => context.Fail(_path + ".toughness", message);

    private static string Length(double value) => string.Create(CultureInfo.InvariantCulture, $"{NumberText.Rounded(value, 4)} mm");

    private static string Energy(double value) => string.Create(CultureInfo.InvariantCulture, $"{NumberText.Rounded(value, 4)} kJ/m^2");

    private static string Stiffness(double value) => string.Create(CultureInfo.InvariantCulture, $"{NumberText.Rounded(value, 4)} {DimensionText.Unit(Dimension.LayerStiffness)}");
}
