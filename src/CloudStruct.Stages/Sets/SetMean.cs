using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;
using MathNet.Numerics.Distributions;

namespace CloudStruct.Stages.Sets;

/// <summary>Mean axis of a set with the region that holds the true one.</summary>
/// <param name="Mean">Mean axis of its law in the mixture, upward.</param>
/// <param name="Tensor">Orientation tensor of the poles, each weighted by its weight times its share in the set.</param>
/// <param name="Kappa">Fisher's (n - 1)/(n - R) of the poles turned to the side of the mean, n the effective number.</param>
/// <param name="Region">Cone and ellipse of the mean, without and with the common errors of the model.</param>
/// <param name="Variance">Covariance of the mean as a unit vector [rad²].</param>
/// <param name="Groups">Independent observations it rests on.</param>
internal sealed record SetMean(Vec3 Mean, OrientationTensor Tensor, double Kappa, PoleRegion Region, Symmetric3 Variance, double Groups)
{
    /// <summary>Mean of one component of a mixture.</summary>
    /// <param name="component">The component.</param>
    /// <param name="axes">Unit poles of either sign.</param>
    /// <param name="weights">Weight of each times its share in the component.</param>
    /// <param name="covariance">Of the mean, from the whole likelihood.</param>
    /// <param name="groups">Independent observations it rests on.</param>
    /// <param name="reference">Common errors of the model.</param>
    /// <remarks>The variance is widened from a known to an estimated one: chi-square to F. The
    /// degrees of freedom are 2 (n - 1) for a round region, as in Fisher's exact cone, and fewer for an elongated one
    /// (Satterthwaite). Common errors are added after that: they are stated, not estimated here.</remarks>
    public static SetMean Of(
        AxisComponent component, Vec3[] axes, double[] weights, Symmetric3 covariance, double groups, ModelReference reference)
    {
        OrientationTensor t = OrientationTensor.Of(axes, weights);
        Vec3 mean = TrendPlunge.Lower(component.Mean) * -1;
        double n = t.NEffective, sum = 0, cosines = 0;
        for (int i = 0; i < axes.Length; i++)
        {
            sum += weights[i];
            cosines += weights[i] * Math.Abs(axes[i].Dot(mean));
        }

        double r = n * cosines / sum, kappa = n - r > 0 ? (n - 1) / (n - r) : double.PositiveInfinity;
        Eigen3 v = covariance.Eigen();
        double v1 = Math.Max(0, v.L1), v2 = Math.Max(0, v.L2);
        if (!(groups > 1.5) || !double.IsFinite(v1))
        {
            var unknown = new PoleRegion { Cone95Deg = 90, Cone95TotalDeg = 90, Ellipse95MajorDeg = 90, Ellipse95MinorDeg = 90 };
            return new SetMean(mean, t, kappa, unknown, Symmetric3.Outer(component.Wide) + Symmetric3.Outer(component.Narrow), groups);
        }

        double freedom = v1 > 0 ? (groups - 1) * Math.Pow(v1 + v2, 2) / ((v1 * v1) + (v2 * v2)) : 2 * (groups - 1);
        double widening = FisherSnedecor.InvCDF(2, freedom, 0.95) * 2 / ChiSquared.InvCDF(2, 0.95);
        Symmetric3 wide = covariance * widening;
        return new SetMean(mean, t, kappa, PoleRegions.From(mean, wide, reference), covariance, groups);
    }
}
