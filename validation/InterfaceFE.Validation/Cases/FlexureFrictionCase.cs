using InterfaceFE.Decks;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// End-notched flexure with friction between the faces of the crack, below damage. The arms press on each other over the support with P/4, so that F = μP/4 resists the sliding there: each arm has the
/// bending moment Px/4 - F·h/2 and the axial force ±F up to the tip.
/// </summary>
public sealed class FlexureFrictionCase : ICase
{
    private const double Crack = 25, Travel = 0.4;
    private const string Source = "derived from the arms' moments and axial forces at the tip: G = G0·(1 - 2μh/(3(a + Yh)))²; its first order is the correction of Carlsson, Gillespie and Pipes, J. Compos. Mater. 20 (1986) 594-604 (from memory)";

    /// <inheritdoc/>
    public string Name => "flexure-friction";

    /// <inheritdoc/>
    public string Group => "Flexure";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        FlexureSpecimen specimen = FlexureSpecimen.As4Peek;
        double tip = Crack + specimen.RootTerm * specimen.Height;
        (double bare, _) = AtUnitLoad(Of(context, specimen, 0));
        foreach (double friction in (double[])[0.3, 0.6])
        {
            RunResult run = Of(context, specimen, friction);
            (double rate, double spent) = AtUnitLoad(run);
            yield return new CaseLine($"coefficient {friction}: what friction takes off √G at the same load, by the law at the starter tip", 2 * friction * specimen.Height / (3 * tip), 1 - Math.Sqrt(rate / bare), 0.03, "", Source);
            double load = friction / 4, inertia = specimen.Width * Math.Pow(specimen.Height, 3) / 12;
            double sliding = specimen.Height / (specimen.HeldYoung * inertia) * (tip * tip / 8 - load * specimen.Height * tip / 2) - 2 * load * tip / (specimen.HeldYoung * specimen.Width * specimen.Height);
            yield return new CaseLine($"coefficient {friction}: spent in friction at unit load", 1e9 * 0.5 * load * sliding, 1e9 * spent, 0.06, "pJ", "derived: half of F times the sliding of simple beams over the support in proportional loading; what shear in the arms adds to the sliding is left out");
            yield return SelfCheck.Balance($"coefficient {friction}", run);
            yield return SelfCheck.PathError($"coefficient {friction}", run);
        }
    }

    private static RunResult Of(CaseContext context, FlexureSpecimen specimen, double friction)
    {
        string deck = specimen.Deck(Crack, 800, Mixing.BenzeggaghKenane, Travel, elementLength: 0.3);
        const string Key = "contact stiffness:";
        return context.Run(FormattableString.Invariant($"coefficient of friction {friction}"), friction > 0 ? deck.Replace(Key, FormattableString.Invariant($"friction: {friction}, {Key}"), StringComparison.Ordinal) : deck);
    }

    /// <summary>J under the law at the starter tip and energy spent in friction, over the square of the load [N/mm/N², mJ/N²].</summary>
    private static (double Rate, double Spent) AtUnitLoad(RunResult run)
    {
        double load = run.History.Points[^1].Grips.Single(g => Math.Abs(g.Force) > 0 && g.Displacement > 0).Force;
        FrontRow front = run.History.Fronts.Last(f => f.Front == 1);
        return (front.JUnderLaw!.Value / (load * load), run.History.Energies[^1].SpentInFriction / (load * load));
    }
}
