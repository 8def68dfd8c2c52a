using CloudStruct.Maths.Rates;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Width;

namespace CloudStruct.Stages.Sets;

/// <summary>Mean spacing of a set's exposed planes along its normal, with limits for the spacing of all its joints.</summary>
/// <remarks>In every cube of the surface lines are laid over the ground in the direction in which the set's normal falls on it.
/// Along each the rock seen is measured along the normal, and the planes of the set that the line meets are counted, each once:
/// planes over length is the rate of an exponential law, whatever the ends cut off. A joint between blocks that end level shows
/// no face and is not met; on a cliff that the set itself makes every course of blocks ends at a joint of its own. So the value
/// is of exposed planes, and the limits allow for what that was worth on simulated rock whose joints are all known.</remarks>
internal static class SetSpacing
{
    /// <summary>Fewest separate planes for a spacing.</summary>
    private const int FewestPlanes = 4;

    // Where the ground lies nearer to the set's planes than 20 deg a line along the normal is short and meets what it meets by chance.
    private const double LeastSine = 0.34;

    // Exposed over true spacing on simulated outcrops (plans no-dike and demo, seeds 1-5, true and found faces, 60 sets): mean and
    // spread of the logarithm. Some joints show no face, and on a cliff the set's own courses count too many. Lines only where
    // the set stands above 50 deg to the ground were tried with coarser steps: the spread was 0.52.
    private const double HiddenLog = 0.14, HiddenSpread = 0.42;

    // A line is so many point spacings broad: then gaps between points do not break it.
    private const double LineSpacings = 4;

    /// <summary>Spacing with its 95 % limits, or null when too few planes or too little rock was seen.</summary>
    /// <param name="cloud">The cloud.</param>
    /// <param name="surface">The rock seen, in cubes.</param>
    /// <param name="rock">Per point: a face of the set's domain that it lies on, 0-based, or -1.</param>
    /// <param name="planeOfFace">Per face: number of its plane in this set, or -1.</param>
    /// <param name="normal">Mean pole of the set.</param>
    /// <param name="lineM">Breadth of a line [m]; null: by the spacing of the points.</param>
    public static Estimate? Of(WorkingCloud cloud, SurfaceCells surface, int[] rock, int[] planeOfFace, Vec3 normal, double? lineM)
    {
        double breadth = lineM ?? (LineSpacings * cloud.SpacingM);
        double step = cloud.SpacingM;
        if (!(breadth > 0 && step > 0)) return null;
        var met = new HashSet<(int U, int Plane)>();
        var planes = new HashSet<int>();
        var seen = new List<(int U, int T, int V)>();
        var cells = new List<(double Planes, double LengthM)>();
        foreach (SurfaceCells.Cell cell in surface.Cells)
        {
            Vec3 across = normal.Cross(cell.Normal);
            if (across.Length < LeastSine) continue;
            Vec3 u = across.Unit(), v = normal.Cross(u);
            seen.Clear();
            met.Clear();
            foreach (int i in cell.Points)
            {
                Vec3 p = cloud.Place(i);
                int line = (int)Math.Floor(p.Dot(u) / breadth), plane = planeOfFace[rock[i]];
                if (plane < 0) seen.Add((line, (int)Math.Floor(p.Dot(normal) / step), (int)Math.Floor(p.Dot(v) / breadth)));
                else if (met.Add((line, plane))) planes.Add(plane);
            }

            cells.Add((met.Count, Steps(seen) * step));
        }

        if (planes.Count < FewestPlanes || ClusteredRate.MeanGap(cells, planes.Count) is not { } shown) return null;
        double sampling = Math.Log(shown.High95 / shown.Value), half = Math.Sqrt((sampling * sampling) + Math.Pow(1.96 * HiddenSpread, 2));
        return new Estimate(shown.Value, shown.Value * Math.Exp(-HiddenLog - half), shown.Value * Math.Exp(half - HiddenLog));
    }

    /// <summary>Steps along the normal that lines make over the ground. Where the ground lies over itself (a cliff that goes in and
    /// out) each layer counts; what is steep within one step does not. Gaps of up to three steps are bridged: points lie unevenly,
    /// and a face seen edge-on hides as much. Steps as long as a line is broad (tried) made treads too long by one step each.</summary>
    private static int Steps(List<(int U, int T, int V)> seen)
    {
        seen.Sort();
        int steps = 0;
        (int U, int T, int V) last = (int.MinValue, 0, 0);
        foreach ((int U, int T, int V) s in seen)
        {
            bool sameLine = s.U == last.U;
            if (!sameLine || s.T != last.T || s.V > last.V + 2) steps += sameLine && s.T > last.T && s.T <= last.T + 4 ? s.T - last.T : 1;
            last = s;
        }

        return steps;
    }
}
