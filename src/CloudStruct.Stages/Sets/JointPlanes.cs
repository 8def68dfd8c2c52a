using CloudStruct.Maths.Directions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Sets;

/// <summary>Joins faces that are pieces of one plane.</summary>
/// <remarks>A joint is one draw from its set, though it may show in ten faces: counted as ten, the cone of the mean would be
/// three times too narrow. Faces are taken in order of falling area; each joins the plane of the larger face that it fits best,
/// or starts its own. It is held against that larger face alone, never against smaller ones, so that uncertain small faces
/// cannot chain planes together.</remarks>
internal static class JointPlanes
{
    private const double Degree = Math.PI / 180;

    // Natural planes bend: pieces of one plane differ by about a degree more than their own errors.
    private const double BendRad = 1.0 * Degree;

    // Of a two-dimensional normal law 95 % lie within 2.4477 standard deviations.
    private const double Cone95Sigmas = 2.4477;

    // Beyond it two pieces of one plane are as rare as two planes that happen to be in line.
    private const double LeastReachM = 5;
    private const double ReachInSizes = 6;

    // However uncertain, faces this far from parallel are not called one plane.
    private static readonly double CosineOfFarthest = Math.Cos(10 * Degree);

    /// <summary>Planes of one domain, in order of their first face.</summary>
    /// <param name="faces">All faces.</param>
    /// <param name="members">Indices of the faces of the domain, ascending.</param>
    /// <param name="noiseM">Scatter of points about a face [m].</param>
    /// <param name="reachM">Farthest from the larger face; null: by its size.</param>
    public static JointPlane[] Of(Face[] faces, int[] members, double noiseM, double? reachM)
    {
        int[] order = [.. members.OrderByDescending(m => faces[m].AreaM2).ThenBy(m => m)];
        var seeds = new List<int>();
        var normals = new List<Vec3>();   // of the seeds, side by side: nearly all pairs fail on the angle alone
        var pieces = new List<List<int>>();
        foreach (int face in order)
        {
            int best = -1;
            double least = 1;
            Vec3 normal = faces[face].Normal;
            for (int s = 0; s < normals.Count; s++)
            {
                if (Math.Abs(normals[s].Dot(normal)) < CosineOfFarthest) continue;
                double misfit = Misfit(faces[seeds[s]], faces[face], noiseM, reachM);
                if (misfit < least) (best, least) = (s, misfit);
            }

            if (best < 0)
            {
                seeds.Add(face);
                normals.Add(normal);
                pieces.Add([face]);
            }
            else
            {
                pieces[best].Add(face);
            }
        }

        return [.. pieces.Select(p => Joined(faces, [.. p.Order()])).OrderBy(p => p.Faces[0])];
    }

    /// <summary>One standard deviation of a face's attitude in each direction [rad].</summary>
    public static double ErrorOf(Face f) => Math.Max(0.02, f.Region.Cone95Deg) * Degree / Cone95Sigmas;

    /// <summary>How badly a face fits the plane of a larger one; below 1 within the errors of both.</summary>
    private static double Misfit(Face large, Face small, double noiseM, double? reachM)
    {
        Vec3 between = small.Middle - large.Middle;
        double distance2 = between.Dot(between), reach = reachM ?? Math.Max(LeastReachM, ReachInSizes * Math.Sqrt(large.AreaM2));
        if (distance2 > reach * reach) return double.PositiveInfinity;
        double errorLarge = ErrorOf(large), errorSmall = ErrorOf(small);
        double cosine = Math.Abs(large.Normal.Dot(small.Normal));
        double angle = Math.Acos(Math.Min(1, cosine)) / (Cone95Sigmas * Math.Sqrt((errorLarge * errorLarge) + (errorSmall * errorSmall) + (BendRad * BendRad)));
        double lean = Math.Sqrt((errorLarge * errorLarge) + (BendRad * BendRad / 4));
        double offset = Math.Abs(large.Normal.Dot(between)) / (2 * (noiseM + (Math.Sqrt(distance2) * lean)));
        return Math.Max(angle, offset);
    }

    private static JointPlane Joined(Face[] faces, int[] own)
    {
        double[] precision = [.. own.Select(i => 1 / (Math.Pow(ErrorOf(faces[i]), 2) + (BendRad * BendRad / 4)))];
        OrientationTensor mean = OrientationTensor.Of([.. own.Select(i => faces[i].Normal)], precision);
        return new JointPlane(own, mean.MeanAxis, own.Sum(i => faces[i].AreaM2), 1 / Math.Sqrt(precision.Sum()));
    }
}
