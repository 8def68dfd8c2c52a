using System.Collections.Concurrent;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Faces;

/// <summary>The described cloud as the steps of this stage see it: columns, graph, spacing and limits.</summary>
internal sealed class Surface
{
    private readonly ConcurrentBag<Marks> spare = [];

    public Surface(DescribedCloud described, FaceSettings settings, int threads, CancellationToken stop)
    {
        WorkingCloud cloud = described.Cloud;
        Count = cloud.Count;
        (X, Y, Z) = (cloud.X, cloud.Y, cloud.Z);
        (NormalX, NormalY, NormalZ) = (described.NormalX, described.NormalY, described.NormalZ);
        Neighbours = cloud.Neighbours;
        SpacingM = cloud.SpacingM;
        PointAreaM2 = Middle(described.AreaM2, SpacingM * SpacingM);
        Settings = settings;
        GapM = settings.GapM ?? 5 * SpacingM;
        BendCosine = Math.Cos(settings.BendDeg * Math.PI / 180);
        SmallestPoints = (int)Math.Max(10, settings.SmallestFaceM2 / PointAreaM2 / 2);
        Threads = threads;
        Stop = stop;
    }

    public int Count { get; }

    public float[] X { get; }

    public float[] Y { get; }

    public float[] Z { get; }

    public float[] NormalX { get; }

    public float[] NormalY { get; }

    public float[] NormalZ { get; }

    /// <summary>Row-major, <see cref="WorkingCloud.K"/> a point, -1 where none.</summary>
    public int[] Neighbours { get; }

    public double SpacingM { get; }

    /// <summary>Surface that a point usually stands for [m²].</summary>
    public double PointAreaM2 { get; }

    public FaceSettings Settings { get; }

    public double GapM { get; }

    public double BendCosine { get; }

    /// <summary>Scatter below which none is believed [m]: meshes and made-up clouds have none, and would leave a band in which
    /// only their own triangles fit.</summary>
    public double LeastScatterM => 0.1 * SpacingM;

    /// <summary>Half the points of the smallest face: what is smaller while growing is let go.</summary>
    public int SmallestPoints { get; }

    public int Threads { get; }

    public CancellationToken Stop { get; }

    public Vec3 Place(int i) => new(X[i], Y[i], Z[i]);

    public Vec3 Normal(int i) => new(NormalX[i], NormalY[i], NormalZ[i]);

    public ReadOnlySpan<int> NeighboursOf(int i) => Neighbours.AsSpan(i * WorkingCloud.K, WorkingCloud.K);

    /// <summary>Absolute cosine between the local normal and a direction; 0 where there is no normal.</summary>
    public double Agreement(int i, Vec3 direction)
    {
        double c = Math.Abs((NormalX[i] * direction.X) + (NormalY[i] * direction.Y) + (NormalZ[i] * direction.Z));
        return double.IsNaN(c) ? 0 : c;
    }

    /// <summary>Distance of a point from a plane [m].</summary>
    public double Distance(int i, in PlaneFit plane)
    {
        Vec3 n = plane.Normal, c = plane.Centroid;
        return (n.X * (X[i] - c.X)) + (n.Y * (Y[i] - c.Y)) + (n.Z * (Z[i] - c.Z));
    }

    /// <summary>Empty marks of all points, for one worker at a time; give them back with <see cref="Return"/>.</summary>
    public Marks RentMarks()
    {
        Marks marks = spare.TryTake(out Marks? used) ? used : new Marks(Count);
        marks.Clear();
        return marks;
    }

    /// <summary>Takes marks back for the next worker.</summary>
    public void Return(Marks marks) => spare.Add(marks);

    private static double Middle(float[] areas, double otherwise)
    {
        // A thousandth part is enough for a median, and even steps keep it the same on every machine.
        int step = Math.Max(1, areas.Length / 2000);
        var some = new List<float>();
        for (int i = 0; i < areas.Length; i += step)
        {
            if (areas[i] > 0) some.Add(areas[i]);
        }

        some.Sort();
        return some.Count > 0 ? some[some.Count / 2] : otherwise;
    }
}
