namespace InterfaceFE.Mechanics.Layers;

/// <summary>The straight way from the accepted to the tentative separation.</summary>
/// <param name="From">Accepted separation.</param>
/// <param name="To">Tentative separation.</param>
internal readonly record struct Stride(Separation From, Separation To)
{
    /// <summary>Change of opening [mm].</summary>
    public double OpeningChange => To.Opening - From.Opening;

    /// <summary>Change of sliding [mm].</summary>
    public double SlidingChange => To.Sliding - From.Sliding;

    /// <summary>Separation at a progress from 0 to 1; the ends are met exactly.</summary>
    public Separation At(double progress) => progress == 1 ? To : new(From.Opening + progress * OpeningChange, From.Sliding + progress * SlidingChange);

    /// <summary>The same way counted from another origin.</summary>
    public Stride CountedFrom(double opening, double sliding) => new(new Separation(From.Opening - opening, From.Sliding - sliding), new Separation(To.Opening - opening, To.Sliding - sliding));

    /// <summary>Progress at which a growing opening meets a value; infinite when it does not.</summary>
    public double ReachesOpening(double value) => To.Opening >= value && OpeningChange > 0 ? Math.Max(0, (value - From.Opening) / OpeningChange) : double.PositiveInfinity;

    /// <summary>Progress at which a growing amount of sliding meets a value in the sense of its end; infinite when it does not.</summary>
    public double ReachesSliding(double value)
    {
        if (!(Math.Abs(To.Sliding) >= value) || SlidingChange == 0 || (To.Sliding > 0) != (SlidingChange > 0))
            return double.PositiveInfinity;
        return Math.Max(0, (Math.CopySign(value, To.Sliding) - From.Sliding) / SlidingChange);
    }
}
