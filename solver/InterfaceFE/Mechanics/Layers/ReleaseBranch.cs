namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Carrier of a mode on the release branch: the secant up to a limit M, flat at the traction c_M beyond, unloading by the secant from the largest separation.
/// It is what is left of the own curve at the start: rise to max(largest separation, elastic limit), then flat.
/// </summary>
/// <param name="Limit">M [mm].</param>
/// <param name="Held">c_M [MPa].</param>
internal readonly record struct Carrier(double Limit, double Held)
{
    /// <summary>Secant stiffness at a largest separation [MPa/mm].</summary>
    public double Secant(double largest) => Held / Math.Max(largest, Limit);

    /// <summary>c at a separation [MPa].</summary>
    public double Traction(double separation, double largest) => IsFlat(separation, largest) ? Held : Secant(largest) * separation;

    /// <summary>dc/dx, of the growing side at kinks [MPa/mm].</summary>
    public double Slope(double separation, double largest) => IsFlat(separation, largest) ? 0 : Secant(largest);

    /// <summary>Whether the separation lies on the flat part, growing.</summary>
    public bool IsFlat(double separation, double largest) => separation >= Limit && separation >= largest;
}

/// <summary>
/// What is frozen when release starts. With carrier tractions c_i, q = sum of the carriers' net work over Γ_i since the start and q_m its largest value:
/// s = 1 - q_m/(2·R0), t_i = s·c_i, separated for good at s = 0; so sum G_i/Γ_i = 1 - R0·s² while q grows. Derived for the project.
/// </summary>
internal readonly struct ReleaseBranch
{
    /// <summary>Carrier of peel.</summary>
    public required Carrier Peel { get; init; }

    /// <summary>Carrier of shear.</summary>
    public required Carrier Shear { get; init; }

    /// <summary>Energy due at the start R0 [-].</summary>
    public required double Due { get; init; }

    /// <summary>Γ_I [N/mm].</summary>
    public required double PeelToughness { get; init; }

    /// <summary>Γ_II [N/mm].</summary>
    public required double ShearToughness { get; init; }

    /// <summary>How the start moves with the end of the stride; all zero when the start is accepted already.</summary>
    public StartMotion Motion { get; init; }

    /// <summary>s for a largest q.</summary>
    public double Share(double mostSpent) => Math.Max(0, 1 - mostSpent / (2 * Due));

    /// <summary>
    /// Tractions and their derivatives by the tentative separation; the derivatives of a crossing stride contain the motion of its start.
    /// </summary>
    /// <param name="z">Separation.</param>
    /// <param name="largestOpening">Largest opening before [mm].</param>
    /// <param name="largestSliding">Largest sliding before [mm].</param>
    /// <param name="spent">q here.</param>
    /// <param name="mostSpent">Largest q with this one.</param>
    /// <param name="motionShare">1 at the end of a stride; λ at a point on the way stands for a shorter stride, whose start moves 1/λ as much.</param>
    /// <param name="answer">Tractions without contact and tangent are put here.</param>
    public void Evaluate(in Separation z, double largestOpening, double largestSliding, double spent, double mostSpent, double motionShare, ref LayerResponse answer)
    {
        bool open = z.Opening >= 0;
        double sense = z.Sliding < 0 ? -1 : 1;
        double opening = open ? z.Opening : 0, sliding = Math.Abs(z.Sliding);
        double peel = Peel.Traction(opening, largestOpening), shear = sense * Shear.Traction(sliding, largestSliding);
        double share = Share(mostSpent);
        bool releasing = spent >= mostSpent && share > 0;
        double shareByOpening = releasing && open ? -peel / (2 * Due * PeelToughness) : 0;
        double shareBySliding = releasing ? -shear / (2 * Due * ShearToughness) : 0;
        answer.PeelByOpening = open ? share * Peel.Slope(opening, largestOpening) + peel * shareByOpening : 0;
        answer.PeelBySliding = peel * shareBySliding;
        answer.ShearByOpening = shear * shareByOpening;
        answer.ShearBySliding = share * Shear.Slope(sliding, largestSliding) + shear * shareBySliding;
        answer.Peel = share * peel;
        answer.Shear = share * shear;
        if (Motion.Moves && share > 0)
            AddMotion(z, peel, shear, share, releasing ? spent : double.NaN, 1 / motionShare, ref answer);
    }

    /// <summary>Adds d(traction)/d(start)·d(start)/d(end). Starts on a curve's falling part change the carrier's height, every start changes R0 and where q counts from.</summary>
    private void AddMotion(in Separation z, double peel, double shear, double share, double spent, double scale, ref LayerResponse answer)
    {
        double shareByStartOpening = 0, shareByStartSliding = 0;
        if (!double.IsNaN(spent))
        {
            double opening = Math.Max(z.Opening, 0), sliding = Math.Abs(z.Sliding);
            shareByStartOpening = ShareByStart(Motion.Opening, opening, PeelToughness, spent);
            shareByStartSliding = Motion.Sense * ShareByStart(Motion.Sliding, sliding, ShearToughness, spent);
        }
        double heldByOpening = Motion.Opening.HeldSlope;
        double heldBySliding = Motion.Sliding.HeldSlope * Motion.Sense * (z.Sliding < 0 ? -1 : 1);
        double pp = scale * (peel * shareByStartOpening + share * heldByOpening), ps = scale * peel * shareByStartSliding;
        double sp = scale * shear * shareByStartOpening, ss = scale * (shear * shareByStartSliding + share * heldBySliding);
        answer.PeelByOpening += pp * Motion.OpeningByOpening + ps * Motion.SlidingByOpening;
        answer.PeelBySliding += pp * Motion.OpeningBySliding + ps * Motion.SlidingBySliding;
        answer.ShearByOpening += sp * Motion.OpeningByOpening + ss * Motion.SlidingByOpening;
        answer.ShearBySliding += sp * Motion.OpeningBySliding + ss * Motion.SlidingBySliding;
    }

    private double ShareByStart(in ModeStart start, double separation, double toughness, double spent)
    {
        double spentByStart = (-start.Traction + start.HeldSlope * (separation - start.Separation)) / toughness;
        return (-spentByStart + spent / Due * start.DueSlope) / (2 * Due);
    }
}

/// <summary>A mode at the start of release.</summary>
/// <param name="Separation">x [mm].</param>
/// <param name="Traction">t [MPa].</param>
/// <param name="HeldSlope">d c_M/dx: slope of the curve while growing, else 0 [MPa/mm].</param>
/// <param name="DueSlope">dR/dx [1/mm].</param>
/// <param name="PlasticSlope">d(plastic separation)/dx.</param>
internal readonly record struct ModeStart(double Separation, double Traction, double HeldSlope, double DueSlope, double PlasticSlope);

/// <summary>
/// Motion of the start with the end of a crossing stride: start = from + λ·Δ with f(start) = 1, so d start = λ·(1 - Δ⊗g/(g·Δ))·d end, g = df/d start.
/// </summary>
internal readonly struct StartMotion
{
    public bool Moves { get; init; }

    public ModeStart Opening { get; init; }

    public ModeStart Sliding { get; init; }

    /// <summary>Sense of sliding at the start, +1 or -1.</summary>
    public double Sense { get; init; }

    public double OpeningByOpening { get; init; }

    public double OpeningBySliding { get; init; }

    public double SlidingByOpening { get; init; }

    public double SlidingBySliding { get; init; }
}
