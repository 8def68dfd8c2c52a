using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Width;

/// <summary>The points of one dike, sorted along its run, for what shows of it where a margin is hidden.</summary>
internal sealed class DikePoints
{
    private readonly double[] key;
    private readonly Vec3[] place;
    private readonly Vec3 origin, run;

    /// <summary>Gathers the points of a dike.</summary>
    /// <param name="cloud">Working cloud.</param>
    /// <param name="classes">Its classes.</param>
    /// <param name="dike">Number of the dike.</param>
    /// <param name="origin">First place of the centre line.</param>
    /// <param name="run">Unit vector from its first to its last place.</param>
    public DikePoints(WorkingCloud cloud, ClassifiedCloud classes, int dike, Vec3 origin, Vec3 run)
    {
        this.origin = origin;
        this.run = run;
        var own = new List<(double Key, int Index)>();
        for (int i = 0; i < cloud.Count; i++)
        {
            if (classes.DikeOfPoint[i] == dike && classes.Class[i] is (byte)RockClass.Dike or (byte)RockClass.Inclusion)
            {
                own.Add(((cloud.Place(i) - origin).Dot(run), i));
            }
        }

        own.Sort();
        key = [.. own.Select(o => o.Key)];
        place = [.. own.Select(o => cloud.Place(o.Index))];
    }

    /// <summary>Extent along the normal of the dike's points about a station, a fiftieth of them left out at either end; null
    /// with fewer than twenty.</summary>
    /// <param name="at">Station.</param>
    /// <param name="normal">From A to B.</param>
    /// <param name="along">Along strike.</param>
    /// <param name="halfM">Half the stretch along strike that counts [m].</param>
    /// <param name="reachM">Farthest from the station along the normal [m].</param>
    public (double Low, double High)? Extent(Vec3 at, Vec3 normal, Vec3 along, double halfM, double reachM)
    {
        double middle = (at - origin).Dot(run), far = halfM + reachM;   // the run may differ from strike by the dike's bend
        int i = Array.BinarySearch(key, middle - far);
        if (i < 0) i = ~i;
        var offsets = new List<double>();
        for (; i < key.Length && key[i] <= middle + far; i++)
        {
            Vec3 d = place[i] - at;
            double q = d.Dot(normal);
            if (Math.Abs(d.Dot(along)) <= halfM && Math.Abs(q) <= reachM) offsets.Add(q);
        }

        if (offsets.Count < 20) return null;
        offsets.Sort();
        return (offsets[offsets.Count / 50], offsets[^(1 + (offsets.Count / 50))]);
    }
}
