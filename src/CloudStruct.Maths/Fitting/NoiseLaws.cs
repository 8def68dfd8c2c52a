using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace CloudStruct.Maths.Fitting;

/// <summary>A family of laws of correlated error, weighed by what the residual waves of patches show.</summary>
/// <remarks>Residuals are smaller than errors, because the plane absorbs the long waves; so each wave's square is compared
/// with what a law makes expected for exactly that wave (restricted likelihood on a few low waves plus the rest of the
/// residual power), the variance is integrated out, and the error of the slopes is averaged over the laws.</remarks>
public sealed class NoiseLaws
{
    private static readonly double[] WhiteShares = [0, 0.15, 0.4];
    private static readonly double[] WaveShares = [0.25, 0.6];

    // The residual power beyond the waves has thousands of degrees of freedom on a large patch. Real errors follow no law
    // of the family exactly, so no more than this is believed; else the fine scales alone would decide about the coarse ones.
    private const double MostFineFreedom = 30;

    private readonly double[] table;   // correlated part of the covariance at unit variance, law by bin
    private readonly LagBins bins;

    /// <summary>Laws with lengths from the finest to the longest.</summary>
    /// <param name="bins">Distances of the patches' records.</param>
    /// <param name="finestM">Shortest correlation length [m].</param>
    /// <param name="longestM">Longest correlation length [m].</param>
    public NoiseLaws(LagBins bins, double finestM, double longestM)
    {
        this.bins = bins;
        int lengths = 2 + (int)Math.Max(0, Math.Round(Math.Log(longestM / finestM) / Math.Log(1.5)));
        var all = new List<NoiseCandidate>();
        foreach (CorrelationShape shape in Enum.GetValues<CorrelationShape>())
        {
            for (int i = 0; i < lengths; i++)
            {
                double length = finestM * Math.Pow(longestM / finestM, (double)i / (lengths - 1));
                foreach (double white in WhiteShares) all.Add(new NoiseCandidate(shape, length, white));
            }
        }

        // Short noise on an undulating surface: neither length alone explains both the fine and the coarse residuals.
        for (int i = 0; i < lengths / 2; i++)
        {
            double length = finestM * Math.Pow(longestM / finestM, (double)i / (lengths - 1));
            foreach (double share in WaveShares)
            {
                all.Add(new NoiseCandidate(CorrelationShape.Exponential, length, 0.1, share, longestM / 2));
                all.Add(new NoiseCandidate(CorrelationShape.Exponential, length, 0.1, share, 2 * longestM));
            }
        }

        Candidates = [.. all];
        table = new double[all.Count * bins.Count];
        for (int c = 0; c < all.Count; c++)
        {
            for (int b = 0; b < bins.Count; b++) table[(c * bins.Count) + b] = all[c].At(bins.DistanceM[b]);
        }
    }

    /// <summary>The laws.</summary>
    public NoiseCandidate[] Candidates { get; }

    /// <summary>All laws alike.</summary>
    /// <param name="variance">Typical variance of the errors [m²].</param>
    /// <param name="freedom">How firmly patches keep to it.</param>
    public NoisePrior Flat(double variance, double freedom) =>
        new([.. Candidates.Select(_ => -Math.Log(Candidates.Length))], [.. Candidates.Select(_ => 1.0 / Candidates.Length)], variance, freedom);

    /// <summary>Weighs the laws for one patch.</summary>
    /// <param name="patch">Its record.</param>
    /// <param name="variance">Typical variance of the scene [m²].</param>
    /// <param name="freedom">Its degrees of freedom.</param>
    /// <returns>Log likelihood of each law with the variance integrated out, the slopes' variances under it, and so on.</returns>
    public NoiseLikelihood Weigh(PatchRecord patch, double variance, double freedom)
    {
        var result = new NoiseLikelihood(Candidates.Length);
        for (int c = 0; c < Candidates.Length; c++) WeighOne(patch, c, variance, freedom, result);
        return result;
    }

    /// <summary>Shares of the laws in the scene, by expectation and maximisation over its patches, mixed half and half with no
    /// preference, so that a patch unlike the rest can still be told.</summary>
    /// <param name="patches">Likelihoods of the patches.</param>
    /// <param name="flat">The prior under which they were weighed.</param>
    public NoisePrior Learn(IReadOnlyList<NoiseLikelihood> patches, NoisePrior flat)
    {
        int n = Candidates.Length;
        var share = new double[n];
        Array.Fill(share, 1.0 / n);
        for (int round = 0; round < 30 && patches.Count > 0; round++)
        {
            var next = new double[n];
            foreach (NoiseLikelihood p in patches)
            {
                double[] posterior = p.Posterior([.. share.Select(s => Math.Log(Math.Max(s, 1e-300)))]);
                for (int c = 0; c < n; c++) next[c] += posterior[c] / patches.Count;
            }

            share = next;
        }

        return flat with { LogShare = [.. share.Select(s => Math.Log((0.5 * s) + (0.5 / n)))], Share = share };
    }

    /// <summary>Expected squares of a patch's waves under the mean law of the scene, for errors of variance 1.</summary>
    public double[] ExpectedSquares(PatchRecord patch, NoisePrior prior)
    {
        double white = 0;
        var covariance = new double[bins.Count];
        for (int c = 0; c < Candidates.Length; c++)
        {
            white += prior.Share[c] * Candidates[c].WhiteShare;
            for (int b = 0; b < bins.Count; b++) covariance[b] += prior.Share[c] * table[(c * bins.Count) + b];
        }

        var expected = new double[patch.Waves];
        for (int k = 0; k < patch.Waves; k++)
        {
            expected[k] = white * patch.WhiteShare[k];
            for (int b = 0; b < bins.Count; b++) expected[k] += covariance[b] * patch.LagSums[(b * PatchRecord.Lanes) + k];
        }

        return expected;
    }

    /// <summary>Error of a patch's slopes under a prior.</summary>
    public SlopeError Slopes(NoiseLikelihood likelihood, NoisePrior prior)
    {
        double[] posterior = likelihood.Posterior(prior.LogShare);
        double uu = 0, vv = 0, uv = 0, error = 0, logLength = 0;
        for (int c = 0; c < posterior.Length; c++)
        {
            double p = posterior[c];
            uu += p * likelihood.SlopeU[c];
            vv += p * likelihood.SlopeV[c];
            uv += p * likelihood.SlopeUv[c];
            error += p * likelihood.Variance[c];
            logLength += p * Math.Log(Candidates[c].LengthM);
        }

        return new SlopeError(uu, vv, uv, Stretch(posterior, likelihood, uu + vv), error, Math.Exp(logLength));
    }

    private void WeighOne(PatchRecord patch, int law, double variance, double freedom, NoiseLikelihood result)
    {
        double white = Candidates[law].WhiteShare;
        double pairs = patch.WhiteShare[0] * ((white * white) + (2 * white * (1 - white)));   // sum of squared correlations
        Span<Vector256<double>> sum = stackalloc Vector256<double>[PatchRecord.Lanes / 4];
        sum.Clear();
        ReadOnlySpan<Vector256<double>> rows = MemoryMarshal.Cast<double, Vector256<double>>(patch.LagSums.AsSpan());
        for (int b = 0; b < bins.Count; b++)
        {
            double value = table[(law * bins.Count) + b];
            if (value < 1e-9) break;   // every law falls with distance
            ReadOnlySpan<Vector256<double>> row = rows.Slice(b * sum.Length, sum.Length);
            for (int k = 0; k < sum.Length; k++) sum[k] += value * row[k];
            pairs += value * value * patch.LagSums[b * PatchRecord.Lanes];
        }

        Span<double> expected = stackalloc double[PatchRecord.Lanes];
        for (int k = 0; k < expected.Length; k++) expected[k] = sum[k / 4][k % 4];
        for (int k = 0; k < patch.Waves; k++) expected[k] += white * patch.WhiteShare[k];

        double log = 0, power = freedom * variance, degrees = freedom, inWaves = 0, inWavesSquared = 0, seen = 0;
        for (int k = 0; k < patch.Waves; k++)
        {
            double e = Math.Max(expected[k], 1e-12);
            inWaves += e;
            inWavesSquared += e * e;
            if (k < 3) continue;
            seen += patch.Squares[k];
            log -= 0.5 * Math.Log(e);
            power += patch.Squares[k] / e;
            degrees++;
        }

        double fine = 1 - inWaves, fineSquared = pairs - inWavesSquared;
        if (fine > 0.02 && fineSquared > 0)
        {
            double f = Math.Min(MostFineFreedom, fine * fine / fineSquared);
            double observed = Math.Max(patch.MeanSquare - seen, 1e-3 * patch.MeanSquare);

            // A gamma law of mean fine * variance: variance enters like any other squared wave.
            log += (0.5 * f * Math.Log(f * observed / (2 * fine))) - MathNet.Numerics.SpecialFunctions.GammaLn(f / 2);
            power += f * observed / fine;
            degrees += f;
        }

        log += MathNet.Numerics.SpecialFunctions.GammaLn(degrees / 2) - (0.5 * degrees * Math.Log(power / 2));
        double posterior = power / degrees;
        result.Log[law] = log;
        result.Freedom[law] = degrees;
        result.Variance[law] = posterior;
        double u = patch.SpreadU, v = patch.SpreadV;
        result.SlopeU[law] = posterior * Math.Max(expected[1], 1e-12) / (u * u);
        result.SlopeV[law] = posterior * Math.Max(expected[2], 1e-12) / (v * v);
        result.SlopeUv[law] = posterior * expected[PatchRecord.CrossLane] / (u * v);
    }

    // The radius that holds 95 % of a mixture of bivariate t laws, over that of the normal law with the same mean variance.
    private static double Stretch(double[] posterior, NoiseLikelihood likelihood, double trace)
    {
        if (!(trace > 0)) return 1;
        double low = 0.3, high = 10;
        for (int i = 0; i < 40; i++)
        {
            double middle = Math.Sqrt(low * high), r2 = middle * middle * -2 * Math.Log(0.05), outside = 0;
            for (int c = 0; c < posterior.Length; c++)
            {
                if (posterior[c] < 1e-6) continue;
                double variance = (likelihood.SlopeU[c] + likelihood.SlopeV[c]) / trace, f = likelihood.Freedom[c];
                outside += posterior[c] * Math.Pow(1 + (r2 / (f * variance)), -f / 2);
            }

            if (outside > 0.05) low = middle;
            else high = middle;
        }

        return Math.Sqrt(low * high);
    }
}
