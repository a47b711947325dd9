using InterfaceFE.Mechanics.Layers;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Layers;

public class ClosingLawTests
{
    private const double Stiffness = 5000, Onset = 1e-4;

    private static LayerResponse At(double opening, double sliding = 0.3) =>
        new ClosingLaw(Stiffness, Onset).Update(new Separation(opening, sliding), new LawPoint(293.15, 0), [], []);

    [Fact]
    public void Faces_part_and_slide_freely()
    {
        LayerResponse open = At(0.2);
        Assert.Equal((0, 0, 0, 0, 0, 1), (open.Peel, open.Shear, open.PeelByOpening, open.ShearBySliding, open.Stored, open.Damage));
        Assert.Equal(0, At(-0.2).Shear);
    }

    [Fact]
    public void Pressed_faces_meet_with_the_contact_stiffness_beyond_the_onset()
    {
        // By hand: the area under a stiffness that rises in a straight line over the onset and then stays.
        Close.To(-Stiffness * (0.2 - 0.5 * Onset), At(-0.2).Peel, 1e-12);
        Close.To(Stiffness, At(-0.2).PeelByOpening, 1e-12);
        Close.To(-0.5 * Stiffness * Onset, At(-Onset).Peel, 1e-12);
    }

    [Theory]
    [InlineData(-0.3e-4)]
    [InlineData(-0.9999e-4)]
    [InlineData(-1.0001e-4)]
    [InlineData(-7e-4)]
    public void Traction_is_the_slope_of_the_energy_and_tangent_that_of_the_traction(double opening)
    {
        const double Step = 1e-9;
        LayerResponse below = At(opening - Step), above = At(opening + Step), here = At(opening);
        Close.To((above.Stored - below.Stored) / (2 * Step), here.Peel, 1e-5);
        Close.To((above.Peel - below.Peel) / (2 * Step), here.PeelByOpening, 1e-5);
    }

    [Fact]
    public void An_opening_that_is_no_number_is_handed_on() => Assert.True(double.IsNaN(At(double.NaN).Peel));
}
