using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Kernels;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Benchmarks;

/// <summary>How right the results of the kernels are: against brute force on some points, and against the truth in the file.</summary>
internal static class KernelTruth
{
    private const int Asked = 200;
    private const double RightDeg = 5;
    private const double LargeM2 = 0.25;

    /// <summary>Share of some points whose distances are those of brute force.</summary>
    public static Dictionary<string, double> Nearest(float[] x, float[] y, float[] z, int[] rows, int k)
    {
        int right = Some(x.Length).Count(i =>
        {
            float[] all = Distances(x, y, z, i);
            Array.Sort(all);   // itself first
            return Enumerable.Range(0, k).All(j => rows[(i * k) + j] >= 0 && Distance2(x, y, z, i, rows[(i * k) + j]) == all[j + 1]);
        });
        return new() { ["exact_share"] = (double)right / Asked };
    }

    /// <summary>The same for the number within a radius, and the mean number.</summary>
    public static Dictionary<string, double> Radius(WorkingCloud cloud, long[] starts, double radiusM)
    {
        float r2 = (float)radiusM * (float)radiusM;
        int right = Some(cloud.Count).Count(i => Distances(cloud.X, cloud.Y, cloud.Z, i).Count(d => d <= r2) - 1 == starts[i + 1] - starts[i]);
        return new() { ["exact_share"] = (double)right / Asked, ["mean_neighbours"] = (double)starts[^1] / cloud.Count };
    }

    /// <summary>Angle to the normal of the true plane, over points that lie on one.</summary>
    public static Dictionary<string, double> Normals(KernelFile? truth, int[] order, LocalPlanes planes)
    {
        if (truth is null || truth.Normals.Length != order.Length) return [];
        var errors = new List<double>();
        for (int i = 0; i < order.Length; i++)
        {
            Vec3 n = truth.Normals[order[i]];
            if (!(n.Length > 0.5)) continue;
            double c = Math.Abs(n.Dot(new Vec3(planes.NormalX[i], planes.NormalY[i], planes.NormalZ[i])));
            errors.Add(Math.Acos(Math.Min(1, c)) * 180 / Math.PI);
        }

        errors.Sort();
        return new() { ["median_deg"] = errors[errors.Count / 2], ["p95_deg"] = errors[(int)(0.95 * errors.Count)] };
    }

    /// <summary>Precision: points of reported faces that are right, over all reported. A face is right when half of its points carry one
    /// true face whose normal is within 5 deg. Recall: points of true faces of 0.25 m² or more that are found, over all of theirs;
    /// found when right faces hold half of their points.</summary>
    public static Dictionary<string, double> Faces(KernelFile? truth, Vec3 origin, WorkingCloud cloud, FaceSet found)
    {
        if (truth is null) return new() { ["faces"] = found.Faces.Length };
        var at = new Dictionary<(float, float, float), int>(truth.Places.Length);
        for (int i = 0; i < truth.Places.Length; i++)
        {
            Vec3 p = truth.Places[i] - origin;
            at[((float)p.X, (float)p.Y, (float)p.Z)] = i;
        }

        int[] trueFace = [.. Enumerable.Range(0, cloud.Count).Select(i => at.TryGetValue((cloud.X[i], cloud.Y[i], cloud.Z[i]), out int t) ? truth.Faces[t] : 0)];
        Dictionary<int, Vec3> normals = [];
        for (int i = 0; i < truth.Faces.Length; i++) normals.TryAdd(truth.Faces[i], truth.Normals[i]);
        Dictionary<int, int> size = trueFace.Where(t => t > 0).CountBy(t => t).ToDictionary();
        var covered = new Dictionary<int, int>();
        long rightPoints = 0, reported = 0;
        foreach (IGrouping<int, int> face in Enumerable.Range(0, cloud.Count).Where(i => found.FaceOfPoint[i] > 0).GroupBy(i => found.FaceOfPoint[i]))
        {
            int count = face.Count();
            reported += count;
            (int t, int own) = face.CountBy(i => trueFace[i]).MaxBy(c => c.Value);
            double cosine = t == 0 ? 0 : Math.Abs(normals[t].Dot(found.Faces[face.Key - 1].Normal));
            if (t == 0 || 2 * own < count || cosine < Math.Cos(RightDeg * Math.PI / 180)) continue;
            rightPoints += count;
            covered[t] = covered.GetValueOrDefault(t) + own;
        }

        double perPoint = found.Faces.Sum(f => f.AreaM2) / Math.Max(1, reported);
        var large = size.Where(s => s.Value * perPoint >= LargeM2).ToList();
        return new()
        {
            ["faces"] = found.Faces.Length,
            ["precision"] = (double)rightPoints / Math.Max(1, reported),
            ["recall"] = (double)large.Where(s => 2 * covered.GetValueOrDefault(s.Key) >= s.Value).Sum(s => s.Value) / Math.Max(1, large.Sum(s => s.Value)),
        };
    }

    private static IEnumerable<int> Some(int n) => Enumerable.Range(0, Asked).Select(q => new Draws(5, 1, (ulong)q).NextBelow(n));

    private static float[] Distances(float[] x, float[] y, float[] z, int i) => [.. Enumerable.Range(0, x.Length).Select(j => Distance2(x, y, z, i, j))];

    private static float Distance2(float[] x, float[] y, float[] z, int i, int j)
    {
        float dx = x[j] - x[i], dy = y[j] - y[i], dz = z[j] - z[i];
        return (dx * dx) + (dy * dy) + (dz * dz);
    }
}
