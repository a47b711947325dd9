namespace InterfaceFE.Results;

/// <summary>Takes records as they come, so that a run that is interrupted has kept all its points.</summary>
public interface IRecordSink
{
    /// <summary>An accepted point with its fronts and energies.</summary>
    void Write(PointRow point, IReadOnlyList<FrontRow> fronts, EnergyRow energy);

    /// <summary>An iteration.</summary>
    void Write(IterationRow iteration);

    /// <summary>Fields.</summary>
    void Write(FieldSnapshot fields);

    /// <summary>A line for the log.</summary>
    void Say(string line);
}
