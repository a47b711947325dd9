using InterfaceFE.Benchmarks.Models;
using InterfaceFE.Benchmarks.Timing;
using MathNet.Numerics;
using MathNet.Numerics.LinearAlgebra.Double;
using MathNet.Numerics.LinearAlgebra.Double.Solvers;
using MathNet.Numerics.LinearAlgebra.Solvers;

namespace InterfaceFE.Benchmarks.Rivals;

/// <summary>Outcome of an iterative solve.</summary>
/// <param name="Converged">Whether the residual reached the tolerance.</param>
/// <param name="Milliseconds">Time of preconditioner and iteration [ms].</param>
/// <param name="Iterations">Iterations.</param>
/// <param name="RelativeResidual">True residual over the right side, Euclidean norms.</param>
public sealed record IterativeOutcome(bool Converged, double Milliseconds, int Iterations, double RelativeResidual);

/// <summary>MathNet's sparse solvers, which are iterative ones; it has no sparse direct solver. The only file that touches the package.</summary>
public static class IterativeSolvers
{
    /// <summary>Relative residual at which an answer counts.</summary>
    public const double Tolerance = 1e-8;

    // A guard only: the time limit comes first.
    private const int MostIterations = 10_000_000;

    private static readonly Dictionary<string, Func<IIterativeSolver<double>>> SolverMakers = new()
    {
        ["bicgstab"] = () => new BiCgStab(),
        ["tfqmr"] = () => new TFQMR(),
        ["gpbicg"] = () => new GpBiCg(),
        ["mlkbicgstab"] = () => new MlkBiCgStab(),
    };

    private static readonly Dictionary<string, Func<IPreconditioner<double>>> PreconditionerMakers = new()
    {
        ["ilu0"] = () => new MILU0Preconditioner(modified: false),
        ["diagonal"] = () => new DiagonalPreconditioner(),
    };

    /// <summary>Names of the solvers.</summary>
    public static IEnumerable<string> Solvers => SolverMakers.Keys;

    /// <summary>Names of the preconditioners.</summary>
    public static IEnumerable<string> Preconditioners => PreconditionerMakers.Keys;

    /// <summary>Version of the package.</summary>
    public static string Version => typeof(BiCgStab).Assembly.GetName().Version?.ToString(3) ?? "";

    /// <summary>Solves a system on one thread.</summary>
    /// <param name="solver">One of <see cref="Solvers"/>.</param>
    /// <param name="preconditioner">One of <see cref="Preconditioners"/>.</param>
    /// <param name="matrix">Matrix.</param>
    /// <param name="rightSide">Right side.</param>
    /// <param name="seconds">Limit of preconditioner and iteration, on the clock of <see cref="ThreadClock"/> [s].</param>
    public static IterativeOutcome Solve(string solver, string preconditioner, AssembledMatrix matrix, double[] rightSide, double seconds)
    {
        Control.UseSingleThread();
        SparseMatrix full = SparseMatrix.OfIndexed(matrix.Size, matrix.Size, Entries(matrix));
        DenseVector b = DenseVector.Create(matrix.Size, i => rightSide[i]), x = DenseVector.Create(matrix.Size, 0);
        int iterations = 0;
        double start = ThreadClock.Milliseconds();
        Iterator<double> iterator = new(
            new DelegateStopCriterion<double>((iteration, _, _, _) =>
            {
                iterations = iteration;
                return ThreadClock.Milliseconds() - start > 1000 * seconds ? IterationStatus.StoppedWithoutConvergence : IterationStatus.Continue;
            }),
            new ResidualStopCriterion<double>(0.5 * Tolerance),
            new IterationCountStopCriterion<double>(MostIterations));
        IPreconditioner<double> helper = PreconditionerMakers[preconditioner]();
        helper.Initialize(full);
        SolverMakers[solver]().Solve(full, b, x, iterator, helper);
        double time = ThreadClock.Milliseconds() - start;
        double residual = (b - full * x).L2Norm() / b.L2Norm();
        return new IterativeOutcome(residual <= Tolerance, time, iterations, residual);
    }

    private static IEnumerable<Tuple<int, int, double>> Entries(AssembledMatrix matrix)
    {
        for (int column = 0; column < matrix.Size; column++)
            for (int k = matrix.Start[column]; k < matrix.Start[column + 1]; k++)
            {
                yield return Tuple.Create(matrix.Rows[k], column, matrix.Values[k]);
                if (matrix.Rows[k] != column)
                    yield return Tuple.Create(column, matrix.Rows[k], matrix.Values[k]);
            }
    }
}
