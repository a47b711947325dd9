namespace InterfaceFE.Sparse;

/// <summary>What was noted of the pivots of a front and of all fronts below it.</summary>
internal struct PivotTally
{
    /// <summary>Positive pivots that are not numerically zero.</summary>
    public int Positive;

    /// <summary>Negative pivots that are not numerically zero.</summary>
    public int Negative;

    /// <summary>Numerically zero pivots.</summary>
    public int Zero;

    /// <summary>Pivots lifted for growth alone.</summary>
    public int Harmful;

    /// <summary>Lowest place of a numerically zero pivot; -1 for none.</summary>
    public int FirstZero;

    /// <summary>Smallest magnitude of a pivot (before lifting) over the scale of its unknown.</summary>
    public double SmallestRatio;

    /// <summary>Largest sum of magnitudes that went into a pivot, over the scale of its unknown; about 2 for a definite matrix.</summary>
    public double Growth;

    /// <summary>Nothing noted yet.</summary>
    public static PivotTally Empty => new() { FirstZero = -1, SmallestRatio = double.PositiveInfinity };

    /// <summary>Adds what was noted in another subtree.</summary>
    public void Join(in PivotTally other)
    {
        Positive += other.Positive;
        Negative += other.Negative;
        Zero += other.Zero;
        Harmful += other.Harmful;
        if (other.FirstZero >= 0 && (FirstZero < 0 || other.FirstZero < FirstZero))
            FirstZero = other.FirstZero;
        SmallestRatio = Math.Min(SmallestRatio, other.SmallestRatio);
        Growth = Math.Max(Growth, other.Growth);
    }
}
