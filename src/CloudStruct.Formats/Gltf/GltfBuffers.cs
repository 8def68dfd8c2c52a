using System.Buffers.Binary;
using SharpGLTF.Memory;
using SharpGLTF.Schema2;

namespace CloudStruct.Formats.Gltf;

/// <summary>The vertices, colours and triangles of all parts in three views of the buffer.</summary>
internal sealed class GltfBuffers
{
    private readonly ModelRoot root;
    private readonly GltfPart[] parts;
    private readonly int[] placeAt, colourAt, triangleAt;
    private readonly BufferView places;
    private readonly BufferView? colours, triangles;

    /// <summary>Fills the views.</summary>
    public GltfBuffers(ModelRoot root, GltfPart[] parts)
    {
        this.root = root;
        this.parts = parts;
        placeAt = Starts(p => p.Places.Length / 3, 12);
        colourAt = Starts(p => p.Rgb.Length / 3, 4);
        triangleAt = Starts(p => p.Triangles.Length, 4);
        byte[] place = new byte[Math.Max(12, placeAt[^1])], colour = new byte[colourAt[^1]], triangle = new byte[triangleAt[^1]];
        for (int i = 0; i < parts.Length; i++)
        {
            Span<byte> to = place.AsSpan(placeAt[i]);
            for (int v = 0; v + 2 < parts[i].Places.Length; v += 3)
            {
                BinaryPrimitives.WriteSingleLittleEndian(to[(4 * v)..], parts[i].Places[v]);
                BinaryPrimitives.WriteSingleLittleEndian(to[((4 * v) + 4)..], parts[i].Places[v + 2]);
                BinaryPrimitives.WriteSingleLittleEndian(to[((4 * v) + 8)..], 0 - parts[i].Places[v + 1]);
            }

            for (int v = 0; v < parts[i].Rgb.Length / 3; v++)
            {
                Span<byte> one = colour.AsSpan(colourAt[i] + (4 * v), 4);
                for (int c = 0; c < 3; c++) one[c] = (byte)Math.Round(255 * GltfModelWriter.Linear(parts[i].Rgb[(3 * v) + c]));
                one[3] = 255;
            }

            for (int t = 0; t < parts[i].Triangles.Length; t++)
                BinaryPrimitives.WriteInt32LittleEndian(triangle.AsSpan(triangleAt[i] + (4 * t)), parts[i].Triangles[t]);
        }

        places = root.UseBufferView(new ArraySegment<byte>(place), 12, BufferMode.ARRAY_BUFFER);
        colours = colour.Length > 0 ? root.UseBufferView(new ArraySegment<byte>(colour), 4, BufferMode.ARRAY_BUFFER) : null;
        triangles = triangle.Length > 0 ? root.UseBufferView(new ArraySegment<byte>(triangle), 0, BufferMode.ELEMENT_ARRAY_BUFFER) : null;
    }

    /// <summary>Positions of a part.</summary>
    public Accessor Places(int part)
    {
        Accessor a = root.CreateAccessor();
        a.SetVertexData(places, placeAt[part], parts[part].Places.Length / 3, new AttributeFormat(DimensionType.VEC3, EncodingType.FLOAT, false));
        a.UpdateBounds();
        return a;
    }

    /// <summary>Colours of a part.</summary>
    public Accessor Colours(int part)
    {
        Accessor a = root.CreateAccessor();
        a.SetVertexData(colours, colourAt[part], parts[part].Rgb.Length / 3, new AttributeFormat(DimensionType.VEC4, EncodingType.UNSIGNED_BYTE, true));
        return a;
    }

    /// <summary>Triangles of a part.</summary>
    public Accessor Triangles(int part)
    {
        Accessor a = root.CreateAccessor();
        a.SetIndexData(triangles, triangleAt[part], parts[part].Triangles.Length, IndexEncodingType.UNSIGNED_INT);
        return a;
    }

    private int[] Starts(Func<GltfPart, int> count, int bytes)
    {
        int[] starts = new int[parts.Length + 1];
        for (int i = 0; i < parts.Length; i++) starts[i + 1] = starts[i] + (count(parts[i]) * bytes);
        return starts;
    }
}
