using InterfaceFE.Decks;
using InterfaceFE.Mechanics.Materials;
using InterfaceFE.Model;
using InterfaceFE.Tests.Marching;
using Xunit;

namespace InterfaceFE.Tests.Model;

public class MaterialFactoryTests
{
    [Fact]
    public void An_isotropic_material_may_expand_by_direction()
    {
        Deck deck = BarDeck.Make(1) with
        {
            Materials = new Dictionary<string, MaterialDeck> { ["stuff"] = new() { Young = new Directional(1000), Poisson = new PoissonRatios(0.3), Expansion = new Directional(1e-5, 2e-5, 3e-5) } },
        };
        PlaneElasticity free = MaterialFactory.Create(deck, "stuff");
        Close.To(1e-5, free.Expansion[0]);
        Close.To(2e-5, free.Expansion[1]);
        // Held out of plane each in-plane expansion grows by ν times that across (Hooke's law).
        PlaneElasticity held = MaterialFactory.Create(deck with { Model = deck.Model with { OutOfPlane = OutOfPlane.Held } }, "stuff");
        Close.To(1e-5 + 0.3 * 3e-5, held.Expansion[0]);
        Close.To(2e-5 + 0.3 * 3e-5, held.Expansion[1]);
    }
}
