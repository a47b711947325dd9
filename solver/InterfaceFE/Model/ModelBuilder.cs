using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Model;

/// <summary>Makes the model that is marched from a deck and its mesh.</summary>
public static class ModelBuilder
{
    /// <summary>Onset of the contact of faces that were never bonded, as a share of the layer's thickness.</summary>
    private const double OnsetShare = 1e-3;

    /// <summary>Builds the model.</summary>
    /// <exception cref="DeckException">The deck asks for something that the mesh or the mechanics cannot give.</exception>
    public static SpecimenModel Build(Deck deck, Mesh mesh)
    {
        bool turns = deck.Model.Rotation == RotationSetting.Finite;
        PlaneElasticity[][] materials = [.. mesh.Adherends.Select(a => MaterialFactory.Rows(deck, a))];
        OutOfPlaneGroups? outOfPlane = deck.Model.OutOfPlane == OutOfPlane.UniformStrain ? new OutOfPlaneGroups(mesh, deck.Model.Width, deck.Model.StrainOutOfPlane) : null;
        (IReadOnlyList<GripBody> bodies, IReadOnlyList<Grip> grips) = GripPlanner.Plan(deck, mesh);
        var unknowns = new UnknownMap(mesh, bodies, outOfPlane, turns, [.. grips.SelectMany(g => g.LoadTrains)]);
        SolidBlock[] solids = [.. mesh.Adherends.Select((a, i) => SolidBlock.Create(mesh, a, materials[i], deck.StressFreeTemperature,
            a.PlyOfRow.Count == 0 ? MaterialFactory.Yielding(deck, a.Material) : null, unknowns.LinkOf(i), turns))];
        double[] across = [.. mesh.Adherends.Select((_, i) => FreeAcross(deck, mesh, materials, outOfPlane, i))];
        LayerBlock[] layers = [.. mesh.Joints.Select(joint => Layer(deck, mesh, joint, materials, across))];
        LayerBlock[] openFaces = [.. mesh.Joints.Zip(layers, (joint, layer) => OpenFaces(deck, mesh, joint, layer)).Where(block => block.Count > 0)];
        return new SpecimenModel
        {
            Mesh = mesh,
            Unknowns = unknowns,
            Solids = solids,
            LoadTrains = unknowns.LoadTrains.Count > 0 ? [new LoadTrainBlock(unknowns)] : [],
            OpenFaces = openFaces,
            Pressures = PressurePlanner.Plan(deck, mesh),
            Layers = layers,
            Grips = grips,
            Stages = SequencePlanner.Plan(deck, unknowns, grips, WeightPlanner.Plan(deck, mesh, unknowns, solids)),
            StressFreeTemperature = deck.StressFreeTemperature,
        };
    }

    private static LayerBlock Layer(Deck deck, Mesh mesh, MeshedJoint joint, PlaneElasticity[][] materials, double[] across)
    {
        LayerDeck layer = deck.Layers![joint.Layer];
        ILayerLaw law = LayerLawFactory.Create(joint.Layer, layer, deck.Model.OutOfPlane, deck.Model.AmbientPressure);
        if (layer.Friction is { } friction)
            law = new FrictionLaw(law, friction, neverBonded: false);
        double along = 0.5 * (Along(joint.UpperAdherend) + Along(joint.LowerAdherend));
        double out3 = 0.5 * (across[joint.UpperAdherend] + across[joint.LowerAdherend]);
        double perKelvin = LayerLawFactory.Bulk(layer, deck.Model.OutOfPlane)?.FreeOpening(1, along, out3) ?? 0;
        return new LayerBlock(mesh, joint, law, layer.Thickness, Rule(deck, mesh), perKelvin, deck.StressFreeTemperature, bonded: true, Kinematics(deck, joint));

        double Along(int adherend) => Mean(mesh, adherend, materials[adherend], m => m.YoungAlongX,
            m => m.Expansion[0] + (deck.Model.OutOfPlane == OutOfPlane.UniformStrain ? m.DrivenOutOfPlane().Expansion[0] * across[adherend] : 0));
    }

    /// <summary>
    /// Free strain out of plane of an adherend per kelvin [1/K]: held 0, free its own expansion, with a uniform strain that of its group when nothing else strains it: mean expansion by
    /// stiffness out of plane; 0 where the strain is given.
    /// </summary>
    private static double FreeAcross(Deck deck, Mesh mesh, PlaneElasticity[][] materials, OutOfPlaneGroups? groups, int adherend)
    {
        if (groups is null)
            return deck.Model.OutOfPlane == OutOfPlane.Held ? 0 : FreeExpansionAcross(deck, mesh.Adherends[adherend]);
        if (groups.Given is not null)
            return 0;
        double sum = 0, stiffness = 0;
        for (int i = 0; i < mesh.Adherends.Count; i++)
        {
            if (groups.Of(i) != groups.Of(adherend))
                continue;
            double own = mesh.Adherends[i].Width * mesh.AreaOf(i) * Mean(mesh, i, materials[i], _ => 1, m => m.YoungOutOfPlane);
            sum += own * Mean(mesh, i, materials[i], m => m.YoungOutOfPlane, m => m.ExpansionOutOfPlane);
            stiffness += own;
        }
        return sum / stiffness;
    }

    /// <summary>Expansion out of plane [1/K]; of plies the mean by thickness.</summary>
    private static double FreeExpansionAcross(Deck deck, MeshedAdherend adherend)
    {
        if (deck.Adherends[adherend.Name].Plies is not { } plies)
            return deck.Materials[adherend.Material].Expansion.Z;
        double sum = 0;
        foreach (PlyDeck ply in plies)
        {
            Directional own = deck.Materials[ply.Of ?? adherend.Material].Expansion;
            sum += ply.Thickness * (own.Z + (own.X - own.Z) * Math.Pow(Math.Sin(ply.Angle), 2));
        }
        return sum / plies.Sum(p => p.Thickness);
    }

    /// <summary>Mean of a value over the rows of elements of an adherend, by their height and a weight.</summary>
    private static double Mean(Mesh mesh, int adherend, PlaneElasticity[] rows, Func<PlaneElasticity, double> weight, Func<PlaneElasticity, double> value)
    {
        if (rows.Length == 1)
            return value(rows[0]);
        double sum = 0, weights = 0;
        for (int row = 0; row < rows.Length; row++)
        {
            double own = weight(rows[row]) * mesh.AreaOf(adherend, row);
            sum += own * value(rows[row]);
            weights += own;
        }
        return sum / weights;
    }

    private static LayerBlock OpenFaces(Deck deck, Mesh mesh, MeshedJoint joint, LayerBlock layer)
    {
        ILayerLaw law = new ClosingLaw(layer.Law.Stiffness.Contact, OnsetShare * layer.Thickness);
        if (deck.Layers![joint.Layer].Friction is { } friction)
            law = new FrictionLaw(law, friction, neverBonded: true);
        return new LayerBlock(mesh, joint, law, layer.Thickness, Rule(deck, mesh), 0, deck.StressFreeTemperature, bonded: false, Kinematics(deck, joint));
    }

    /// <summary>Null where faces lie on each other and turn little: then nothing but the jump counts.</summary>
    private static LayerKinematics? Kinematics(Deck deck, MeshedJoint joint)
    {
        JointDeck drawn = deck.Joints![joint.Name];
        bool turns = deck.Model.Rotation == RotationSetting.Finite;
        if (!turns && drawn.Drawn == DrawnThickness.Zero)
            return null;
        return new LayerKinematics(drawn.Frame switch { FrameLine.UpperFace => LayerFrame.UpperFace, FrameLine.LowerFace => LayerFrame.LowerFace, _ => LayerFrame.MidLine }, turns);
    }

    private static LayerRule Rule(Deck deck, Mesh mesh) => deck.Model.LayerIntegration switch
    {
        LayerIntegration.Gauss => LayerRule.Gauss(mesh.NodesPerFace),
        LayerIntegration.Lobatto => LayerRule.Lobatto(mesh.NodesPerFace),
        _ => LayerRule.SubIntervals(mesh.NodesPerFace),
    };
}
