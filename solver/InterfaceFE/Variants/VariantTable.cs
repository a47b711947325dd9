using System.Text;
using InterfaceFE.Results;

namespace InterfaceFE.Variants;

/// <summary>variants.csv: a row per deck; a column of stress for each adherend of any deck. Empty where a deck has no such value.</summary>
internal static class VariantTable
{
    private static readonly string[] Fixed =
    [
        "deck", "status", "cause", "exit code", "self-check", "grip", "peak force [N]", "displacement at peak [mm]", "peak moment [N mm]", "rotation at peak [rad]",
        "first damage stage", "first damage progress", "first damage at", "points",
    ];

    /// <summary>Writes the table as a whole: a reader finds the old one or the new one.</summary>
    public static void Write(string path, IReadOnlyList<VariantRow> rows)
    {
        string[] adherends = [.. rows.SelectMany(row => row.Adherends.Select(a => a.Name)).Distinct(StringComparer.Ordinal)];
        WholeFile.Write(path, stream =>
        {
            using CsvTable table = new(new StreamWriter(stream, new UTF8Encoding(false), leaveOpen: true), [.. Fixed, .. adherends.Select(name => $"{name} highest equivalent stress [MPa]")]);
            foreach (VariantRow row in rows)
                Write(table, row, adherends);
        });
    }

    private static void Write(CsvTable table, VariantRow row, string[] adherends)
    {
        table.Add(row.Deck).Add(row.Status).Add(row.Cause).Add((int)row.Code).Add(row.SelfCheck).Add(row.Grip?.Name);
        table.Add(row.Grip?.PeakForce).Add(row.Grip?.DisplacementAtPeak).Add(row.Grip?.PeakMoment).Add(row.Grip?.RotationAtPeak);
        table.Add((double?)row.FirstDamage?.Stage).Add(row.FirstDamage?.Progress).Add(row.FirstDamage?.Where).Add((double?)row.Points);
        foreach (string name in adherends)
            table.Add(row.Adherends.FirstOrDefault(a => a.Name == name)?.LargestEquivalentStress);
        table.EndRow();
    }
}
