namespace InterfaceFE.Mechanics.Layers;

/// <summary>A law that changes the answers of another one and keeps what that one says of itself.</summary>
public abstract class WrappedLaw : ILayerLaw
{
    /// <summary>Wraps a law.</summary>
    /// <exception cref="ArgumentNullException">There is none.</exception>
    protected WrappedLaw(ILayerLaw inner)
    {
        ArgumentNullException.ThrowIfNull(inner);
        Inner = inner;
    }

    /// <inheritdoc/>
    public virtual int StateSize => Inner.StateSize;

    /// <inheritdoc/>
    public virtual bool HasSymmetricTangent => Inner.HasSymmetricTangent;

    /// <inheritdoc/>
    public virtual bool DependsOnTime => Inner.DependsOnTime;

    /// <inheritdoc/>
    public LayerStiffness Stiffness => Inner.Stiffness;

    /// <inheritdoc/>
    public double PeelToughness => Inner.PeelToughness;

    /// <inheritdoc/>
    public double ShearToughness => Inner.ShearToughness;

    /// <inheritdoc/>
    public double FinalOpening => Inner.FinalOpening;

    /// <inheritdoc/>
    public double FinalSliding => Inner.FinalSliding;

    /// <summary>The law inside.</summary>
    protected ILayerLaw Inner { get; }

    /// <inheritdoc/>
    public abstract LayerResponse Update(in Separation separation, in LawPoint at, ReadOnlySpan<double> accepted, Span<double> tentative);
}
