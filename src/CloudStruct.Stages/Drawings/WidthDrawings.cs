using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Width;
using static System.FormattableString;

namespace CloudStruct.Stages.Drawings;

/// <summary>Width along strike, one drawing per dike.</summary>
internal static class WidthDrawings
{
    /// <summary>The drawings, in order of dikes.</summary>
    public static WidthDrawing[] Of(Findings input) =>
        [.. input.Contacts.Dikes.Select(d => One(input, d, input.Width.Dikes.FirstOrDefault(s => s.Dike == d.Dike)))];

    private static WidthDrawing One(Findings input, DikeFrame dike, DikeSummary? summary)
    {
        WidthRecord width = input.Width;
        Station[] own = [.. width.Stations.Where(s => s.Dike == dike.Dike)];
        return new WidthDrawing
        {
            Dike = dike.Dike,
            Title = Invariant($"Width of dike {dike.Dike} along strike"),
            Points = [.. own.Select(s => new WidthPoint(
                s.ChainageM,
                s.Status == StationStatus.Measured ? s.TrueWidthM : null,
                s.Status == StationStatus.Measured ? s.TrueWidthLow95M : null,
                s.Status == StationStatus.Measured ? s.TrueWidthHigh95M : null,
                s.Status == StationStatus.Unconstrained ? s.ApparentWidthM : null,
                s.Status is StationStatus.AHidden or StationStatus.BHidden ? s.VisibleWidthM : null,
                s.Status))],
            Trends = [.. width.Trends.Where(t => t.Dike == dike.Dike)],
            Leans = [.. input.Contacts.Contacts.Where(c => c.Dike == dike.Dike).OrderBy(c => c.Margin).ThenBy(c => c.ChainageFromM)
                .Select(c => new MarginLean(c.Margin, c.ChainageFromM, c.ChainageToM, c.LeanToBDeg, c.LeanLow95Deg, c.LeanHigh95Deg))],
            Histogram = Histograms.Of(
                [.. own.Where(s => s.Status == StationStatus.Measured && s.TrueWidthM is not null).Select(s => s.TrueWidthM!.Value)], summary?.Laws ?? []),
            Sentence = Sentence(width, own, summary),
        };
    }

    private static string Sentence(WidthRecord width, Station[] own, DikeSummary? summary)
    {
        if (own.Length == 0) return "No station lies on this dike.";
        double[] widths = [.. own.Where(s => s.Status == StationStatus.Measured && s.TrueWidthM is not null).Select(s => s.TrueWidthM!.Value)];
        var text = new List<string>();
        if (widths.Length == 0)
        {
            text.Add("The true width could not be measured at any station.");
        }
        else
        {
            string apart = width.StationM > 0 ? Invariant($", {Words.Short(width.StationM)} m apart") : "";
            string range = widths.Length == 1
                ? Invariant($"{Words.Short(widths[0])} m")
                : Invariant($"{Words.Short(widths.Min())} to {Words.Short(widths.Max())} m");
            text.Add(Invariant($"True width at {widths.Length} of {Words.Count(own.Length, "station", "stations")}{apart}: {range}."));
            if (summary?.WidthMeanM is { } mean)
            {
                text.Add(Invariant($"Mean {Words.Short(mean.Value)} m (95 %: {Words.Short(mean.Low95)} to {Words.Short(mean.High95)} m)."));
            }
        }

        int hidden = own.Count(s => s.Status is StationStatus.AHidden or StationStatus.BHidden or StationStatus.BothHidden);
        int loose = own.Count(s => s.Status == StationStatus.Unconstrained);
        if (hidden > 0) text.Add(Invariant($"At {Words.Count(hidden, "station", "stations")} a margin is hidden."));
        if (loose > 0) text.Add(Invariant($"At {Words.Count(loose, "station", "stations")} nothing fixes the dip, and only the apparent width is known."));
        if (widths.Length > 0) text.Add("The band holds the internal errors; those of the whole model come on top.");
        return string.Join(" ", text);
    }
}
