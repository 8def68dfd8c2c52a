using CloudStruct.Maths.Blocks;

namespace CloudStruct.Maths.Neighbours;

/// <summary>A rough distance between neighbouring points of a surface, to choose cells by.</summary>
public static class PointSpacing
{
    private const int Most = 1 << 14;
    private const double PerCell = 4;
    private const ulong Purpose = 0x73706163;

    /// <summary>Root of the surface per point, within a factor of about two [m]; 0 when all points lie in one place.</summary>
    /// <param name="x">East [m], finite.</param>
    /// <param name="y">North [m].</param>
    /// <param name="z">Up [m].</param>
    /// <remarks>The edge of cells is sought in which a random sample has four points an occupied cell on average; on a surface
    /// points per cell grow with the square of the edge.</remarks>
    public static double Rough(float[] x, float[] y, float[] z)
    {
        if (x.Length < 2) return 0;
        int m = Math.Min(Most, x.Length);
        int[] some = m == x.Length
            ? [.. Enumerable.Range(0, m)]
            : [.. Enumerable.Range(0, m).Select(i => new Draws(1, Purpose, (ulong)i).NextBelow(x.Length))];
        double reach = some.Max(i => Math.Max(Math.Abs(x[i] - x[0]), Math.Max(Math.Abs(y[i] - y[0]), Math.Abs(z[i] - z[0]))));
        if (!(reach > 0)) return 0;
        double low = reach * 1e-6, high = 2 * reach;
        for (int step = 0; step < 24 && high > 1.05 * low; step++)
        {
            double edge = Math.Sqrt(low * high);
            int cells = some.Select(i => (Math.Floor(x[i] / edge), Math.Floor(y[i] / edge), Math.Floor(z[i] / edge))).Distinct().Count();
            if (m > PerCell * cells) high = edge;
            else low = edge;
        }

        return high / Math.Sqrt(PerCell * x.Length / m);
    }
}
