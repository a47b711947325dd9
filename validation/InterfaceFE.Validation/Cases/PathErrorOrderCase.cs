using System.Globalization;
using InterfaceFE.Decks;
using InterfaceFE.Runs;
using InterfaceFE.Tests.Marching;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>The energy path error is of second order in the stride: runs with equal strides, halved from run to run.</summary>
public sealed class PathErrorOrderCase : ICase
{
    private const string Source = "trapezoidal rule of the work put in";

    private const string Peel = """
        title: Double cantilever beam, even strides
        model: {width: 25 mm, out of plane: free, rotation: small}
        include: [materials.yaml]
        adherends:
          lower arm: {of: steel, rectangle: {corner: [0 mm, 0 mm], size: [100 mm, 6 mm]}}
          upper arm: {of: steel, rectangle: {corner: [0 mm, 6 mm], size: [100 mm, 6 mm]}}
        joints:
          bond: {layer: hull epoxy, upper: bottom of upper arm, lower: top of lower arm, starter crack: {from: start, length: 40 mm}}
        grips:
          upper block: {on: top of upper arm, from: 0 mm, to: 8 mm}
          lower block: {on: bottom of lower arm, from: 0 mm, to: 8 mm}
        sequence:
          - fix: {lower block: [x, y], upper block: [x]}
          - pull: {grip: upper block, along: +y, travel: 0.7 mm, speed: 1 mm/min}
        keep: {fields: none}
        """;

    /// <inheritdoc/>
    public string Name => "path-error-order";

    /// <inheritdoc/>
    public string Group => "March";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        var curves = new List<CaseCurve>();
        Deck bar = BarDeck.Make(0.25, height: 1.5);
        LayerDeck glue = bar.Layers!["glue"];
        var smooth = new CurveDeck { Law = CurveShape.Exponential, Stiffness = BarDeck.Stiffness, Strength = BarDeck.Strength, Toughness = BarDeck.Toughness, FinalSeparation = 0.3 };
        bar = bar with { Layers = new Dictionary<string, LayerDeck> { ["glue"] = glue with { Peel = smooth, Shear = smooth } } };
        foreach ((string name, Deck deck, int least) in ((string, Deck, int)[])[("bar, exponential law", bar, 25), ("peel coupon, epoxy", context.Read("peel, even strides", Peel), 20)])
        {
            int[] strides = [least, 2 * least, 4 * least, 8 * least];
            List<double> errors = [];
            foreach (int count in strides)
            {
                // The aim is far above the error of these strides: it never shortens one.
                var march = new MarchDeck { FirstStride = 1.0 / count, LargestStride = 1.0 / count, PathError = 0.1, Control = ControlSetting.Own };
                RunResult run = context.Run(string.Create(CultureInfo.InvariantCulture, $"{name}, {count} strides"), deck with { March = march });
                int points = run.History.Points.Count - 1;
                if (Math.Abs(points - count) > 1)
                    yield return CaseLine.Broken($"{name}: {count} strides asked for, {points} taken", SelfCheck.Words(run.Summary));
                errors.Add(run.History.Energies[^1].PathError);
                yield return CaseLine.Reported(string.Create(CultureInfo.InvariantCulture, $"{name}: path error of the run in {count} strides"), errors[^1], "", Source);
            }
            yield return new CaseLine(name + ": order of the path error in the stride", 2, Math.Log2(errors[0] / errors[^1]) / (strides.Length - 1), 0.1, "", Source);
            curves.Add(new CaseCurve(name, [.. strides.Select(n => Math.Log10(n))], [.. errors.Select(Math.Log10)], Points: true));
        }
        context.Draw(new CaseFigure("path-error-order", "Energy path error against strides", "equal strides; slope -2 is second order", "log10 of strides", "log10 of the path error", curves));
    }
}
