using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using InterfaceFE.Marching;
using InterfaceFE.Model;

namespace InterfaceFE.Tests.Marching;

/// <summary>Marches a deck in memory and keeps what the march tells.</summary>
internal sealed class Recording : IMarchObserver
{
    private Recording(FullEquilibrium equilibrium) => Equilibrium = equilibrium;

    public FullEquilibrium Equilibrium { get; }

    public MarchOutcome Outcome { get; private set; }

    public List<MarchPoint> Points { get; } = [];

    public List<double[]> Displacements { get; } = [];

    public List<double[]> Forces { get; } = [];

    public List<MarchIteration> Iterations { get; } = [];

    public List<string> Lines { get; } = [];

    public static Recording Of(Deck deck, Func<MarchSettings, MarchSettings>? change = null, ReplayPlan? replay = null)
    {
        SpecimenModel model = ModelBuilder.Build(deck, Mesher.Build(deck).Mesh);
        var equilibrium = new FullEquilibrium(model);
        var recording = new Recording(equilibrium);
        MarchDeck march = deck.March ?? new MarchDeck();
        var settings = new MarchSettings
        {
            Tolerance = march.Tolerance,
            FirstStride = march.FirstStride,
            LargestStride = march.LargestStride,
            PathError = march.PathError,
            MostPoints = march.MostPoints,
            Path = march.Control switch { ControlSetting.Own => PathControl.None, ControlSetting.ArcLength => PathControl.ArcLength, _ => PathControl.LayerWork },
        };
        recording.Outcome = new March(equilibrium, change is null ? settings : change(settings), recording, replay).Run();
        return recording;
    }

    public void PointAccepted(MarchPoint point)
    {
        Points.Add(point);
        Displacements.Add(Equilibrium.AcceptedDisplacement.ToArray());
        Forces.Add(Equilibrium.InternalForce.ToArray());
    }

    public void IterationMade(in MarchIteration iteration) => Iterations.Add(iteration);

    public void Said(string line) => Lines.Add(line);
}
