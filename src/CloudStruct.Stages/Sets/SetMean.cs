using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;
using MathNet.Numerics.Distributions;

namespace CloudStruct.Stages.Sets;

/// <summary>Mean axis of a set with the cone that holds the true one.</summary>
/// <param name="Tensor">Weighted orientation tensor of the planes' poles; its first eigenvector is the mean.</param>
/// <param name="Kappa">Fisher's (n - 1)/(n - R) of the poles turned to the side of the mean, n the effective number.</param>
/// <param name="Cone95Deg">Half-angle of the 95 % cone of the mean [deg], 90 when nothing is known.</param>
internal sealed record SetMean(OrientationTensor Tensor, double Kappa, double Cone95Deg)
{
    /// <summary>Mean of planes.</summary>
    /// <param name="axes">Unit poles of either sign.</param>
    /// <param name="weights">As long, above 0.</param>
    /// <param name="lost">Share of the set's law whose planes were given to the background or a neighbour, 0 to 1.</param>
    /// <remarks>The variance of the mean is taken from how the planes scatter about it, Σ w² d dᵀ / (Σ w)² with the
    /// small-sample factor n/(n - 1): it holds the natural scatter and the error of each plane together, whatever their
    /// shares, and needs no law. The radius is that of a bivariate normal law (the two directions may differ), widened
    /// from chi-square to F for the variance being estimated; its degrees of freedom are 2 (n - 1) for a round set, as in
    /// Fisher's exact cone, and fewer for an elongated one (Satterthwaite). Without its outer share q a bivariate normal law keeps
    /// 1 + q ln q / (1 - q) of its variance; the variance is divided by that.</remarks>
    public static SetMean Of(Vec3[] axes, double[] weights, double lost = 0)
    {
        OrientationTensor t = OrientationTensor.Of(axes, weights);
        Vec3 mean = t.MeanAxis;
        double n = t.NEffective, sum = weights.Sum(), cosines = 0;
        var variance = default(Symmetric3);
        for (int i = 0; i < axes.Length; i++)
        {
            Vec3 a = axes[i].Dot(mean) < 0 ? -axes[i] : axes[i];
            cosines += weights[i] * a.Dot(mean);
            Vec3 off = (a - (mean * a.Dot(mean))) * a.Dot(mean);
            variance += Symmetric3.Outer(off, weights[i] * weights[i] / (sum * sum));
        }

        double r = n * cosines / sum, kappa = n - r > 0 ? (n - 1) / (n - r) : double.PositiveInfinity;
        if (!(n > 1.5)) return new SetMean(t, kappa, 90);

        // An axis moves the first eigenvector by (sine · cosine of its deviation)/(S1 - Sj).
        double q = Math.Clamp(lost, 1e-9, 0.3), whole = 1 + (q * Math.Log(q) / (1 - q));
        Eigen3 v = (variance * (n / (n - 1) / whole)).Eigen();
        double gain = 1 / Math.Max(0.2, t.S1 - ((t.S2 + t.S3) / 2));
        double v1 = Math.Max(0, v.L1), v2 = Math.Max(0, v.L2);
        double freedom = v1 > 0 ? (n - 1) * Math.Pow(v1 + v2, 2) / ((v1 * v1) + (v2 * v2)) : 2 * (n - 1);
        double widening = Math.Sqrt(FisherSnedecor.InvCDF(2, freedom, 0.95) * 2 / ChiSquared.InvCDF(2, 0.95));
        double radius = PoleRegions.Cone95(Math.Sqrt(v1), Math.Sqrt(v2)) * widening * gain * 180 / Math.PI;
        return new SetMean(t, kappa, Math.Min(90, radius));
    }
}
