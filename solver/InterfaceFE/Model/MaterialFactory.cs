using InterfaceFE.Decks;
using InterfaceFE.Mechanics.Materials;

namespace InterfaceFE.Model;

/// <summary>Materials of a deck as laws of the plane model.</summary>
public static class MaterialFactory
{
    /// <summary>The law of a material in its own axes (x along the adherend).</summary>
    /// <exception cref="DeckException">The constants are no stable elastic material.</exception>
    public static PlaneElasticity Create(Deck deck, string name)
    {
        MaterialDeck material = deck.Materials[name];
        OutOfPlaneState state = deck.Model.OutOfPlane == OutOfPlane.Held ? OutOfPlaneState.Held : OutOfPlaneState.Free;
        try
        {
            // An isotropic material may still expand by direction, as a drawn sheet does.
            double shear = material.ShearModulus?.Xy ?? material.Young.X / (2 * (1 + material.Poisson.Xy));
            if (material.ShearModulus is null && material.Expansion == new Directional(material.Expansion.X))
                return PlaneElasticity.Isotropic(material.Young.X, material.Poisson.Xy, material.Expansion.X, state);
            return PlaneElasticity.Orthotropic(new OrthotropicConstants(material.Young.X, material.Young.Y, material.Young.Z, material.Poisson.Xy, material.Poisson.Xz, material.Poisson.Zy,
                shear, material.Expansion.X, material.Expansion.Y, material.Expansion.Z), state);
        }
        catch (ArgumentException fault)
        {
            throw new DeckException($"materials.{name}", fault.Message);
        }
    }
}
