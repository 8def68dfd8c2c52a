using CloudStruct.Records.Comparing;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Comparing;

/// <summary>Which plane of one survey is which plane of the other: by place and attitude, never by number.</summary>
internal static class PlanePairs
{
    /// <summary>Two surveys of one face may differ by this much and by three times their stated errors [deg].</summary>
    private const double LeastGateDeg = 15;

    private const double LargestAreaRatio = 2.5;

    /// <summary>Pairs of which each is the other's nearest, in the order of the first.</summary>
    /// <param name="first">Planes.</param>
    /// <param name="second">Planes of the other survey.</param>
    /// <param name="slackM">How far the middles may lie apart beyond half of the plane's size [m].</param>
    public static List<(int First, int Second, double DistanceM)> Of(MeasuredPlane[] first, MeasuredPlane[] second, double slackM)
    {
        double cell = Math.Max(1, slackM + 1);
        ILookup<(int, int), int> at = Enumerable.Range(0, second.Length).ToLookup(j => Cell(second[j].Place, cell));
        var best = new (int Of, double Cost, double DistanceM)[first.Length];
        var back = new (int Of, double Cost)[second.Length];
        Array.Fill(best, (-1, double.PositiveInfinity, 0));
        Array.Fill(back, (-1, double.PositiveInfinity));
        for (int i = 0; i < first.Length; i++)
        {
            MeasuredPlane a = first[i];
            double reach = slackM + (0.5 * Math.Max(a.LengthM, a.HeightM));
            int around = (int)Math.Ceiling(reach / cell);
            (int cx, int cy) = Cell(a.Place, cell);
            for (int dx = -around; dx <= around; dx++)
            {
                for (int dy = -around; dy <= around; dy++)
                {
                    foreach (int j in at[(cx + dx, cy + dy)])
                    {
                        MeasuredPlane b = second[j];
                        double distance = (b.Place - a.Place).Length;
                        if (distance > reach) continue;
                        if (a.AreaM2 > 0 && (a.AreaM2 > LargestAreaRatio * b.AreaM2 || b.AreaM2 > LargestAreaRatio * a.AreaM2)) continue;
                        if (Differences.AngleDeg(a.Normal, b.Normal) > Math.Max(LeastGateDeg, 3 * Math.Sqrt((a.MajorDeg * a.MajorDeg) + (b.MajorDeg * b.MajorDeg)))) continue;
                        if (distance < best[i].Cost) best[i] = (j, distance, distance);
                        if (distance < back[j].Cost) back[j] = (i, distance);
                    }
                }
            }
        }

        var pairs = new List<(int, int, double)>();
        for (int i = 0; i < first.Length; i++)
        {
            if (best[i].Of >= 0 && back[best[i].Of].Of == i) pairs.Add((i, best[i].Of, best[i].DistanceM));
        }

        return pairs;
    }

    private static (int, int) Cell(Vec3 p, double cell) => ((int)Math.Floor(p.X / cell), (int)Math.Floor(p.Y / cell));
}
