using System.Runtime.Intrinsics;
using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Maths.Kernels;

/// <summary>The surface that each point stands for: the part of its tangent plane that is nearer to it than to any neighbour.</summary>
/// <remarks>The cell is star-shaped, so its area is the mean of half the squared distance to its rim over all directions;
/// sixteen directions are taken, turned from point to point by the golden angle so that no lattice of points can
/// resonate with them. Toward an open side (no neighbour) the cell ends half a local spacing away. Unlike one over the
/// density within a radius this does not swell along outlines, and unlike one value per voxel it holds for any slope
/// against the voxel grid.</remarks>
public static class SurfaceShare
{
    private const int Directions = 16;

    // In units of the local spacing as 16 neighbours show it. A rim farther than this is taken for an open side.
    private const float Open = 1.15f;
    private const float Half = 0.40f;

    // Eight directions of the half circle, in 64 turned versions: cosines cost more than all the rest.
    private const int Turns = 64;
    private const double GoldenAngle = 2.399963229728653;

    private static readonly Vector256<float>[] Cosines = [.. Enumerable.Range(0, Turns).Select(t => HalfFan(TurnOf(t)))];
    private static readonly Vector256<float>[] Sines = [.. Enumerable.Range(0, Turns).Select(t => HalfFan(TurnOf(t) - (Math.PI / 2)))];

    /// <summary>Area per point [m²].</summary>
    /// <param name="cloud">Points with neighbours.</param>
    /// <param name="nx">Unit normals.</param>
    /// <param name="ny">Unit normals.</param>
    /// <param name="nz">Unit normals.</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Checked per block.</param>
    public static float[] Of(WorkingCloud cloud, float[] nx, float[] ny, float[] nz, int threads, CancellationToken stop)
    {
        var area = new float[cloud.Count];
        BlockParallel.For(
            area.Length,
            threads,
            stop,
            (from, to) =>
            {
                for (int i = from; i < to; i++) area[i] = One(cloud, i, new Vec3(nx[i], ny[i], nz[i]));
            });
        return area;
    }

    private static float One(WorkingCloud cloud, int i, Vec3 n)
    {
        ReadOnlySpan<int> row = cloud.Neighbours.AsSpan(i * WorkingCloud.K, WorkingCloud.K);
        int found = 0;
        while (found < row.Length && row[found] >= 0) found++;

        // Sixteen neighbours and the point itself within the distance of the last one.
        float spacing = (float)cloud.SpacingM;
        if (found > 0)
        {
            Vec3 last = cloud.Place(row[found - 1]) - cloud.Place(i);
            spacing = (float)Math.Min(3 * spacing, Math.Max(0.1 * spacing, last.Length * Math.Sqrt(Math.PI / (found + 0.5))));
        }

        (Vec3 u, Vec3 v) = Axes(n);
        int turn = i % Turns;
        Vector256<float> cosLow = Cosines[turn], sinLow = Sines[turn];
        Vector256<float> rimLow = Vector256.Create(Open * spacing), rimHigh = rimLow, none = Vector256<float>.Zero;
        for (int k = 0; k < found; k++)
        {
            Vec3 d = cloud.Place(row[k]) - cloud.Place(i);
            float a = (float)d.Dot(u), b = (float)d.Dot(v), half = 0.5f * ((a * a) + (b * b));
            if (half <= 0) continue;

            // Half the squared distance over the part along the direction; the other eight directions are opposite.
            Vector256<float> along = (cosLow * a) + (sinLow * b);
            Vector256<float> rim = Vector256.Create(half) / along;
            rimLow = Vector256.ConditionalSelect(Vector256.GreaterThan(along, none), Vector256.Min(rimLow, rim), rimLow);
            rimHigh = Vector256.ConditionalSelect(Vector256.LessThan(along, none), Vector256.Min(rimHigh, -rim), rimHigh);
        }

        Vector256<float> open = Vector256.Create(Open * spacing), end = Vector256.Create(Half * spacing);
        rimLow = Vector256.ConditionalSelect(Vector256.LessThan(rimLow, open), rimLow, end);
        rimHigh = Vector256.ConditionalSelect(Vector256.LessThan(rimHigh, open), rimHigh, end);
        return (float)(Math.PI / Directions) * (Vector256.Sum(rimLow * rimLow) + Vector256.Sum(rimHigh * rimHigh));
    }

    private static double TurnOf(int t) => t * GoldenAngle % (2 * Math.PI / Directions);

    private static Vector256<float> HalfFan(double turn)
    {
        Span<float> c = stackalloc float[8];
        for (int k = 0; k < 8; k++) c[k] = (float)Math.Cos(turn + (k * 2 * Math.PI / Directions));
        return Vector256.Create<float>(c);
    }

    private static (Vec3 U, Vec3 V) Axes(Vec3 n)
    {
        Vec3 other = Math.Abs(n.Z) < 0.9 ? new Vec3(0, 0, 1) : new Vec3(1, 0, 0);
        Vec3 u = n.Cross(other).Unit();
        return (u, n.Cross(u));
    }
}
