using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Comparing;
using CloudStruct.Records.Frame;
using MathNet.Numerics.Statistics;

namespace CloudStruct.Stages.Comparing;

/// <summary>Lays one survey onto another: the shift from the offsets of paired faces along their normals, which are sharp, not from their
/// middles; the rotation from the normals. Both are found in turn, since a rotation moves what lies far out.</summary>
internal static class Aligned
{
    private const int FewestPairs = 12, Rounds = 5;

    /// <summary>How far middles may lie apart at first, beyond half of a face's size: models of one coordinate system [m].</summary>
    private const double FarthestM = 1;

    /// <summary>The second survey on the first, the shift [m] and rotation that were taken off; null where too few faces pair up or all face one way.</summary>
    /// <remarks>The rotation is about the middle of the first survey's faces; the shift is that of this middle.</remarks>
    public static (MeasuredResults Moved, Vec3? ShiftM, CommonRotation? Rotation) Onto(MeasuredResults first, MeasuredResults second)
    {
        Vec3 middle = first.Faces.Length == 0 ? default : first.Faces.Aggregate(default(Vec3), (s, f) => s + f.Place) / first.Faces.Length;
        Vec3 turn = default, shift = default;
        bool shifted = false;
        CommonRotation? last = null;
        MeasuredResults moved = second;
        for (int round = 0; round < Rounds; round++)
        {
            List<(int A, int B, double)> pairs = PlanePairs.Of(first.Faces, moved.Faces, round == 0 ? FarthestM : 0.3);
            last = CommonRotation.Of(
                [.. pairs.Select(p => first.Faces[p.A].Normal)], [.. pairs.Select(p => moved.Faces[p.B].Normal)], [.. pairs.Select(p => Differences.Sigma(first.Faces[p.A], moved.Faces[p.B]))]);
            if (last is not null)
            {
                turn = CommonRotation.Compose(last.Vector, turn);
                moved = Move(second, middle, turn, shift);
            }

            if (pairs.Count >= FewestPairs && Shift(first.Faces, moved.Faces, pairs) is { } step)
            {
                shift += step;
                shifted = true;
                moved = Move(second, middle, turn, shift);
            }
        }

        return (moved, shifted ? shift : null, last is null ? null : last with { Vector = turn });
    }

    private static MeasuredResults Move(MeasuredResults results, Vec3 middle, Vec3 turn, Vec3 shift)
    {
        return results with
        {
            Faces = [.. results.Faces.Select(Plane)],
            Contacts = [.. results.Contacts.Select(Plane)],
            Widths = [.. results.Widths.Select(w => w with { Place = At(w.Place) })],
        };

        MeasuredPlane Plane(MeasuredPlane p) => p with { Place = At(p.Place), Normal = CommonRotation.Turn(p.Normal, -turn) };

        Vec3 At(Vec3 p) => middle + CommonRotation.Turn(p - middle, -turn) - shift;
    }

    private static Vec3? Shift(MeasuredPlane[] first, MeasuredPlane[] second, List<(int A, int B, double)> pairs)
    {
        var t = default(Vec3);
        for (int round = 0; round < 10; round++)
        {
            double[] rest = [.. pairs.Select(p => first[p.A].Normal.Dot(second[p.B].Place - first[p.A].Place - t))];
            double scale = Math.Max(1e-4, Statistics.Median(rest.Select(Math.Abs)) / 0.6745);
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
}
