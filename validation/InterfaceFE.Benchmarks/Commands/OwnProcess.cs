using System.Diagnostics;
using System.Reflection;

namespace InterfaceFE.Benchmarks.Commands;

/// <summary>Runs this program once more, with other settings of the runtime or with a time limit that can end it.</summary>
public static class OwnProcess
{
    /// <summary>Runs it and gives what it printed; null where it failed or took too long.</summary>
    /// <param name="arguments">Arguments.</param>
    /// <param name="environment">Variables that it gets in addition.</param>
    /// <param name="limit">Wall-clock limit; the process is ended then.</param>
    public static string? Run(IEnumerable<string> arguments, IReadOnlyDictionary<string, string> environment, TimeSpan limit)
    {
        ArgumentNullException.ThrowIfNull(arguments);
        ArgumentNullException.ThrowIfNull(environment);
        if (Environment.ProcessPath is not { } path)
            return null;
        ProcessStartInfo start = new(path) { RedirectStandardOutput = true, RedirectStandardError = true };
        if (Path.GetFileNameWithoutExtension(path) == "dotnet")
            start.ArgumentList.Add(Assembly.GetExecutingAssembly().Location);
        foreach (string argument in arguments)
            start.ArgumentList.Add(argument);
        foreach ((string name, string value) in environment)
            start.Environment[name] = value;
        using Process? process = Process.Start(start);
        if (process is null)
            return null;
        Task<string> output = process.StandardOutput.ReadToEndAsync(), errors = process.StandardError.ReadToEndAsync();
        if (!process.WaitForExit(limit))
        {
            process.Kill();
            return null;
        }
        _ = errors.Result;
        return process.ExitCode == 0 ? output.Result : null;
    }
}
