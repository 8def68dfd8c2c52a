using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Width;

/// <summary>The margins about one station: q = a + b s + l t per margin, l common, in axes of the station; the waves of the
/// margins about it are followed, the errors of the traces are not.</summary>
/// <param name="OffsetAM">Margin A along the normal, at the height where the two traces face each other [m].</param>
/// <param name="OffsetBM">Margin B [m].</param>
/// <param name="Stretch">Distance along the local normal per metre of q: below 1 where strike and dip differ from the axes.</param>
/// <param name="SigmaM">One standard deviation of the true width: place of the traces and dip [m].</param>
/// <param name="HeightAM">Height up dip at which trace A passes the station [m].</param>
/// <param name="HeightBM">Height of trace B [m].</param>
internal sealed record StationFit(double OffsetAM, double OffsetBM, double Stretch, double SigmaM, double HeightAM, double HeightBM)
{
    private const int Parameters = 5;   // aA, bA, aB, bB, l
    private const double StrikePrior = 0.15;

    /// <summary>Distance of the margins along the normal [m].</summary>
    public double WidthM => (OffsetBM - OffsetAM) * Stretch;

    /// <summary>Fits; null when a margin is missing or the fit is singular.</summary>
    /// <param name="near">Vertices of both traces about the station.</param>
    /// <param name="origin">Place of the station.</param>
    /// <param name="normal">From A to B.</param>
    /// <param name="along">Along strike.</param>
    /// <param name="up">Up dip.</param>
    /// <param name="tiltSigma">Prior of l: tangent of the one-sigma of the dip; 0 leaves heights out.</param>
    /// <param name="frame">For the noise of the traces.</param>
    public static StationFit? Of(
        IReadOnlyList<TraceVertex> near, Vec3 origin, Vec3 normal, Vec3 along, Vec3 up, double tiltSigma, DikeFrame frame)
    {
        int n = near.Count;
        if (near.All(v => v.Margin == Margin.A) || near.All(v => v.Margin == Margin.B)) return null;
        var s = new double[n];
        var t = new double[n];
        var q = new double[n];
        var design = new double[n * Parameters];
        for (int i = 0; i < n; i++)
        {
            Vec3 d = near[i].Place - origin;
            (s[i], t[i], q[i]) = (d.Dot(along), d.Dot(up), d.Dot(normal));
        }

        (double heightA, double heightB) = (Height(near, s, t, Margin.A), Height(near, s, t, Margin.B));
        double facing = (heightA + heightB) / 2;
        for (int i = 0; i < n; i++)
        {
            int at = (i * Parameters) + (near[i].Margin == Margin.A ? 0 : 2);
            design[at] = 1;
            design[at + 1] = s[i];
            design[(i * Parameters) + 4] = tiltSigma > 0 ? t[i] - facing : 0;
        }

        var noise = new CorrelatedNoise(frame.TraceScatterM, frame.TraceRangeM, frame.TraceWhiteShare);
        double wave = frame.WaveM * frame.WaveM;
        double WaveAt(double d) => wave > 0 ? wave * Correlation.At(CorrelationShape.Matern32, d, frame.WaveRangeM) : 0;
        static double Apart(double ds, double dt) => Math.Sqrt((ds * ds) + (dt * dt));
        var covariance = new double[n * n];
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < i; j++)
            {
                double d = Apart(s[i] - s[j], t[i] - t[j]);
                covariance[(i * n) + j] = near[i].Margin == near[j].Margin ? noise.Covariance(d) + WaveAt(d) : frame.TraceShared * WaveAt(d);
            }

            covariance[(i * n) + i] = noise.Variance() + wave;
        }

        double strike = 1 / (StrikePrior * StrikePrior);
        if (CorrelatedFit.Solve(design, q, covariance, [0, strike, 0, strike, tiltSigma > 0 ? 1 / (tiltSigma * tiltSigma) : 1]) is not { } fit) return null;
        var toA = new double[n];
        var toB = new double[n];
        var difference = new double[n];
        for (int i = 0; i < n; i++)
        {
            double k = WaveAt(Apart(s[i], t[i] - facing));
            (toA[i], toB[i]) = near[i].Margin == Margin.A ? (k, k * frame.TraceShared) : (k * frame.TraceShared, k);
            difference[i] = toB[i] - toA[i];
        }

        // Traces rougher here than along the dike as a whole, behind soil or shade: the errors here are larger too.
        double rough = Math.Max(1, fit.SquareSum / Math.Max(1, n - Parameters));
        double a = fit.Predict([1, 0, 0, 0, 0], toA, wave).Value;
        (double across, double variance) = fit.Predict([-1, 0, 1, 0, 0], difference, 2 * wave * (1 - frame.TraceShared));
        variance *= rough;
        double slope = (fit.Beta[1] + fit.Beta[3]) / 2, tilt = fit.Beta[4], stretch = 1 / Math.Sqrt(1 + (slope * slope) + (tilt * tilt));
        return new StationFit(a, a + across, stretch, Math.Sqrt(variance) * stretch, heightA, heightB);
    }

    // Where a trace passes the station: heights near it, the nearest counting most.
    private static double Height(IReadOnlyList<TraceVertex> near, double[] s, double[] t, Margin margin)
    {
        double sum = 0, weight = 0;
        for (int i = 0; i < s.Length; i++)
        {
            if (near[i].Margin != margin) continue;
            double w = 1 / ((s[i] * s[i]) + 0.04);
            sum += w * t[i];
            weight += w;
        }

        return sum / weight;
    }
}
