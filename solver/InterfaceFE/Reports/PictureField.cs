namespace InterfaceFE.Reports;

/// <summary>What a picture of the deformed model shows in colour.</summary>
public enum PictureField
{
    /// <summary>Equivalent (von Mises) stress.</summary>
    EquivalentStress,

    /// <summary>Stress along x.</summary>
    StressXx,

    /// <summary>Stress along y.</summary>
    StressYy,

    /// <summary>Shear stress.</summary>
    StressXy,

    /// <summary>Equivalent plastic strain.</summary>
    PlasticStrain,

    /// <summary>Temperature.</summary>
    Temperature,
}
