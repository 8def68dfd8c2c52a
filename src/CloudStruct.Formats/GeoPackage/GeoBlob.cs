using System.Buffers.Binary;
using CloudStruct.Records.Frame;

namespace CloudStruct.Formats.GeoPackage;

/// <summary>Shapes as a GeoPackage stores them: a header, then well-known binary (OGC 12-128r17, clause 2.1.3; OGC 06-103r4).</summary>
internal static class GeoBlob
{
    /// <summary>Name of a kind in the table of geometry columns.</summary>
    public static string TypeName(GeoShape shape) => shape switch
    {
        GeoShape.Point => "POINT",
        GeoShape.Line => "LINESTRING",
        _ => "POLYGON",
    };

    /// <summary>The blob: little-endian, with a box for lines and polygons.</summary>
    public static byte[] Of(Vec3[] points, GeoShape shape, bool hasZ, int system)
    {
        bool box = shape != GeoShape.Point;
        int perPoint = hasZ ? 24 : 16, counts = shape switch { GeoShape.Point => 0, GeoShape.Line => 4, _ => 8 };
        int head = 8 + (box ? 32 : 0);
        byte[] blob = new byte[head + 5 + counts + (points.Length * perPoint)];
        (blob[0], blob[1], blob[2], blob[3]) = ((byte)'G', (byte)'P', 0, (byte)(box ? 0b11 : 0b01));
        BinaryPrimitives.WriteInt32LittleEndian(blob.AsSpan(4), system);
        if (box)
        {
            Put(8, points.Min(p => p.X));
            Put(16, points.Max(p => p.X));
            Put(24, points.Min(p => p.Y));
            Put(32, points.Max(p => p.Y));
        }

        int at = head;
        blob[at] = 1;
        int kind = shape switch { GeoShape.Point => 1, GeoShape.Line => 2, _ => 3 };
        BinaryPrimitives.WriteInt32LittleEndian(blob.AsSpan(at + 1), kind + (hasZ ? 1000 : 0));
        at += 5;
        if (shape == GeoShape.Polygon)
        {
            BinaryPrimitives.WriteInt32LittleEndian(blob.AsSpan(at), 1);
            at += 4;
        }

        if (shape != GeoShape.Point)
        {
            BinaryPrimitives.WriteInt32LittleEndian(blob.AsSpan(at), points.Length);
            at += 4;
        }

        foreach (Vec3 p in points)
        {
            Put(at, p.X);
            Put(at + 8, p.Y);
            if (hasZ) Put(at + 16, p.Z);
            at += perPoint;
        }

        return blob;

        void Put(int where, double value) => BinaryPrimitives.WriteDoubleLittleEndian(blob.AsSpan(where), value);
    }
}
