using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Planar;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Drawings;

/// <summary>Outlines of the faces as valid polygons and triangles on their planes.</summary>
internal static class Outlines
{
    // Faces that one worker mends at a time.
    private const int Block = 64;

    /// <summary>The shapes, in the order of the faces.</summary>
    public static FaceShapes Of(Face[] faces, StageContext context)
    {
        var shapes = new PlanarShape[faces.Length];
        BlockParallel.For(faces.Length, context.Threads, context.Stop, (from, to) =>
        {
            for (int f = from; f < to; f++) shapes[f] = Flat(faces[f]);
        }, Block);

        int[] vertexFrom = new int[faces.Length + 1], triangleFrom = new int[faces.Length + 1];
        for (int f = 0; f < faces.Length; f++)
        {
            vertexFrom[f + 1] = vertexFrom[f] + shapes[f].Ring.Length;
            triangleFrom[f + 1] = triangleFrom[f] + shapes[f].Triangles.Length;
        }

        float[] x = new float[vertexFrom[^1]], y = new float[x.Length], z = new float[x.Length];
        int[] triangles = new int[triangleFrom[^1]];
        for (int f = 0; f < faces.Length; f++)
        {
            (Vec3 along, Vec3 up) = Tangent.Axes(faces[f].Normal);
            Vec3 middle = faces[f].Middle + (faces[f].Normal * Height(faces[f]));
            for (int i = 0; i < shapes[f].Ring.Length; i++)
            {
                Vec3 p = middle + (along * shapes[f].Ring[i].X) + (up * shapes[f].Ring[i].Y);
                int at = vertexFrom[f] + i;
                (x[at], y[at], z[at]) = ((float)p.X, (float)p.Y, (float)p.Z);
            }

            shapes[f].Triangles.CopyTo(triangles, triangleFrom[f]);
        }

        return new FaceShapes { VertexFrom = vertexFrom, X = x, Y = y, Z = z, TriangleFrom = triangleFrom, Triangles = triangles };
    }

    // The middle is the mean of the surface, which a bent face lifts off its plane; the ring stays on the plane.
    private static double Height(Face face) =>
        face.Outline.Length < 4 ? 0 : face.Outline.Average(p => (p - face.Middle).Dot(face.Normal));

    private static PlanarShape Flat(Face face)
    {
        if (face.Outline.Length < 4) return PlanarShape.Empty;
        (Vec3 along, Vec3 up) = Tangent.Axes(face.Normal);
        var ring = new Point2[face.Outline.Length - 1];
        for (int i = 0; i < ring.Length; i++)
        {
            Vec3 d = face.Outline[i] - face.Middle;
            ring[i] = new Point2(d.Dot(along), d.Dot(up));
        }

        return PlanarShape.Of(ring);
    }
}
