using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// Moment-loaded double cantilever beam with the adhesive as a solid of its own thickness and layer elements on both its faces: the crack runs along the weaker upper face, and the
/// two moments in steady growth follow from the bending stiffness of a bare arm and of an arm with the adhesive on it.
/// </summary>
public sealed class ThickAdhesiveCase : ICase
{
    private const double Width = 25, Arm = 6, Adhesive = 2, Young = 210000, Soft = 3000, Toughness = 1;

    /// <inheritdoc/>
    public string Name => "thick-adhesive";

    /// <inheritdoc/>
    public string Group => "Moment coupons";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        RunResult run = context.Run("layer elements on both faces", Deck());
        double starter = run.History.Fronts.First(f => f.Joint == "upper face" && f.Front == 1).CrackTip!.Value;
        int[] grown = [.. run.History.Fronts.Where(f => f is { Joint: "upper face", Front: 1 } && f.CrackTip > starter + 5).Select(f => f.Point)];
        const string Source = "derived: G = (Mu²/Du + Ml²/Dl - (Mu + Ml)²/D)/2b between the section behind the front and the whole one, bending stiffnesses of bonded beams about their common axis; equal toughnesses make the mode mix immaterial; G = Γ in steady growth of any law";
        double[] rates = [.. grown.Select(i => Rate(run.History.Points[i].Grips[0].Moment!.Value, run.History.Points[i].Grips[1].Moment!.Value))];
        yield return new CaseLine("energy release rate from both moments, mean over the growth", Toughness, rates.Length == 0 ? double.NaN : rates.Average(), 0.005, "N/mm", Source);
        yield return new CaseLine("the same at the point farthest from it", Toughness, rates.Length == 0 ? double.NaN : rates.MaxBy(r => Math.Abs(r - Toughness)), 0.01, "N/mm", Source);
        yield return CaseLine.AtMost("damage of the stronger lower face", 0, run.History.Damage.Where(d => d.Joint == 0).SelectMany(d => d.Damage).Where(float.IsFinite).DefaultIfEmpty(1).Max(), "", "its strength is four times the other's");
        foreach (CaseLine line in SelfCheck.Lines("both faces", run))
            yield return line;
    }

    private static double Rate(double upper, double lower)
    {
        (double, double, double) lowerArm = (Young, 0, Arm), paste = (Soft, Arm, Adhesive), upperArm = (Young, Arm + Adhesive, Arm);
        return (upper * upper / Bending(upperArm) + lower * lower / Bending(lowerArm, paste) - (upper + lower) * (upper + lower) / Bending(lowerArm, paste, upperArm)) / (2 * Width);
    }

    /// <summary>Bending stiffness of bonded beams about their common axis [N·mm²]; each by its modulus, lower edge and height.</summary>
    private static double Bending(params (double Young, double From, double Height)[] parts)
    {
        double axial = parts.Sum(p => p.Young * p.Height), axis = parts.Sum(p => p.Young * p.Height * (p.From + 0.5 * p.Height)) / axial;
        return Width * parts.Sum(p => p.Young * p.Height * (p.Height * p.Height / 12 + Math.Pow(p.From + 0.5 * p.Height - axis, 2)));
    }

    private static string Deck() => FormattableString.Invariant($$"""
        title: Double cantilever beam with a thick adhesive
        model: {width: {{Width}} mm, out of plane: free, rotation: small}
        materials:
          steel: {young: {{Young}} MPa, poisson: 0.3}
          adhesive: {young: {{Soft}} MPa, poisson: 0.35}
        layers:
          weak: {thickness: 0.1 mm, mixing: independent modes, peel: {law: bilinear, stiffness: 1000 MPa/mm, strength: 5 MPa, toughness: {{Toughness}} N/mm}, shear: {law: bilinear, stiffness: 1000 MPa/mm, strength: 5 MPa, toughness: {{Toughness}} N/mm} }
          strong: {thickness: 0.1 mm, mixing: independent modes, peel: {law: bilinear, stiffness: 2000 MPa/mm, strength: 20 MPa, toughness: 10 N/mm}, shear: {law: bilinear, stiffness: 2000 MPa/mm, strength: 20 MPa, toughness: 10 N/mm} }
        adherends:
          lower arm: {of: steel, rectangle: {corner: [0 mm, 0 mm], size: [220 mm, {{Arm}} mm]} }
          paste: {of: adhesive, rectangle: {corner: [0 mm, {{Arm}} mm], size: [220 mm, {{Adhesive}} mm]} }
          upper arm: {of: steel, rectangle: {corner: [0 mm, {{Arm + Adhesive}} mm], size: [220 mm, {{Arm}} mm]} }
        joints:
          lower face: {layer: strong, upper: bottom of paste, lower: top of lower arm, element length: 1 mm}
          upper face: {layer: weak, upper: bottom of upper arm, lower: top of paste, starter crack: {from: start, length: 40 mm}, element length: 1 mm}
        grips:
          upper end: {on: left end of upper arm}
          lower end: {on: left end of lower arm}
          far end: {on: right end of lower arm}
        sequence:
          - fix: {far end: [x, y, rotation]}
          - turn: {grips: {upper end: -1, lower end: 1}, angle: 2.8 deg}
        keep: {curves of: [upper end], fields: none}
        """);
}
