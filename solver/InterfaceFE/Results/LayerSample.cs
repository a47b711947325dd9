using InterfaceFE.Marching;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Model;

namespace InterfaceFE.Results;

/// <summary>
/// State of one joint at an accepted point: every integration point of its bonded elements, in order of position. The law is asked again at the accepted separation, which
/// repeats the accepted answer.
/// </summary>
public sealed class LayerSample
{
    /// <summary>Samples a layer.</summary>
    /// <param name="layer">Block of the joint.</param>
    /// <param name="joint">Index of the joint.</param>
    /// <param name="equilibrium">Equilibrium at the accepted point.</param>
    /// <param name="ux">Displacement of each node along x [mm].</param>
    /// <param name="uy">Displacement of each node along y [mm].</param>
    public LayerSample(LayerBlock layer, int joint, FullEquilibrium equilibrium, double[] ux, double[] uy)
    {
        Layer = layer;
        int points = layer.PointsPerElement;
        Position = new double[layer.Count * points];
        Length = new double[Position.Length];
        Separation = new Separation[Position.Length];
        Response = new LayerResponse[Position.Length];
        CoupleFlow = new double[Position.Length];
        var at = new PathPoint(equilibrium.AcceptedProgress, equilibrium.AcceptedTemperature, 0, 0);
        Span<double> native = stackalloc double[2 * layer.NodesPerElement];
        for (int e = 0; e < layer.Count; e++)
        {
            Gather(layer.Nodes(e), ux, uy, native);
            layer.Sample(e, at, native, equilibrium.AcceptedLayerState(joint, e), Separation.AsSpan(e * points, points), Response.AsSpan(e * points, points));
            for (int p = 0; p < points; p++)
            {
                Position[e * points + p] = layer.Position(e, p);
                Length[e * points + p] = layer.PointLength(e, p);
                if (layer.Stance(e, p, native) is not { } stance)
                    continue;
                CoupleFlow[e * points + p] = stance.CoupleFlow(Response[e * points + p]);
                if (Response[e * points + p].Damage is > 0 and < 1)
                    LargestFaceAngle = Math.Max(LargestFaceAngle, Math.Abs(stance.FaceAngle));
            }
        }
    }

    /// <summary>The block.</summary>
    public LayerBlock Layer { get; }

    /// <summary>Position along the joint [mm].</summary>
    public double[] Position { get; }

    /// <summary>Length that each point stands for [mm].</summary>
    public double[] Length { get; }

    /// <summary>Jump less free opening [mm].</summary>
    public Separation[] Separation { get; }

    /// <summary>Answer of the law.</summary>
    public LayerResponse[] Response { get; }

    /// <summary>Flow of energy by the layer's couple through a cut at each point [N/mm]; 0 at small rotation and zero thickness.</summary>
    public double[] CoupleFlow { get; }

    /// <summary>Largest angle between the two faces where damage is under way [rad]; 0 at small rotation and zero thickness.</summary>
    public double LargestFaceAngle { get; }

    /// <summary>Magnitude of the traction, closing not counted [MPa].</summary>
    public double Traction(int point) => Math.Sqrt(Math.Pow(Math.Max(Response[point].Peel, 0), 2) + Math.Pow(Response[point].Shear, 2));

    /// <summary>Native displacements of an element from nodal ones.</summary>
    public static void Gather(ReadOnlySpan<int> nodes, double[] ux, double[] uy, Span<double> native)
    {
        for (int i = 0; i < nodes.Length; i++)
        {
            native[2 * i] = ux[nodes[i]];
            native[2 * i + 1] = uy[nodes[i]];
        }
    }
}
