using System.Buffers.Binary;
using CloudStruct.Records.Frame;

namespace CloudStruct.Benchmarks;

/// <summary>The cloud of <see cref="BlockyCloud"/> with its truth, and what a kernel's result is worth against it.</summary>
internal sealed class BlockyTruth
{
    private const int Row = 33;

    /// <summary>Reads the file.</summary>
    public BlockyTruth(string path)
    {
        byte[] bytes = File.ReadAllBytes(path);
        int start = bytes.AsSpan().IndexOf("end_header\n"u8) + 11;
        int count = (bytes.Length - start) / Row;
        (X, Y, Z, Shade, Plane, Side, Normals) = (new float[count], new float[count], new float[count], new float[count], new int[count], new byte[count], new Vec3[count]);
        for (int i = 0; i < count; i++)
        {
            ReadOnlySpan<byte> row = bytes.AsSpan(start + (i * Row), Row);
            X[i] = BinaryPrimitives.ReadSingleLittleEndian(row);
            Y[i] = BinaryPrimitives.ReadSingleLittleEndian(row[4..]);
            Z[i] = BinaryPrimitives.ReadSingleLittleEndian(row[8..]);
            Normals[i] = new(BinaryPrimitives.ReadSingleLittleEndian(row[12..]), BinaryPrimitives.ReadSingleLittleEndian(row[16..]), BinaryPrimitives.ReadSingleLittleEndian(row[20..]));
            Shade[i] = BinaryPrimitives.ReadSingleLittleEndian(row[24..]);
            Plane[i] = BinaryPrimitives.ReadInt32LittleEndian(row[28..]);
            Side[i] = row[32];
        }
    }

    /// <summary>Points.</summary>
    public int Count => X.Length;

    /// <summary>Places [m].</summary>
    public float[] X { get; }

    /// <summary>Places [m].</summary>
    public float[] Y { get; }

    /// <summary>Places [m].</summary>
    public float[] Z { get; }

    /// <summary>What the class is to be told from.</summary>
    public float[] Shade { get; }

    /// <summary>Number of the true plane, 0 for strays.</summary>
    public int[] Plane { get; }

    /// <summary>True class, 0 or 1.</summary>
    public byte[] Side { get; }

    /// <summary>True normals.</summary>
    public Vec3[] Normals { get; }

    /// <summary>Median and 95th percentile of the angle to the true normal [deg], strays left out.</summary>
    public (double Median, double P95) NormalErrors(ReadOnlySpan<float> normals)
    {
        var errors = new List<double>(Count);
        for (int i = 0; i < Count; i++)
        {
            if (Plane[i] == 0) continue;
            var n = new Vec3(normals[3 * i], normals[(3 * i) + 1], normals[(3 * i) + 2]);
            errors.Add(n.Length > 0.5 ? Angle(n.Unit(), Normals[i]) : 90);
        }

        errors.Sort();
        return (errors[errors.Count / 2], errors[errors.Count * 95 / 100]);
    }

    /// <summary>How well points were put on planes.</summary>
    /// <remarks>A plane of 500 points (0.2 m²) or more is found when one label holds half of its points and is mostly of it. Precision:
    /// share of the labelled points that lie on the plane that most points of their label are of. Errors: least squares on each such label.</remarks>
    public FaceQuality Faces(ReadOnlySpan<int> labels)
    {
        var pairs = new Dictionary<(int Label, int Plane), int>();
        var size = new Dictionary<int, int>();
        for (int i = 0; i < Count; i++)
        {
            if (Plane[i] != 0) size[Plane[i]] = size.GetValueOrDefault(Plane[i]) + 1;
            if (labels[i] != 0) pairs[(labels[i], Plane[i])] = pairs.GetValueOrDefault((labels[i], Plane[i])) + 1;
        }

        Dictionary<int, (int Plane, int Points)> main = pairs.GroupBy(p => p.Key.Label)
            .ToDictionary(g => g.Key, g => g.MaxBy(p => (p.Value, -p.Key.Plane)) is var best ? (best.Key.Plane, best.Value) : default);
        int[] wanted = [.. size.Where(s => s.Value >= 500).Select(s => s.Key).Order()];
        var found = new HashSet<int>(main.Where(m => m.Value.Plane != 0 && 2 * m.Value.Points >= size[m.Value.Plane]).Select(m => m.Value.Plane));
        double right = main.Where(m => m.Value.Plane != 0).Sum(m => (double)m.Value.Points), all = pairs.Values.Sum(v => (double)v);
        List<double> errors = Refit(labels, main, size);
        return new(wanted.Length, (double)wanted.Count(found.Contains) / wanted.Length, right / Math.Max(1, all), errors.Count > 0 ? errors[errors.Count / 2] : 90, errors.Count > 0 ? errors[errors.Count * 95 / 100] : 90);
    }

    private List<double> Refit(ReadOnlySpan<int> labels, Dictionary<int, (int Plane, int Points)> main, Dictionary<int, int> size)
    {
        var points = main.Where(m => m.Value.Plane != 0 && size[m.Value.Plane] >= 500 && 2 * m.Value.Points >= size[m.Value.Plane]).ToDictionary(m => m.Key, _ => new List<int>());
        for (int i = 0; i < Count; i++)
        {
            if (labels[i] != 0 && points.TryGetValue(labels[i], out List<int>? list)) list.Add(i);
        }

        var errors = new List<double>();
        foreach ((int label, List<int> at) in points)
        {
            Vec3 n = Normals[at.First(i => Plane[i] == main[label].Plane)], middle = at.Aggregate(default(Vec3), (s, i) => s + At(i)) / at.Count;
            Vec3 u = n.Cross(Math.Abs(n.Z) < 0.9 ? Vec3.Up : new Vec3(1, 0, 0)).Unit(), v = n.Cross(u);
            double uu = 0, uv = 0, vv = 0, uw = 0, vw = 0;
            foreach (int i in at)
            {
                Vec3 d = At(i) - middle;
                (double a, double b, double w) = (d.Dot(u), d.Dot(v), d.Dot(n));
                uu += a * a; uv += a * b; vv += b * b; uw += a * w; vw += b * w;
            }

            double det = (uu * vv) - (uv * uv), slopeU = ((uw * vv) - (vw * uv)) / det, slopeV = ((vw * uu) - (uw * uv)) / det;
            errors.Add(Math.Atan(Math.Sqrt((slopeU * slopeU) + (slopeV * slopeV))) * 180 / Math.PI);
        }

        errors.Sort();
        return errors;
    }

    private Vec3 At(int i) => new(X[i], Y[i], Z[i]);

    private static double Angle(Vec3 a, Vec3 b) => Math.Asin(Math.Min(1, a.Cross(b).Length)) * 180 / Math.PI;
}

/// <summary>How well points were put on planes: planes asked for, share found, share of labelled points on their plane, errors of refitted normals [deg].</summary>
internal readonly record struct FaceQuality(int Planes, double Recall, double Precision, double MedianDeg, double P95Deg);
