using InterfaceFE.Runs;
using InterfaceFE.Tests.Model;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>Strips of plies: curvature under end moments and after heating against classical laminate theory in the matching out-of-plane state.</summary>
public sealed class LaminateCase : ICase
{
    private const string Source = "classical laminate theory, computed (Jones, Mechanics of Composite Materials (1975), from memory): M = (D - B²/A)κ, thermal forces and moments of the plies";
    private const double Tolerance = 0.005;

    /// <inheritdoc/>
    public string Name => "laminate";

    /// <inheritdoc/>
    public string Group => "Laminates";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        foreach (string state in (string[])["held", "free", "uniform strain"])
        {
            foreach ((string plies, Laminate laminate) in ((string, Laminate)[])[("five uneven plies", Laminate.Uneven), ("two crossed plies", Laminate.Crossed)])
            {
                const double moment = 10;
                (double byMoment, double byHeating) = laminate.Curvatures(state, moment);
                RunResult bent = context.Run($"{plies}, {state}, bent", laminate.Deck(state, moment)), bowed = context.Run($"{plies}, {state}, heated", laminate.Deck(state, null));
                yield return new CaseLine($"{plies}, {state}: curvature under end moments", byMoment, laminate.Curvature(bent.History.Mesh, bent.History.Snapshots[^1]), Tolerance, "1/mm", Source);
                yield return new CaseLine($"{plies}, {state}: curvature after heating", byHeating, laminate.Curvature(bowed.History.Mesh, bowed.History.Snapshots[^1]), Tolerance, "1/mm",
                    state == "uniform strain" ? Source + "; the theory leaves the ends out, whose share of the force out of plane differs" : Source);
            }
        }
    }
}
