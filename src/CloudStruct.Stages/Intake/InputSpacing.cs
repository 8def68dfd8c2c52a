using System.Runtime.InteropServices;
using CloudStruct.Maths.Fitting;
using CloudStruct.Maths.Neighbours;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Intake;

/// <summary>Typical distance between neighbouring points on the surface: the root of the surface per point.</summary>
/// <remarks>From the distance to the eighth neighbour, d8: a disc of that radius holds eight other points, so a point has
/// πd²/8 to itself. Steadier than the nearest neighbour, which in a cloud of overlapping image pairs may be a repetition.</remarks>
internal static class InputSpacing
{
    private const int Rank = 8;

    /// <summary>Median spacing of places that may lie anywhere [m]; 0 when there are too few. The scale is found by trying:
    /// from fine to coarse until most points have neighbours.</summary>
    public static double OfAny(Vec3[] places, int threads, CancellationToken stop)
    {
        if (places.Length < Rank + 1) return 0;
        double reach = places.Max(p => (p - places[0]).Length);
        if (reach == 0) return 0;
        double guess = reach / Math.Sqrt(places.Length) / 8;
        for (int trial = 0; trial < 12; trial++, guess *= 2)
        {
            List<double> spacing = All(places, guess, _ => true, threads, stop);
            if (spacing.Count > places.Length / 2) return Median(spacing);
        }

        return 0;
    }

    /// <summary>Median spacing of those places that a test lets through [m]; 0 when there are too few.</summary>
    /// <param name="places">Places within some kilometres of each other; parts of a cloud.</param>
    /// <param name="guessM">Rough spacing, above 0.</param>
    /// <param name="counts">Which places count; the others are neighbours only.</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Checked now and then.</param>
    public static double Of(Vec3[] places, double guessM, Func<Vec3, bool> counts, int threads, CancellationToken stop) =>
        places.Length < Rank + 1 ? 0 : Median(All(places, guessM, counts, threads, stop));

    private static List<double> All(Vec3[] places, double guessM, Func<Vec3, bool> counts, int threads, CancellationToken stop)
    {
        float[] x = Array.ConvertAll(places, p => (float)(p.X - places[0].X));
        float[] y = Array.ConvertAll(places, p => (float)(p.Y - places[0].Y));
        float[] z = Array.ConvertAll(places, p => (float)(p.Z - places[0].Z));
        (SortedGrid grid, int[] order) = GridBuilder.Build(x, y, z, (float)(3 * guessM), threads);
        x = Array.ConvertAll(order, i => x[i]);
        y = Array.ConvertAll(order, i => y[i]);
        z = Array.ConvertAll(order, i => z[i]);
        var neighbours = new int[places.Length * Rank];
        NearestNeighbours.Fill(grid, x, y, z, Rank, neighbours, null, threads, stop);
        var spacing = new List<double>(places.Length);
        for (int i = 0; i < places.Length; i++)
        {
            int j = neighbours[(i * Rank) + Rank - 1];
            if (j < 0 || !counts(places[order[i]])) continue;
            double d = new Vec3(x[j] - x[i], y[j] - y[i], z[j] - z[i]).Length;
            spacing.Add(d * Math.Sqrt(Math.PI / Rank));
        }

        return spacing;
    }

    private static double Median(List<double> values)
    {
        if (values.Count == 0) return 0;
        return OrderStatistic.Nth(CollectionsMarshal.AsSpan(values), values.Count / 2);
    }
}
