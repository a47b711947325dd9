using System.Diagnostics;
using System.Globalization;
using InterfaceFE.Benchmarks.Models;
using InterfaceFE.Benchmarks.Timing;

namespace InterfaceFE.Benchmarks.Rivals;

/// <summary>One configuration of CHOLMOD on one matrix.</summary>
/// <param name="Name">Method and order.</param>
/// <param name="FactorNonZeros">Entries of the factor, diagonal included.</param>
/// <param name="Flops">Sum of the squared column lengths of the factor.</param>
/// <param name="AnalysisMs">Time of the analysis [ms].</param>
public sealed record CholmodConfiguration(string Name, double FactorNonZeros, double Flops, double AnalysisMs)
{
    /// <summary>Times of factorisations [ms].</summary>
    public Samples Factor { get; } = new();

    /// <summary>Times of solves [ms].</summary>
    public Samples Solve { get; } = new();

    /// <summary>Median of factorisation plus that of solve [ms]; NaN where the matrix was refused.</summary>
    public double TotalMs => Factor.Median + Solve.Median;
}

/// <summary>
/// CHOLMOD on one matrix in a program of its own, one thread throughout: OpenBLAS and OpenMP are told so, and the thread limit keeps the OpenMP runtime from waiting in loops
/// that a bare thread count of one leaves it (measured: half of the time).
/// OpenBLAS chooses its kernels itself; forcing those for 512-bit vectors changed nothing (measured). The program waits for requests, so that its runs can alternate with the
/// engine's.
/// </summary>
public sealed class CholmodSession : IDisposable
{
    private readonly Process _program;
    private readonly Task<string> _errors;
    private readonly TemporaryFolder _folder;

    /// <summary>Starts the program on a matrix.</summary>
    /// <exception cref="RivalException">It broke off.</exception>
    public CholmodSession(CholmodProgram program, TemporaryFolder folder, AssembledMatrix matrix, double[] rightSide)
    {
        ArgumentNullException.ThrowIfNull(program);
        ArgumentNullException.ThrowIfNull(folder);
        ArgumentNullException.ThrowIfNull(matrix);
        _folder = folder;
        Size = matrix.Size;
        string file = folder.File("system");
        BinaryFiles.WriteSystem(file, matrix, rightSide);
        ProcessStartInfo start = new(program.Executable) { RedirectStandardInput = true, RedirectStandardOutput = true, RedirectStandardError = true };
        foreach (string variable in (string[])["OMP_NUM_THREADS", "OMP_THREAD_LIMIT", "OPENBLAS_NUM_THREADS"])
            start.Environment[variable] = "1";
        _program = Process.Start(start) ?? throw new RivalException("the compiled C program could not be started");
        _errors = _program.StandardError.ReadToEndAsync();
        Versions = string.Join(' ', Ask("versions", "versions"));
        Ask("open " + file, "opened");
    }

    /// <summary>Number of rows.</summary>
    public int Size { get; }

    /// <summary>Versions of the libraries.</summary>
    public string Versions { get; }

    /// <summary>The configurations; empty before <see cref="Analyze"/>.</summary>
    public IReadOnlyList<CholmodConfiguration> Configurations { get; private set; } = [];

    /// <summary>The fastest configuration by its medians.</summary>
    /// <exception cref="RivalException">All of them refused the matrix.</exception>
    public CholmodConfiguration Best => Configurations.Where(c => c.Factor.Count > 0).MinBy(c => c.TotalMs)
        ?? throw new RivalException("each configuration of CHOLMOD refused the matrix");

    /// <summary>Analyses the matrix in each configuration and runs each once, unmeasured: later runs find their memory in place.</summary>
    public void Analyze()
    {
        string[] answer = Ask("analyze", "analyzed");
        List<CholmodConfiguration> all = [];
        for (int i = 0; ; i++)
        {
            all.Add(new CholmodConfiguration(answer[0], Number(answer[1]), Number(answer[2]), Number(answer[3])));
            if (i == 3)
                break;
            answer = Read("analyzed");
        }
        Configurations = all;
        Ask("round", "round");
    }

    /// <summary>Factorises and solves once with each configuration. A configuration that refuses the matrix gets no sample.</summary>
    public void Round()
    {
        string[] answer = Ask("round", "round");
        for (int i = 0; i < Configurations.Count; i++)
        {
            if (answer[3 * i] != "0")
                continue;
            Configurations[i].Factor.Add(Number(answer[3 * i + 1]));
            Configurations[i].Solve.Add(Number(answer[3 * i + 2]));
        }
    }

    /// <summary>Solution of the last round.</summary>
    public double[] Solution()
    {
        string file = _folder.File("solution");
        Ask("solution " + file, "written");
        return BinaryFiles.ReadVector(file, Size);
    }

    /// <summary>Entries of the factor and flops under a given order of the rows.</summary>
    public (double FactorNonZeros, double Flops) CountOrder(int[] order)
    {
        string file = _folder.File("order");
        BinaryFiles.WriteOrder(file, order);
        string[] answer = Ask("order " + file, "ordered");
        return (Number(answer[0]), Number(answer[1]));
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        try
        {
            _program.StandardInput.Close();
        }
        catch (IOException)
        {
            // It has ended by itself.
        }
        if (!_program.WaitForExit(5000))
            _program.Kill();
        _program.Dispose();
    }

    private static double Number(string text) => double.Parse(text, CultureInfo.InvariantCulture);

    private string[] Ask(string request, string expected)
    {
        try
        {
            _program.StandardInput.WriteLine(request);
            _program.StandardInput.Flush();
        }
        catch (IOException cause)
        {
            throw new RivalException($"CHOLMOD broke off: {_errors.Result.Trim()}", cause);
        }
        return Read(expected);
    }

    private string[] Read(string expected)
    {
        string? line = _program.StandardOutput.ReadLine();
        string[] words = line?.Split(' ') ?? [];
        return words.Length > 0 && words[0] == expected ? words[1..] : throw new RivalException($"CHOLMOD broke off: {line ?? _errors.Result.Trim()}");
    }
}
