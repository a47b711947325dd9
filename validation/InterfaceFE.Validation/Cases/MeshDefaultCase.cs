using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Geometry;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>The demo's peel coupon on the default mesh, and at the element length that the program gives for 1 % error, against a mesh four times finer in both directions with finer strides.</summary>
public sealed class MeshDefaultCase : ICase
{
    private const string Measure = "own mesh four times finer, strides an order finer; distance in the box of peak force and last displacement";

    /// <inheritdoc/>
    public string Name => "mesh-default";

    /// <inheritdoc/>
    public string Group => "Mesh";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        DeckReading reading = DeckReader.Read(Path.Combine(context.Root, "inputs", "coupons", "peel-epoxy.yaml"));
        Deck deck = reading.Deck ?? throw new InvalidOperationException("peel-epoxy.yaml: " + string.Join("; ", reading.Problems));
        deck = deck with { Keep = new KeepDeck { CurvesOf = deck.Keep?.CurvesOf, Fields = new FieldInterval(0) } };
        string grip = deck.Keep!.CurvesOf![0];
        Mesh mesh = Mesher.Build(deck).Mesh;
        MeshedJoint joint = mesh.Joints[0];
        double chosen = Longest(joint), onePercent = joint.OnePercentLength;

        RunResult asChosen = context.Run("default mesh", deck);
        RunResult atOnePercent = context.Run("length for 1 %", WithLength(deck, onePercent));
        RunResult fine = context.Run("four times finer", Finer(deck, mesh, chosen / 4));
        MeshCurve reference = MeshCurve.Of(fine, grip), curve = MeshCurve.Of(asChosen, grip), coarse = MeshCurve.Of(atOnePercent, grip);
        yield return new CaseLine("default mesh: points of the curve", 0, curve.PointsFrom(reference), 0.002, "", Measure);
        yield return new CaseLine("default mesh: line through the points", 0, curve.LineFrom(reference), 0.002, "", Measure);
        yield return CaseLine.AtMost("default mesh: strides", 60, asChosen.History.Points.Count - 1, "", "aim of the project");
        yield return new CaseLine("length for 1 %: points of the curve", 0, coarse.PointsFrom(reference), 0.015, "", Measure);
        yield return new CaseLine("length for 1 %: line through the points", 0, coarse.LineFrom(reference), 0.015, "", Measure);
        yield return CaseLine.Reported("default element length, beside that for 1 %", chosen, "mm", "DEVELOPERS.md, formulas of the project's own measurements", onePercent);
        yield return CaseLine.Reported("peak force, beside the finer mesh's", Peak(asChosen, grip), "N", Measure, Peak(fine, grip));
        context.Draw(new CaseFigure("mesh-default", "Peel coupon on three meshes", "double cantilever beam, epoxy on steel", "opening [mm]", "force [N]",
        [
            new CaseCurve("four times finer", reference.Displacement, reference.Force),
            new CaseCurve("default mesh", curve.Displacement, curve.Force, true),
            new CaseCurve("length for 1 %", coarse.Displacement, coarse.Force, true),
        ]));
    }

    private static double Peak(RunResult run, string grip) => run.Summary.Grips.First(g => g.Name == grip).PeakForce!.Value;

    private static double Longest(MeshedJoint joint)
    {
        double longest = 0;
        for (int e = 0; e < joint.ElementCount; e++)
            if (joint.Bonded[e])
                longest = Math.Max(longest, joint.Position[e + 1] - joint.Position[e]);
        return longest;
    }

    private static Deck WithLength(Deck deck, double length) => deck with { Joints = deck.Joints!.ToDictionary(j => j.Key, j => j.Value with { ElementLength = length }) };

    private static Deck Finer(Deck deck, Mesh mesh, double length) => WithLength(deck, length) with
    {
        Adherends = deck.Adherends.ToDictionary(a => a.Key, a => a.Value with
        {
            Elements = new ElementsDeck { Through = 4 * mesh.Adherends.First(m => m.Name == a.Key).ElementsThrough, Length = LongestAlong(mesh, a.Key) / 4 },
        }),
        March = new MarchDeck { PathError = 3e-5, LargestStride = 0.02 },
    };

    private static double LongestAlong(Mesh mesh, string adherend)
    {
        MeshedEdge edge = mesh.Adherends.First(a => a.Name == adherend).Edges["top"];
        int step = mesh.NodesPerFace - 1;
        double longest = 0;
        for (int i = 0; i + step < edge.Arc.Length; i += step)
            longest = Math.Max(longest, edge.Arc[i + step] - edge.Arc[i]);
        return longest;
    }
}
