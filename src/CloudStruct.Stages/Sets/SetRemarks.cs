using CloudStruct.Maths.Directions;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Sets;

/// <summary>What the stage says about the sets of a domain.</summary>
internal static class SetRemarks
{
    // Beyond a gap of ten in BIC the runner-up has no case (Kass and Raftery 1995, J. Am. Stat. Assoc. 90, 773-795).
    private const double CertainGap = 10;

    /// <summary>Says it.</summary>
    public static void Say(
        StageContext context, string word, AxisClusters clusters, int planes, int faces, SetSettings settings, FaceDomain domain)
    {
        if (clusters.Count == 0)
        {
            if (domain != FaceDomain.Margin)
            {
                string why = planes < settings.FewestPlanes
                    ? Invariant($"fewer than {settings.FewestPlanes} planes")
                    : clusters.TooWide > 0 ? "their poles scatter too widely" : "their poles are not gathered more than chance would have it";
                Say(context, Invariant($"No set in the {word}: {faces} {(faces == 1 ? "face" : "faces")} on {planes} {(planes == 1 ? "plane" : "planes")}, {why}."), false);
            }

            return;
        }

        int left = clusters.ClusterOf.Count(c => c < 0);
        bool doubtful = clusters.BicGap < CertainGap;
        string doubt = doubtful ? Invariant($" Another number of clusters would fit nearly as well (BIC differs by {clusters.BicGap:0.0}).") : "";
        string icl = clusters.IclComponents != clusters.Components
            ? Invariant($" ICL, which asks for clear borders, takes {clusters.IclComponents} of the {clusters.Components} clusters that BIC takes.") : "";
        Say(
            context,
            Invariant($"{word}: {clusters.Count} {(clusters.Count == 1 ? "set" : "sets")} from {faces} {(faces == 1 ? "face" : "faces")} on {planes} separate {(planes == 1 ? "plane" : "planes")}; {left} {(left == 1 ? "plane belongs" : "planes belong")} to none.{doubt}{icl}"),
            doubtful);
    }

    private static void Say(StageContext context, string text, bool doubtful) => context.Say(new Remark("sets", text, doubtful));
}
