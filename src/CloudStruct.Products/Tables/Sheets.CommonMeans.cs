using CloudStruct.Records.Sets;

namespace CloudStruct.Products.Tables;

public static partial class Sheets
{
    private static TableSheet<CommonMean> CommonMeans() => new TableSheet<CommonMean>
    {
        File = "common_means.csv",
        Title = "Tests of a common mean",
        Meaning = "One row for each pair of mean attitudes within 30 deg: contacts and sets, sets of different domains, and one set in different zones. May they be one?",
        From = f => f.Sets.CommonMeans,
    }
    .Text("first", "What is compared: a set, a margin of a dike, or a set in a zone.", m => m.First)
    .Text("second", "With what.", m => m.Second)
    .Text("zone", "Zone in which the sets were measured; empty for the whole survey.", m => m.Zone)
    .Angle("angle_deg", "Angle between the two means.", m => m.AngleDeg)
    .Number("statistic", "V of Watson 1983 for two means with unequal concentrations.", m => m.Statistic)
    .Number("p", "Probability of a larger statistic when the means are one.", m => m.P)
    .Number("n_first", "Independent planes or windows behind the first mean.", m => m.NFirst)
    .Number("n_second", "The same behind the second.", m => m.NSecond)
    .Word("verdict", "apart: p below 0.05. alike: above, and means 10 deg apart would have been told apart. undecided: above, but too little is known.", m => m.Verdict);
}
