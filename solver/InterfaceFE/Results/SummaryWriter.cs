using System.Text.Encodings.Web;
using System.Text.Json;

namespace InterfaceFE.Results;

/// <summary>summary.json: keys are words with their units. A number that is missing or not finite is null.</summary>
public static class SummaryWriter
{
    private static readonly JsonWriterOptions Options = new() { Indented = true, NewLine = "\n", Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    /// <summary>Writes the file as a whole: a reader finds the old one or the new one.</summary>
    /// <param name="path">File; its folder must exist.</param>
    /// <param name="summary">What to write.</param>
    public static void Write(string path, RunSummary summary) => WholeFile.Write(path, stream => Write(stream, summary));

    /// <summary>Writes the summary to a stream, as UTF-8 without byte order mark.</summary>
    public static void Write(Stream stream, RunSummary summary)
    {
        ArgumentNullException.ThrowIfNull(stream);
        ArgumentNullException.ThrowIfNull(summary);
        using (Utf8JsonWriter json = new(stream, Options))
        {
            json.WriteStartObject();
            json.WriteString("title", summary.Title);
            json.WriteString("status", SummaryWords.Of(summary.Status));
            json.WriteString("cause", summary.Cause);
            Check(json, summary.SelfCheck);
            Grips(json, summary.Grips);
            Event(json, "first damage", summary.FirstDamage);
            Event(json, "first yield", summary.FirstYield);
            Joints(json, summary.Joints);
            Adherends(json, summary.Adherends);
            Lines(json, "remarks", summary.Remarks);
            Lines(json, "warnings", summary.Warnings);
            Counts(json, summary);
            json.WriteEndObject();
        }
        stream.Write("\n"u8);
    }

    private static void Check(Utf8JsonWriter json, SelfCheck check)
    {
        json.WriteStartObject("self-check");
        json.WriteString("verdict", SummaryWords.Of(check.Verdict));
        Lines(json, "reasons", check.Reasons);
        Number(json, "balance", check.Balance);
        Number(json, "path error", check.PathError);
        Number(json, "disagreement of J", check.JDisagreement);
        Number(json, "elements per process zone", check.ElementsPerProcessZone);
        json.WriteNumber("unstable points", check.UnstablePoints);
        Number(json, "largest rotation [deg]", check.LargestRotationDegrees);
        json.WriteEndObject();
    }

    private static void Grips(Utf8JsonWriter json, List<GripSummary> grips)
    {
        json.WriteStartObject("grips");
        foreach (GripSummary grip in grips)
        {
            json.WriteStartObject(grip.Name);
            Number(json, "peak force [N]", grip.PeakForce);
            Number(json, "displacement at peak [mm]", grip.DisplacementAtPeak);
            if (grip.PeakPoint is { } point)
                json.WriteNumber("peak point", point);
            else
                json.WriteNull("peak point");
            Number(json, "largest stable force [N]", grip.LargestStableForce);
            Number(json, "displacement at largest stable force [mm]", grip.DisplacementAtLargestStable);
            Number(json, "peak moment [N mm]", grip.PeakMoment);
            Number(json, "rotation at peak [rad]", grip.RotationAtPeak);
            Number(json, "final force [N]", grip.FinalForce);
            Number(json, "final displacement [mm]", grip.FinalDisplacement);
            Number(json, "final moment [N mm]", grip.FinalMoment);
            Number(json, "final rotation [rad]", grip.FinalRotation);
            json.WriteEndObject();
        }
        json.WriteEndObject();
    }

    private static void Joints(Utf8JsonWriter json, List<JointSummary> joints)
    {
        json.WriteStartObject("joints");
        foreach (JointSummary joint in joints)
        {
            json.WriteStartObject(joint.Name);
            Number(json, "largest opening [mm]", joint.LargestOpening);
            Number(json, "largest sliding [mm]", joint.LargestSliding);
            Number(json, "largest peel strain", joint.LargestPeelStrain);
            Number(json, "largest shear strain", joint.LargestShearStrain);
            Number(json, "largest damage", joint.LargestDamage);
            Number(json, "largest peel traction [MPa]", joint.LargestPeel);
            Number(json, "largest shear traction [MPa]", joint.LargestShear);
            Number(json, "separated length [mm]", joint.SeparatedLength);
            Number(json, "element length [mm]", joint.ElementLength);
            Number(json, "elements per process zone", joint.ElementsPerProcessZone);
            json.WriteEndObject();
        }
        json.WriteEndObject();
    }

    private static void Adherends(Utf8JsonWriter json, List<AdherendSummary> adherends)
    {
        json.WriteStartObject("adherends");
        foreach (AdherendSummary adherend in adherends)
        {
            json.WriteStartObject(adherend.Name);
            Number(json, "largest equivalent stress [MPa]", adherend.LargestEquivalentStress);
            Number(json, "at x [mm]", adherend.X);
            Number(json, "at y [mm]", adherend.Y);
            json.WriteNumber("at point", adherend.Point);
            Number(json, "largest plastic strain", adherend.LargestPlasticStrain);
            json.WriteEndObject();
        }
        json.WriteEndObject();
    }

    private static void Event(Utf8JsonWriter json, string name, EventSummary? happened)
    {
        if (happened is null)
        {
            json.WriteNull(name);
            return;
        }
        json.WriteStartObject(name);
        json.WriteString("where", happened.Where);
        json.WriteNumber("point", happened.Point);
        json.WriteNumber("stage", happened.Stage);
        Number(json, "progress", happened.Progress);
        json.WriteEndObject();
    }

    private static void Counts(Utf8JsonWriter json, RunSummary summary)
    {
        json.WriteStartObject("counts");
        foreach ((string name, long count) in summary.Counts)
            json.WriteNumber(name, count);
        json.WriteEndObject();
        json.WriteStartObject("timings [s]");
        foreach ((string phase, double seconds) in summary.WallSeconds)
            Number(json, phase, seconds);
        json.WriteEndObject();
        json.WriteNumber("kernel width [bit]", summary.KernelWidth);
        json.WriteString("version", summary.Version);
        json.WriteString("deck hash", summary.DeckHash);
    }

    private static void Lines(Utf8JsonWriter json, string name, List<string> lines)
    {
        json.WriteStartArray(name);
        foreach (string line in lines)
            json.WriteStringValue(line);
        json.WriteEndArray();
    }

    private static void Number(Utf8JsonWriter json, string name, double? value)
    {
        if (value is { } number && double.IsFinite(number))
            json.WriteNumber(name, number);
        else
            json.WriteNull(name);
    }
}
