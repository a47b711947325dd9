using InterfaceFE.Results;
using InterfaceFE.Runs;

namespace InterfaceFE.Variants;

/// <summary>What is kept of one deck of a batch: its row in variants.csv.</summary>
public sealed record VariantRow
{
    /// <summary>Name of the deck: its file without extension, and its folder of results.</summary>
    public required string Deck { get; init; }

    /// <summary>How its run ended.</summary>
    public required ExitCode Code { get; init; }

    /// <summary>Status in words: that of the run, or `not run`, `error in the program`.</summary>
    public required string Status { get; init; }

    /// <summary>Cause in words; empty when finished.</summary>
    public required string Cause { get; init; }

    /// <summary>Verdict of the self-check on the numbers; null without a run.</summary>
    public string? SelfCheck { get; init; }

    /// <summary>The main grip with its peak; null when none moves or without a run.</summary>
    public GripSummary? Grip { get; init; }

    /// <summary>First damage; null when none.</summary>
    public EventSummary? FirstDamage { get; init; }

    /// <summary>Adherends with their maxima.</summary>
    public IReadOnlyList<AdherendSummary> Adherends { get; init; } = [];

    /// <summary>Number of points; null without a run.</summary>
    public int? Points { get; init; }

    /// <summary>The row of a run.</summary>
    public static VariantRow Of(string deck, FileRunOutcome outcome)
    {
        ArgumentNullException.ThrowIfNull(outcome);
        if (outcome.Result is not { } result)
        {
            return new VariantRow
            {
                Deck = deck,
                Code = outcome.Code,
                Status = outcome.Code == ExitCode.ProgramError ? "error in the program" : "not run",
                Cause = string.Join("; ", outcome.Messages),
            };
        }
        RunSummary summary = result.Summary;
        IReadOnlyList<string> curves = result.History.CurvesOf;
        return new VariantRow
        {
            Deck = deck,
            Code = outcome.Code,
            Status = SummaryWords.Of(summary.Status),
            Cause = summary.Cause,
            SelfCheck = SummaryWords.Of(summary.SelfCheck.Verdict),
            Grip = curves.Count == 0 ? null : summary.Grips.Find(g => g.Name == curves[0]),
            FirstDamage = summary.FirstDamage,
            Adherends = summary.Adherends,
            Points = result.History.Points.Count,
        };
    }

    /// <summary>The row in one line for the terminal.</summary>
    public string Words()
    {
        string peak = Grip is { PeakForce: not null } pulled ? $", peak force {SummaryText.Number(pulled.PeakForce)} N at {SummaryText.Number(pulled.DisplacementAtPeak)} mm"
            : Grip is { PeakMoment: not null } turned ? $", peak moment {SummaryText.Number(turned.PeakMoment)} N·mm at {SummaryText.Number(turned.RotationAtPeak)} rad"
            : "";
        return $"{Deck}: {Status}{(SelfCheck is null ? "" : $", {SelfCheck}")}{peak}{(Cause.Length == 0 ? "" : $": {Cause}")}";
    }
}
