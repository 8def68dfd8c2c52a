using System.Runtime.InteropServices;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Faces;

/// <summary>All points that a face is measured on: its own, and those under its outline that no face owns, within a wide band.</summary>
/// <remarks>Faces are detected in a tight band, which cuts the tails of the noise off; attitude and region measured on the
/// tight points alone come out too sure by a fifth.</remarks>
internal sealed class WidePatch
{
    private const double BandOverScatter = 4;

    // Where the noise is smooth the tight band cuts whole corners off a face, and what is left is tilted. So the gathering goes on
    // beyond the outline over unowned points that lie nearly in the plane. On single faces under noise of 11 to 22 cm this brought coverage
    // between 0.25 and 1 m² from 0.80-0.90 to 0.89-0.95. Beside small faces it gathers worn edges instead.
    private const double BeyondOverBand = 0.75;
    private const double BeyondBendDeg = 12;
    private const double RimlessM2 = 0.25;

    private WidePatch(int[] points, PlaneFit plane, double scaleM, Coverage coverage, Vec3 along, Vec3 up)
    {
        Points = points;
        Plane = plane;
        ScaleM = scaleM;
        Coverage = coverage;
        Along = along;
        Up = up;
    }

    /// <summary>Point indices, ascending.</summary>
    public int[] Points { get; }

    /// <summary>Bisquare plane of the points.</summary>
    public PlaneFit Plane { get; }

    /// <summary>Scatter of the points, from their median distance [m].</summary>
    public double ScaleM { get; }

    /// <summary>Raster of the face's own points, in coordinates along <see cref="Along"/> and <see cref="Up"/> from the
    /// centroid of the plane it was found with.</summary>
    public Coverage Coverage { get; }

    /// <summary>Strike direction.</summary>
    public Vec3 Along { get; }

    /// <summary>Up the dip.</summary>
    public Vec3 Up { get; }

    /// <summary>Gathers and fits.</summary>
    /// <param name="surface">The points.</param>
    /// <param name="pieces">Labels, sorted.</param>
    /// <param name="label">The face.</param>
    /// <param name="scatterM">Scatter of the cloud about large faces [m].</param>
    public static WidePatch Of(Surface surface, Pieces pieces, int label, double scatterM)
    {
        PlaneFit plane = pieces.Planes[label];
        ReadOnlySpan<int> own = pieces.Of(label);
        (Vec3 along, Vec3 down) = Maths.Directions.PoleRegions.StrikeAndDip(plane.Normal);
        Vec3 up = -down;
        var u = new double[own.Length];
        var v = new double[own.Length];
        for (int i = 0; i < own.Length; i++)
        {
            Vec3 d = surface.Place(own[i]) - plane.Centroid;
            (u[i], v[i]) = (d.Dot(along), d.Dot(up));
        }

        var coverage = new Coverage(u, v, surface.SpacingM);
        int[] points = Gather(surface, pieces, own, plane, coverage, along, up, BandOverScatter * scatterM);
        (PlaneFit fit, double scale) = Fit(surface, points, plane, scatterM);
        return new WidePatch(points, fit, scale, coverage, along, up);
    }

    /// <summary>Coordinates, distances and pseudo-residuals of the points about the fitted plane.</summary>
    public (double[] U, double[] V, double[] Distance, double[] Pseudo, double[] Weight) Columns(Surface surface)
    {
        int n = Points.Length;
        double[] u = new double[n], v = new double[n], r = new double[n], pseudo = new double[n], weight = new double[n];
        double limit = RobustPlane.RefitConstant * ScaleM, steep = 0;
        int inside = 0;
        Vec3 e1 = (Along - (Plane.Normal * Along.Dot(Plane.Normal))).Unit(), e2 = Plane.Normal.Cross(e1);
        for (int i = 0; i < n; i++)
        {
            Vec3 d = surface.Place(Points[i]) - Plane.Centroid;
            (u[i], v[i], r[i]) = (d.Dot(e1), d.Dot(e2), d.Dot(Plane.Normal));
            double q2 = r[i] / limit * (r[i] / limit);
            if (q2 >= 1) continue;
            weight[i] = 1;
            pseudo[i] = RobustPlane.Weight(r[i] / limit) * r[i];
            steep += (1 - q2) * (1 - (5 * q2));
            inside++;
        }

        // The error of a robust fit is that of least squares on psi(r) over the mean slope of psi, not on the residuals that
        // its weights have shrunk (P. J. Huber 1981, Robust statistics: asymptotic variance of M-estimates).
        double slope = Math.Max(0.3, steep / Math.Max(1, inside));
        for (int i = 0; i < n; i++) pseudo[i] /= slope;
        return (u, v, r, pseudo, weight);
    }

    private static int[] Gather(
        Surface surface, Pieces pieces, ReadOnlySpan<int> own, in PlaneFit plane, Coverage coverage, Vec3 along, Vec3 up, double bandM)
    {
        int[] label = pieces.Label;
        double beyondCosine = own.Length * surface.PointAreaM2 >= RimlessM2 ? Math.Cos(BeyondBendDeg * Math.PI / 180) : 2;
        Marks seen = surface.RentMarks();
        var front = new List<int>();
        foreach (int i in own) Look(i, plane);
        for (int at = 0; at < front.Count; at++) Look(front[at], plane);
        surface.Return(seen);
        front.Sort();
        return Merge(own, CollectionsMarshal.AsSpan(front));

        void Look(int i, in PlaneFit plane)
        {
            foreach (int j in surface.NeighboursOf(i))
            {
                if (j < 0) break;
                if (label[j] != 0 || seen.Has(j)) continue;
                Vec3 d = surface.Place(j) - plane.Centroid;
                double off = Math.Abs(d.Dot(plane.Normal));
                if (off > bandM) continue;
                bool under = coverage.Holds(d.Dot(along), d.Dot(up));
                if (!under && (off > BeyondOverBand * bandM || surface.Agreement(j, plane.Normal) < beyondCosine)) continue;
                seen.Set(j);
                front.Add(j);
            }
        }
    }

    private static int[] Merge(ReadOnlySpan<int> a, ReadOnlySpan<int> b)
    {
        int[] all = new int[a.Length + b.Length];
        for (int k = 0, i = 0, j = 0; k < all.Length; k++) all[k] = j == b.Length || (i < a.Length && a[i] < b[j]) ? a[i++] : b[j++];
        return all;
    }

    private static (PlaneFit Plane, double ScaleM) Fit(Surface surface, int[] points, PlaneFit start, double scatterM)
    {
        var places = new Vec3[points.Length];
        var distance = new double[points.Length];
        for (int i = 0; i < points.Length; i++) places[i] = surface.Place(points[i]);
        PlaneFit plane = start;
        double scale = scatterM;
        for (int round = 0; round < 3; round++)
        {
            for (int i = 0; i < points.Length; i++) distance[i] = Math.Abs(plane.Distance(places[i]));
            double middle = OrderStatistic.Nth<double>(distance, distance.Length / 2);

            // Its own scatter, but within a factor of two of the scene's: a face of few points cannot tell more.
            scale = Math.Clamp(1.4826 * middle, scatterM / 2, 2 * scatterM);
            plane = RobustPlane.Refit(places, plane, scale, 8);
        }

        return (plane, scale);
    }
}
