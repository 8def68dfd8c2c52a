using CloudStruct.Records.Attitudes;

namespace CloudStruct.Maths.Directions;

/// <summary>Axes in a plane by doubled angles: mean axis, how well they agree, and whether they do so by more than chance.</summary>
/// <param name="N">Number of axes.</param>
/// <param name="SumCosine">Σ cos 2a.</param>
/// <param name="SumSine">Σ sin 2a.</param>
/// <remarks>N. I. Fisher 1993, Statistical Analysis of Circular Data. Angles in degrees; 0 ≤ axis &lt; 180.</remarks>
public readonly record struct DoubledAngles(int N, double SumCosine, double SumSine)
{
    private const double Degree = Math.PI / 180;

    /// <summary>Mean axis, 0 ≤ a &lt; 180 [deg]; meaningless when <see cref="MeanLength"/> is 0.</summary>
    public double MeanAxisDeg => Azimuth.Wrap180(Math.Atan2(SumSine, SumCosine) / 2 / Degree);

    /// <summary>Mean resultant length of the doubled angles, 0 to 1.</summary>
    public double MeanLength => Math.Sqrt((SumCosine * SumCosine) + (SumSine * SumSine)) / N;

    /// <summary>Concentration of the doubled angles by maximum likelihood (von Mises): I1(κ)/I0(κ) = mean length.</summary>
    public double Kappa
    {
        get
        {
            double r = MeanLength, low = 0, high = 1;
            if (r >= 1) return double.PositiveInfinity;
            while (Ratio(high) < r) high *= 2;
            for (int i = 0; i < 200 && high - low > 1e-13 * high; i++)
            {
                double middle = (low + high) / 2;
                if (Ratio(middle) < r) low = middle;
                else high = middle;
            }

            return (low + high) / 2;
        }
    }

    /// <summary>One standard error of the mean axis, 1/√(N R κ) halved [deg].</summary>
    public double StandardErrorDeg => 1 / Math.Sqrt(N * MeanLength * Kappa) / 2 / Degree;

    /// <summary>Rayleigh's test: probability of so large a mean length when there is no preferred axis.</summary>
    /// <remarks>Series in 1/N to its fourth term (Mardia and Jupp 2000, section 6.3, from memory); good from N = 5 on.</remarks>
    public double RayleighP
    {
        get
        {
            double n = N, z = n * MeanLength * MeanLength;
            double second = ((2 * z) - (z * z)) / (4 * n);
            double third = ((24 * z) - (132 * z * z) + (76 * z * z * z) - (9 * z * z * z * z)) / (288 * n * n);
            return Math.Clamp(Math.Exp(-z) * (1 + second - third), 0, 1);
        }
    }

    /// <summary>Of axes given as azimuths; a and a + 180 count as one.</summary>
    public static DoubledAngles Of(ReadOnlySpan<double> axesDeg)
    {
        double c = 0, s = 0;
        foreach (double a in axesDeg)
        {
            (double sine, double cosine) = Math.SinCos(2 * a * Degree);
            c += cosine;
            s += sine;
        }

        return new DoubledAngles(axesDeg.Length, c, s);
    }

    private static double Ratio(double kappa) => ScaledBessel.I1(kappa) / ScaledBessel.I0(kappa);
}
