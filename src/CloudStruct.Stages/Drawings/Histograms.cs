using CloudStruct.Records.Drawings;
using CloudStruct.Records.Width;

namespace CloudStruct.Stages.Drawings;

/// <summary>Histogram of widths, with the laws that the stage width fitted as stations expected in a bin.</summary>
internal static class Histograms
{
    // Fewer stations make bins of one or two, which say nothing.
    private const int FewestStations = 8;
    private const int FewestBins = 5, MostBins = 14, CurvePoints = 81;

    /// <summary>The histogram; null with too few stations.</summary>
    public static WidthHistogram? Of(double[] widths, ThicknessLaw[] laws)
    {
        if (widths.Length < FewestStations) return null;
        double[] sorted = [.. widths.Order()];
        double low = sorted[0], high = sorted[^1], range = high - low;
        if (!(range > 0)) return null;

        // D. Freedman and P. Diaconis 1981: twice the interquartile range over the cube root of the number.
        double quartiles = sorted[3 * (sorted.Length - 1) / 4] - sorted[(sorted.Length - 1) / 4];
        double wanted = quartiles > 0 ? 2 * quartiles / Math.Cbrt(sorted.Length) : range / FewestBins;
        double bin = Round(range / Math.Clamp(range / wanted, FewestBins, MostBins));
        double from = Math.Floor((low / bin) + 1e-9) * bin;
        int[] counts = new int[(int)Math.Floor(((high - from) / bin) + 1e-9) + 1];
        foreach (double w in widths) counts[Math.Min(counts.Length - 1, (int)Math.Floor(((w - from) / bin) + 1e-9))]++;
        double best = laws.Length > 0 ? laws.Min(l => l.Aic) : 0, to = from + (counts.Length * bin);
        return new WidthHistogram(from, bin, counts, [.. laws.Select(l => new LawCurve(
            l.Kind, l.Aic <= best, [.. Enumerable.Range(0, CurvePoints).Select(i => from + ((to - from) * i / (CurvePoints - 1)))
                .Select(w => new Point2(w, widths.Length * bin * Density(l, w)))]))]);
    }

    /// <summary>Probability density of a law [1/m].</summary>
    public static double Density(ThicknessLaw law, double widthM)
    {
        if (!(widthM > 0)) return 0;
        switch (law.Kind)
        {
            case ThicknessLawKind.Lognormal:
                double z = (Math.Log(widthM) - law.First) / law.Second!.Value;
                return Math.Exp(-z * z / 2) / (widthM * law.Second.Value * Math.Sqrt(2 * Math.PI));
            case ThicknessLawKind.Weibull:
                double t = widthM / law.Second!.Value;
                return law.First / law.Second.Value * Math.Pow(t, law.First - 1) * Math.Exp(-Math.Pow(t, law.First));
            default:
                return Math.Exp(-widthM / law.First) / law.First;
        }
    }

    private static double Round(double bin)
    {
        double power = Math.Pow(10, Math.Floor(Math.Log10(bin)));
        double[] steps = [1, 2, 2.5, 5, 10];
        return steps.First(s => s * power >= bin * (1 - 1e-9)) * power;
    }
}
