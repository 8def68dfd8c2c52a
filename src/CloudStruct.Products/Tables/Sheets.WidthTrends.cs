using CloudStruct.Records.Width;

namespace CloudStruct.Products.Tables;

public static partial class Sheets
{
    private static TableSheet<WidthTrend> WidthTrends() => new TableSheet<WidthTrend>
    {
        File = "width_trends.csv",
        Title = "Changes of width along strike",
        Meaning = "One row for each step of the true width and one for an even taper, where the stations show it beyond their correlated scatter (chance below 0.01). No row: no such change.",
        From = f => f.Width.Trends,
    }
    .Count("dike", "Number of the dike.", t => t.Dike)
    .Word("kind", "step: the width changes at one place. taper: it changes evenly over the measured length, steps taken out.", t => t.Kind)
    .Metres("chainage_m", "Place of the step; middle of the taper.", t => t.ChainageM.Value)
    .Metres("chainage_low95_m", "Lower 95 % limit of the step's place; start of the taper.", t => t.ChainageM.Low95)
    .Metres("chainage_high95_m", "Upper 95 % limit of the step's place; end of the taper.", t => t.ChainageM.High95)
    .Metres("size_m", "Change of the true width toward increasing chainage, across the step or from end to end of the taper; negative where the dike thins.", t => t.SizeM.Value)
    .Metres("size_low95_m", "Lower 95 % limit of the same.", t => t.SizeM.Low95)
    .Metres("size_high95_m", "Upper 95 % limit of the same.", t => t.SizeM.High95)
    .Number("p_value", "Probability of as large a change in stations of this scatter and correlation without one; for a step, anywhere along the dike.", t => t.PValue)
    .Metres("width_before_m", "Mean true width before the step; true width at the start of the taper.", t => t.WidthBeforeM)
    .Metres("width_after_m", "Mean true width after the step; true width at the end of the taper.", t => t.WidthAfterM);
}
