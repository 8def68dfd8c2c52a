using CloudStruct.Formats.Meshes;
using CloudStruct.Formats.Bytes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Points;
using static System.FormattableString;

namespace CloudStruct.Formats.Ply;

/// <summary>Loads a mesh in one pass, whichever of vertices and faces stands first. Polygons become fans of triangles.</summary>
internal static class PlyMeshReader
{
    /// <summary>Reads vertices and triangles.</summary>
    public static TriangleMesh Read(FileBytes file, PlyHeader header, PlyVertexLayout layout, double floatColourScale, CancellationToken stop)
    {
        PlyElement vertices = layout.Element, faces = header.Faces!;
        // The header reader has checked the count against the file's size.
        long count = vertices.Count;
        if (count > int.MaxValue / 2)
            throw new InputException(header.Name, "the mesh has too many vertices", Invariant($"{count}"), "Cut it into tiles");
        double[] x = new double[count], y = new double[count], z = new double[count];
        ushort[] red = new ushort[layout.HasColour ? count : 0], green = new ushort[red.Length], blue = new ushort[red.Length];
        var corners = new List<int>();
        PlyCursor cursor = PlyCursor.Over(file, header);
        bool verticesDone = false, facesDone = false;
        foreach (PlyElement element in header.Elements)
        {
            if (ReferenceEquals(element, vertices))
            {
                int at = 0;
                foreach (SourceBlock block in new PlyVertexReader(header, layout, cursor, floatColourScale).Blocks(stop))
                {
                    using (block)
                    {
                        block.X.AsSpan(0, block.Count).CopyTo(x.AsSpan(at));
                        block.Y.AsSpan(0, block.Count).CopyTo(y.AsSpan(at));
                        block.Z.AsSpan(0, block.Count).CopyTo(z.AsSpan(at));
                        if (layout.HasColour)
                        {
                            block.Red.AsSpan(0, block.Count).CopyTo(red.AsSpan(at));
                            block.Green.AsSpan(0, block.Count).CopyTo(green.AsSpan(at));
                            block.Blue.AsSpan(0, block.Count).CopyTo(blue.AsSpan(at));
                        }
                        at += block.Count;
                    }
                }
                verticesDone = true;
            }
            else if (ReferenceEquals(element, faces))
            {
                Fans(header, faces, cursor, count, corners, stop);
                facesDone = true;
            }
            else
            {
                cursor.SkipElement(element, stop);
            }
            if (verticesDone && facesDone) break;
        }
        return new TriangleMesh(x, y, z, red, green, blue, corners);
    }

    private static void Fans(
        PlyHeader header, PlyElement faces, PlyCursor cursor, long vertices, List<int> corners, CancellationToken stop)
    {
        int listAt = PlyHeader.FaceList(faces);
        PlyProperty list = faces.Properties[listAt];
        for (long f = 0; f < faces.Count; f++)
        {
            if ((f & 0xFFFF) == 0) stop.ThrowIfCancellationRequested();
            cursor.StartRecord(faces);
            for (int p = 0; p < faces.Properties.Length; p++)
            {
                if (p != listAt)
                {
                    cursor.SkipProperty(faces.Properties[p]);
                    continue;
                }
                long n = cursor.ListLength(list, list.CountType!.Value);
                int first = 0, last = 0;
                for (long i = 0; i < n; i++)
                {
                    long index = cursor.Whole(list.Type);
                    if (index < 0 || index >= vertices)
                        throw new InputException(Invariant($"{header.Name}, face {f + 1}"), "a face names a vertex that does not exist",
                            Invariant($"vertex {index}, of {vertices} from 0"), "The file is damaged; export the mesh again");
                    if (i == 0) first = (int)index;
                    if (i >= 2)
                    {
                        if (corners.Count > Array.MaxLength - 3)
                            throw new InputException(header.Name, "the mesh has too many triangles", Invariant($"more than {Array.MaxLength / 3}"), "Cut it into tiles");
                        corners.Add(first);
                        corners.Add(last);
                        corners.Add((int)index);
                    }
                    last = (int)index;
                }
            }
            cursor.EndRecord();
        }
    }
}
