using System.Diagnostics;
using System.Globalization;
using InterfaceFE.Tests.Results;
using Xunit;

namespace InterfaceFE.Tests.Cli;

/// <summary>The built program as a process of its own.</summary>
[Collection(DiskCollection.Name)]
public class ProcessTests
{
    [Fact]
    public async Task Process_that_is_told_to_terminate_writes_what_it_found_and_ends_with_130()
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "Windows has no such signal.");
        using TemporaryFolder temporary = new();
        string deck = temporary.File("deck.yaml"), into = temporary.File("out");
        await File.WriteAllTextAsync(deck, TinyDeck.Text("first stride: 1e-6, largest stride: 1e-6, most points: 1000000"), TestContext.Current.CancellationToken);
        using Process process = Start("run", deck, "--into", into);
        try
        {
            Task<string> output = process.StandardOutput.ReadToEndAsync(TestContext.Current.CancellationToken);
            string? line = "";
            while (line is not null && !line.Contains("point 10:", StringComparison.Ordinal))
                line = await process.StandardError.ReadLineAsync(TestContext.Current.CancellationToken);
            Assert.NotNull(line);
            using Process kill = Process.Start("kill", ["-TERM", process.Id.ToString(CultureInfo.InvariantCulture)]);
            string rest = await process.StandardError.ReadToEndAsync(TestContext.Current.CancellationToken);
            await process.WaitForExitAsync(TestContext.Current.CancellationToken);
            Assert.Equal(130, process.ExitCode);
            Assert.Contains("stopping", rest, StringComparison.Ordinal);
            Assert.Contains("interrupted", await output, StringComparison.Ordinal);
            Assert.Contains("\"interrupted\"", await File.ReadAllTextAsync(Path.Join(into, "summary.json"), TestContext.Current.CancellationToken), StringComparison.Ordinal);
            Assert.True(File.ReadLines(Path.Join(into, "grips.csv")).Count() >= 12);
        }
        finally
        {
            if (!process.HasExited)
                process.Kill();
        }
    }

    private static Process Start(params string[] args)
    {
        ProcessStartInfo start = new("dotnet") { RedirectStandardError = true, RedirectStandardOutput = true };
        start.ArgumentList.Add(typeof(InterfaceFE.Cli.CommandLine).Assembly.Location);
        foreach (string arg in args)
            start.ArgumentList.Add(arg);
        return Process.Start(start)!;
    }
}
