using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Points;
using static System.FormattableString;

namespace CloudStruct.Stages.Contacts;

/// <summary>What lies beyond the last places where the margins of a dike were followed: host rock across its whole course (it ends
/// there, or steps aside), cover, or nothing.</summary>
internal static class DikeEnds
{
    private const int Samples = 150_000, Enough = 40;
    private const double HostShare = 0.8;

    /// <summary>A sentence for each end that lies inside the survey; empty for none.</summary>
    /// <param name="cloud">Working cloud.</param>
    /// <param name="classes">Its classes.</param>
    /// <param name="tracker">The dike's margins.</param>
    /// <param name="fromS">First place with a trace.</param>
    /// <param name="toS">Last.</param>
    public static string Said(WorkingCloud cloud, ClassifiedCloud classes, MarginTracker tracker, double fromS, double toS)
    {
        int[] host = new int[2], shown = new int[2];
        double width = tracker.Guess.WidthAt((fromS + toS) / 2), reach = Math.Max(1, width);
        int stride = Math.Max(1, cloud.Count / Samples);
        for (int i = 0; i < cloud.Count; i += stride)
        {
            SheetPoint at = tracker.Sheet.Of(cloud.Place(i));
            int end = at.S < fromS - (0.3 * reach) && at.S > fromS - (1.5 * reach) ? 0 : at.S > toS + (0.3 * reach) && at.S < toS + (1.5 * reach) ? 1 : -1;
            if (end < 0) continue;
            double a = tracker.Guess.Distance(Margin.A, at), b = tracker.Guess.Distance(Margin.B, at);
            if (a < 0.2 * width || b > -0.2 * width) continue;   // the middle of its course
            shown[end]++;
            if (classes.Class[i] == (byte)RockClass.Host) host[end]++;
        }

        string said = "";
        for (int end = 0; end < 2; end++)
        {
            if (shown[end] < Enough || host[end] < HostShare * shown[end]) continue;
            said += Invariant($" At the {(end == 0 ? "start" : "end")} of its chainage host rock lies across its course: it ends or steps aside there, inside the survey.");
        }

        return said;
    }
}
