using CloudStruct.Maths.Blocks;

namespace CloudStruct.Tests.Kit;

/// <summary>Exact draws of a correlated normal field at given places, by the Cholesky root of its covariance.</summary>
internal sealed class NoiseField
{
    private readonly double[] root;
    private readonly int n;

    /// <summary>Factorises the covariance of all pairs.</summary>
    public NoiseField(double[] u, double[] v, Func<double, double> covariance)
    {
        n = u.Length;
        root = new double[n * n];
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j <= i; j++)
            {
                double sum = covariance(Math.Sqrt(((u[i] - u[j]) * (u[i] - u[j])) + ((v[i] - v[j]) * (v[i] - v[j]))));
                if (i == j) sum *= 1 + 1e-9;
                for (int k = 0; k < j; k++) sum -= root[(i * n) + k] * root[(j * n) + k];
                root[(i * n) + j] = i == j ? Math.Sqrt(sum) : sum / root[(j * n) + j];
            }
        }
    }

    /// <summary>One field.</summary>
    public double[] Draw(ulong seed, ulong item)
    {
        var draws = new Draws(seed, 11, item);
        var white = new double[n];
        for (int i = 0; i < n; i++) white[i] = draws.NextNormal();
        var field = new double[n];
        for (int i = 0; i < n; i++)
        {
            for (int k = 0; k <= i; k++) field[i] += root[(i * n) + k] * white[k];
        }

        return field;
    }
}
