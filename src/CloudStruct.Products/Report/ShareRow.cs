using CloudStruct.Products.Plots;
using CloudStruct.Records.Drawings;
using static System.FormattableString;

namespace CloudStruct.Products.Report;

/// <summary>A row of bars on the strip along chainage.</summary>
/// <param name="Name">What it shows.</param>
/// <param name="Unit">Beneath the name.</param>
/// <param name="Top">What the full height stands for.</param>
/// <param name="Colour">Of the bars.</param>
/// <param name="Bars">Start and end [m], height from 0 to 1, and words.</param>
internal sealed record ShareRow(string Name, string Unit, string Top, string Colour, (double FromM, double ToM, double Share, string Words)[] Bars)
{
    /// <summary>The rows that have something to show, in order.</summary>
    public static ShareRow[] Of(ChainageCell[] cells)
    {
        if (cells.Length == 0) return [];
        var rows = new List<ShareRow>();
        if (cells.Any(c => c.InclusionShare > 0))
            rows.Add(new("inclusions", "% of dike", "100", "#a0527d", [.. cells.Where(c => c.InclusionShare != null).Select(c => (c.FromM, c.ToM, c.InclusionShare!.Value, Words(c, Invariant($"{100 * c.InclusionShare.Value:F0} % of the dike's surface is inclusions"))))]));
        rows.Add(new("cover", "%", "100", "#00785a", [.. cells.Select(c => (c.FromM, c.ToM, c.CoverShare, Words(c, Invariant($"{100 * c.CoverShare:F0} % of the surface is cover"))))]));
        double top = NiceScale.StepFor(cells.Max(c => c.PointsPerM2));
        rows.Add(new("density", "points/m²", Invariant($"{top:N0}"), "#6b6660", [.. cells.Select(c => (c.FromM, c.ToM, c.PointsPerM2 / top, Words(c, Invariant($"{c.PointsPerM2:N0} points on a square metre"))))]));
        return [.. rows];
    }

    private static string Words(ChainageCell c, string what) => Invariant($"chainage {c.FromM:F1} to {c.ToM:F1} m: {what}");
}
