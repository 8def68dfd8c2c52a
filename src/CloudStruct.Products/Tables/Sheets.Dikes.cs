using CloudStruct.Records.Width;

namespace CloudStruct.Products.Tables;

public static partial class Sheets
{
    private static TableSheet<DikeSummary> Dikes() => new TableSheet<DikeSummary>
    {
        File = "dikes.csv",
        Title = "Dikes",
        Meaning = "One row for each dike: what goes into a paper. No row at all: no dike was found.",
        From = f => f.Width.Dikes,
    }
    .Count("dike", "Number of the dike.", d => d.Dike)
    .Azimuth("strike_deg", "Mean strike over the part whose dip is known; empty where nothing fixes the dip.", d => d.Mean?.StrikeDeg)
    .Angle("dip_deg", "Mean dip over the same part.", d => d.Mean?.DipDeg)
    .Azimuth("dip_direction_deg", "Azimuth of steepest descent of the mean.", d => d.Mean?.DipDirectionDeg)
    .Angle("cone95_deg", "Half-angle of the cone that holds the true mean pole with 95 % probability, internal errors only.", d => d.Region?.Cone95Deg)
    .Angle("cone95_total_deg", "The cone with the common errors of the whole model added.", d => d.Region?.Cone95TotalDeg)
    .Axis("trend_deg", "Mean trend of the centre line, 0 to 180; known even where the dip is not.", d => d.TrendDeg)
    .Metres("seen_length_m", "Length along strike where both margins show.", d => d.SeenLengthM)
    .Metres("hidden_length_m", "Length between the ends where a margin is hidden.", d => d.HiddenLengthM)
    .MetresWithLimits("true_width_mean", "Mean true width of the stations measured.", d => d.WidthMeanM)
    .MetresWithLimits("true_width_median", "Median true width.", d => d.WidthMedianM)
    .MetresWithLimits("true_width_min", "Smallest true width of a station.", d => d.WidthMinM)
    .MetresWithLimits("true_width_max", "Largest true width of a station.", d => d.WidthMaxM)
    .Count("measured_stations", "Stations with a true width.", d => d.Measured)
    .Number("n_effective", "How many independent stations they are worth: neighbours resemble each other.", d => d.NEffective)
    .Metres("window_m", "Length of the window along strike in which attitudes were gathered.", d => d.WindowM)
    .Number("aspect_ratio_min", "Seen and hidden length over mean width: a lower bound, for the ends may lie outside the survey.", d => d.AspectRatioMin)
    .Metres("thinnest_dike_m", "Thinnest dike that would have been seen; what is thinner may have been missed.", d => d.ThinnestDikeM)
    .Count("steps", "Steps of the true width along strike (width_trends.csv); empty with too few stations to look for any.", d => d.Steps)
    .Number("trend", "Even change of the true width per metre of chainage, steps taken out: negative where the dike thins toward increasing chainage.", d => d.Trend?.Value)
    .Number("trend_low95", "Lower 95 % limit of the same.", d => d.Trend?.Low95)
    .Number("trend_high95", "Upper 95 % limit of the same.", d => d.Trend?.High95)
    .Text("thickness_law", "The law of smallest Akaike criterion among the three that follow: lognormal, weibull or exponential; widths where a margin is hidden enter as lower bounds. Empty with fewer than three stations.", d => LawName(d.Laws.MinBy(l => l.Aic)))
    .Number("lognormal_mu", "Lognormal law of the stations' widths: mean of ln(width / 1 m).", d => Law(d, ThicknessLawKind.Lognormal)?.First)
    .Number("lognormal_sigma", "Lognormal law: standard deviation of ln(width).", d => Law(d, ThicknessLawKind.Lognormal)?.Second)
    .Number("lognormal_aic", "Akaike criterion of the lognormal law, for the effective number of stations.", d => Law(d, ThicknessLawKind.Lognormal)?.Aic)
    .Number("weibull_shape", "Weibull law: shape.", d => Law(d, ThicknessLawKind.Weibull)?.First)
    .Metres("weibull_scale_m", "Weibull law: scale.", d => Law(d, ThicknessLawKind.Weibull)?.Second)
    .Number("weibull_aic", "Akaike criterion of the Weibull law.", d => Law(d, ThicknessLawKind.Weibull)?.Aic)
    .Metres("exponential_mean_m", "Exponential law: mean.", d => Law(d, ThicknessLawKind.Exponential)?.First)
    .Number("exponential_aic", "Akaike criterion of the exponential law.", d => Law(d, ThicknessLawKind.Exponential)?.Aic);

    private static ThicknessLaw? Law(DikeSummary d, ThicknessLawKind kind) => Array.Find(d.Laws, l => l.Kind == kind);

    private static string LawName(ThicknessLaw? law) => law?.Kind switch
    {
        ThicknessLawKind.Lognormal => "lognormal",
        ThicknessLawKind.Weibull => "weibull",
        ThicknessLawKind.Exponential => "exponential",
        _ => "",
    };
}
