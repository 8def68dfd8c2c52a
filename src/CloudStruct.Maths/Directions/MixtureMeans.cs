using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;
using MathNet.Numerics.LinearAlgebra;

namespace CloudStruct.Maths.Directions;

/// <summary>How well the means of a mixture's components are known.</summary>
/// <remarks>An axis near a border may belong to the background or a neighbour, and shares, shapes and all means are fitted
/// together: the variance of a mean is more than the scatter of its own axes over their number. It is taken from the whole
/// likelihood: information of the complete data less what not knowing the components costs (Louis 1982, J. R. Stat. Soc. B
/// 44, 226-233, from memory). Axes that belong together are left out together, one group after the other, each time by one
/// step of Newton's rule (jackknife): neither the law nor the independence of axes need hold exactly, and no share of a
/// small sample is lost. For a single cluster this is Σ d²/(n (n - 1)).</remarks>
public static class MixtureMeans
{
    // Leaving out one of more groups than this moves the information by less than a thousandth: the plain sandwich will do.
    private const int MostToLeaveOut = 1000;

    /// <summary>Covariance of the mean axis of each component as a unit vector [rad²], and the number of groups that it rests on.</summary>
    /// <param name="mixture">Fitted to the axes.</param>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">As long as the axes.</param>
    /// <param name="groups">Per axis a number ≥ 0: axes with the same number may share their errors.</param>
    /// <returns>Per component; NaN entries where the information is singular.</returns>
    public static (Symmetric3 Covariance, double Groups)[] Of(AxisMixture mixture, Vec3[] axes, double[] weights, int[] groups)
    {
        var sheet = new MixtureScores(mixture);
        int k = mixture.Components.Length, size = sheet.Size;
        int[][] members = [.. Enumerable.Range(0, axes.Length).GroupBy(i => groups[i]).OrderBy(g => g.Key).Select(g => g.ToArray())];
        double[] total = new double[size * size];
        double[][] scores = new double[members.Length][];
        double[][] shares = new double[members.Length][];
        for (int g = 0; g < members.Length; g++)
        {
            scores[g] = new double[size];
            shares[g] = new double[k];
            foreach (int i in members[g]) sheet.Add(axes[i], weights[i], total, scores[g], shares[g]);
        }

        Matrix<double> all = Matrix<double>.Build.Dense(size, size, total), inverse = all.Inverse();
        double[] own = new double[size * size], ignored = new double[size], ignoredShares = new double[k];
        var covariances = new Symmetric3[k];
        for (int g = 0; g < members.Length; g++)
        {
            Vector<double> score = Vector<double>.Build.Dense(scores[g]), plain = inverse * score, move = plain;
            if (members.Length <= MostToLeaveOut)
            {
                Array.Clear(own);
                foreach (int i in members[g]) sheet.Add(axes[i], weights[i], own, ignored, ignoredShares);
                move = (all - Matrix<double>.Build.Dense(size, size, own)).Solve(score);
            }

            for (int c = 0; c < k; c++)
            {
                (double a, double b) = sheet.Turn(move, c);
                (double a0, double b0) = sheet.Turn(plain, c);

                // A step that left the neighbourhood in which it means anything: twice the plain one instead.
                if (!(Math.Sqrt((a * a) + (b * b)) < 4 * Math.Sqrt((a0 * a0) + (b0 * b0)))) (a, b) = (2 * a0, 2 * b0);
                covariances[c] += Symmetric3.Outer((mixture.Components[c].Wide * a) + (mixture.Components[c].Narrow * b));
            }
        }

        var result = new (Symmetric3, double)[k];
        for (int c = 0; c < k; c++)
        {
            double sum = shares.Sum(s => s[c]), squares = shares.Sum(s => s[c] * s[c]), n = squares > 0 ? sum * sum / squares : 0;
            double small = members.Length <= MostToLeaveOut ? (n - 1) / n : n / (n - 1);
            result[c] = (n > 1 ? covariances[c] * small : covariances[c] * double.NaN, n);
        }

        return result;
    }
}
