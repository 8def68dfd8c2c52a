using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Maths.Rates;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Width;

namespace CloudStruct.Stages.Width;

/// <summary>One row per dike from its stations.</summary>
internal static class Summaries
{
    private const double Quantile95 = 1.959963985;

    /// <summary>Summary of one dike.</summary>
    public static DikeSummary Of(
        DikeFrame frame, Station[] stations, Contact[] contacts, double thinnestM, double stationM, SurveyFrame survey)
    {
        Station[] measured = [.. stations.Where(s => s.Status == StationStatus.Measured)];
        double seen = stationM * stations.Count(s => s.Status is StationStatus.Measured or StationStatus.Unconstrained);
        double hidden = stationM * stations.Count(s => s.Status is StationStatus.AHidden or StationStatus.BHidden or StationStatus.BothHidden);
        Vec3 run = frame.CentreLine[^1] - frame.CentreLine[0];
        var summary = new DikeSummary
        {
            Dike = frame.Dike, TrendDeg = Azimuth.Wrap180(MeanTrend(stations, run, survey)), SeenLengthM = seen, HiddenLengthM = hidden,
            Measured = measured.Length, WindowM = frame.WindowM, ThinnestDikeM = thinnestM,
        };
        if (MeanAttitude(frame, contacts, survey) is { } mean)
        {
            summary = summary with { Mean = mean.Attitude, Normal = mean.Normal, Region = mean.Region };
        }

        if (measured.Length == 0) return summary;
        double[] widths = [.. measured.Select(s => s.TrueWidthM!.Value)];
        double[] sigma = [.. measured.Select(s => (s.TrueWidthHigh95M!.Value - s.TrueWidthM!.Value) / Quantile95)];
        double average = widths.Average(), effective = Effective(measured, widths);
        double spread = widths.Length < 2 ? 0 : Math.Sqrt(widths.Sum(w => (w - average) * (w - average)) / (widths.Length - 1));
        // The scatter of the stations holds both real variation and errors of single stations; what all stations share (a shift
        // of the labels, the dip) it cannot show, and that part does not shrink: the surest station's error stands for it.
        double error = Math.Sqrt((spread * spread / effective) + Math.Pow(sigma.Min(), 2));
        double medianError = Math.Sqrt((Math.PI / 2 * spread * spread / effective) + Math.Pow(sigma.Min(), 2));
        int smallest = Array.IndexOf(widths, widths.Min()), largest = Array.IndexOf(widths, widths.Max());
        Array.Sort(sigma);
        double[] ordered = [.. widths.Order()];
        int n = ordered.Length;
        double median = n % 2 == 1 ? ordered[n / 2] : (ordered[(n / 2) - 1] + ordered[n / 2]) / 2;
        // Widths of which one end is out of sight are at least as large as what shows of them.
        double[] larger = [.. stations.Where(s => s.Status is StationStatus.AHidden or StationStatus.BHidden && s.VisibleWidthM is > 0).Select(s => s.VisibleWidthM!.Value)];
        return summary with
        {
            Laws = CensoredLaws.Of(widths, larger, effective), WidthMeanM = About(average, error), WidthMedianM = About(median, medianError), WidthMinM = Own(measured[smallest]),
            WidthMaxM = Own(measured[largest]), NEffective = effective, AspectRatioMin = (seen + hidden) / average,
        };
    }

    private static Estimate About(double value, double sigma) =>
        new(value, Math.Max(0, value - (Quantile95 * sigma)), value + (Quantile95 * sigma));

    private static Estimate Own(Station s) => new(s.TrueWidthM!.Value, s.TrueWidthLow95M!.Value, s.TrueWidthHigh95M!.Value);

    private static double MeanTrend(Station[] stations, Vec3 run, SurveyFrame survey)
    {
        double east = 0, north = 0;   // doubled angles: trends are axes
        foreach (Station s in stations)
        {
            double a = 2 * (s.TrendAlongDeg ?? 0) * Math.PI / 180;
            if (s.TrendAlongDeg is null) continue;
            east += Math.Sin(a);
            north += Math.Cos(a);
        }

        return east == 0 && north == 0 ? Azimuth.Of(run, survey.TurnDeg) : Math.Atan2(east, north) / 2 * 180 / Math.PI;
    }

    // n / (1 + 2 sum of autocorrelations), summed while they stay positive (initial positive sequence).
    private static double Effective(Station[] measured, double[] widths)
    {
        int n = widths.Length;
        if (n < 3) return n;
        double mean = widths.Average(), variance = widths.Sum(w => (w - mean) * (w - mean)) / n;
        if (!(variance > 0)) return n;
        double sum = 1;
        for (int lag = 1; lag < n / 2; lag++)
        {
            double product = 0;
            int pairs = 0;
            for (int i = 0, j = 0; i < n; i++)
            {
                while (j < n && measured[j].Number < measured[i].Number + lag) j++;
                if (j >= n || measured[j].Number != measured[i].Number + lag) continue;
                product += (widths[i] - mean) * (widths[j] - mean);
                pairs++;
            }

            if (pairs == 0) continue;
            double correlation = product / pairs / variance;
            if (correlation <= 0.05) break;
            sum += 2 * correlation * (n - lag) / n;
        }

        return Math.Clamp(n / sum, 1, n);
    }

    // Mean of axes over the fixed part of the centre line. Its error: the scatter of the normals from window to window, and
    // what the surest contact row leaves open, for a dip that all share does not get surer with length.
    private static (Attitude Attitude, Vec3 Normal, PoleRegion Region)? MeanAttitude(DikeFrame frame, Contact[] contacts, SurveyFrame survey)
    {
        Vec3[] normals = [.. frame.Normal.Where((_, i) => frame.Constraint[i] == Constraint.Plane)];
        if (normals.Length == 0) return null;
        Symmetric3 tensor = default;
        foreach (Vec3 n in normals) tensor += Symmetric3.Outer(n, 1.0 / normals.Length);
        Vec3 mean = tensor.Eigen().V1;
        if (mean.Z < 0) mean = -mean;
        double length = frame.WindowM * normals.Length / Math.Max(1, frame.Normal.Length);
        double covered = (frame.ChainageM[^1] - frame.ChainageM[0]) * normals.Length / frame.Normal.Length;
        double windows = Math.Max(1, covered / Math.Max(length, 1e-9));
        Symmetric3 scatter = default;
        foreach (Vec3 n in normals)
        {
            Vec3 d = (n * Math.Sign(n.Dot(mean))) - mean;
            scatter += Symmetric3.Outer(d - (mean * mean.Dot(d)), 1.0 / (normals.Length * windows));
        }

        PoleRegion? surest = contacts.Where(c => c.Dike == frame.Dike && c.Region is not null && c.Evidence != Evidence.Prior).MinBy(c => c.Region!.Cone95Deg)?.Region;
        if (surest is { MajorAxis.Length: > 0 } r)
        {
            const double toSigma = Math.PI / 180 / 2.4477;
            Vec3 major = (r.MajorAxis - (mean * mean.Dot(r.MajorAxis))).Unit(), minor = mean.Cross(major);
            scatter += Symmetric3.Outer(major, Math.Pow(r.Ellipse95MajorDeg * toSigma, 2)) + Symmetric3.Outer(minor, Math.Pow(r.Ellipse95MinorDeg * toSigma, 2));
        }

        return (Attitude.FromNormal(mean, survey.TurnDeg), mean, PoleRegions.From(mean, scatter, survey.Reference));
    }
}
