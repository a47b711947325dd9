using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Model;

/// <summary>Materials of a deck as laws of the plane model.</summary>
public static class MaterialFactory
{
    /// <summary>The elastic law of a material in its own axes (x along the adherend).</summary>
    /// <exception cref="DeckException">The constants are no stable elastic material.</exception>
    public static PlaneElasticity Create(Deck deck, string name)
    {
        MaterialDeck material = deck.Materials[name];
        return Guarded(name, () => material.ShearModulus is null && material.Expansion == new Directional(material.Expansion.X)
            ? PlaneElasticity.Isotropic(material.Young.X, material.Poisson.Xy, material.Expansion.X, StateOf(deck))
            : PlaneElasticity.Orthotropic(Constants(material), StateOf(deck)));
    }

    /// <summary>The elastic laws of an adherend in its own axes: one, or one for each row of elements where it has plies.</summary>
    /// <exception cref="DeckException">The constants are no stable elastic material.</exception>
    public static PlaneElasticity[] Rows(Deck deck, MeshedAdherend adherend)
    {
        if (deck.Adherends[adherend.Name].Plies is not { } plies)
            return [Create(deck, adherend.Material)];
        PlaneElasticity[] ofPly = [.. plies.Select(ply => Ply(deck, ply.Of ?? adherend.Material, ply.Angle))];
        return [.. adherend.PlyOfRow.Select(ply => ofPly[ply])];
    }

    private static PlaneElasticity Ply(Deck deck, string name, double angle)
    {
        MaterialDeck material = deck.Materials[name];
        if (Math.Abs(Math.Sin(angle)) <= 1e-12)
            return Create(deck, name);
        OrthotropicConstants constants = Constants(material);
        return Guarded(name, () => TurnedPly.Of(constants, material.ShearModulus?.Xz ?? constants.ShearXy, material.ShearModulus?.Zy ?? constants.ShearXy, angle, StateOf(deck)));
    }

    /// <summary>The same material as it yields; null when it does not.</summary>
    /// <exception cref="DeckException">The constants are no material that can yield.</exception>
    public static J2Plasticity? Yielding(Deck deck, string name)
    {
        MaterialDeck material = deck.Materials[name];
        if (material.YieldCurve is not { } table)
            return null;
        return Guarded(name, () => new J2Plasticity(Constants(material), new YieldCurve([.. table.PlasticStrain], [.. table.Stress], [.. table.Temperature ?? []], [.. table.ShareOfStress ?? []]),
            table.KinematicHardening, StateOf(deck), deck.StressFreeTemperature));
    }

    /// <summary>With a uniform strain the law is the held one: the strain comes on top.</summary>
    private static OutOfPlaneState StateOf(Deck deck) => deck.Model.OutOfPlane == OutOfPlane.Free ? OutOfPlaneState.Free : OutOfPlaneState.Held;

    // An isotropic material may still expand by direction, as a drawn sheet does.
    private static OrthotropicConstants Constants(MaterialDeck material) => new(material.Young.X, material.Young.Y, material.Young.Z, material.Poisson.Xy, material.Poisson.Xz, material.Poisson.Zy,
        material.ShearModulus?.Xy ?? material.Young.X / (2 * (1 + material.Poisson.Xy)), material.Expansion.X, material.Expansion.Y, material.Expansion.Z);

    private static T Guarded<T>(string name, Func<T> make)
    {
        try
        {
            return make();
        }
        catch (ArgumentException fault)
        {
            throw new DeckException($"materials.{name}", fault.Message);
        }
    }
}
