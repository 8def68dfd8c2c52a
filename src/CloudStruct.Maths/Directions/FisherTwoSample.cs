using CloudStruct.Records.Frame;
using MathNet.Numerics.Distributions;

namespace CloudStruct.Maths.Directions;

/// <summary>Do two groups of directions share one mean?</summary>
/// <param name="F">(N - 2)(R1 + R2 - R)/(N - R1 - R2); assumes equal concentrations.</param>
/// <param name="P">Probability of a larger F with 2 and 2(N - 2) degrees of freedom when the means are one.</param>
/// <param name="V">Watson's V = 2(Σ k R - |Σ k R m|), which lets the concentrations k differ; about chi-square with 2 degrees
/// of freedom in large samples.</param>
/// <param name="AngleDeg">Angle between the two means [deg].</param>
/// <remarks>Watson and Williams 1956 and Watson 1983 (forms from memory), with Fisher's k = (N - 1)/(N - R).</remarks>
public readonly record struct FisherTwoSample(double F, double P, double V, double AngleDeg)
{
    /// <summary>The test of two groups of at least two directions each.</summary>
    public static FisherTwoSample Of(ReadOnlySpan<Vec3> first, ReadOnlySpan<Vec3> second)
    {
        FisherMean a = FisherMean.Of(first), b = FisherMean.Of(second);
        double pooled = ((a.Mean * a.R) + (b.Mean * b.R)).Length;
        int n = a.N + b.N;
        double f = (n - 2) * (a.R + b.R - pooled) / (n - a.R - b.R);
        double v = 2 * ((a.K * a.R) + (b.K * b.R) - ((a.Mean * (a.K * a.R)) + (b.Mean * (b.K * b.R))).Length);
        double angle = Math.Atan2(a.Mean.Cross(b.Mean).Length, a.Mean.Dot(b.Mean)) * 180 / Math.PI;
        return new FisherTwoSample(f, 1 - FisherSnedecor.CDF(2, 2 * (n - 2), f), v, angle);
    }
}
