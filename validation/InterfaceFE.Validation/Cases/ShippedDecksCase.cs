using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Geometry;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// Every deck in the folder inputs: it runs to its end, its energies balance, and where it is a peel or a moment coupon, the energy release rates by path, from rotations
/// and under the law agree.
/// </summary>
public sealed class ShippedDecksCase : ICase
{
    private const int QuickUnknowns = 15_000;
    private const string Rates = "Rice 1968; Paris and Paris 1988; Olsson and Stigh 1989: one J for a law without path dependence";

    /// <inheritdoc/>
    public string Name => "shipped-decks";

    /// <inheritdoc/>
    public string Group => "Shipped decks";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        foreach ((string name, string path) in ShippedDecks.In(context.Root))
        {
            DeckReading reading = DeckReader.Read(path);
            if (reading.Deck is not { } deck)
            {
                yield return CaseLine.Broken(name + ": cannot be read", string.Join("; ", reading.Problems.Select(p => p.ToString())));
                continue;
            }
            int unknowns = 2 * Mesher.Build(deck).Mesh.X.Length;
            if (context.Quick && unknowns > QuickUnknowns)
            {
                yield return CaseLine.Skipped(name, $"{unknowns} unknowns: only in the full run");
                continue;
            }
            foreach (CaseLine line in Lines(context, name, deck))
                yield return line;
        }
    }

    private static IEnumerable<CaseLine> Lines(CaseContext context, string name, Deck deck)
    {
        RunResult run = context.Run(name, deck with { Keep = (deck.Keep ?? new KeepDeck()) with { Fields = new FieldInterval(0) } });
        foreach (CaseLine line in SelfCheck.Lines(name, run))
            yield return line;
        yield return CaseLine.Reported($"{name}: verdict of the self-check: {Word(run.Summary.SelfCheck.Verdict)}", run.Summary.SelfCheck.Reasons.Count, "", "number of remarks");
        bool isJudged = Path.GetFileName(name) is { } file && (file.StartsWith("peel", StringComparison.Ordinal) || file.StartsWith("moment", StringComparison.Ordinal));
        foreach (IGrouping<(string Joint, int Front), FrontRow> front in run.History.Fronts.GroupBy(f => (f.Joint, f.Front)))
        {
            double reached = front.Max(f => f.JUnderLaw ?? 0);
            FrontRow[] loaded = [.. front.Where(f => f.JUnderLaw is { } j && j >= 0.1 * reached && j > 0)];
            foreach ((string way, Func<FrontRow, double?> value) in ((string, Func<FrontRow, double?>)[])[("path", f => f.JPath), ("rotation", f => f.JRotation)])
            {
                double[] shares = [.. loaded.Where(f => value(f) is not null).Select(f => Math.Abs(value(f)!.Value - f.JUnderLaw!.Value) / reached)];
                if (shares.Length == 0)
                    continue;
                string what = $"{name}: J {way} against J under the law, {front.Key.Joint} front {front.Key.Front}, largest difference over the largest J";
                yield return isJudged ? CaseLine.AtMost(what, 0.01, shares.Max(), "", Rates) : CaseLine.Reported(what, shares.Max(), "", Rates + "; not judged for this kind of specimen");
            }
        }
    }

    private static string Word(Verdict verdict) => verdict switch
    {
        Verdict.NumbersHold => "numbers hold",
        Verdict.HoldWithCare => "hold with care",
        _ => "do not hold",
    };
}
