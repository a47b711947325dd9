using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Benchmarks.Models;

/// <summary>
/// Element matrices of a benchmark mesh by the library's own elements and laws: aluminium arms, an adhesive layer that softens exponentially in peel, so that each opening has a tangent of its own. Elements of one shape share
/// one matrix. Not safe for use by several threads.
/// </summary>
/// <param name="mesh">The mesh.</param>
public sealed class ElementMatrices(BenchmarkMesh mesh)
{
    /// <summary>Levels of a layer element: 0 is the virgin one, then come softening ones, and this one stands open and carries nothing.</summary>
    public const int OpenLevel = 64;

    /// <summary>States of a solid element: 0 elastic, then yielding ones.</summary>
    public const int SolidStates = 3;

    // Aluminium; width of a lap coupon. Numbers invented within the usual range.
    private const double Young = 70_000, Poisson = 0.33, Width = 25;

    // An epoxy layer of 0.2 mm: stiffness [MPa/mm], strength [MPa] and toughness [N/mm] in peel and shear, final opening [mm]. Invented within the usual range.
    private const double PeelStiffness = 1e4, PeelStrength = 30, PeelToughness = 1, PeelEnd = 0.12, ShearStiffness = 4e3, ShearStrength = 25, ShearToughness = 2;

    private const double SofteningShare = 0.5;

    private const double PartsPerMillimetre = 1e6;

    private static readonly ExponentialCurve Peel = new(PeelStiffness, PeelStrength, PeelToughness, PeelEnd);
    private static readonly IndependentModesLaw Law = new(Peel, new BilinearCurve(ShearStiffness, ShearStrength, ShearToughness), PeelStiffness);

    // Flow leaves the resistance to change of volume and little else: a low modulus near incompressibility stands for a yielding metal's tangent.
    private static readonly PlaneElasticity[] Materials =
    [
        PlaneElasticity.Isotropic(Young, Poisson, 0, OutOfPlaneState.Held),
        PlaneElasticity.Isotropic(0.10 * Young, 0.48, 0, OutOfPlaneState.Held),
        PlaneElasticity.Isotropic(0.15 * Young, 0.47, 0, OutOfPlaneState.Held),
    ];

    private readonly Dictionary<SolidKey, double[]> _solids = [];
    private readonly Dictionary<(long Length, int Level), double[]> _layers = [];
    private readonly LayerRule _rule = LayerRule.SubIntervals(mesh.NodesPerFace);

    /// <summary>Stiffness of a solid element [N/mm], row-major; not to be changed.</summary>
    /// <param name="element">Element.</param>
    /// <param name="state">0 elastic, else a yielding state below <see cref="SolidStates"/>.</param>
    public double[] Solid(int element, int state)
    {
        ReadOnlySpan<int> nodes = mesh.SolidNodes(element);
        double[] coordinates = Coordinates(nodes);
        SolidKey key = new(state, Parts(coordinates[2] - coordinates[0]), Parts(coordinates[3] - coordinates[1]), Parts(coordinates[4] - coordinates[0]),
            Parts(coordinates[5] - coordinates[1]), Parts(coordinates[6] - coordinates[0]), Parts(coordinates[7] - coordinates[1]));
        if (_solids.TryGetValue(key, out double[]? known))
            return known;
        int size = coordinates.Length;
        var stiffness = new double[size * size];
        if (mesh.NodesPerSolid == Quadrilateral8.NodeCount)
            Stiffness<Quadrilateral8>(coordinates, Materials[state], stiffness);
        else
            Stiffness<Quadrilateral4>(coordinates, Materials[state], stiffness);
        _solids.Add(key, stiffness);
        return stiffness;
    }

    /// <summary>Tangent of a layer element [N/mm], row-major; not to be changed.</summary>
    /// <param name="element">Element.</param>
    /// <param name="level">0 virgin; up to <see cref="OpenLevel"/> the opening has run through the first half of the softening branch, where tangents are symmetric; <see cref="OpenLevel"/> stands open.</param>
    public double[] Layer(int element, int level)
    {
        double[] coordinates = Coordinates(mesh.LayerNodes(element));
        (long, int) key = (Parts(coordinates[2 * mesh.NodesPerFace - 2] - coordinates[0]), level);
        if (_layers.TryGetValue(key, out double[]? known))
            return known;
        int size = coordinates.Length;
        var tangent = new double[size * size];
        if (level < OpenLevel)
        {
            double opening = level == 0 ? 0 : Peel.ElasticLimit + SofteningShare * (Peel.FinalSeparation - Peel.ElasticLimit) * level / OpenLevel;
            var displacements = new double[size];
            for (int i = size / 2 + 1; i < size; i += 2)
                displacements[i] = opening;
            int states = _rule.Count * Law.StateSize;
            LayerElement.Evaluate(_rule, coordinates, displacements, Width, 0, Law, new LawPoint(293.15, 0), new double[states], new double[states], [], tangent, [], []);
        }
        _layers.Add(key, tangent);
        return tangent;
    }

    private static void Stiffness<TElement>(double[] coordinates, PlaneElasticity material, double[] stiffness)
        where TElement : struct, IPlaneElement => TElement.Stiffness(coordinates, material, Width, stiffness);

    private static long Parts(double length) => (long)Math.Round(length * PartsPerMillimetre);

    private double[] Coordinates(ReadOnlySpan<int> nodes)
    {
        var coordinates = new double[2 * nodes.Length];
        for (int i = 0; i < nodes.Length; i++)
            (coordinates[2 * i], coordinates[2 * i + 1]) = (mesh.X[nodes[i]], mesh.Y[nodes[i]]);
        return coordinates;
    }

    /// <summary>Corners seen from corner 0; mid-sides lie in the middle of straight sides.</summary>
    private readonly record struct SolidKey(int State, long X1, long Y1, long X2, long Y2, long X3, long Y3);
}
