using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace CloudStruct.Maths.Mixtures;

/// <summary>Small symmetric positive matrices, row-major in spans: the factor, its logarithmic determinant, distances.</summary>
public static class Cholesky
{
    /// <summary>Turns the lower triangle of a matrix into its factor L, a = L Lᵀ; false when it is not positive.</summary>
    public static bool Factor(Span<double> a, int d)
    {
        for (int j = 0; j < d; j++)
        {
            double s = a[(j * d) + j];
            for (int k = 0; k < j; k++) s -= a[(j * d) + k] * a[(j * d) + k];
            if (!(s > 0)) return false;
            double root = Math.Sqrt(s);
            a[(j * d) + j] = root;
            for (int i = j + 1; i < d; i++)
            {
                double t = a[(i * d) + j];
                for (int k = 0; k < j; k++) t -= a[(i * d) + k] * a[(j * d) + k];
                a[(i * d) + j] = t / root;
            }
        }

        return true;
    }

    /// <summary>ln det(L Lᵀ).</summary>
    public static double LogDeterminant(ReadOnlySpan<double> factor, int d)
    {
        double s = 0;
        for (int j = 0; j < d; j++) s += Math.Log(factor[(j * d) + j]);
        return 2 * s;
    }

    /// <summary>Solves L z = v in place; the squared length of z is vᵀ (L Lᵀ)⁻¹ v.</summary>
    /// <returns>The squared length.</returns>
    public static double Whiten(ReadOnlySpan<double> factor, int d, Span<double> v)
    {
        double sum = 0;
        for (int i = 0; i < d; i++)
        {
            double t = v[i];
            for (int k = 0; k < i; k++) t -= factor[(i * d) + k] * v[k];
            v[i] = t / factor[(i * d) + i];
            sum += v[i] * v[i];
        }

        return sum;
    }

    /// <summary>The same for four vectors at once, one in each lane; to the bit what <see cref="Whiten(ReadOnlySpan{double}, int, Span{double})"/> gives for each.</summary>
    /// <returns>The squared lengths.</returns>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<double> Whiten(ReadOnlySpan<double> factor, int d, Span<Vector256<double>> v)
    {
        unchecked
        {
            Vector256<double> sum = Vector256<double>.Zero;
            for (int i = 0; i < d; i++)
            {
                Vector256<double> t = v[i];
                ReadOnlySpan<double> row = factor.Slice(i * d, i + 1);
                for (int k = 0; k < row.Length - 1; k++) t -= Vector256.Create(row[k]) * v[k];
                t /= Vector256.Create(row[^1]);
                v[i] = t;
                sum += t * t;
            }

            return sum;
        }
    }
}
