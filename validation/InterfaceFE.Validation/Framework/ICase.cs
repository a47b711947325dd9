namespace InterfaceFE.Validation.Framework;

/// <summary>A case: one or more runs or calculations whose results are compared with values the code did not produce. Found by reflection; needs a constructor without parameters.</summary>
public interface ICase
{
    /// <summary>Name in lower-case words joined by hyphens; unique; what the command line takes.</summary>
    string Name { get; }

    /// <summary>Group of the report under which the case stands, in words.</summary>
    string Group { get; }

    /// <summary>Whether the case belongs to <c>all --quick</c>.</summary>
    bool Quick { get; }

    /// <summary>Runs the case. Lines are handed out one by one, so that a case that fails half way keeps what it had.</summary>
    /// <param name="context">What a case may use; says whether the run is a quick one.</param>
    IEnumerable<CaseLine> Run(CaseContext context);
}
