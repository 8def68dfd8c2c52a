using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Contacts;

/// <summary>The plane that the ground along a dike comes nearest to: a trace that does not leave it fixes no dip.</summary>
internal sealed class GroundPlanes
{
    private const int Samples = 60_000;
    private readonly List<(double S, Vec3 Place)> near = [];
    private readonly double windowM;

    /// <summary>Gathers points about the dike.</summary>
    public GroundPlanes(WorkingCloud cloud, MarginTracker tracker)
    {
        windowM = tracker.WindowM;
        int stride = Math.Max(1, cloud.Count / Samples);
        for (int i = 0; i < cloud.Count; i += stride)
        {
            Vec3 p = cloud.Place(i);
            SheetPoint at = tracker.Sheet.Of(p);
            double flank = Math.Max(1, tracker.Guess.WidthAt(at.S) / 2);
            if (tracker.Guess.Distance(Records.Contacts.Margin.A, at) > -flank && tracker.Guess.Distance(Records.Contacts.Margin.B, at) < flank) near.Add((at.S, p));
        }

        near.Sort((a, b) => a.S.CompareTo(b.S));
    }

    /// <summary>Unit normal of the ground within half a window of a place along strike; up where there are too few points.</summary>
    public Vec3 NormalAt(double s)
    {
        var sums = default(Moments);
        bool any = false;
        foreach ((double at, Vec3 p) in near)
        {
            if (at < s - (windowM / 2)) continue;
            if (at > s + (windowM / 2)) break;
            if (!any) sums = new Moments(p);
            any = true;
            sums.Add(p.X, p.Y, p.Z);
        }

        return sums.Weight < 12 ? Vec3.Up : PlaneFit.From(sums).Normal;
    }
}
