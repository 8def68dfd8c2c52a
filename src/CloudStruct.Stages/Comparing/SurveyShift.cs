using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Comparing;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Comparing;

/// <summary>How far one model lies off another: from the offsets of paired faces along their normals, which are sharp, not from their middles.</summary>
internal static class SurveyShift
{
    private const int FewestPairs = 12, Rounds = 4;

    /// <summary>Between models of one coordinate system [m].</summary>
    private const double FarthestM = 1;

    /// <summary>Shift of the second against the first [m]; null when too few faces pair up, or all of them face one way.</summary>
    public static Vec3? Of(MeasuredPlane[] first, MeasuredPlane[] second)
    {
        var shift = default(Vec3);
        for (int round = 0; round < Rounds; round++)
        {
            List<(int A, int B, double)> pairs = PlanePairs.Of(first, second, shift, round == 0 ? FarthestM : 0.3);
            if (pairs.Count < FewestPairs) return null;
            if (Solve(first, second, pairs) is not { } found) return null;
            shift = found;
        }

        return shift;
    }

    private static Vec3? Solve(MeasuredPlane[] first, MeasuredPlane[] second, List<(int A, int B, double)> pairs)
    {
        var t = default(Vec3);
        for (int round = 0; round < 10; round++)
        {
            double[] rest = [.. pairs.Select(p => Gap(first[p.A], second[p.B], t))];
            double scale = Math.Max(1e-4, Differences.Median(rest.Select(Math.Abs)) / 0.6745);
            var h = default(Symmetric3);
            var g = default(Vec3);
            for (int i = 0; i < rest.Length; i++)
            {
                Vec3 n = first[pairs[i].A].Normal;
                double w = Math.Min(1, 1.5 * scale / Math.Max(Math.Abs(rest[i]), 1e-9));
                h += Symmetric3.Outer(n, w);
                g += n * (w * rest[i]);
            }

            if (h.Eigen().L3 < 0.02 * pairs.Count) return null;
            Vec3 step = h.Inverse().Times(g);
            t += step;
            if (step.Length < 1e-6) break;
        }

        return t;
    }

    private static double Gap(MeasuredPlane a, MeasuredPlane b, Vec3 shift) => a.Normal.Dot(b.Place - a.Place - shift);
}
