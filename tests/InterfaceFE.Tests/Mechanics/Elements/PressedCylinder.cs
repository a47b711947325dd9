using InterfaceFE.Geometry;
using InterfaceFE.Marching;
using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;
using InterfaceFE.Model;

namespace InterfaceFE.Tests.Mechanics.Elements;

/// <summary>
/// Thick cylinder, radii 100 and 200 mm, held out of plane, without hardening, under pressure inside (Hill, The Mathematical Theory of Plasticity, 1950): a quarter of eight-node
/// elements, marched by force.
/// </summary>
internal sealed class PressedCylinder : IMarchObserver
{
    public const double Inner = 100, Outer = 200, Young = 210000, Yield = 240;
    private const double StressFree = 293.15;
    private readonly FullEquilibrium _equilibrium;
    private readonly PlaneMesh _mesh;

    public PressedCylinder(int around, int through, double poisson, double pressure)
    {
        _mesh = BenchmarkMeshes.QuarterRing(8, around, through, Inner, Outer);
        PlaneElasticity elasticity = PlaneElasticity.Isotropic(Young, poisson, 0, OutOfPlaneState.Held);
        double shear = Young / (2 * (1 + poisson));
        J2Plasticity yielding = new(new OrthotropicConstants(Young, Young, Young, poisson, poisson, poisson, shear), new YieldCurve([0], [Yield]), 0, OutOfPlaneState.Held, StressFree);
        PlaneModel<Quadrilateral8> unit = new(_mesh, elasticity);
        unit.LoadEdge(_mesh.Bottom, (nx, ny) => (-nx, -ny));
        Mesh mesh = new()
        {
            X = _mesh.X,
            Y = _mesh.Y,
            NodesPerSolid = 8,
            Joints = [],
            Adherends =
            [
                new MeshedAdherend
                {
                    Name = "cylinder",
                    Material = "metal",
                    Width = 1,
                    Thickness = Outer - Inner,
                    Connectivity = _mesh.Connectivity,
                    FirstNode = 0,
                    NodeCount = _mesh.X.Length,
                    ElementsAlong = around,
                    ElementsThrough = through,
                    Edges = new Dictionary<string, MeshedEdge>(),
                    StraightAlongX = false,
                },
            ],
        };
        GripBody[] bodies = [.. new[] { _mesh.Left, _mesh.Right, _mesh.Bottom }.Select(nodes => new GripBody { Name = "edge", Rigid = false, Nodes = nodes, PinX = 0, PinY = 0 })];
        var unknowns = new UnknownMap(mesh, bodies);
        HeldTarget[] held =
        [
            .. _mesh.Left.Select(node => new HeldTarget(unknowns.OfNode(node), TargetKind.Stay, 0)),
            .. _mesh.Right.Select(node => new HeldTarget(unknowns.OfNode(node) + 1, TargetKind.Stay, 0)),
        ];
        HashSet<int> isHeld = [.. held.Select(h => h.Unknown)];
        List<ForceTarget> forces = [];
        foreach (int node in _mesh.Bottom)
            for (int i = 0; i < 2; i++)
                if (!isHeld.Contains(unknowns.OfNode(node) + i))
                    forces.Add(new ForceTarget(unknowns.OfNode(node) + i, pressure * unit.Load[2 * node + i]));
        _equilibrium = new FullEquilibrium(new SpecimenModel
        {
            Mesh = mesh,
            Unknowns = unknowns,
            Solids = [SolidBlock.Create(mesh, mesh.Adherends[0], [elasticity], StressFree, yielding)],
            OpenFaces = [],
            Layers = [],
            Grips = [new Grip("edges", [0, 1, 2])],
            Stages = [new LoadStage { Number = 1, Words = "press", Held = held, Forces = forces, Temperature = null, Duration = 1, Marches = true }],
            StressFreeTemperature = StressFree,
        });
        Outcome = new March(_equilibrium, new MarchSettings(), this).Run();
    }

    public MarchOutcome Outcome { get; }

    public List<MarchPoint> Points { get; } = [];

    public List<MarchIteration> Iterations { get; } = [];

    /// <summary>Pressure that was reached, as a share of the one asked for.</summary>
    public double Reached => _equilibrium.AcceptedProgress;

    /// <summary>Movement of the outer face at the x axis [mm].</summary>
    public double OuterMovement => _equilibrium.Model.Unknowns.Displacement(_mesh.Right[^1], _equilibrium.AcceptedDisplacement).X;

    /// <summary>Radius of the edge of the zone that has yielded: by the area that yielded integration points stand for [mm].</summary>
    public double YieldedRadius()
    {
        SolidBlock solid = _equilibrium.Model.Solids[0];
        double[] x = new double[32], y = new double[32], areas = new double[4], strains = new double[4];
        double area = 0;
        for (int e = 0; e < solid.Count; e++)
        {
            solid.ShapeGradients(e, x, y, areas);
            solid.PlasticStrains(_equilibrium.AcceptedSolidState(0, e), strains);
            for (int p = 0; p < 4; p++)
                area += strains[p] > 0 ? areas[p] : 0;
        }
        return Math.Sqrt(Inner * Inner + 4 * area / Math.PI);
    }

    /// <summary>Pressure at which the yielded zone reaches a radius, by Hill [MPa].</summary>
    public static double Pressure(double radius) => 2 * Yield / Math.Sqrt(3) * (Math.Log(radius / Inner) + 0.5 * (1 - radius * radius / (Outer * Outer)));

    /// <summary>Movement of the outer face then, by Hill [mm].</summary>
    public static double Movement(double radius, double poisson) => 2 * Yield * radius * radius * (1 - poisson * poisson) / (Math.Sqrt(3) * Young * Outer);

    public void PointAccepted(MarchPoint point) => Points.Add(point);

    public void IterationMade(in MarchIteration iteration) => Iterations.Add(iteration);

    public void Said(string line)
    {
    }
}
