using System.ComponentModel;
using System.Diagnostics;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>Fields written by a run are read by two independent readers of the open VTU format, where they are installed.</summary>
public sealed class FieldReadersCase : ICase
{
    private static readonly string[] Interpreters = ["/usr/bin/python3", "python3", "python"];

    /// <inheritdoc/>
    public string Name => "field-readers";

    /// <inheritdoc/>
    public string Group => "Outputs";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        const string What = "fields of a peel coupon read by VTK and meshio: faults";
        if (Interpreters.FirstOrDefault(p => Start(p, ["-c", "import vtk, meshio"]).ExitCode == 0) is not { } python)
        {
            yield return CaseLine.Skipped(What, "no Python with vtk and meshio on this machine (Debian: python3-vtk9, python3-meshio)");
            yield break;
        }
        string folder = Directory.CreateTempSubdirectory("interfacefe-").FullName;
        try
        {
            DeckReading reading = DeckReader.Read(Path.Combine(context.Root, "inputs", "coupons", "peel-epoxy.yaml"));
            new FolderRun(folder, _ => { }).Execute(reading.Deck ?? throw new InvalidOperationException(string.Join("; ", reading.Problems)), [], default);
            (int code, string said) = Start(python, [Path.Combine(context.Root, "validation", "read_fields.py"), folder]);
            context.Say("  read_fields.py: " + said);
            yield return CaseLine.AtMost($"{What} ({said})", 0, code, "", "both readers must agree on points, cells and arrays");
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    private static (int ExitCode, string Said) Start(string program, string[] arguments)
    {
        try
        {
            var info = new ProcessStartInfo(program, arguments) { RedirectStandardOutput = true, RedirectStandardError = true };
            using Process process = Process.Start(info) ?? throw new InvalidOperationException($"{program} did not start");
            Task<string> errors = process.StandardError.ReadToEndAsync();
            string said = process.StandardOutput.ReadToEnd();
            process.WaitForExit();
            return (process.ExitCode, (said + errors.Result).Trim().ReplaceLineEndings("; "));
        }
        catch (Win32Exception)
        {
            return (-1, "");
        }
    }
}
