using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>Fisher statistics of directions (not of axes: align those to their mean axis first).</summary>
/// <param name="N">Number of directions.</param>
/// <param name="R">Length of their vector sum.</param>
/// <param name="Mean">Unit mean direction; NaN when the sum vanishes.</param>
public readonly record struct FisherMean(int N, double R, Vec3 Mean)
{
    /// <summary>Fisher's estimate of the concentration, (N - 1)/(N - R).</summary>
    public double K => (N - 1) / (N - R);

    /// <summary>Concentration by maximum likelihood.</summary>
    public double KappaMl => Fisher.KappaOf(R / N);

    /// <summary>Half-angle of the exact 95 % cone of the mean [deg].</summary>
    public double Cone95Deg => Fisher.ConeDeg(N, R);

    /// <summary>Statistics of unit vectors.</summary>
    public static FisherMean Of(ReadOnlySpan<Vec3> directions)
    {
        var sum = default(Vec3);
        foreach (Vec3 d in directions) sum += d;
        return new FisherMean(directions.Length, sum.Length, sum.Unit());
    }

    /// <summary>Statistics of unit axes, each turned to the side of the mean axis of the orientation tensor.</summary>
    public static FisherMean OfAxes(ReadOnlySpan<Vec3> axes)
    {
        Vec3 mean = OrientationTensor.Of(axes).MeanAxis;
        var sum = default(Vec3);
        foreach (Vec3 a in axes) sum += a.Dot(mean) < 0 ? -a : a;
        return new FisherMean(axes.Length, sum.Length, sum.Unit());
    }
}
