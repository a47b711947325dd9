using InterfaceFE.Model;

namespace InterfaceFE.Marching;

/// <summary>The way from the point before to the accepted point, in every measure that a control may continue it by.</summary>
internal sealed class LastWay
{
    private readonly double[] _displacement;

    public LastWay(int unknowns) => _displacement = new double[unknowns];

    /// <summary>Whether there is one in this stage.</summary>
    public bool Exists { get; private set; }

    /// <summary>Way of every unknown [mm or rad].</summary>
    public double[] Displacement => _displacement;

    /// <summary>Way of the progress.</summary>
    public double Progress { get; private set; }

    /// <summary>Growth of layer work [mJ].</summary>
    public double LayerWork { get; private set; }

    /// <summary>Growth of dissipated energy [mJ].</summary>
    public double Dissipation { get; private set; }

    /// <summary>Takes the tentative way of the equilibrium, before it is accepted.</summary>
    /// <param name="equilibrium">The tentative point.</param>
    /// <param name="before">Energies at the accepted point.</param>
    public void Take(FullEquilibrium equilibrium, in EnergyState before)
    {
        ReadOnlySpan<double> now = equilibrium.Displacement, accepted = equilibrium.AcceptedDisplacement;
        for (int i = 0; i < _displacement.Length; i++)
            _displacement[i] = now[i] - accepted[i];
        Progress = equilibrium.Progress - equilibrium.AcceptedProgress;
        Dissipation = equilibrium.Energy.SpentInLayers - before.SpentInLayers;
        LayerWork = Dissipation + equilibrium.Energy.StoredInLayers - before.StoredInLayers;
        Exists = true;
    }

    /// <summary>Whether the tentative way of the equilibrium has a component against this one.</summary>
    public bool Opposes(FullEquilibrium equilibrium)
    {
        ReadOnlySpan<double> now = equilibrium.Displacement, accepted = equilibrium.AcceptedDisplacement;
        double along = 0;
        for (int i = 0; i < _displacement.Length; i++)
            along += _displacement[i] * (now[i] - accepted[i]);
        return along < 0;
    }

    /// <summary>Movement of the grips along x and y: what arc length watches where no layer can soften.</summary>
    private static List<(int, int)> Grips(UnknownMap unknowns)
    {
        var watched = new List<(int, int)>();
        for (int b = 0; b < unknowns.Bodies.Count; b++)
        {
            IEnumerable<int> first = unknowns.Bodies[b].Rigid ? [unknowns.OfBody(b)] : unknowns.Bodies[b].Nodes.Select(unknowns.OfNode);
            watched.AddRange(first.SelectMany(i => new[] { (i, -1), (i + 1, -1) }));
        }
        return watched;
    }

    /// <summary>The control that goes on by a share of this way in a given measure; null where the measure did not grow on it.</summary>
    /// <param name="measure">Measure.</param>
    /// <param name="share">Share of the way; above 1 for a longer stride.</param>
    /// <param name="equilibrium">The equilibrium.</param>
    /// <param name="accepted">Energies at the accepted point.</param>
    public IControl? Continue(PathMeasure measure, double share, FullEquilibrium equilibrium, in EnergyState accepted)
    {
        double stride = share * measure switch
        {
            PathMeasure.LayerWork => LayerWork,
            PathMeasure.Dissipation => Dissipation,
            _ => new ArcLengthControl(Watched(equilibrium), _displacement, 1).Length(_displacement, []),
        };
        return stride > 0 ? Control(measure, stride, equilibrium, accepted) : null;
    }

    /// <summary>The control that goes on by a stride in a given measure.</summary>
    /// <param name="measure">Measure.</param>
    /// <param name="stride">Stride [mJ, for arc length mm].</param>
    /// <param name="equilibrium">The equilibrium.</param>
    /// <param name="accepted">Energies at the accepted point.</param>
    public IControl Control(PathMeasure measure, double stride, FullEquilibrium equilibrium, in EnergyState accepted) => measure switch
    {
        PathMeasure.LayerWork => new LayerWorkControl(accepted.StoredInLayers + accepted.SpentInLayers + stride, stride),
        PathMeasure.Dissipation => new DissipationControl(accepted.SpentInLayers + stride, stride),
        _ => new ArcLengthControl(Watched(equilibrium), (double[])_displacement.Clone(), stride),
    };

    /// <summary>What arc length watches: separations, or the grips where nothing is bonded.</summary>
    private static IReadOnlyList<(int Unknown, int Other)> Watched(FullEquilibrium equilibrium) =>
        equilibrium.Model.Layers.Count > 0 ? equilibrium.Bonds.WatchedSeparations() : Grips(equilibrium.Model.Unknowns);
}

/// <summary>By what a stride is measured where the path may turn back.</summary>
internal enum PathMeasure
{
    LayerWork,
    Dissipation,
    ArcLength,
}
