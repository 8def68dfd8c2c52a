namespace CloudStruct.Maths.Fitting;

/// <summary>Cholesky factors of small dense matrices, row-major.</summary>
internal static class LowerTriangle
{
    /// <summary>Cholesky factor in place of a row-major symmetric matrix (lower triangle read); false when it is not positive.</summary>
    public static bool Factor(double[] m, int n, out double logDet)
    {
        logDet = 0;
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j <= i; j++)
            {
                double sum = m[(i * n) + j] - Dot(m.AsSpan(i * n, j), m.AsSpan(j * n, j));
                if (i != j)
                {
                    m[(i * n) + j] = sum / m[(j * n) + j];
                    continue;
                }

                if (!(sum > 1e-13 * Math.Abs(m[(i * n) + i])) || sum < 1e-300) return false;
                m[(i * n) + i] = Math.Sqrt(sum);
                logDet += Math.Log(sum);
            }
        }

        return true;
    }

    /// <summary>Solves L v = v in place.</summary>
    public static void Forward(double[] lower, int n, Span<double> v)
    {
        for (int i = 0; i < n; i++) v[i] = (v[i] - Dot(lower.AsSpan(i * n, i), v[..i])) / lower[(i * n) + i];
    }

    /// <summary>Inverse of L Lᵀ, row-major.</summary>
    public static double[] Inverse(double[] lower, int n)
    {
        var inverse = new double[n * n];
        var unit = new double[n];
        for (int j = 0; j < n; j++)
        {
            Array.Clear(unit);
            unit[j] = 1;
            Forward(lower, n, unit);
            for (int i = n - 1; i >= 0; i--)
            {
                double sum = unit[i];
                for (int k = i + 1; k < n; k++) sum -= lower[(k * n) + i] * unit[k];
                unit[i] = sum / lower[(i * n) + i];
            }

            for (int i = 0; i < n; i++) inverse[(i * n) + j] = unit[i];
        }

        return inverse;
    }

    // Four running sums in a fixed order: the processor overlaps them, and the result does not depend on its vector width.
    private static double Dot(ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        double s0 = 0, s1 = 0, s2 = 0, s3 = 0;
        int i = 0;
        for (; i + 4 <= a.Length; i += 4)
        {
            s0 += a[i] * b[i];
            s1 += a[i + 1] * b[i + 1];
            s2 += a[i + 2] * b[i + 2];
            s3 += a[i + 3] * b[i + 3];
        }

        for (; i < a.Length; i++) s0 += a[i] * b[i];
        return (s0 + s1) + (s2 + s3);
    }
}
