using System.Globalization;
using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using InterfaceFE.Marching;
using InterfaceFE.Model;
using InterfaceFE.Results;
using InterfaceFE.Sparse;

namespace InterfaceFE.Runs;

/// <summary>What a run leaves in memory.</summary>
/// <param name="History">Records.</param>
/// <param name="Summary">Summary.</param>
/// <param name="Equilibrium">Equilibrium at the last accepted point.</param>
public sealed record RunResult(RunHistory History, RunSummary Summary, FullEquilibrium Equilibrium);

/// <summary>One run from a deck to records: mesh, model, march, summary. Knows no files.</summary>
public static class DeckRun
{
    /// <summary>Runs a deck.</summary>
    /// <param name="deck">Deck as read.</param>
    /// <param name="makeSink">Makes what takes the records, once the history's heading is known; null: records stay in memory only.</param>
    /// <param name="cancellation">Stops the march; points so far are kept.</param>
    /// <exception cref="DeckException">The deck asks for something that cannot be built.</exception>
    public static RunResult Execute(Deck deck, Func<RunHistory, IRecordSink>? makeSink = null, CancellationToken cancellation = default) => Execute(deck, makeSink, null, new PhaseClock(), cancellation);

    /// <summary>Runs a deck, or replays an earlier run of it.</summary>
    /// <param name="deck">Deck as read.</param>
    /// <param name="makeSink">Makes what takes the records, once the history's heading is known; null: records stay in memory only.</param>
    /// <param name="replay">Choices of an earlier run that are followed; null: the march chooses for itself.</param>
    /// <param name="clock">Takes the time by phase.</param>
    /// <param name="cancellation">Stops the march; points so far are kept.</param>
    /// <exception cref="DeckException">The deck asks for something that cannot be built.</exception>
    /// <exception cref="ReplayException">The stages of the earlier run are not those of the deck.</exception>
    public static RunResult Execute(Deck deck, Func<RunHistory, IRecordSink>? makeSink, ReplayPlan? replay, PhaseClock clock, CancellationToken cancellation)
    {
        ArgumentNullException.ThrowIfNull(clock);
        MeshingResult meshing;
        SpecimenModel model;
        using (clock.In(Phase.Meshing))
        {
            meshing = Mesher.Build(deck);
            model = ModelBuilder.Build(deck, meshing.Mesh);
            FreeMovement.Refuse(model);
        }
        if (replay?.Misfit(model) is { } misfit)
            throw new ReplayException("the record that is to be replayed is of another deck: " + misfit);
        var gauges = new GaugeReader(deck, meshing.Mesh);
        RunHistory history = Heading(deck, model, gauges);
        IRecordSink sink;
        using (clock.In(Phase.Writing))
            sink = makeSink?.Invoke(history) ?? new NoSink();
        foreach (string note in meshing.Notes)
            sink.Say(note);
        FullEquilibrium equilibrium;
        using (clock.In(Phase.Plan))
            equilibrium = new FullEquilibrium(model) { Clock = clock, Threads = Math.Min(2, Environment.ProcessorCount) };
        sink.Say(string.Create(CultureInfo.InvariantCulture, $"model: {model.Unknowns.Count} unknowns, {model.Solids.Sum(s => s.Count)} elements in adherends, {model.Layers.Sum(l => l.Count)} in joints"));
        RunRecorder recorder;
        using (clock.In(Phase.Recording))
            recorder = new RunRecorder(equilibrium, history, gauges, deck.Keep?.Fields.Points ?? new KeepDeck().Fields.Points, sink);
        MarchOutcome outcome = new March(equilibrium, Settings(deck, model), recorder, replay).Run(cancellation);
        recorder.Finish();
        sink.Say(string.Create(CultureInfo.InvariantCulture, $"factorisations: {equilibrium.Factorisations}, along what changed; their arithmetic is worth {equilibrium.WholeFactorisations:0.#} whole ones"));
        var summary = new RunSummary { Status = Status(outcome.Status), Cause = outcome.Cause, Title = deck.Title };
        summary.Warnings.AddRange(meshing.Warnings);
        using (clock.In(Phase.Recording))
        {
            if (history.Points.Count > 0)
                SummaryMaker.Fill(summary, history, recorder, model);
            else
                NoPoint(summary);
        }
        Count(summary, history, equilibrium);
        Timings.Fill(summary, clock);
        summary.KernelWidth = DenseKernels.WidthBits;
        summary.Version = typeof(DeckRun).Assembly.GetName().Version?.ToString(3) ?? "";
        return new RunResult(history, summary, equilibrium);
    }

    /// <summary>Settings of the march of a deck.</summary>
    public static MarchSettings Settings(Deck deck, SpecimenModel model)
    {
        MarchDeck march = deck.March ?? new MarchDeck();
        double work = 0;
        foreach (LayerBlock layer in model.Layers)
        {
            MeshedJoint joint = model.Mesh.Joints.First(j => j.Name == layer.Name);
            work += 0.5 * joint.ProcessZoneEstimate * joint.Width * Math.Min(layer.Law.PeelToughness, layer.Law.ShearToughness);
        }
        return new MarchSettings
        {
            Tolerance = march.Tolerance,
            FirstStride = march.FirstStride,
            LargestStride = march.LargestStride,
            PathError = march.PathError,
            MostPoints = march.MostPoints,
            Path = march.Control switch { ControlSetting.Own => PathControl.None, ControlSetting.ArcLength => PathControl.ArcLength, _ => PathControl.LayerWork },
            LargestLayerWork = work > 0 ? work : double.PositiveInfinity,
        };
    }

    private static RunHistory Heading(Deck deck, SpecimenModel model, GaugeReader gauges)
    {
        GripInfo[] grips = [.. model.Grips.Select(grip => Info(deck, model, grip))];
        foreach (GripInfo info in grips)
            if (!info.Moved && deck.Keep?.CurvesOf?.Contains(info.Name) == true)
                throw new DeckException("keep.curves of", $"'{info.Name}' is only fixed: it has no curve of force against displacement; name a grip that is pulled, pushed or turned (its reactions stand in grips.csv)");
        IReadOnlyList<string> curves = deck.Keep?.CurvesOf ?? [.. grips.Where(g => g.Moved).Select(g => g.Name)];
        return new RunHistory
        {
            Title = deck.Title,
            Mesh = model.Mesh,
            Grips = grips,
            CurvesOf = curves,
            Gauges = [.. gauges.Gauges, .. OutOfPlane(model)],
            Stages = [.. model.Stages.Select(s => s.Words)],
        };
    }

    /// <summary>Strains out of plane stand beside the gauges, one for each group of adherends.</summary>
    private static IEnumerable<GaugeInfo> OutOfPlane(SpecimenModel model) => model.Unknowns.OutOfPlane is not { } groups ? []
        : Enumerable.Range(0, groups.Count).Select(g => new GaugeInfo(groups.Count == 1 ? "strain out of plane" : $"strain out of plane with {model.Mesh.Adherends[groups.FirstOf(g)].Name}", "-"));

    private static GripInfo Info(Deck deck, SpecimenModel model, Grip grip)
    {
        PullDeck? pull = deck.Sequence.Select(s => s.Pull ?? s.Push).FirstOrDefault(p => p?.Grip == grip.Name);
        bool turned = deck.Sequence.Any(s => s.Turn?.Grips.ContainsKey(grip.Name) == true);
        GripBody body = model.Unknowns.Bodies[grip.Bodies[0]];
        double x = 0, y = 0;
        if (pull is not null)
        {
            (GripComponent component, int sense) = SequencePlanner.Of(pull.Along);
            (x, y) = component == GripComponent.X ? (sense, 0) : (0, sense);
        }
        return new GripInfo(grip.Name, pull is not null || turned, x, y, turned, body.PinX, body.PinY) { HasLoadTrain = grip.LoadTrains.Count > 0 };
    }

    private static void Count(RunSummary summary, RunHistory history, FullEquilibrium equilibrium)
    {
        SpecimenModel model = equilibrium.Model;
        summary.Counts["unknowns"] = model.Unknowns.Count;
        summary.Counts["elements"] = model.Solids.Sum(s => (long)s.Count);
        summary.Counts["layer elements"] = model.Layers.Sum(l => (long)l.Count);
        summary.Counts["points"] = history.Points.Count;
        summary.Counts["iterations"] = history.Iterations.Count(i => i.Iteration > 0);
        summary.Counts["factorisations"] = equilibrium.Factorisations;
        summary.Counts["solves"] = equilibrium.Solves;
        summary.Counts["changed elements"] = equilibrium.ChangedTangents;
    }

    private static void NoPoint(RunSummary summary)
    {
        summary.SelfCheck.Verdict = Verdict.DoNotHold;
        summary.SelfCheck.Reasons.Add("no point was found");
    }

    private static RunStatus Status(MarchStatus status) => status switch
    {
        MarchStatus.Finished => RunStatus.Finished,
        MarchStatus.Severed => RunStatus.Severed,
        MarchStatus.Interrupted => RunStatus.Interrupted,
        _ => RunStatus.StoppedEarly,
    };

    private sealed class NoSink : IRecordSink
    {
        public void Write(PointRow point, IReadOnlyList<FrontRow> fronts, EnergyRow energy)
        {
        }

        public void Write(IterationRow iteration)
        {
        }

        public void Write(FieldSnapshot fields)
        {
        }

        public void Say(string line)
        {
        }
    }
}
