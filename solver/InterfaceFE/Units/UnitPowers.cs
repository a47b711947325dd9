namespace InterfaceFE.Units;

/// <summary>Powers of the five base quantities in a unit. Stress is force per length squared; energy is force times length.</summary>
/// <param name="Length">Power of length.</param>
/// <param name="Force">Power of force.</param>
/// <param name="Time">Power of time.</param>
/// <param name="Kelvin">Power of temperature difference.</param>
/// <param name="Angle">Power of angle, kept apart so that an angle is never taken for a bare number.</param>
internal readonly record struct UnitPowers(int Length, int Force, int Time, int Kelvin, int Angle)
{
    /// <summary>Powers of a product.</summary>
    public static UnitPowers operator +(UnitPowers a, UnitPowers b) =>
        new(a.Length + b.Length, a.Force + b.Force, a.Time + b.Time, a.Kelvin + b.Kelvin, a.Angle + b.Angle);

    /// <summary>Powers of the unit raised to a power.</summary>
    public static UnitPowers operator *(UnitPowers a, int power) =>
        new(a.Length * power, a.Force * power, a.Time * power, a.Kelvin * power, a.Angle * power);
}
