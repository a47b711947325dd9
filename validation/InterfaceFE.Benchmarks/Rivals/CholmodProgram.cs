using System.ComponentModel;
using System.Diagnostics;

namespace InterfaceFE.Benchmarks.Rivals;

/// <summary>The small C program around CHOLMOD, compiled where compiler and library are installed.</summary>
/// <param name="Executable">The compiled program.</param>
public sealed record CholmodProgram(string Executable)
{
    private static readonly string Source = Path.Combine(AppContext.BaseDirectory, "Rivals", "cholmod_session.c");
    private const string HowToGetIt = "on Debian: apt-get install gcc libsuitesparse-dev libopenblas0-pthread";

    /// <summary>Compiles the program into a folder.</summary>
    /// <exception cref="RivalException">The compiler or the library is missing; the message says how to get it.</exception>
    public static CholmodProgram Compile(TemporaryFolder folder)
    {
        ArgumentNullException.ThrowIfNull(folder);
        string executable = folder.File("cholmod_session");
        ProcessStartInfo start = new("cc") { RedirectStandardError = true, RedirectStandardOutput = true };
        foreach (string argument in (string[])["-O2", "-I/usr/include/suitesparse", Source, "-o", executable, "-lcholmod", "-ldl"])
            start.ArgumentList.Add(argument);
        try
        {
            using Process compiler = Process.Start(start) ?? throw new RivalException("the C compiler cc could not be started");
            Task<string> errors = compiler.StandardError.ReadToEndAsync();
            compiler.StandardOutput.ReadToEnd();
            compiler.WaitForExit();
            if (compiler.ExitCode == 0)
                return new CholmodProgram(executable);
            string? first = errors.Result.Split('\n').FirstOrDefault(line => line.Contains("error", StringComparison.Ordinal));
            throw new RivalException(errors.Result.Contains("cholmod.h", StringComparison.Ordinal) || errors.Result.Contains("-lcholmod", StringComparison.Ordinal)
                ? $"SuiteSparse with its headers is not installed ({HowToGetIt})"
                : $"the C program does not compile here: {first}");
        }
        catch (Win32Exception cause)
        {
            throw new RivalException($"there is no C compiler called cc ({HowToGetIt})", cause);
        }
    }
}
