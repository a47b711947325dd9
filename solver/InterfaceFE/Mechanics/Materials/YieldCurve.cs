namespace InterfaceFE.Mechanics.Materials;

/// <summary>
/// Yield stress by equivalent plastic strain and temperature: a table of straight pieces, level beyond its end, times a share that follows temperature by a table of straight pieces,
/// level beyond its ends. Immutable.
/// </summary>
public sealed class YieldCurve
{
    private readonly double[] _strain, _stress, _area, _temperature, _share;

    /// <summary>Makes a curve.</summary>
    /// <param name="plasticStrain">Equivalent plastic strains, rising from 0; at least one.</param>
    /// <param name="stress">Yield stresses [MPa], above 0 and not falling; as many.</param>
    /// <param name="temperature">Temperatures [K] of <paramref name="share"/>, rising; empty: no influence.</param>
    /// <param name="share">Share of the stresses that holds at each temperature, above 0; as many.</param>
    /// <exception cref="ArgumentException">The tables are not as said; the message says why.</exception>
    public YieldCurve(ReadOnlySpan<double> plasticStrain, ReadOnlySpan<double> stress, ReadOnlySpan<double> temperature = default, ReadOnlySpan<double> share = default)
    {
        if (Fault(plasticStrain, stress, temperature, share) is { } fault)
            throw new ArgumentException(fault);
        _strain = plasticStrain.ToArray();
        _stress = stress.ToArray();
        _temperature = temperature.ToArray();
        _share = share.ToArray();
        _area = new double[_strain.Length];
        for (int i = 1; i < _area.Length; i++)
            _area[i] = _area[i - 1] + 0.5 * (_stress[i] + _stress[i - 1]) * (_strain[i] - _strain[i - 1]);
    }

    /// <summary>Equivalent plastic strain at the end of the table.</summary>
    public double End => _strain[^1];

    /// <summary>Whether the table is more than one stress, so that its level extension is worth a word.</summary>
    public bool IsTable => _strain.Length > 1;

    /// <summary>Whether temperature matters.</summary>
    public bool DependsOnTemperature => _temperature.Length > 0;

    /// <summary>Yield stress of the table [MPa] and its slope onwards [MPa].</summary>
    /// <param name="plasticStrain">Equivalent plastic strain, at least 0.</param>
    public (double Stress, double Slope) At(double plasticStrain)
    {
        int piece = Piece(plasticStrain);
        double slope = Slope(piece);
        return (_stress[piece] + slope * (plasticStrain - _strain[piece]), slope);
    }

    /// <summary>Area under the table up to a plastic strain [MPa]: work of yielding per volume.</summary>
    public double Area(double plasticStrain)
    {
        int piece = Piece(plasticStrain);
        double way = plasticStrain - _strain[piece];
        return _area[piece] + (_stress[piece] + 0.5 * Slope(piece) * way) * way;
    }

    /// <summary>Share of the table at a temperature [K] and its change with temperature [1/K].</summary>
    public (double Share, double ByTemperature) ShareAt(double temperature)
    {
        if (_temperature.Length == 0)
            return (1, 0);
        int last = _temperature.Length - 1, piece = 0;
        if (temperature <= _temperature[0])
            return (_share[0], 0);
        if (temperature >= _temperature[last])
            return (_share[last], 0);
        while (temperature >= _temperature[piece + 1])
            piece++;
        double slope = (_share[piece + 1] - _share[piece]) / (_temperature[piece + 1] - _temperature[piece]);
        return (_share[piece] + slope * (temperature - _temperature[piece]), slope);
    }

    /// <summary>
    /// Growth d of plastic strain that fulfils excess = stiffness·d + share·(stress(from + d) - stress(from)), in closed form piece by piece.
    /// </summary>
    /// <param name="from">Equivalent plastic strain before.</param>
    /// <param name="excess">Stress above yield [MPa], at least 0.</param>
    /// <param name="stiffness">Stress that a unit of growth takes away [MPa], above 0.</param>
    /// <param name="share">Share of the table.</param>
    /// <param name="slope">Slope of the table on the piece where the growth ends [MPa].</param>
    public double Growth(double from, double excess, double stiffness, double share, out double slope)
    {
        double grown = 0;
        for (int piece = Piece(from); ; piece++)
        {
            slope = Slope(piece);
            double rest = excess / (stiffness + share * slope);
            if (piece == _strain.Length - 1 || from + grown + rest <= _strain[piece + 1])
                return grown + rest;
            double step = _strain[piece + 1] - (from + grown);
            excess -= (stiffness + share * slope) * step;
            grown += step;
        }
    }

    private int Piece(double plasticStrain)
    {
        int piece = 0;
        while (piece < _strain.Length - 1 && plasticStrain >= _strain[piece + 1])
            piece++;
        return piece;
    }

    private double Slope(int piece) => piece == _strain.Length - 1 ? 0 : (_stress[piece + 1] - _stress[piece]) / (_strain[piece + 1] - _strain[piece]);

    private static string? Fault(ReadOnlySpan<double> strain, ReadOnlySpan<double> stress, ReadOnlySpan<double> temperature, ReadOnlySpan<double> share)
    {
        if (strain.Length == 0 || strain.Length != stress.Length)
            return "a yield curve needs as many plastic strains as stresses, at least one";
        if (temperature.Length != share.Length)
            return "a yield curve needs as many temperatures as shares";
        if (strain[0] != 0)
            return "the plastic strains of a yield curve begin at 0";
        for (int i = 0; i < strain.Length; i++)
            if (!double.IsFinite(strain[i]) || !double.IsFinite(stress[i]) || stress[i] <= 0 || (i > 0 && (strain[i] <= strain[i - 1] || stress[i] < stress[i - 1])))
                return "the plastic strains of a yield curve must rise, its stresses be above 0 and not fall";
        for (int i = 0; i < share.Length; i++)
            if (!double.IsFinite(temperature[i]) || !double.IsFinite(share[i]) || share[i] <= 0 || (i > 0 && temperature[i] <= temperature[i - 1]))
                return "the temperatures of a yield curve must rise and their shares be above 0";
        return null;
    }
}
