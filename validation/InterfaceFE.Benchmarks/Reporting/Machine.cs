using System.Runtime.InteropServices;

namespace InterfaceFE.Benchmarks.Reporting;

/// <summary>The machine of a run.</summary>
public static class Machine
{
    private const string LinuxFile = "/proc/cpuinfo";

    /// <summary>The processor's model as the system names it; its architecture where it does not.</summary>
    public static string ProcessorModel()
    {
        string? line = File.Exists(LinuxFile) ? File.ReadLines(LinuxFile).FirstOrDefault(l => l.StartsWith("model name", StringComparison.Ordinal)) : null;
        return line is null ? RuntimeInformation.ProcessArchitecture.ToString() : line[(line.IndexOf(':', StringComparison.Ordinal) + 1)..].Trim();
    }
}
