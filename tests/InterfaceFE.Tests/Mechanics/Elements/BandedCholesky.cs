namespace InterfaceFE.Tests.Mechanics.Elements;

/// <summary>Cholesky factor of a symmetric positive definite band matrix, so that element tests may refine beyond what a dense factor takes in seconds.</summary>
internal static class BandedCholesky
{
    /// <summary>Solves in place. rows[i][k] holds entry (i, i - k); both arguments are overwritten, the right side by the solution.</summary>
    public static void Solve(double[][] rows, double[] right)
    {
        int size = rows.Length, band = rows[0].Length - 1;
        for (int i = 0; i < size; i++)
        {
            double[] row = rows[i];
            for (int j = Math.Max(0, i - band); j <= i; j++)
            {
                double[] other = rows[j];
                double sum = row[i - j];
                for (int k = Math.Max(0, i - band); k < j; k++)
                    if (j - k <= band)
                        sum -= row[i - k] * other[j - k];
                if (i == j && !(sum > 0))
                    throw new InvalidOperationException($"the matrix of the test model is not positive definite at unknown {i}");
                row[i - j] = i == j ? Math.Sqrt(sum) : sum / other[0];
            }
        }
        for (int i = 0; i < size; i++)
        {
            for (int k = Math.Max(0, i - band); k < i; k++)
                right[i] -= rows[i][i - k] * right[k];
            right[i] /= rows[i][0];
        }
        for (int i = size - 1; i >= 0; i--)
        {
            right[i] /= rows[i][0];
            for (int k = Math.Max(0, i - band); k < i; k++)
                right[k] -= rows[i][i - k] * right[i];
        }
    }
}
