using CloudStruct.Maths.Directions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Width;
using MathNet.Numerics.Distributions;

namespace CloudStruct.Stages.Sets;

/// <summary>Mean length of a set's planes along strike, the ends that run out of sight taken into account.</summary>
/// <remarks>All length seen over half of all ends seen: each plane has two ends, so that ends per area over two are planes per area,
/// and length per area over planes per area is their mean length, whatever its law and however much the edges cut off (the
/// reasoning of Mauldon 1998). An end counts as seen when rock of the domain goes on beyond it. Pieces of one plane count as one
/// length with the gaps between them.</remarks>
internal static class SetPersistence
{
    private const int FewestEnds = 4;

    // Beyond an end rock is looked for within this many point spacings.
    private const double LookSpacings = 8;

    /// <summary>Persistence with 95 % limits; null when nearly no end was seen.</summary>
    /// <param name="cloud">The cloud.</param>
    /// <param name="faces">All faces.</param>
    /// <param name="planes">The planes of the set.</param>
    /// <param name="normal">Mean pole of the set.</param>
    /// <param name="grid">Rock points by place, see <see cref="RockGrid"/>.</param>
    public static Estimate? Of(WorkingCloud cloud, Face[] faces, JointPlane[] planes, Vec3 normal, RockGrid grid)
    {
        (Vec3 along, _) = PoleRegions.StrikeAndDip(normal);
        double look = LookSpacings * cloud.SpacingM, length = 0;
        if (!(look > 0)) return null;
        int ends = 0;
        foreach (JointPlane plane in planes)
        {
            (double from, double to, Vec3 first, Vec3 last) = (double.PositiveInfinity, double.NegativeInfinity, default, default);
            foreach (int f in plane.Faces)
            {
                double middle = faces[f].Middle.Dot(along), half = faces[f].LengthM / 2;
                if (middle - half < from) (from, first) = (middle - half, faces[f].Middle - (along * half));
                if (middle + half > to) (to, last) = (middle + half, faces[f].Middle + (along * half));
            }

            length += to - from;
            if (grid.Any(first - (along * (1.5 * look)), look)) ends++;
            if (grid.Any(last + (along * (1.5 * look)), look)) ends++;
        }

        if (ends < FewestEnds) return null;

        // Ends come in pairs: half as many independent ones. The limits are those of an exponential law (chi-square).
        double value = 2 * length / ends, n = ends / 2.0;
        return new Estimate(value, value * 2 * n / ChiSquared.InvCDF(2 * n, 0.975), value * 2 * n / ChiSquared.InvCDF(2 * n, 0.025));
    }
}
