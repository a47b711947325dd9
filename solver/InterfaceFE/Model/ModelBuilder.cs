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
        PlaneElasticity[] materials = [.. mesh.Adherends.Select(a => MaterialFactory.Create(deck, a.Material))];
        SolidBlock[] solids = [.. mesh.Adherends.Select((a, i) => SolidBlock.Create(mesh, a, materials[i], deck.StressFreeTemperature))];
        LayerBlock[] layers = [.. mesh.Joints.Select(joint => Layer(deck, mesh, joint, materials))];
        LayerBlock[] openFaces = [.. mesh.Joints.Zip(layers, (joint, layer) => OpenFaces(deck, mesh, joint, layer)).Where(block => block.Count > 0)];
        (IReadOnlyList<GripBody> bodies, IReadOnlyList<Grip> grips) = GripPlanner.Plan(deck, mesh);
        var unknowns = new UnknownMap(mesh, bodies, [.. grips.SelectMany(g => g.LoadTrains)]);
        return new SpecimenModel
        {
            Mesh = mesh,
            Unknowns = unknowns,
            Solids = solids,
            LoadTrains = unknowns.LoadTrains.Count > 0 ? [new LoadTrainBlock(unknowns)] : [],
            OpenFaces = openFaces,
            Layers = layers,
            Grips = grips,
            Stages = SequencePlanner.Plan(deck, unknowns, grips),
            StressFreeTemperature = deck.StressFreeTemperature,
        };
    }

    private static LayerBlock Layer(Deck deck, Mesh mesh, MeshedJoint joint, PlaneElasticity[] materials)
    {
        LayerDeck layer = deck.Layers![joint.Layer];
        ILayerLaw law = LayerLawFactory.Create(joint.Layer, layer, deck.Model.OutOfPlane);
        if (layer.Friction is { } friction)
            law = new FrictionLaw(law, friction, neverBonded: false);
        double along = 0.5 * (materials[joint.UpperAdherend].Expansion[0] + materials[joint.LowerAdherend].Expansion[0]);
        double across = deck.Model.OutOfPlane == OutOfPlane.Held ? 0
            : 0.5 * (deck.Materials[mesh.Adherends[joint.UpperAdherend].Material].Expansion.Z + deck.Materials[mesh.Adherends[joint.LowerAdherend].Material].Expansion.Z);
        double perKelvin = LayerLawFactory.Bulk(layer, deck.Model.OutOfPlane)?.FreeOpening(1, along, across) ?? 0;
        return new LayerBlock(mesh, joint, law, layer.Thickness, Rule(deck, mesh), perKelvin, deck.StressFreeTemperature, bonded: true);
    }

    private static LayerBlock OpenFaces(Deck deck, Mesh mesh, MeshedJoint joint, LayerBlock layer)
    {
        ILayerLaw law = new ClosingLaw(layer.Law.Stiffness.Contact, OnsetShare * layer.Thickness);
        if (deck.Layers![joint.Layer].Friction is { } friction)
            law = new FrictionLaw(law, friction, neverBonded: true);
        return new LayerBlock(mesh, joint, law, layer.Thickness, Rule(deck, mesh), 0, deck.StressFreeTemperature, bonded: false);
    }

    private static LayerRule Rule(Deck deck, Mesh mesh) => deck.Model.LayerIntegration switch
    {
        LayerIntegration.Gauss => LayerRule.Gauss(mesh.NodesPerFace),
        LayerIntegration.Lobatto => LayerRule.Lobatto(mesh.NodesPerFace),
        _ => LayerRule.SubIntervals(mesh.NodesPerFace),
    };
}
