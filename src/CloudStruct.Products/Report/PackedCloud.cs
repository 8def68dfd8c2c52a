using System.IO.Compression;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;

namespace CloudStruct.Products.Report;

/// <summary>Points and outlines of the linked page, small enough for one file: whole steps of a box, byte planes, gzip.</summary>
/// <remarks>A step is at most 2 mm for a survey of 120 m. The points lie in the order of the working cloud's grid, so neighbours
/// follow each other and differences are small, which packs well.</remarks>
internal sealed class PackedCloud
{
    private const double RoomM = 0.5;   // outlines may pass the outermost point
    private readonly MemoryStream planes = new();

    private PackedCloud(Vec3 min, double stepM)
    {
        MinM = min;
        StepM = stepM;
    }

    /// <summary>Corner of the box, local [m].</summary>
    public Vec3 MinM { get; }

    /// <summary>Metres per step, the same along all axes.</summary>
    public double StepM { get; }

    /// <summary>Points.</summary>
    public int Count { get; private set; }

    /// <summary>Vertices per face.</summary>
    public int[] Outlines { get; private set; } = [];

    /// <summary>Triangles per face.</summary>
    public int[] Triangles { get; private set; } = [];

    /// <summary>Packs a run.</summary>
    /// <returns>Null without points.</returns>
    public static PackedCloud? Of(ThinnedCloud cloud, FaceShapes faces)
    {
        if (cloud.X.Length == 0) return null;
        Vec3 min = new(cloud.X.Min() - RoomM, cloud.Y.Min() - RoomM, cloud.Z.Min() - RoomM);
        double side = Math.Max(cloud.X.Max() - min.X, Math.Max(cloud.Y.Max() - min.Y, cloud.Z.Max() - min.Z)) + RoomM;
        var packed = new PackedCloud(min, side / ushort.MaxValue);
        packed.Points(cloud);
        packed.Faces(faces);
        return packed;
    }

    /// <summary>All planes, compressed, as text.</summary>
    public string Text() => Squeeze(planes.ToArray());

    /// <summary>Bytes, compressed, as text.</summary>
    public static string Squeeze(byte[] bytes)
    {
        using var packed = new MemoryStream();
        using (var gzip = new GZipStream(packed, CompressionLevel.SmallestSize, leaveOpen: true)) gzip.Write(bytes);
        return Convert.ToBase64String(packed.ToArray());
    }

    private void Points(ThinnedCloud cloud)
    {
        Count = cloud.X.Length;
        Steps(cloud.X, MinM.X);
        Steps(cloud.Y, MinM.Y);
        Steps(cloud.Z, MinM.Z);
        for (int channel = 0; channel < 3; channel++)
        {
            int at = channel;
            planes.Write([.. Enumerable.Range(0, Count).Select(i => cloud.Rgb[(3 * i) + at])]);
        }

        planes.Write(cloud.Class.Length == Count ? cloud.Class : new byte[Count]);
        int[] face = cloud.Face.Length == Count ? cloud.Face : new int[Count];
        for (int shift = 0; shift < 24; shift += 8) planes.Write(Array.ConvertAll(face, f => (byte)((f >> shift) & 255)));
    }

    private void Faces(FaceShapes faces)
    {
        Outlines = [.. faces.VertexFrom.Zip(faces.VertexFrom.Skip(1), (from, to) => to - from)];
        Triangles = [.. faces.TriangleFrom.Zip(faces.TriangleFrom.Skip(1), (from, to) => (to - from) / 3)];
        Steps(faces.X, MinM.X);
        Steps(faces.Y, MinM.Y);
        Steps(faces.Z, MinM.Z);
        planes.Write(Array.ConvertAll(faces.Triangles, v => (byte)(v & 255)));
        planes.Write(Array.ConvertAll(faces.Triangles, v => (byte)((v >> 8) & 255)));
    }

    // Differences from value to value, low bytes before high ones.
    private void Steps(float[] metres, double from)
    {
        byte[] low = new byte[metres.Length], high = new byte[metres.Length];
        int before = 0;
        for (int i = 0; i < metres.Length; i++)
        {
            int now = (int)Math.Clamp(Math.Round((metres[i] - from) / StepM), 0, ushort.MaxValue), step = (now - before) & ushort.MaxValue;
            (low[i], high[i]) = ((byte)(step & 255), (byte)(step >> 8));
            before = now;
        }

        planes.Write(low);
        planes.Write(high);
    }
}
