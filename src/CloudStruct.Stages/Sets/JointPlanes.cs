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

    // Errors of attitude are what they are stated to be only on average: planes that miss one another by up to so many times
    // what joins them may still be pieces of one.
    private const double Looser = 2.5;

    /// <summary>Planes of one domain, in order of their first face.</summary>
    /// <param name="faces">All faces.</param>
    /// <param name="members">Indices of the faces of the domain, ascending.</param>
    /// <param name="noiseM">Scatter of points about a face [m].</param>
    /// <param name="reachM">Farthest from the larger face; null: by its size.</param>
    public static JointPlane[] Of(Face[] faces, int[] members, double noiseM, double? reachM)
    {
        int[] order = [.. members.OrderByDescending(m => faces[m].AreaM2).ThenBy(m => m)];
        var seeds = new NearFaces(faces, reachM);
        var pieces = new List<List<int>>();
        foreach (int face in order)
        {
            int best = seeds.Best(face, s => Misfit(faces[s], faces[face], noiseM, reachM), 1);
            if (best < 0)
            {
                seeds.Add(face);
                pieces.Add([face]);
            }
            else
            {
                pieces[best].Add(face);
            }
        }

        return [.. pieces.Select(p => Joined(faces, [.. p.Order()])).OrderBy(p => p.Faces[0])];
    }

    /// <summary>Per plane the number of its group: planes that may be pieces of one joint, though not near enough to be joined.</summary>
    /// <param name="faces">All faces.</param>
    /// <param name="planes">Planes of one domain.</param>
    /// <param name="noiseM">Scatter of points about a face [m].</param>
    /// <param name="reachM">Farthest from the larger face; null: by its size.</param>
    /// <remarks>Only the variance of a mean uses them: putting two independent planes in one group costs a degree of freedom,
    /// taking two pieces of one joint for independent makes the cone too narrow.</remarks>
    public static int[] Groups(Face[] faces, JointPlane[] planes, double noiseM, double? reachM)
    {
        int[] largest = [.. planes.Select(p => p.Faces.MaxBy(f => faces[f].AreaM2))];
        int[] order = [.. Enumerable.Range(0, planes.Length).OrderByDescending(p => faces[largest[p]].AreaM2).ThenBy(p => p)];
        int[] group = new int[planes.Length];
        var heads = new NearFaces(faces, reachM);
        int count = 0;
        var numbers = new List<int>();
        foreach (int p in order)
        {
            int best = heads.Best(largest[p], h => Misfit(faces[h], faces[largest[p]], noiseM, reachM), Looser);
            if (best < 0)
            {
                heads.Add(largest[p]);
                numbers.Add(count);
                group[p] = count++;
            }
            else
            {
                group[p] = numbers[best];
            }
        }

        return group;
    }

    /// <summary>One standard deviation of a face's attitude in each direction [rad].</summary>
    public static double ErrorOf(Face f) => Math.Max(0.02, f.Region.Cone95Deg) * Degree / Cone95Sigmas;

    /// <summary>How badly a face fits the plane of a larger one; below 1 within the errors of both.</summary>
    private static double Misfit(Face large, Face small, double noiseM, double? reachM)
    {
        Vec3 between = small.Middle - large.Middle;
        double distance2 = between.Dot(between), reach = ReachOf(large, reachM);
        if (distance2 > reach * reach) return double.PositiveInfinity;
        double errorLarge = ErrorOf(large), errorSmall = ErrorOf(small);
        double cosine = Math.Abs(large.Normal.Dot(small.Normal));
        double angle = Math.Acos(Math.Min(1, cosine)) / (Cone95Sigmas * Math.Sqrt((errorLarge * errorLarge) + (errorSmall * errorSmall) + (BendRad * BendRad)));
        double lean = Math.Sqrt((errorLarge * errorLarge) + (BendRad * BendRad / 4));
        double offset = Math.Abs(large.Normal.Dot(between)) / (2 * (noiseM + (Math.Sqrt(distance2) * lean)));
        return Math.Max(angle, offset);
    }

    /// <summary>How far from a face its plane is looked for [m].</summary>
    public static double ReachOf(Face large, double? reachM) => reachM ?? Math.Max(LeastReachM, ReachInSizes * Math.Sqrt(large.AreaM2));

    private static JointPlane Joined(Face[] faces, int[] own)
    {
        double[] precision = [.. own.Select(i => 1 / (Math.Pow(ErrorOf(faces[i]), 2) + (BendRad * BendRad / 4)))];
        OrientationTensor mean = OrientationTensor.Of([.. own.Select(i => faces[i].Normal)], precision);
        return new JointPlane(own, mean.MeanAxis, own.Sum(i => faces[i].AreaM2), 1 / Math.Sqrt(precision.Sum()));
    }
}
