using InterfaceFE.Geometry;
using InterfaceFE.Marching;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Mechanics.Materials;
using InterfaceFE.Model;
using InterfaceFE.Results;
using Xunit;

namespace InterfaceFE.Tests.Model;

/// <summary>Two adherends and a layer on an irregular mesh: uniform strain with a constant jump, and movements without strain.</summary>
public class LayerPatchTests
{
    private const double Young = 900, Poisson = 0.27, Peel = 400, Shear = 250;

    [Theory]
    [InlineData(false, 0, false)]
    [InlineData(true, 0, false)]
    [InlineData(false, 0.6, false)]
    [InlineData(true, 0.6, false)]
    [InlineData(true, -1.1, true)]
    [InlineData(false, 2.5, true)]
    public void Uniform_strain_with_a_constant_jump_is_reproduced(bool quadratic, double angle, bool oneDamage)
    {
        // Source: definition of a patch test; stress by plane stress of Hooke's law, jump = traction on the joint line over the layer's stiffness.
        HandMesh hand = HandMesh.Make(quadratic, angle);
        double exx = 2e-3, eyy = -0.7e-3, gxy = 1.3e-3, turn = 0.4e-3;
        double f = Young / (1 - Poisson * Poisson), xx = f * (exx + Poisson * eyy), yy = f * (eyy + Poisson * exx), xy = Young / (2 * (1 + Poisson)) * gxy;
        (double s, double c) = Math.SinCos(angle);
        double normal = xx * s * s - 2 * xy * s * c + yy * c * c, along = (yy - xx) * s * c + xy * (c * c - s * s);
        double stiffness = normal < 0 ? 3 * Peel : Peel, opening = normal / stiffness, sliding = along / Shear;
        double jumpX = -s * opening + c * sliding, jumpY = c * opening + s * sliding;
        Mesh mesh = hand.Mesh;
        FullEquilibrium equilibrium = Solve(hand, oneDamage, (node, isUpper) =>
        {
            double x = mesh.X[node], y = mesh.Y[node];
            return (exx * x + (gxy / 2 - turn) * y + (isUpper ? jumpX : 0), (gxy / 2 + turn) * x + eyy * y + (isUpper ? jumpY : 0));
        });

        double[] ux = new double[mesh.NodeCount], uy = new double[mesh.NodeCount];
        for (int node = 0; node < mesh.NodeCount; node++)
        {
            bool isUpper = node >= mesh.Adherends[1].FirstNode;
            (ux[node], uy[node]) = equilibrium.Model.Unknowns.Displacement(node, equilibrium.AcceptedDisplacement);
            Close.To(exx * mesh.X[node] + (gxy / 2 - turn) * mesh.Y[node] + (isUpper ? jumpX : 0), ux[node], 0, 1e-9 * 5e-3, $"x of node {node}");
            Close.To((gxy / 2 + turn) * mesh.X[node] + eyy * mesh.Y[node] + (isUpper ? jumpY : 0), uy[node], 0, 1e-9 * 5e-3, $"y of node {node}");
        }
        double[] native = new double[16], stress = new double[16];
        foreach (SolidBlock solid in equilibrium.Model.Solids)
        {
            for (int e = 0; e < solid.Count; e++)
            {
                LayerSample.Gather(solid.Nodes(e), ux, uy, native);
                solid.Stresses(e, native.AsSpan(0, 2 * solid.NodesPerElement), equilibrium.AcceptedTemperature, [], stress);
                for (int p = 0; p < 4; p++)
                {
                    Close.To(xx, stress[4 * p], 1e-9, 0, "xx");
                    Close.To(yy, stress[4 * p + 1], 0, 1e-9 * xx, "yy");
                    Close.To(xy, stress[4 * p + 3], 1e-9, 0, "xy");
                }
            }
        }
        var sample = new LayerSample(equilibrium.Model.Layers[0], 0, equilibrium, ux, uy);
        for (int i = 0; i < sample.Response.Length; i++)
        {
            Close.To(normal, sample.Response[i].Peel, 0, 1e-9 * xx, "peel");
            Close.To(along, sample.Response[i].Shear, 0, 1e-9 * xx, "shear");
        }
        Close.To(3 * 1.1, sample.Length.Sum(), 1e-12, 0, "length of the joint");
    }

    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public void Infinitesimal_rigid_motion_gives_no_force_and_no_separation(bool quadratic)
    {
        HandMesh hand = HandMesh.Make(quadratic, 0.6);
        Mesh mesh = hand.Mesh;
        FullEquilibrium equilibrium = Solve(hand, false, (node, _) => (0.3 - 0.02 * mesh.Y[node], -0.1 + 0.02 * mesh.X[node]));
        double[] ux = new double[mesh.NodeCount], uy = new double[mesh.NodeCount];
        for (int node = 0; node < mesh.NodeCount; node++)
            (ux[node], uy[node]) = equilibrium.Model.Unknowns.Displacement(node, equilibrium.AcceptedDisplacement);
        foreach (Separation separation in new LayerSample(equilibrium.Model.Layers[0], 0, equilibrium, ux, uy).Separation)
        {
            Close.To(0, separation.Opening, 0, 1e-13, "opening");
            Close.To(0, separation.Sliding, 0, 1e-13, "sliding");
        }
        // Scale: Young's modulus times width times displacement.
        foreach (double force in equilibrium.InternalForce)
            Close.To(0, force, 0, 1e-11 * Young * 1.7 * 0.3, "force");
    }

    private static FullEquilibrium Solve(HandMesh hand, bool oneDamage, Func<int, bool, (double X, double Y)> field)
    {
        Mesh mesh = hand.Mesh;
        GripBody[] bodies = [new GripBody { Name = "outline", Rigid = false, Nodes = hand.Outer, PinX = 0, PinY = 0 }];
        var unknowns = new UnknownMap(mesh, bodies);
        PlaneElasticity material = PlaneElasticity.Isotropic(Young, Poisson, 0, OutOfPlaneState.Free);
        BilinearCurve peel = new(Peel, 20, 4), shear = new(Shear, 20, 6);
        ILayerLaw law = oneDamage ? new BenzeggaghKenaneLaw(peel, shear, 2, 3 * Peel) : new IndependentModesLaw(peel, shear, 3 * Peel);
        List<HeldTarget> held = [];
        foreach (int node in hand.Outer)
        {
            (double x, double y) = field(node, node >= mesh.Adherends[1].FirstNode);
            held.Add(new HeldTarget(unknowns.OfNode(node), TargetKind.MoveTo, x));
            held.Add(new HeldTarget(unknowns.OfNode(node) + 1, TargetKind.MoveTo, y));
        }
        var model = new SpecimenModel
        {
            Mesh = mesh,
            Unknowns = unknowns,
            Solids = [.. mesh.Adherends.Select(a => SolidBlock.Create(mesh, a, [material], 293.15))],
            OpenFaces = [],
            Layers = [new LayerBlock(mesh, mesh.Joints[0], law, 0.1, LayerRule.SubIntervals(mesh.NodesPerFace), 0, 293.15, bonded: true)],
            Grips = [new Grip("outline", [0])],
            Stages = [new LoadStage { Number = 1, Words = "deform", Held = held, Forces = [], Temperature = null, Duration = 1, Marches = true }],
            StressFreeTemperature = 293.15,
        };
        var equilibrium = new FullEquilibrium(model);
        MarchOutcome outcome = new March(equilibrium, new MarchSettings { FirstStride = 1, LargestStride = 1 }, new Silent()).Run();
        Assert.True(outcome.Status == MarchStatus.Finished, outcome.Cause);
        return equilibrium;
    }

    private sealed class Silent : IMarchObserver
    {
        public void PointAccepted(MarchPoint point)
        {
        }

        public void IterationMade(in MarchIteration iteration)
        {
        }

        public void Said(string line)
        {
        }
    }
}
