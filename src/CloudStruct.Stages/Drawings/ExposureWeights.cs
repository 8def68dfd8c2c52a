using CloudStruct.Maths.Fitting;
using CloudStruct.Maths.Rates;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Drawings;

/// <summary>How much more rarely planes are seen the more nearly they lie along the exposed ground (Terzaghi 1965).</summary>
/// <remarks>The ground is taken in cubes wider than its blocks, so that it is the outcrop as a whole that counts and not the
/// faces themselves, which lie along themselves.</remarks>
internal sealed class ExposureWeights
{
    private const double SideM = 2.5;
    private const int FewestPoints = 40, Sample = 200_000;

    private readonly (Vec3 Normal, double Share)[] ground;

    /// <summary>Takes the ground that was seen.</summary>
    public ExposureWeights(Findings input) => ground = Ground(input);

    /// <summary>Weight of each normal, 1 to 10.</summary>
    public double[] Of(Vec3[] normals) =>
        Array.ConvertAll(normals, n => ground.Length == 0 ? 1 : Terzaghi.Capped(ground.Sum(g => g.Share * n.Cross(g.Normal).Length)));

    // A sample in equal steps of the grid's order: it is alike over the ground because the cloud is.
    private static (Vec3 Normal, double Share)[] Ground(Findings input)
    {
        WorkingCloud cloud = input.Described.Cloud;
        byte[] classes = input.Classes.Class;
        int step = Math.Max(1, cloud.Count / Sample);
        var cells = new SortedDictionary<(int X, int Y, int Z), List<int>>();
        for (int i = 0; i < cloud.Count; i += step)
        {
            if (classes.Length > i && (RockClass)classes[i] is RockClass.Cover or RockClass.Loose) continue;
            var key = ((int)Math.Floor(cloud.X[i] / SideM), (int)Math.Floor(cloud.Y[i] / SideM), (int)Math.Floor(cloud.Z[i] / SideM));
            if (!cells.TryGetValue(key, out List<int>? own)) cells[key] = own = [];
            own.Add(i);
        }

        int fewest = Math.Max(8, FewestPoints / step), all = cells.Values.Where(c => c.Count >= fewest).Sum(c => c.Count);
        return [.. cells.Values.Where(c => c.Count >= fewest).Select(c => (Normal(cloud, c), (double)c.Count / all))];
    }

    private static Vec3 Normal(WorkingCloud cloud, List<int> own)
    {
        Vec3 middle = default;
        foreach (int i in own) middle += cloud.Place(i);
        middle *= 1.0 / own.Count;
        var scatter = default(Symmetric3);
        foreach (int i in own) scatter += Symmetric3.Outer(cloud.Place(i) - middle, 1);
        return scatter.Eigen().V3;
    }
}
