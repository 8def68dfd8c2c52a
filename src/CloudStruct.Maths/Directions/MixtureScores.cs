using CloudStruct.Records.Frame;
using MathNet.Numerics.LinearAlgebra;

namespace CloudStruct.Maths.Directions;

/// <summary>Slopes and information of a mixture's likelihood, axis by axis. Parameters of a component: logarithm of its share
/// over the background's, turn of the mean toward wide and toward narrow [rad], one exponent (round) or two.</summary>
/// <remarks>The turn of an elongated shape about its own mean is left out: it is nearly independent of the mean.</remarks>
internal sealed class MixtureScores
{
    // What has less part in an axis moves no digit.
    private const double Least = 1e-9;

    private readonly AxisMixture mixture;
    private readonly int[] at;
    private readonly double[] share;
    private readonly double[] score;
    private readonly double[] one;
    private readonly double[][] own;

    public MixtureScores(AxisMixture mixture)
    {
        this.mixture = mixture;
        int k = mixture.Components.Length;
        at = new int[k];
        for (int c = 0; c < k; c++)
        {
            at[c] = Size;
            Size += mixture.Components[c].Round ? 4 : 5;
        }

        share = new double[k + 1];
        score = new double[Size];
        one = new double[Size];
        own = [.. mixture.Components.Select(c => new double[c.Round ? 3 : 4])];
    }

    /// <summary>Parameters.</summary>
    public int Size { get; }

    /// <summary>The turn of one component's mean in a vector of parameters [rad].</summary>
    public (double TowardWide, double TowardNarrow) Turn(Vector<double> parameters, int component) =>
        (parameters[at[component] + 1], parameters[at[component] + 2]);

    /// <summary>Adds what one axis tells.</summary>
    /// <param name="axis">Unit vector.</param>
    /// <param name="w">Its weight.</param>
    /// <param name="information">[in, out] Row-major.</param>
    /// <param name="scores">[in, out] Weighted slopes.</param>
    /// <param name="shares">[in, out] Weight times share in each component.</param>
    public void Add(Vec3 axis, double w, double[] information, double[] scores, double[] shares)
    {
        int k = at.Length;
        mixture.Shares(axis, share);
        Array.Clear(score);
        for (int c = 0; c < k; c++)
        {
            AxisComponent comp = mixture.Components[c];
            double r = share[c];
            score[at[c]] = r - comp.Share;
            information[at[c] * (Size + 1)] += w * comp.Share;
            if (r < Least) continue;
            shares[c] += w * r;
            double x = axis.Dot(comp.Wide), y = axis.Dot(comp.Narrow), z = axis.Dot(comp.Mean), px = -2 * comp.KWide, py = -2 * comp.KNarrow;
            double[] g = own[c];
            g[0] = px * x * z;
            g[1] = py * y * z;
            int first = at[c] + 1;
            information[first * (Size + 1)] += w * r * px * ((z * z) - (x * x));
            information[(first + 1) * (Size + 1)] += w * r * py * ((z * z) - (y * y));
            if (comp.Round)
            {
                g[2] = -0.5 * ((x * x) + (y * y) - (2 / px));
                information[(first + 2) * (Size + 1)] += w * r / (px * px);
            }
            else
            {
                g[2] = -0.5 * ((x * x) - (1 / px));
                g[3] = -0.5 * ((y * y) - (1 / py));
                information[(first + 2) * (Size + 1)] += w * r / (2 * px * px);
                information[(first + 3) * (Size + 1)] += w * r / (2 * py * py);
            }

            for (int j = 0; j < g.Length; j++) score[first + j] = r * g[j];
        }

        // Shares: a multinomial law, π's on the diagonal (above) less their products.
        for (int a = 0; a < k; a++)
        {
            for (int b = 0; b < k; b++) information[(at[a] * Size) + at[b]] -= w * mixture.Components[a].Share * mixture.Components[b].Share;
        }

        AddMissing(w, information);
        for (int j = 0; j < Size; j++) scores[j] += w * score[j];
    }

    /// <summary>Takes off the covariance of the complete-data slopes under the shares of the axis: Σ r g gᵀ - s sᵀ.</summary>
    private void AddMissing(double w, double[] information)
    {
        int k = at.Length;
        for (int z = 0; z <= k; z++)
        {
            if (share[z] < Least) continue;
            Array.Clear(one);
            for (int c = 0; c < k; c++) one[at[c]] = (c == z ? 1 : 0) - mixture.Components[c].Share;
            if (z < k) for (int j = 0; j < own[z].Length; j++) one[at[z] + 1 + j] = own[z][j];
            AddOuter(information, one, -w * share[z]);
        }

        AddOuter(information, score, w);
    }

    private static void AddOuter(double[] h, double[] v, double w)
    {
        for (int a = 0; a < v.Length; a++)
        {
            double va = w * v[a];
            if (va == 0) continue;
            int row = a * v.Length;
            for (int b = 0; b < v.Length; b++) h[row + b] += va * v[b];
        }
    }
}
