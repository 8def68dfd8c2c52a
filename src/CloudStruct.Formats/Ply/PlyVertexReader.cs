using System.Buffers.Binary;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Points;
using static System.FormattableString;

namespace CloudStruct.Formats.Ply;

/// <summary>Vertices as blocks, from a cursor that stands at the first of them.</summary>
internal sealed class PlyVertexReader
{
    private const int BufferBytes = 1 << 21;

    private readonly PlyHeader header;
    private readonly PlyVertexLayout layout;
    private readonly PlyCursor cursor;
    private readonly double floatColourScale;
    private readonly double[] record;

    /// <summary>A reader of the vertex element.</summary>
    /// <param name="header">The file's header.</param>
    /// <param name="layout">Where coordinates and colour stand.</param>
    /// <param name="cursor">At the first vertex.</param>
    /// <param name="floatColourScale">Factor of float colours: 65535 when they go from 0 to 1.</param>
    public PlyVertexReader(PlyHeader header, PlyVertexLayout layout, PlyCursor cursor, double floatColourScale)
    {
        this.header = header;
        this.layout = layout;
        this.cursor = cursor;
        this.floatColourScale = floatColourScale;
        record = new double[layout.Element.Properties.Length];
    }

    /// <summary>All vertices in file order; the caller disposes of the blocks.</summary>
    public IEnumerable<SourceBlock> Blocks(CancellationToken stop)
    {
        bool isFixed = header.Encoding != PlyEncoding.Ascii && layout.Element.IsFixed;
        int stride = layout.Element.LeastBytes;
        int perRead = (int)Math.Min(Math.Min(SourceBlock.Capacity, layout.Element.Count), Math.Max(1, BufferBytes / Math.Max(1, stride)));
        byte[] buffer = isFixed ? new byte[perRead * stride] : [];
        for (long left = layout.Element.Count; left > 0;)
        {
            stop.ThrowIfCancellationRequested();
            int n = (int)Math.Min(left, isFixed ? perRead : SourceBlock.Capacity);
            var block = new SourceBlock(layout.HasColour);
            try
            {
                if (isFixed) Fixed(buffer.AsSpan(0, n * stride), stride, n, block);
                else One(n, block);
            }
            catch
            {
                block.Dispose();
                throw;
            }
            left -= n;
            yield return block;
        }
    }

    private void Fixed(Span<byte> bytes, int stride, int n, SourceBlock block)
    {
        long at = cursor.At;
        int got = cursor.Copy(bytes);
        if (got < bytes.Length)
            throw new InputException(Invariant($"{header.Name}, byte {at}"), "the file ends within the vertices",
                Invariant($"{bytes.Length} bytes wanted, {got} left"), "The copy is incomplete; copy the file again and compare sizes");
        bool big = header.Encoding == PlyEncoding.BigEndian;
        Column(bytes, stride, layout.X, big, block.X.AsSpan(0, n));
        Column(bytes, stride, layout.Y, big, block.Y.AsSpan(0, n));
        Column(bytes, stride, layout.Z, big, block.Z.AsSpan(0, n));
        for (int c = 0; c < layout.Colour.Length; c++)
        {
            ushort[] to = c == 0 ? block.Red : c == 1 ? block.Green : block.Blue;
            int at0 = layout.Element.OffsetOf(layout.Colour[c]);
            PlyType type = layout.Element.Properties[layout.Colour[c]].Type;
            if (type == PlyType.UInt8)
            {
                for (int i = 0, b = at0; i < n; i++, b += stride) to[i] = bytes[b];
                continue;
            }
            for (int i = 0, b = at0; i < n; i++, b += stride) to[i] = ToColour(PlyValue.Read(bytes[b..], type, big), type);
        }
        if (layout.Class < 0) Array.Clear(block.Class, 0, n);
        else
        {
            PlyType type = layout.Element.Properties[layout.Class].Type;
            for (int i = 0, b = layout.Element.OffsetOf(layout.Class); i < n; i++, b += stride)
                block.Class[i] = ToClass(PlyValue.Read(bytes[b..], type, big));
        }
        block.Count = n;
    }

    private void Column(ReadOnlySpan<byte> bytes, int stride, int property, bool big, Span<double> to)
    {
        int at = layout.Element.OffsetOf(property);
        PlyType type = layout.Element.Properties[property].Type;
        unchecked
        {
            // The two that nearly all clouds have, without asking for the type of each value.
            if (type == PlyType.Float32 && !big)
            {
                for (int i = 0; i < to.Length; i++, at += stride) to[i] = BinaryPrimitives.ReadSingleLittleEndian(bytes[at..]);
            }
            else if (type == PlyType.Float64 && !big)
            {
                for (int i = 0; i < to.Length; i++, at += stride) to[i] = BinaryPrimitives.ReadDoubleLittleEndian(bytes[at..]);
            }
            else
            {
                for (int i = 0; i < to.Length; i++, at += stride) to[i] = PlyValue.Read(bytes[at..], type, big);
            }
        }
    }

    private void One(int n, SourceBlock block)
    {
        PlyProperty[] properties = layout.Element.Properties;
        for (int i = 0; i < n; i++)
        {
            cursor.StartRecord(layout.Element);
            for (int p = 0; p < properties.Length; p++)
            {
                if (properties[p].IsList) cursor.SkipProperty(properties[p]);
                else record[p] = cursor.Value(properties[p].Type);
            }
            cursor.EndRecord();
            block.X[i] = record[layout.X];
            block.Y[i] = record[layout.Y];
            block.Z[i] = record[layout.Z];
            block.Class[i] = layout.Class < 0 ? (byte)0 : ToClass(record[layout.Class]);
            if (!layout.HasColour) continue;
            block.Red[i] = ToColour(record[layout.Colour[0]], properties[layout.Colour[0]].Type);
            block.Green[i] = ToColour(record[layout.Colour[1]], properties[layout.Colour[1]].Type);
            block.Blue[i] = ToColour(record[layout.Colour[2]], properties[layout.Colour[2]].Type);
        }
        block.Count = n;
    }

    // Some writers declare bytes as signed: their negative half is the bright one.
    private ushort ToColour(double v, PlyType type)
    {
        if (PlyTypes.IsFloat(type)) v = Math.Round(v * floatColourScale);
        else if (v < 0 && type == PlyType.Int8) v += 256;
        else if (v < 0 && type == PlyType.Int16) v += 65536;
        return v >= 65535 ? (ushort)65535 : v > 0 ? (ushort)v : (ushort)0;   // NaN gives 0
    }

    private static byte ToClass(double v) => v is >= 0 and <= 255 ? (byte)v : (byte)0;
}
