namespace InterfaceFE.Results;

/// <summary>The words for how a run ended and for the verdict on its numbers, as summary.json and the terminal show them.</summary>
public static class SummaryWords
{
    /// <summary>`finished`, `stopped early`, `severed` or `interrupted`.</summary>
    public static string Of(RunStatus status) => status switch
    {
        RunStatus.Finished => "finished",
        RunStatus.StoppedEarly => "stopped early",
        RunStatus.Severed => "severed",
        RunStatus.Interrupted => "interrupted",
        _ => throw new ArgumentOutOfRangeException(nameof(status), status, "not a status"),
    };

    /// <summary>`numbers hold`, `hold with care` or `do not hold`.</summary>
    public static string Of(Verdict verdict) => verdict switch
    {
        Verdict.NumbersHold => "numbers hold",
        Verdict.HoldWithCare => "hold with care",
        Verdict.DoNotHold => "do not hold",
        _ => throw new ArgumentOutOfRangeException(nameof(verdict), verdict, "not a verdict"),
    };
}
