namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Facing faces that were never bonded: nothing holds them together, pressed together they meet with the contact stiffness, without friction. Penalty form; stored energy ½·k·w² for w &lt; 0.
/// </summary>
/// <param name="contactStiffness">Stiffness when pressed together [MPa/mm], > 0.</param>
public sealed class ClosingLaw(double contactStiffness) : ILayerLaw
{
    private readonly double _contact = Admissible.Positive(contactStiffness, nameof(contactStiffness));

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
        double closing = double.IsNaN(separation.Opening) ? separation.Opening : Math.Min(separation.Opening, 0);
        return new LayerResponse
        {
            Peel = _contact * closing,
            PeelByOpening = separation.Opening < 0 ? _contact : 0,
            Stored = 0.5 * _contact * closing * closing,
            Damage = 1,
            Branch = LawBranch.Separated,
        };
    }
}
