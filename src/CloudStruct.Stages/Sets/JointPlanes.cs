using CloudStruct.Maths.Directions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Sets;

/// <summary>Joins faces that are pieces of one plane.</summary>
/// <remarks>A joint is one draw from its set, though it may show in ten faces: counted as ten, the cone of the mean would be
/// three times too narrow. Faces are joined when they are parallel and lie in each other's plane within their errors.</remarks>
internal static class JointPlanes
{
    private const double Degree = Math.PI / 180;

    // Natural planes bend: pieces of one plane differ by about a degree more than their own errors.
    private const double BendRad = 1.0 * Degree;

    // Two standard deviations of a two-dimensional normal law hold 86 %, 2.45 hold 95 %.
    private const double Cone95Sigmas = 2.4477;

    /// <summary>Planes of one domain, in order of their first face.</summary>
    /// <param name="faces">All faces.</param>
    /// <param name="members">Indices of the faces of the domain.</param>
    /// <param name="noiseM">Scatter of points about a face [m].</param>
    /// <param name="reachM">Farthest apart; null: by size.</param>
    public static JointPlane[] Of(Face[] faces, int[] members, double noiseM, double? reachM)
    {
        int[] parent = [.. Enumerable.Range(0, members.Length)];
        int[] byX = [.. Enumerable.Range(0, members.Length)];
        double[] x = [.. members.Select(m => faces[m].Middle.X)];
        Array.Sort((double[])x.Clone(), byX);
        double farthest = members.Length == 0 ? 0 : members.Max(m => Reach(faces[m], faces[m], reachM));
        for (int p = 0; p < byX.Length; p++)
        {
            for (int q = p + 1; q < byX.Length && x[byX[q]] - x[byX[p]] <= farthest; q++)
            {
                if (OnOnePlane(faces[members[byX[p]]], faces[members[byX[q]]], noiseM, reachM)) Join(parent, byX[p], byX[q]);
            }
        }

        return [.. Enumerable.Range(0, members.Length)
            .GroupBy(i => Root(parent, i))
            .OrderBy(g => g.Min())
            .Select(g => Joined(faces, [.. g.Select(i => members[i]).Order()]))];
    }

    /// <summary>One standard deviation of a face's attitude in each direction [rad].</summary>
    public static double ErrorOf(Face f) => Math.Max(0.02, f.Region.Cone95Deg) * Degree / Cone95Sigmas;

    private static bool OnOnePlane(Face a, Face b, double noiseM, double? reachM)
    {
        Vec3 between = b.Middle - a.Middle;
        double distance = between.Length;
        if (distance > Reach(a, b, reachM)) return false;
        double error = Math.Sqrt(Math.Pow(ErrorOf(a), 2) + Math.Pow(ErrorOf(b), 2) + (BendRad * BendRad));
        double cosine = Math.Abs(a.Normal.Dot(b.Normal));
        if (cosine < Math.Cos(Math.Min(10 * Degree, Cone95Sigmas * error))) return false;

        // The offset is judged by both planes: by the small, uncertain one alone nearly everything would fit.
        double sa = Math.Max(ErrorOf(a), BendRad / 2), sb = Math.Max(ErrorOf(b), BendRad / 2);
        return Math.Abs(a.Normal.Dot(between)) < (2 * noiseM) + (2 * distance * sa)
            && Math.Abs(b.Normal.Dot(between)) < (2 * noiseM) + (2 * distance * sb);
    }

    private static double Reach(Face a, Face b, double? reachM) =>
        reachM ?? Math.Max(2, 4 * Math.Sqrt(Math.Max(a.AreaM2, b.AreaM2)));

    private static JointPlane Joined(Face[] faces, int[] own)
    {
        double[] precision = [.. own.Select(i => 1 / (Math.Pow(ErrorOf(faces[i]), 2) + (BendRad * BendRad / 4)))];
        OrientationTensor mean = OrientationTensor.Of([.. own.Select(i => faces[i].Normal)], precision);
        return new JointPlane(own, mean.MeanAxis, own.Sum(i => faces[i].AreaM2), 1 / Math.Sqrt(precision.Sum()));
    }

    private static void Join(int[] parent, int a, int b)
    {
        int ra = Root(parent, a), rb = Root(parent, b);
        if (ra != rb) parent[Math.Max(ra, rb)] = Math.Min(ra, rb);
    }

    private static int Root(int[] parent, int i)
    {
        while (parent[i] != i) i = parent[i] = parent[parent[i]];
        return i;
    }
}
