using System.Globalization;
using InterfaceFE.Mechanics.Layers;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

/// <summary>Walks a law along separations, accepting each; keeps the work done, by many points on each straight stride.</summary>
internal sealed class LawWalk(ILayerLaw law)
{
    private static readonly LawPoint Cold = new(293, 0);
    private double[] _accepted = new double[law.StateSize];

    public Separation Separation { get; private set; }

    public LayerResponse Answer { get; private set; }

    public double[] Accepted => _accepted;

    public LawWalk To(double opening, double sliding)
    {
        double[] tentative = new double[law.StateSize];
        Answer = law.Update(new Separation(opening, sliding), Cold, _accepted, tentative);
        Separation = new Separation(opening, sliding);
        _accepted = tentative;
        return this;
    }

    public LayerResponse Try(double opening, double sliding) => law.Update(new Separation(opening, sliding), Cold, _accepted, new double[law.StateSize]);

    /// <summary>Tangent and gradient of the dissipated energy against central differences; size is the natural separation.</summary>
    public void CheckDerivatives(double opening, double sliding, double size, double tolerance, string what)
    {
        LayerResponse here = Try(opening, sliding);
        double h = 1e-6 * size;
        LayerResponse wp = Try(opening + h, sliding), wm = Try(opening - h, sliding), vp = Try(opening, sliding + h), vm = Try(opening, sliding - h);
        double scale = Math.Max(law.Stiffness.Peel, law.Stiffness.Shear);
        Near((wp.Peel - wm.Peel) / (2 * h), here.PeelByOpening, "peel by opening");
        Near((vp.Peel - vm.Peel) / (2 * h), here.PeelBySliding, "peel by sliding");
        Near((wp.Shear - wm.Shear) / (2 * h), here.ShearByOpening, "shear by opening");
        Near((vp.Shear - vm.Shear) / (2 * h), here.ShearBySliding, "shear by sliding");
        scale *= size;
        Near((wp.Dissipated - wm.Dissipated) / (2 * h), here.DissipatedByOpening, "dissipated by opening");
        Near((vp.Dissipated - vm.Dissipated) / (2 * h), here.DissipatedBySliding, "dissipated by sliding");

        void Near(double expected, double actual, string name) =>
            Close.To(expected, actual, tolerance, tolerance * scale, string.Create(CultureInfo.InvariantCulture, $"{what} {name} on {here.Branch} at ({opening:R}, {sliding:R}):"));
    }

    /// <summary>Work of the tractions on the straight way to a separation in many strides, each accepted, by the trapezoidal rule.</summary>
    public double AcceptedWorkTo(double opening, double sliding, int strides)
    {
        Separation from = Separation;
        double work = 0;
        for (int i = 1; i <= strides; i++)
        {
            (LayerResponse last, Separation at) = (Answer, Separation);
            To(from.Opening + (opening - from.Opening) * i / strides, from.Sliding + (sliding - from.Sliding) * i / strides);
            work += 0.5 * ((last.Peel + Answer.Peel) * (Separation.Opening - at.Opening) + (last.Shear + Answer.Shear) * (Separation.Sliding - at.Sliding));
        }
        return work;
    }

    /// <summary>Work of the tractions on the straight way to a separation, by the trapezoidal rule over many equal parts of the same stride; accepts the end.</summary>
    public double WorkTo(double opening, double sliding, int parts)
    {
        Separation from = Separation;
        double work = 0, dw = (opening - from.Opening) / parts, dv = (sliding - from.Sliding) / parts;
        LayerResponse last = Try(from.Opening, from.Sliding);
        for (int i = 1; i <= parts; i++)
        {
            LayerResponse next = Try(from.Opening + i * dw, from.Sliding + i * dv);
            work += 0.5 * ((last.Peel + next.Peel) * dw + (last.Shear + next.Shear) * dv);
            last = next;
        }
        To(opening, sliding);
        return work;
    }
}

internal static class Laws
{
    public static readonly BilinearCurve PeelLine = new(20, 2.5, 0.8);
    public static readonly BilinearCurve ShearLine = new(8, 4, 2.2);
    public static readonly TrapezoidCurve Plateau = new(1.5, 0.45, 2.0);
    public static readonly ExponentialCurve Decaying = new(10, 2, 1.1, 3);
    public static readonly LinearParabolicCurve Parabola = new(6, 1.5, 1.4);
    public static readonly TableCurve Tape = new([0, 0.3, 4, 7], [0, 0.42, 0.5, 0]);

    public static IEnumerable<ITractionCurve> Curves =>
    [
        PeelLine, ShearLine, Plateau, Decaying, Parabola, new ExponentialCurve(10, 2, 3.9, 3), new ExponentialCurve(10, 2, 3.0, 3), Tape,
        new TrapezoidCurve(2.5, 0.5, 2, 3.2, 5), new TableCurve([0, 0.1, 0.2, 0.5, 3], [0, 1, 2, 1, 0]),
        new CavityCurve(Plateau, [0.3, 0.9, 3, 4], [0, 0.6, 0.7, 0], -0.07), new CavityCurve(Parabola, [0.3, 0.8, 1, 1.4], [0, 0.4, 0.4, 0], 0.3),
    ];

    public static IEnumerable<IndependentModesLaw> Independent =>
    [
        new(PeelLine, ShearLine, 30), new(PeelLine, ShearLine, 30, 0.1, EnergyCounting.NetWork), new(Tape, Plateau, 2), new(Decaying, Tape, 10, 0.02, EnergyCounting.NetWork), new(Decaying, PeelLine, 10, 0.01),
        new(Parabola, Plateau, 6, 0.05, EnergyCounting.NetWork),
    ];

    public static IEnumerable<IndependentModesLaw> Plastic =>
    [
        new(Tape, Decaying, 6, 0.05, EnergyCounting.LargestSeparation, 0.4, 0.7), new(Parabola, PeelLine, 6, 0.05, EnergyCounting.NetWork, 1, 0.25),
        new(PeelLine, Plateau, 6, 0.02, EnergyCounting.NetWork, 0, 0.999), new(Plateau, ShearLine, 6, 0.05, EnergyCounting.LargestSeparation, 0.6, 0),
    ];

    public static IEnumerable<OneDamageLaw> OneDamage =>
    [
        new BenzeggaghKenaneLaw(PeelLine, ShearLine, 2.1, 30), new BenzeggaghKenaneLaw(PeelLine, ShearLine, 0.6, 30), new BenzeggaghKenaneLaw(ShearLine, PeelLine, 1, 5),
        new PowerLaw(PeelLine, ShearLine, 1, 30), new PowerLaw(ShearLine, PeelLine, 1.7, 5), new PowerLaw(PeelLine, ShearLine, 0.7, 30),
    ];

    public static readonly PotentialMode HollowPeel = new(3, 0.9, 3.4, 0.05);
    public static readonly PotentialMode BulgingShear = new(4, 2.2, 1.6, 0.12);

    public static IEnumerable<CoupledPotentialLaw> Potentials => [new(HollowPeel, BulgingShear, 30), new(BulgingShear, HollowPeel, 30), new(HollowPeel, new PotentialMode(2, 0.9, 2, 0.01), 30)];

    /// <summary>Whether surfaces of equal damage of a law are not convex, by its place in <see cref="All"/>.</summary>
    public static bool HasBentSurfaces(int index) => index == Independent.Count() + 1;

    /// <summary>Laws that unload to the origin.</summary>
    public static IEnumerable<ILayerLaw> Secant => [.. Independent, .. OneDamage, .. Potentials];

    public static IEnumerable<ILayerLaw> All => [.. Secant, .. Plastic];
}
