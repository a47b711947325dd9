using System.Diagnostics;
using System.Runtime.InteropServices;

namespace InterfaceFE.Benchmarks.Timing;

/// <summary>Processor time of the calling thread, so that others on the machine disturb little; wall-clock time where the system offers none.</summary>
public static partial class ThreadClock
{
    // CLOCK_THREAD_CPUTIME_ID of Linux.
    private const int ThreadProcessorTime = 3;

    /// <summary>Whether readings are processor time of the thread.</summary>
    public static bool IsProcessorTime { get; } = OperatingSystem.IsLinux() && Environment.Is64BitProcess;

    /// <summary>What the readings are, in words.</summary>
    public static string Description => IsProcessorTime ? "processor time of the working thread" : "wall-clock time (this system gives no processor time of a thread)";

    /// <summary>Milliseconds from an arbitrary start.</summary>
    public static double Milliseconds()
    {
        if (IsProcessorTime && GetTime(ThreadProcessorTime, out TimeSpec time) == 0)
            return time.Seconds * 1e3 + time.Nanoseconds * 1e-6;
        return WallMilliseconds();
    }

    /// <summary>Wall-clock milliseconds from an arbitrary start.</summary>
    public static double WallMilliseconds() => Stopwatch.GetTimestamp() * (1e3 / Stopwatch.Frequency);

    [LibraryImport("libc", EntryPoint = "clock_gettime")]
    private static partial int GetTime(int clock, out TimeSpec time);

    [StructLayout(LayoutKind.Sequential)]
    private readonly struct TimeSpec
    {
        public readonly long Seconds;
        public readonly long Nanoseconds;
    }
}
