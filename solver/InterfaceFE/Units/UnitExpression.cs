namespace InterfaceFE.Units;

/// <summary>
/// Reads a unit made of known units by products (<c>*</c>, <c>·</c>), quotients (<c>/</c>), powers (<c>^2</c>, <c>²</c>, <c>³</c>) and brackets:
/// <c>kJ/m^2</c>, <c>1/K</c>, <c>N*mm</c>, <c>MPa/mm</c>. Products and quotients count from left to right.
/// </summary>
internal ref struct UnitExpression
{
    private const int DeepestBrackets = 8;
    private const int LargestPower = 9;
    private readonly ReadOnlySpan<char> _text;
    private int _at;
    private string? _error;

    private UnitExpression(ReadOnlySpan<char> text)
    {
        _text = text;
    }

    /// <summary>Reads the text; false with a message that completes "…: MESSAGE" when it is no unit.</summary>
    public static bool TryRead(string text, out KnownUnit unit, out string error)
    {
        UnitExpression reader = new(text);
        unit = reader.Product(0);
        if (reader._error is null && reader._at < text.Length)
            reader.Fail(char.IsAsciiDigit(text[reader._at]) ? $"a power in a unit is written with ^, as in m^{text[reader._at]}" : $"the unit \"{text}\" is not understood from \"{text[reader._at..]}\" on");
        error = reader._error ?? "";
        return reader._error is null;
    }

    private KnownUnit Product(int depth)
    {
        SkipSpaces();
        KnownUnit result = new(1, 1, default);
        bool divide = _at < _text.Length && _text[_at] == '/';
        if (divide)
            _at++;
        while (_error is null)
        {
            KnownUnit factor = Power(depth);
            result *= divide ? factor.Inverse : factor;
            SkipSpaces();
            if (_error is not null || _at >= _text.Length || _text[_at] == ')')
                break;
            char sign = _text[_at];
            if (sign is not ('*' or '/' or '·' or '⋅' or '×'))
                break;
            divide = sign == '/';
            _at++;
        }
        return result;
    }

    private KnownUnit Power(int depth)
    {
        KnownUnit unit = Factor(depth);
        if (_error is not null || _at >= _text.Length)
            return unit;
        int power = 1;
        switch (_text[_at])
        {
            case '²':
                power = 2;
                _at++;
                break;
            case '³':
                power = 3;
                _at++;
                break;
            case '^':
                _at++;
                power = Exponent();
                break;
        }
        KnownUnit one = power < 0 ? unit.Inverse : unit;
        KnownUnit result = new(1, 1, default);
        for (int i = 0; i < Math.Abs(power); i++)
            result *= one;
        return result;
    }

    private int Exponent()
    {
        bool negative = _at < _text.Length && _text[_at] == '-';
        if (negative)
            _at++;
        if (_at < _text.Length && _text[_at] is >= '1' and <= '9' && (_at + 1 == _text.Length || !char.IsAsciiDigit(_text[_at + 1])))
        {
            int value = _text[_at++] - '0';
            return negative ? -value : value;
        }
        Fail($"\"^\" in a unit is followed by a whole number from 1 to {LargestPower}, as in m^2");
        return 1;
    }

    private KnownUnit Factor(int depth)
    {
        SkipSpaces();
        if (_at < _text.Length && _text[_at] == '(')
            return Bracket(depth);
        if (_at < _text.Length && _text[_at] == '1' && (_at + 1 == _text.Length || !char.IsAsciiDigit(_text[_at + 1])))
        {
            _at++;
            return new(1, 1, default);
        }
        int start = _at;
        while (_at < _text.Length && IsUnitLetter(_text[_at]))
            _at++;
        string name = Normalised(_text[start.._at]);
        if (name.Length == 0)
            Fail(_at < _text.Length ? $"\"{_text[_at..]}\" is not a unit" : "the unit is not complete");
        else if (name is "°C" or "℃")
            Fail("°C is a point on the scale and stands alone (20 °C); a difference of temperature, also within a unit, is in K");
        else if (UnitTable.TryFind(name, out KnownUnit unit))
            return unit;
        else
            Fail(Unknown(name));
        return new(1, 1, default);
    }

    private KnownUnit Bracket(int depth)
    {
        _at++;
        if (depth >= DeepestBrackets)
        {
            Fail("too many brackets in the unit");
            return default;
        }
        KnownUnit inner = Product(depth + 1);
        if (_error is null && (_at >= _text.Length || _text[_at] != ')'))
            Fail("a bracket in the unit is not closed");
        _at++;
        return inner;
    }

    private static string Unknown(string name)
    {
        string? near = NearestText.Find(name, UnitTable.Names);
        return near is null
            ? $"\"{name}\" is not a unit this program knows; it knows {string.Join(", ", UnitTable.Names)} and °C"
            : $"\"{name}\" is not a unit this program knows; nearest unit {near}";
    }

    // The sign for micro has two code points (micro sign, Greek mu); both are meant alike.
    private static string Normalised(ReadOnlySpan<char> name) => name.ToString().Replace('μ', 'µ');

    private static bool IsUnitLetter(char c) => char.IsLetter(c) || c is '°' or '%' or '℃';

    private void SkipSpaces()
    {
        while (_at < _text.Length && _text[_at] == ' ')
            _at++;
    }

    private void Fail(string message) => _error ??= message;
}
