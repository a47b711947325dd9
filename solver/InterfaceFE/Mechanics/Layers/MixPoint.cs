namespace InterfaceFE.Mechanics.Layers;

/// <summary>The bilinear law at one mix in the energy norm e.</summary>
/// <param name="Mix">B.</param>
/// <param name="OnsetEnergy">Y0 [N/mm].</param>
/// <param name="Toughness">G_c [N/mm].</param>
/// <param name="OnsetByTurn">dY0/dp, p a variable of the mixing rule that says where between the modes the point lies.</param>
/// <param name="ToughnessByTurn">dG_c/dp.</param>
/// <param name="TurnByPeel">e·∂p/∂(√K_I·w).</param>
/// <param name="TurnByShear">e·∂p/∂(√K_II·v).</param>
internal readonly record struct MixPoint(double Mix, double OnsetEnergy, double Toughness, double OnsetByTurn, double ToughnessByTurn, double TurnByPeel, double TurnByShear)
{
    private double Onset => Math.Sqrt(2 * OnsetEnergy);

    private double End => 2 * Toughness / Onset;

    /// <summary>r = e0/ef.</summary>
    private double Ratio => OnsetEnergy / Toughness;

    /// <summary>d at a norm e.</summary>
    public double Damage(double e) => e <= Onset ? 0 : e >= End ? 1 : e > 0 ? End * (e - Onset) / (e * (End - Onset)) : double.NaN;

    /// <summary>1 - d without cancellation.</summary>
    public double Integrity(double e) => e >= End ? 0 : Onset * (End - e) / (e * (End - Onset));

    /// <summary>∂d/∂e.</summary>
    public double DamageByNorm(double e) => End * Onset / (e * e * (End - Onset));

    /// <summary>∂d/∂p through onset and end.</summary>
    public double DamageByTurn(double e)
    {
        double onset = Onset, end = End, span = end - onset, damage = Damage(e);
        double onsetByTurn = OnsetByTurn / onset, endByTurn = 2 * ToughnessByTurn / onset - end * onsetByTurn / onset;
        return (damage - end / e) / span * onsetByTurn - damage * onset / (end * span) * endByTurn;
    }

    /// <summary>Share of G_c spent at a damage.</summary>
    public double Share(double damage) => damage >= 1 ? 1 : Ratio * damage / (1 - damage * (1 - Ratio));

    /// <summary>Energy spent from one damage to another at this mix [N/mm].</summary>
    public double Spent(double from, double to) => Toughness * Math.Max(0, Share(to) - Share(from));

    /// <summary>d spent/d damage = ½·e² on the growing branch [N/mm].</summary>
    public double Release(double damage)
    {
        double left = 1 - damage * (1 - Ratio);
        return OnsetEnergy / (left * left);
    }

    /// <summary>∂ spent/∂p.</summary>
    public double SpentByTurn(double from, double to)
    {
        double ratioByTurn = (OnsetByTurn - Ratio * ToughnessByTurn) / Toughness;
        return ToughnessByTurn * Math.Max(0, Share(to) - Share(from)) + Toughness * ratioByTurn * (ShareByRatio(to) - ShareByRatio(from));
    }

    private double ShareByRatio(double damage)
    {
        double left = 1 - damage * (1 - Ratio);
        return damage * (1 - damage) / (left * left);
    }
}
