using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Records.Width;
using static System.FormattableString;

namespace CloudStruct.Stages.Width;

/// <summary>True width station by station along every dike, with what is hidden said as hidden, and a summary per dike.</summary>
public sealed class WidthStage : IStage<WidthInput, WidthSettings, WidthRecord>
{
    /// <inheritdoc/>
    public string Name => "width";

    /// <inheritdoc/>
    public WidthRecord Run(WidthInput input, WidthSettings settings, StageContext context)
    {
        WorkingCloud cloud = input.Described.Cloud;
        var stations = new List<Station>();
        var trends = new List<WidthTrend>();
        var summaries = new List<DikeSummary>();
        foreach (DikeFrame frame in input.Contacts.Dikes)
        {
            Vec3 run = frame.CentreLine[^1] - frame.CentreLine[0];
            var points = new DikePoints(cloud, input.Classes, frame.Dike, frame.CentreLine[0], run.Length > 0 ? run.Unit() : new Vec3(1, 0, 0));
            var maker = new StationMaker(frame, input.Contacts.Traces.Where(t => t.Dike == frame.Dike), points, cloud.Frame, settings);
            double[] chainage = [.. maker.Chainages()];
            Station[] own = [.. BlockParallel.Map(
                chainage.Length, context.Threads, context.Stop, (from, to) => Enumerable.Range(from, to - from).Select(i => maker.Measure(chainage[i], i + 1)).ToArray(), 8)
                .SelectMany(s => s)];
            own = new MarginViews(cloud, input.Classes, frame.Dike).Doubted(own, [.. chainage.Select(maker.NormalAt)]);
            own = Continuous(own);
            stations.AddRange(own);
            DikeSummary summary = Summaries.Of(frame, own, input.Contacts.Contacts, input.Classes.ThinnestDikeM, settings.StationM, cloud.Frame);
            (WidthTrend[] rows, int? steps, Estimate? trend) = WidthTrends.Of(own);
            summary = summary with { Steps = steps, Trend = trend };
            trends.AddRange(rows);
            summaries.Add(summary);
            context.Say(Said(summary, own));
        }

        context.Progress(1);
        return new WidthRecord { Stations = [.. stations], Dikes = [.. summaries], Trends = [.. trends], StationM = settings.StationM };
    }

    private Remark Said(DikeSummary d, Station[] own)
    {
        string width = d.WidthMeanM is { } w
            ? Invariant($"mean true width {w.Value:0.00} m ({w.Low95:0.00} to {w.High95:0.00}) from {d.Measured} of {own.Length} stations")
            : Invariant($"no true width at any of {own.Length} stations");
        return new Remark(Name, Invariant($"Dike {d.Dike}: {width}; {d.HiddenLengthM:0.0} m hidden{Changes(d)}."), d.Measured == 0);
    }

    private static string Changes(DikeSummary d) => d.Steps switch
    {
        null => "; too few stations to look for steps",
        0 => "",
        1 => "; its width changes by a step at one place (width_trends.csv)",
        { } n => Invariant($"; its width changes by steps at {n} places (width_trends.csv)"),
    };

    // Trends run on through 360 along one dike.
    private static Station[] Continuous(Station[] stations)
    {
        double? before = null;
        for (int i = 0; i < stations.Length; i++)
        {
            if (stations[i].TrendAlongDeg is not { } trend) continue;
            if (before is { } b) trend = b + ((((trend - b) % 360) + 540) % 360) - 180;
            stations[i] = stations[i] with { TrendAlongDeg = trend };
            before = trend;
        }

        return stations;
    }
}
