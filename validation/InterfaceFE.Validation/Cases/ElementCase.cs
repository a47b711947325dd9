using System.Globalization;
using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;
using InterfaceFE.Tests.Mechanics.Elements;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>Published tests of plane elements, for both kinds.</summary>
public sealed class ElementCase : ICase
{
    private const string Patch = "computed for the patch of MacNeal and Harder, Finite Elem. Anal. Des. 1 (1985) 3-20";
    private const string Beam = "MacNeal and Harder, Finite Elem. Anal. Des. 1 (1985) 3-20; values from memory";
    private const string Curved = "MacNeal and Harder, Finite Elem. Anal. Des. 1 (1985) 3-20";
    private const string Cylinder = "computed from u(a) = (1+ν)pa²[(1-2ν)a + b²/a]/(E(b²-a²)), Lamé";
    private const string Panel = "Cook 1974; computed on a graded mesh of 64 × 64 eight-node elements, ±0.002";
    private const string Ellipse = "NAFEMS LE1: 92.7 MPa published, 92.658 converged (computed)";

    /// <inheritdoc/>
    public string Name => "elements";

    /// <inheritdoc/>
    public string Group => "Elements";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context) => [.. Of<Quadrilateral8>("eight-node: "), .. Of<Quadrilateral4>("four-node: ")];

    private static IEnumerable<CaseLine> Of<TElement>(string kind)
        where TElement : struct, IPlaneElement
    {
        bool eight = TElement.Nodes == 8;
        foreach (OutOfPlaneState state in (OutOfPlaneState[])[OutOfPlaneState.Free, OutOfPlaneState.Held])
            yield return CaseLine.AtMost($"{kind}distorted patch, {Word(state)}: largest error of a stress, relative", 1e-10, PatchError<TElement>(state), "", Patch);
        (string Shape, double Lean, bool Alternate, double? Gate)[] shapes =
            [("rectangles", 0, false, 0.02), ("trapezoids", 0.1, true, eight ? 0.05 : null), ("parallelograms", 0.1, false, eight ? 0.02 : null)];
        foreach ((string shape, double lean, bool alternate, double? gate) in shapes)
        {
            string what = $"{kind}straight beam of 6 {shape}, shear at the end: movement";
            double movement = BeamEnd<TElement>(lean, alternate, 1);
            yield return gate is { } tolerance ? new CaseLine(what, 0.1081, movement, tolerance, "", Beam) : CaseLine.Reported(what, movement, "", Beam, 0.1081);
        }
        yield return new CaseLine(kind + "straight beam of 6 rectangles, pull: extension", 3e-5, BeamEnd<TElement>(0, false, 0), 0.01, "", Beam);
        yield return new CaseLine(kind + "curved beam, load across its end: movement", 0.08734, CurvedEnd<TElement>(eight ? 24 : 48, 2), 0.02, "", Curved);
        foreach (double poisson in (double[])[0.3, 0.49, 0.499, 0.4999])
        {
            double closed = (1 + poisson) * 9 * ((1 - 2 * poisson) * 3 + 27) / (1000 * 72);
            yield return new CaseLine(string.Create(CultureInfo.InvariantCulture, $"{kind}thick cylinder, Poisson's ratio {poisson}: growth of the inner radius"), closed,
                CylinderGrowth<TElement>(eight ? 8 : 24, eight ? 6 : 20, poisson), 0.005, "", Cylinder);
        }
        yield return new CaseLine(kind + "tapered panel, free: sag at (48, 52), even mesh", 23.967, PanelSag<TElement>(eight ? 8 : 20, OutOfPlaneState.Free, false), 0.01, "", Panel);
        yield return new CaseLine(kind + "tapered panel, held: sag at (48, 52), even mesh", 21.524, PanelSag<TElement>(eight ? 8 : 20, OutOfPlaneState.Held, false), 0.01, "", Panel);
        if (eight)
            yield return new CaseLine(kind + "tapered panel, free: sag at (48, 52), graded mesh", 23.967, PanelSag<TElement>(16, OutOfPlaneState.Free, true), 0.001, "", Panel);
        (double stress, double movementIn) = EllipsePoint<TElement>(eight ? 24 : 40, eight ? 16 : 24);
        yield return new CaseLine(kind + "elliptic membrane, free: stress yy at (2, 0)", 92.658, stress, 0.01, "MPa", Ellipse);
        yield return new CaseLine(kind + "elliptic membrane, free: movement x at (2, 0)", -0.1022, 1000 * movementIn, 0.01, "mm", "computed for NAFEMS LE1");
    }

    private static string Word(OutOfPlaneState state) => state == OutOfPlaneState.Free ? "free" : "held";

    private static double PatchError<TElement>(OutOfPlaneState state)
        where TElement : struct, IPlaneElement
    {
        PlaneMesh mesh = BenchmarkMeshes.DistortedPatch(TElement.Nodes);
        PlaneModel<TElement> model = new(mesh, PlaneElasticity.Isotropic(1e6, 0.25, 0, state));
        for (int i = 0; i < mesh.X.Length; i++)
        {
            if (mesh.X[i] is > 1e-9 and < 0.24 - 1e-9 && mesh.Y[i] is > 1e-9 and < 0.12 - 1e-9)
                continue;
            model.Hold([i], 0, 1e-3 * (mesh.X[i] + mesh.Y[i] / 2));
            model.Hold([i], 1, 1e-3 * (mesh.Y[i] + mesh.X[i] / 2));
        }
        model.Solve();
        double along = state == OutOfPlaneState.Free ? 4000.0 / 3 : 1600, across = state == OutOfPlaneState.Free ? 0 : 800, worst = 0;
        double[] expected = [along, along, across, 400];
        for (int e = 0; e < mesh.ElementCount; e++)
        {
            double[] stresses = model.StressesOf(e);
            for (int i = 0; i < 16; i++)
                worst = Math.Max(worst, Math.Abs(stresses[i] - expected[i % 4]) / along);
        }
        return worst;
    }

    private static double BeamEnd<TElement>(double lean, bool alternate, int direction)
        where TElement : struct, IPlaneElement
    {
        PlaneMesh mesh = BenchmarkMeshes.Beam(TElement.Nodes, lean, alternate);
        PlaneModel<TElement> model = new(mesh, PlaneElasticity.Isotropic(1e7, 0.3, 0, OutOfPlaneState.Free), width: 0.1);
        model.Hold(mesh.Left, 0);
        model.Hold(mesh.Left, 1);
        model.LoadEdge(mesh.Right, (_, _) => direction == 0 ? (1 / (0.2 * 0.1), 0) : (0, 1 / (0.2 * 0.1)));
        model.Solve();
        return (model.Displacements[2 * mesh.Right[0] + direction] + model.Displacements[2 * mesh.Right[^1] + direction]) / 2;
    }

    private static double CurvedEnd<TElement>(int around, int through)
        where TElement : struct, IPlaneElement
    {
        PlaneMesh mesh = BenchmarkMeshes.QuarterRing(TElement.Nodes, around, through, 4.12, 4.32);
        PlaneModel<TElement> model = new(mesh, PlaneElasticity.Isotropic(1e7, 0.25, 0, OutOfPlaneState.Free), width: 0.1);
        model.Hold(mesh.Right, 0);
        model.Hold(mesh.Right, 1);
        model.LoadEdge(mesh.Left, (_, _) => (0, 1 / (0.2 * 0.1)));
        model.Solve();
        return (model.Displacements[2 * mesh.Left[0] + 1] + model.Displacements[2 * mesh.Left[^1] + 1]) / 2;
    }

    private static double CylinderGrowth<TElement>(int around, int through, double poisson)
        where TElement : struct, IPlaneElement
    {
        PlaneMesh mesh = BenchmarkMeshes.QuarterRing(TElement.Nodes, around, through, 3, 9);
        PlaneModel<TElement> model = new(mesh, PlaneElasticity.Isotropic(1000, poisson, 0, OutOfPlaneState.Held));
        model.Hold(mesh.Left, 0);
        model.Hold(mesh.Right, 1);
        model.LoadEdge(mesh.Bottom, (nx, ny) => (-nx, -ny));
        model.Solve();
        return model.Displacements[2 * mesh.Right[0]];
    }

    private static double PanelSag<TElement>(int divisions, OutOfPlaneState state, bool graded)
        where TElement : struct, IPlaneElement
    {
        PlaneMesh mesh = BenchmarkMeshes.TaperedPanel(TElement.Nodes, divisions, graded);
        PlaneModel<TElement> model = new(mesh, PlaneElasticity.Isotropic(1, 1.0 / 3, 0, state));
        model.Hold(mesh.Left, 0);
        model.Hold(mesh.Left, 1);
        model.LoadEdge(mesh.Right, (_, _) => (0, 1.0 / 16));
        model.Solve();
        return model.Displacements[2 * mesh.Right[mesh.Right.Length / 2] + 1];
    }

    private static (double StressYy, double X) EllipsePoint<TElement>(int around, int through)
        where TElement : struct, IPlaneElement
    {
        PlaneMesh mesh = BenchmarkMeshes.EllipticMembrane(TElement.Nodes, around, through);
        PlaneModel<TElement> model = new(mesh, PlaneElasticity.Isotropic(210000, 0.3, 0, OutOfPlaneState.Free), width: 0.1);
        model.Hold(mesh.Left, 0);
        model.Hold(mesh.Right, 1);
        model.LoadEdge([.. mesh.Top.Reverse()], (nx, ny) => (10 * nx, 10 * ny));
        model.Solve();
        return (model.StressAtNode(mesh.Right[0])[1], model.Displacements[2 * mesh.Right[0]]);
    }
}
