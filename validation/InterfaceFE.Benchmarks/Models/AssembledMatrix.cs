using InterfaceFE.Sparse;

namespace InterfaceFE.Benchmarks.Models;

/// <summary>
/// The summed matrix of a model without its held unknowns: upper triangle, column after column, rows rising. Slots that are zero throughout (open cracks) leave no entries,
/// so that another solver need not carry them.
/// </summary>
public sealed class AssembledMatrix
{
    private AssembledMatrix(int[] start, int[] rows, double[] values, int[] unknowns)
    {
        Start = start;
        Rows = rows;
        Values = values;
        Unknowns = unknowns;
    }

    /// <summary>Number of rows.</summary>
    public int Size => Unknowns.Length;

    /// <summary>Start of each column, one more entry than columns.</summary>
    public int[] Start { get; }

    /// <summary>Rows, at most the column's number.</summary>
    public int[] Rows { get; }

    /// <summary>Values, in the same order.</summary>
    public double[] Values { get; }

    /// <summary>The model's unknown of each row.</summary>
    public int[] Unknowns { get; }

    /// <summary>Sums a model's slots.</summary>
    public static AssembledMatrix From(BenchmarkModel model)
    {
        ArgumentNullException.ThrowIfNull(model);
        SlotPattern pattern = model.Pattern;
        var isHeld = new bool[pattern.UnknownCount];
        foreach (int unknown in model.Held)
            isHeld[unknown] = true;
        int[] unknowns = [.. Enumerable.Range(0, pattern.UnknownCount).Where(unknown => !isHeld[unknown])];
        var rowOf = new int[pattern.UnknownCount];
        Array.Fill(rowOf, -1);
        for (int row = 0; row < unknowns.Length; row++)
            rowOf[unknowns[row]] = row;

        var start = new long[unknowns.Length + 1];
        Visit(model, rowOf, (_, column, _) => start[column + 1]++);
        for (int column = 0; column < unknowns.Length; column++)
            start[column + 1] += start[column];
        var rows = new int[start[^1]];
        var values = new double[start[^1]];
        long[] fill = [.. start];
        Visit(model, rowOf, (row, column, value) =>
        {
            rows[fill[column]] = row;
            values[fill[column]++] = value;
        });
        return Merge(start, rows, values, unknowns);
    }

    /// <summary>A vector of the model's unknowns without the held ones.</summary>
    public double[] Restrict(double[] ofModel) => [.. Unknowns.Select(unknown => ofModel[unknown])];

    /// <summary>|b - A x| / (|A| |x| + |b|) in the largest norm.</summary>
    public double BackwardError(double[] b, double[] x)
    {
        var product = new double[Size];
        var rowSum = new double[Size];
        for (int column = 0; column < Size; column++)
            for (int k = Start[column]; k < Start[column + 1]; k++)
            {
                product[Rows[k]] += Values[k] * x[column];
                rowSum[Rows[k]] += Math.Abs(Values[k]);
                if (Rows[k] == column)
                    continue;
                product[column] += Values[k] * x[Rows[k]];
                rowSum[column] += Math.Abs(Values[k]);
            }
        double residual = 0, largestX = 0, largestB = 0;
        for (int i = 0; i < Size; i++)
        {
            residual = Math.Max(residual, Math.Abs(b[i] - product[i]));
            largestX = Math.Max(largestX, Math.Abs(x[i]));
            largestB = Math.Max(largestB, Math.Abs(b[i]));
        }
        return residual / (rowSum.Max() * largestX + largestB);
    }

    private static void Visit(BenchmarkModel model, int[] rowOf, Action<int, int, double> visit)
    {
        for (int slot = 0; slot < model.Matrices.Length; slot++)
        {
            double[] matrix = model.Matrices[slot];
            if (matrix.AsSpan().IndexOfAnyExcept(0.0) < 0)
                continue;
            ReadOnlySpan<int> own = model.Pattern.Unknowns(slot);
            for (int r = 0; r < own.Length; r++)
                for (int c = 0; c < own.Length; c++)
                    if (rowOf[own[r]] >= 0 && rowOf[own[r]] <= rowOf[own[c]])
                        visit(rowOf[own[r]], rowOf[own[c]], matrix[r * own.Length + c]);
        }
    }

    private static AssembledMatrix Merge(long[] start, int[] rows, double[] values, int[] unknowns)
    {
        var mergedStart = new int[start.Length];
        int filled = 0;
        for (int column = 0; column < unknowns.Length; column++)
        {
            int from = (int)start[column], count = (int)(start[column + 1] - start[column]);
            Array.Sort(rows, values, from, count);
            for (int k = from; k < from + count; k++)
            {
                if (filled > mergedStart[column] && rows[filled - 1] == rows[k])
                    values[filled - 1] += values[k];
                else
                    (rows[filled], values[filled++]) = (rows[k], values[k]);
            }
            mergedStart[column + 1] = filled;
        }
        return new AssembledMatrix(mergedStart, rows[..filled], values[..filled], unknowns);
    }
}
