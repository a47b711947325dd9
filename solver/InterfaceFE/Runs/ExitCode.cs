namespace InterfaceFE.Runs;

/// <summary>What the program tells the caller when it ends.</summary>
public enum ExitCode
{
    /// <summary>Done. A specimen that came apart is a finished answer too.</summary>
    Done = 0,

    /// <summary>The deck or the call is wrong.</summary>
    WrongDeckOrCall = 1,

    /// <summary>A check or a comparison fell short.</summary>
    FellShort = 2,

    /// <summary>The run stopped before its end.</summary>
    StoppedEarly = 3,

    /// <summary>An error in the program.</summary>
    ProgramError = 4,

    /// <summary>Interrupted from outside.</summary>
    Interrupted = 130,
}
