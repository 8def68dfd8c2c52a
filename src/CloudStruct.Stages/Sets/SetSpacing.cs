using CloudStruct.Maths.Rates;
using CloudStruct.Maths.Directions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Width;

namespace CloudStruct.Stages.Sets;

/// <summary>Mean spacing of a set's exposed planes along its normal.</summary>
/// <remarks>The exposure is cut into lanes along the mean normal, square in cross-section. In every lane the rock seen is
/// measured along the normal, and the planes with a face in it are counted, each once: planes over length is the rate,
/// whatever the lanes' ends cut off. A plane that shows no face in a lane is not counted there: this is the spacing of
/// exposed planes, an upper bound of the spacing of joints.</remarks>
internal static class SetSpacing
{
    /// <summary>Fewest separate planes for a spacing.</summary>
    private const int FewestPlanes = 4;

    // Along the normal the rock is seen in steps of this part of a lane; a gap of one step is bridged, being as wide as a face
    // seen edge-on may hide.
    private const int StepsInLane = 10;

    /// <summary>Spacing with its 95 % limits, or null when too few planes or too little rock was seen.</summary>
    /// <param name="cloud">The cloud.</param>
    /// <param name="rock">Per point: a face of the set's domain that it lies on, 0-based, or -1.</param>
    /// <param name="planeOfFace">Per face: number of its plane in this set, or -1.</param>
    /// <param name="normal">Mean pole of the set.</param>
    /// <param name="laneM">Breadth of a lane [m].</param>
    public static Estimate? Of(WorkingCloud cloud, int[] rock, int[] planeOfFace, Vec3 normal, double laneM)
    {
        (Vec3 e1, Vec3 e2) = Tangent.Axes(normal);
        double step = laneM / StepsInLane;
        var seen = new HashSet<(int U, int V, int T)>();
        var events = new HashSet<(int U, int V, int Plane)>();
        for (int i = 0; i < rock.Length; i++)
        {
            if (rock[i] < 0) continue;
            Vec3 p = cloud.Place(i);
            int u = (int)Math.Floor(p.Dot(e1) / laneM), v = (int)Math.Floor(p.Dot(e2) / laneM);
            seen.Add((u, v, (int)Math.Floor(p.Dot(normal) / step)));
            if (planeOfFace[rock[i]] >= 0) events.Add((u, v, planeOfFace[rock[i]]));
        }

        int planes = events.Select(e => e.Plane).Distinct().Count();
        if (planes < FewestPlanes) return null;

        // A bridged step counts as seen.
        int bridged = seen.Count(s => !seen.Contains((s.U, s.V, s.T + 1)) && seen.Contains((s.U, s.V, s.T + 2)));
        double length = (seen.Count + bridged) * step;

        // Neighbouring lanes meet the same planes: the rate is that of all lanes, its error that of the separate planes.
        double rate = events.Count / length;
        return new CensoredRate(planes, planes / rate).MeanGap;
    }
}
