using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Width;

namespace CloudStruct.Stages.Width;

/// <summary>How much rock shows on both sides of a margin at a station: a trace that reaches into a covered or shaded stretch by
/// half a metre must not make that stretch measured.</summary>
internal sealed class MarginViews(WorkingCloud cloud, ClassifiedCloud classes, int dike)
{
    /// <summary>Least share of what the dike's stations usually show, on every side.</summary>
    private const double LeastShare = 0.12;

    /// <summary>Beside a hidden stretch a width that jumps by more than this share is the edge of what hides, not of the dike.</summary>
    private const double LargestJump = 0.06;

    private const double AlongM = 0.6, BesideM = 0.3, ReachM = 1.2;

    /// <summary>The stations, those with hardly any rock beside a margin turned into hidden ones.</summary>
    /// <param name="stations">Stations of this dike in order.</param>
    /// <param name="normals">Unit normal at each, from A to B.</param>
    public Station[] Doubted(Station[] stations, Vec3[] normals)
    {
        int[][] seen = [.. stations.Select((s, i) => s is { AtA: { } a, AtB: { } b } && IsMeasured(s) ? Counts(a, b, normals[i]) : [])];
        int[][] known = [.. seen.Where(c => c.Length == 4)];
        if (known.Length == 0) return stations;
        double[] least = [.. Enumerable.Range(0, 4).Select(k => LeastShare * known.Select(c => c[k]).Order().ElementAt(known.Length / 2))];
        return Jumps([.. stations.Select((s, i) =>
        {
            if (seen[i].Length != 4) return s;
            bool a = seen[i][0] >= least[0] && seen[i][1] >= least[1], b = seen[i][2] >= least[2] && seen[i][3] >= least[3];
            return a && b ? s : Hide(s, a, b);
        })]);
    }

    // Soil, scree and deep shade pass for host now and then; where they begin, the trace leaves the margin. Only the stations
    // next to what is hidden, or at the ends, are doubted: a step in the open is a step.
    private static Station[] Jumps(Station[] stations)
    {
        Station[] now = [.. stations];
        for (bool again = true; again;)
        {
            again = false;
            bool[] edge = [.. now.Select((s, i) => i == 0 || i == now.Length - 1 || !IsMeasured(now[i - 1]) || !IsMeasured(now[i + 1]))];
            for (int i = 0; i < now.Length; i++)
            {
                if (!edge[i] || now[i] is not { Status: StationStatus.Measured, TrueWidthM: { } own }) continue;
                double[] inner = [.. Enumerable.Range(0, now.Length).Where(j => !edge[j] && now[j].TrueWidthM is not null)
                    .OrderBy(j => Math.Abs(j - i)).ThenBy(j => j).Take(5).Select(j => now[j].TrueWidthM!.Value).Order()];
                if (inner.Length < 3 || Math.Abs(own - inner[inner.Length / 2]) <= LargestJump * inner[inner.Length / 2]) continue;
                now[i] = Hide(now[i], false, false) with { VisibleWidthM = own < inner[inner.Length / 2] ? own : null };
                again = true;
                break;
            }
        }

        return now;
    }

    private static Station Hide(Station s, bool seesA, bool seesB) => s with
    {
        Status = seesA ? StationStatus.BHidden : seesB ? StationStatus.AHidden : StationStatus.BothHidden,
        ApparentWidthM = null, TrueWidthM = null, TrueWidthLow95M = null, TrueWidthHigh95M = null,
        TrueWidthTotalLow95M = null, TrueWidthTotalHigh95M = null, ExposedWidthM = null,
        AtA = seesA ? s.AtA : null, AtB = seesB ? s.AtB : null,
    };

    private static bool IsMeasured(Station s) => s.Status is StationStatus.Measured or StationStatus.Unconstrained;

    // Host and dike beside A, host and dike beside B.
    private int[] Counts(Vec3 atA, Vec3 atB, Vec3 normal)
    {
        (int hostA, int dikeA) = Beside(atA, -normal);
        (int hostB, int dikeB) = Beside(atB, normal);
        return [hostA, dikeA, hostB, dikeB];
    }

    private (int Host, int Dike) Beside(Vec3 at, Vec3 outward)
    {
        if (!double.IsFinite(at.X + at.Y + at.Z)) return (0, 0);
        var near = new List<int>();
        SortedGridLookup.Within(cloud, at.X, at.Y, at.Z, ReachM, near);
        Vec3 along = outward.Cross(Vec3.Up) is { Length: > 1e-6 } level ? level.Unit() : new Vec3(1, 0, 0);
        int host = 0, inside = 0;
        foreach (int i in near)
        {
            Vec3 d = cloud.Place(i) - at;
            double beyond = d.Dot(outward);
            if (Math.Abs(d.Dot(along)) > AlongM || Math.Abs(beyond) > BesideM) continue;
            if (beyond > 0 && classes.Class[i] == (byte)RockClass.Host) host++;
            if (beyond < 0 && classes.DikeOfPoint[i] == dike && classes.Class[i] is (byte)RockClass.Dike or (byte)RockClass.Inclusion) inside++;
        }

        return (host, inside);
    }
}
