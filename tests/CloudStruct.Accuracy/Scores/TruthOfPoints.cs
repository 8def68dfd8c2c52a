using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Simulate;

namespace CloudStruct.Accuracy.Scores;

/// <summary>Which simulated point each working point is, or lies next to.</summary>
public static class TruthOfPoints
{
    /// <summary>Index of the nearest simulated point per working point; -1 where none lies within one spacing.</summary>
    public static int[] Nearest(WorkingCloud cloud, SimulatedOutcrop outcrop)
    {
        double cell = cloud.SpacingM;
        Vec3 origin = cloud.Frame.Origin;
        var order = new int[outcrop.Count];
        var keys = new long[outcrop.Count];
        for (int i = 0; i < outcrop.Count; i++)
        {
            order[i] = i;
            keys[i] = Key((outcrop.X[i] - origin.X) / cell, (outcrop.Y[i] - origin.Y) / cell, (outcrop.Z[i] - origin.Z) / cell);
        }

        Array.Sort(keys, order);
        var nearest = new int[cloud.Count];
        Parallel.For(0, cloud.Count, i =>
        {
            double best = cell * cell;
            nearest[i] = -1;
            for (int k = 0; k < 27; k++)
            {
                long key = Key((cloud.X[i] / cell) + (k % 3) - 1, (cloud.Y[i] / cell) + (k / 3 % 3) - 1, (cloud.Z[i] / cell) + (k / 9) - 1);
                int at = Array.BinarySearch(keys, key);
                if (at < 0) continue;
                while (at > 0 && keys[at - 1] == key) at--;
                for (; at < keys.Length && keys[at] == key; at++)
                {
                    int j = order[at];
                    double dx = outcrop.X[j] - origin.X - cloud.X[i], dy = outcrop.Y[j] - origin.Y - cloud.Y[i], dz = outcrop.Z[j] - origin.Z - cloud.Z[i];
                    double d = (dx * dx) + (dy * dy) + (dz * dz);
                    if (d < best || (d == best && j < nearest[i])) (best, nearest[i]) = (d, j);
                }
            }
        });
        return nearest;
    }

    private static long Key(double x, double y, double z) =>
        ((((long)Math.Floor(z) + (1 << 19)) << 42) | (((long)Math.Floor(y) + (1 << 20)) << 21)) | ((long)Math.Floor(x) + (1 << 20));
}
