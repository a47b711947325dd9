namespace InterfaceFE.Geometry;

/// <summary>
/// A straight run or a bend of a strip's mid-line. Places on it are given by a coordinate q: x itself on straight runs parallel to x, so that facing faces
/// get the very same numbers, and arc length of the mid-line from the run's start on all others. Offsets count to the left of the walking direction.
/// </summary>
internal sealed class Run
{
    private readonly double _x;
    private readonly double _y;
    private readonly double _dx;
    private readonly double _dy;
    private readonly double _radius;
    private readonly double _startAngle;
    private readonly double _turn;

    private Run(int number, double length, double x, double y, double dx, double dy, double radius, double startAngle, double turn)
    {
        Number = number;
        Length = length;
        (_x, _y, _dx, _dy) = (x, y, dx, dy);
        (_radius, _startAngle, _turn) = (radius, startAngle, turn);
    }

    /// <summary>Number of the straight run along the line, from 1; 0 for a bend.</summary>
    public int Number { get; }

    /// <summary>Length of the mid-line [mm].</summary>
    public double Length { get; }

    /// <summary>Whether this is a bend.</summary>
    public bool IsBend => Number == 0;

    /// <summary>Radius of a bend's mid-line [mm].</summary>
    public double Radius => _radius;

    /// <summary>Angle through which a bend turns, positive to the left [rad].</summary>
    public double Turn => _turn;

    /// <summary>Index of the strip it belongs to.</summary>
    public int Strip { get; set; }

    /// <summary>Arc length of the strip's mid-line at the start of the run [mm].</summary>
    public double StartArc { get; set; }

    /// <summary>+1 on a straight run walked to +x, -1 to -x, 0 on all others.</summary>
    public int Heading { get; private init; }

    /// <summary>y of the mid-line of a run parallel to x [mm].</summary>
    public double Y => _y;

    /// <summary>q at the start of the run.</summary>
    public double Start => Heading == 0 ? 0 : _x;

    /// <summary>q at the end of the run.</summary>
    public double End => Heading == 0 ? Length : _x + Heading * Length;

    /// <summary>A straight run between two points; it counts as parallel to x when it rises less than a tolerance [mm].</summary>
    public static Run Straight(int number, double x0, double y0, double x1, double y1, double tolerance)
    {
        double length = Math.Sqrt((x1 - x0) * (x1 - x0) + (y1 - y0) * (y1 - y0));
        if (Math.Abs(y1 - y0) <= tolerance && Math.Abs(x1 - x0) > tolerance)
        {
            int heading = x1 > x0 ? 1 : -1;
            return new Run(number, Math.Abs(x1 - x0), x0, y0, heading, 0, 0, 0, 0) { Heading = heading };
        }
        return new Run(number, length, x0, y0, (x1 - x0) / length, (y1 - y0) / length, 0, 0, 0);
    }

    /// <summary>A bend about a centre from a start angle [rad] through a turn [rad], positive to the left.</summary>
    public static Run Bend(double centreX, double centreY, double radius, double startAngle, double turn) =>
        new(0, radius * Math.Abs(turn), centreX, centreY, 0, 0, radius, startAngle, turn);

    /// <summary>Arc length of the mid-line from the run's start at q [mm].</summary>
    public double Along(double q) => Heading == 0 ? q : Heading * (q - _x);

    /// <summary>q at an arc length of the mid-line from the run's start [mm].</summary>
    public double At(double along) => Heading == 0 ? along : _x + Heading * along;

    /// <summary>Point at q, offset to the left [mm].</summary>
    public (double X, double Y) Point(double q, double offset)
    {
        if (IsBend)
        {
            double angle = _startAngle + _turn * (q / Length);
            double radius = _radius - Math.Sign(_turn) * offset;
            return (_x + radius * Math.Cos(angle), _y + radius * Math.Sin(angle));
        }
        return Heading != 0 ? (q, _y + Heading * offset) : (_x + _dx * q - _dy * offset, _y + _dy * q + _dx * offset);
    }

    /// <summary>Length along an offset line per length of the mid-line: 1 on straight runs.</summary>
    public double Stretch(double offset) => IsBend ? (_radius - Math.Sign(_turn) * offset) / _radius : 1;
}
