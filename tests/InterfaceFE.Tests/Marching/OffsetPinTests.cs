using InterfaceFE.Results;
using InterfaceFE.Tests.Model;
using Xunit;

namespace InterfaceFE.Tests.Marching;

/// <summary>
/// A cantilever with a rigid block at its end, loaded at a pin that lies off the block's face. By reciprocity with pure bending, which the elements hold exactly, the end turns by
/// θ = [F·(L²/2 + d·L) + M·L]/(E·I), d how far the pin lies beyond the end.
/// </summary>
public class OffsetPinTests
{
    private const double Length = 80, Height = 4, Width = 10, Young = 70000, Beyond = 15, Above = 12;

    [Theory]
    [InlineData("pull: {grip: block, along: +y, force: 3 N}", 3, 0, 0)]
    [InlineData("push: {grip: block, along: -x, force: 5 N}", 0, -5, 0)]
    [InlineData("turn: {grips: {block: 2}, moment: 40 N*mm}", 0, 0, 80)]
    public void A_dead_force_at_an_offset_pin_turns_the_block_as_bending_says(string stage, double forceY, double forceX, double moment)
    {
        RunResultOf($"  - {stage}\n    over: 90 s", out PointRow last);
        double stiffness = Young * Width * Math.Pow(Height, 3) / 12;
        double turn = (forceY * (0.5 * Length * Length + Beyond * Length) + (moment - forceX * Above) * Length) / stiffness;
        Close.To(turn, last.Grips[1].Rotation!.Value, 1e-8);
        Close.To(moment, last.Grips[1].Moment!.Value, 1e-9, 1e-9);
        Close.To(-(moment + forceY * (Length + Beyond) - forceX * Above), last.Grips[0].Moment!.Value, 1e-8);
        Close.To(-forceX, last.Grips[0].ForceX, 1e-8, 1e-8);
        Close.To(90, last.Time, 1e-12);
    }

    [Fact]
    public void Travel_at_an_offset_pin_and_dead_force_meet()
    {
        RunResultOf("  - pull: {grip: block, along: +y, force: 3 N}", out PointRow byForce);
        RunResultOf(FormattableString.Invariant($"  - pull: {{grip: block, along: +y, travel: {byForce.Grips[1].Displacement:R} mm, speed: 6 mm/min}}"), out PointRow byTravel);
        Close.To(3, byTravel.Grips[1].Force, 1e-8);
        Close.To(byForce.Grips[1].Rotation!.Value, byTravel.Grips[1].Rotation!.Value, 1e-8);
        Close.To(byForce.Grips[1].Displacement / 0.1, byTravel.Time, 1e-12);
    }

    private static void RunResultOf(string stages, out PointRow last) => last = DeckOf.Run(DeckOf.Yaml(FormattableString.Invariant($$"""
        title: Cantilever with a block
        model: {width: {{Width}} mm, out of plane: free, rotation: small}
        materials:
          metal: {young: {{Young}} MPa, poisson: 0}
        adherends:
          arm: {of: metal, rectangle: {corner: [0 mm, 0 mm], size: [{{Length}} mm, {{Height}} mm]}, elements: {along: 20, through: 2} }
        grips:
          clamp: {on: left end of arm}
          block: {on: right end of arm, from: 0 mm, to: {{Height}} mm, pin: [{{Length + Beyond}} mm, {{0.5 * Height + Above}} mm]}
        sequence:
          - fix: {clamp: [x, y, rotation]}
        """) + "\n" + stages)).History.Points[^1];
}
