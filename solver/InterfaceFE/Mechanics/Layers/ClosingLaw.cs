namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Facing faces that were never bonded: nothing holds them together, pressed together they meet with the contact stiffness k, without friction. Penalty form. The stiffness sets in over a
/// short onset d instead of at once: peel = -k·w²/(2d) for -d &lt; w &lt; 0, k·(w + d/2) below. Long faces may lie on each other at next to no pressure; with a stiffness that jumps at
/// w = 0 they open and close in turn, place by place, for a hundred iterations and more (measured on flexure of two equal arms), with the onset they settle in some twenty.
/// </summary>
/// <param name="contactStiffness">Stiffness when pressed together [MPa/mm], > 0.</param>
/// <param name="onset">Closing over which the stiffness sets in [mm], > 0.</param>
/// <exception cref="ArgumentOutOfRangeException">A number is not above 0.</exception>
public sealed class ClosingLaw(double contactStiffness, double onset) : ILayerLaw
{
    private readonly double _contact = Admissible.Positive(contactStiffness, nameof(contactStiffness));
    private readonly double _onset = Admissible.Positive(onset, nameof(onset));

    /// <inheritdoc/>
    public int StateSize => 0;

    /// <inheritdoc/>
    public bool HasSymmetricTangent => true;

    /// <inheritdoc/>
    public LayerStiffness Stiffness => new(0, 0, _contact);

    /// <inheritdoc/>
    public double PeelToughness => 0;

    /// <inheritdoc/>
    public double ShearToughness => 0;

    /// <inheritdoc/>
    public double FinalOpening => 0;

    /// <inheritdoc/>
    public double FinalSliding => 0;

    /// <inheritdoc/>
    public LayerResponse Update(in Separation separation, in LawPoint at, ReadOnlySpan<double> accepted, Span<double> tentative)
    {
        var answer = new LayerResponse { Damage = 1, Branch = LawBranch.Separated };
        double w = separation.Opening;
        if (w >= 0)
            return answer;
        if (w > -_onset)
        {
            answer.Peel = -0.5 * _contact * w * w / _onset;
            answer.PeelByOpening = -_contact * w / _onset;
            answer.Stored = -_contact * w * w * w / (6 * _onset);
            return answer;
        }
        // The rest, and an opening that is not a number: it is handed on and stopped at assembly.
        answer.Peel = _contact * (w + 0.5 * _onset);
        answer.PeelByOpening = _contact;
        answer.Stored = 0.5 * _contact * (w * w + _onset * w + _onset * _onset / 3);
        return answer;
    }
}
