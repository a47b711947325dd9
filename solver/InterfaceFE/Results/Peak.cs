namespace InterfaceFE.Results;

/// <summary>The largest value of a curve, by the parabola through its highest point and the two beside it; the measure along the curve is its chord length.</summary>
/// <param name="Value">Largest value.</param>
/// <param name="At">Abscissa there.</param>
/// <param name="Index">Index of the highest point.</param>
public sealed record Peak(double Value, double At, int Index)
{
    /// <summary>Peak of a curve; null for an empty one.</summary>
    /// <param name="abscissa">Abscissae in order along the curve.</param>
    /// <param name="ordinate">Ordinates, same length.</param>
    public static Peak? Of(double[] abscissa, double[] ordinate)
    {
        if (ordinate.Length == 0)
            return null;
        int i = Array.IndexOf(ordinate, ordinate.Max());
        if (i == 0 || i == ordinate.Length - 1)
            return new Peak(ordinate[i], abscissa[i], i);
        double scaleX = Math.Max(abscissa.Max() - abscissa.Min(), double.Epsilon), scaleY = Math.Max(ordinate.Max() - ordinate.Min(), double.Epsilon);
        double before = double.Hypot((abscissa[i] - abscissa[i - 1]) / scaleX, (ordinate[i] - ordinate[i - 1]) / scaleY);
        double after = double.Hypot((abscissa[i + 1] - abscissa[i]) / scaleX, (ordinate[i + 1] - ordinate[i]) / scaleY);
        if (before == 0 || after == 0)
            return new Peak(ordinate[i], abscissa[i], i);
        (double slope, double half) = Parabola(ordinate[i - 1], ordinate[i], ordinate[i + 1], before, after);
        if (half >= 0)
            return new Peak(ordinate[i], abscissa[i], i);
        double s = Math.Clamp(-slope / (2 * half), -before, after);
        (double slopeX, double halfX) = Parabola(abscissa[i - 1], abscissa[i], abscissa[i + 1], before, after);
        return new Peak(ordinate[i] + s * (slope + s * half), abscissa[i] + s * (slopeX + s * halfX), i);
    }

    /// <summary>Slope and half curvature at the middle point.</summary>
    private static (double Slope, double Half) Parabola(double left, double middle, double right, double before, double after)
    {
        double toLeft = (middle - left) / before, toRight = (right - middle) / after;
        double half = (toRight - toLeft) / (before + after);
        return (toLeft + half * before, half);
    }
}
