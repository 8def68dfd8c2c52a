using CloudStruct.Maths.Series;
using CloudStruct.Records.Width;
using MathNet.Numerics.Distributions;

namespace CloudStruct.Stages.Width;

/// <summary>Steps and the even trend of one dike's width.</summary>
internal static class WidthTrends
{
    /// <summary>Chance at which a step or a taper is still believed to be one.</summary>
    private const double Level = 0.01;

    /// <summary>Looks for them; no trend with fewer than eight measured stations.</summary>
    /// <param name="stations">Stations of the dike in order.</param>
    public static (WidthTrend[] Rows, int? Steps, Estimate? Trend) Of(Station[] stations)
    {
        Station[] measured = [.. stations.Where(s => s is { Status: StationStatus.Measured, TrueWidthM: not null })];
        if (measured.Length == 0) return ([], null, null);
        double[] x = [.. measured.Select(s => s.ChainageM)], y = [.. measured.Select(s => s.TrueWidthM!.Value)];
        if (StepSearch.Of(x, y, 0.002 * y.Average(), Level) is not { } model) return ([], null, null);
        double t = StudentT.InvCDF(0, 1, Math.Max(1, model.Freedom), 0.975);
        var rows = new List<WidthTrend>();
        double before = x[0];
        for (int k = 0; k < model.Steps.Length; k++)
        {
            StepFound step = model.Steps[k];
            double after = k + 1 < model.Steps.Length ? model.Steps[k + 1].At : double.PositiveInfinity;
            rows.Add(new WidthTrend
            {
                Dike = measured[0].Dike, Kind = WidthTrendKind.Step, ChainageM = new Estimate(step.At, step.AtLow95, step.AtHigh95),
                SizeM = new Estimate(step.Size, step.Size - (t * step.SizeSigma), step.Size + (t * step.SizeSigma)), PValue = step.PValue,
                WidthBeforeM = Mean(x, y, before, step.At), WidthAfterM = Mean(x, y, step.At, after),
            });
            before = step.At;
        }

        var trend = new Estimate(model.Slope, model.Slope - (t * model.SlopeSigma), model.Slope + (t * model.SlopeSigma));
        if (model.SlopePValue < Level)
        {
            double length = x[^1] - x[0], middle = (x[0] + x[^1]) / 2, mean = y.Average();
            rows.Add(new WidthTrend
            {
                Dike = measured[0].Dike, Kind = WidthTrendKind.Taper, ChainageM = new Estimate(middle, x[0], x[^1]), PValue = model.SlopePValue,
                SizeM = new Estimate(trend.Value * length, trend.Low95 * length, trend.High95 * length),
                WidthBeforeM = mean - (trend.Value * length / 2), WidthAfterM = mean + (trend.Value * length / 2),
            });
        }

        return ([.. rows], model.Steps.Length, trend);
    }

    private static double Mean(double[] x, double[] y, double from, double to) =>
        y.Where((_, i) => x[i] >= from && x[i] <= to).Average();
}
