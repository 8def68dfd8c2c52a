using System.Buffers.Binary;
using System.Runtime.InteropServices;

namespace CloudStruct.Runs.Store;

/// <summary>The big columns of a record, kept beside its MessagePack text so that neither needs a copy of the other in memory.</summary>
internal sealed class SideArrays
{
    private readonly List<Array> arrays = [];

    /// <summary>Notes an array and gives its number.</summary>
    public int Add(Array array)
    {
        arrays.Add(array);
        return arrays.Count - 1;
    }

    /// <summary>The array of a number.</summary>
    public T[] Get<T>(int number) => (T[])arrays[number];

    /// <summary>Writes all arrays one after another.</summary>
    public void Write(Stream to)
    {
        Span<byte> head = stackalloc byte[9];
        foreach (Array a in arrays)
        {
            head[0] = (byte)Type.GetTypeCode(a.GetType().GetElementType());
            BinaryPrimitives.WriteInt64LittleEndian(head[1..], a.LongLength);
            to.Write(head);
            foreach (ReadOnlyMemory<byte> part in Parts(a)) to.Write(part.Span);
        }
    }

    /// <summary>Reads a number of arrays.</summary>
    public static SideArrays Read(Stream from, int count)
    {
        var side = new SideArrays();
        Span<byte> head = stackalloc byte[9];
        for (int i = 0; i < count; i++)
        {
            from.ReadExactly(head);
            long length = BinaryPrimitives.ReadInt64LittleEndian(head[1..]);
            if (length < 0 || length > from.Length) throw new InvalidDataException("stored column longer than its file");
            Array a = (TypeCode)head[0] switch
            {
                TypeCode.Byte => new byte[length],
                TypeCode.Int32 => new int[length],
                TypeCode.Int64 => new long[length],
                TypeCode.Single => new float[length],
                TypeCode.Double => new double[length],
                _ => throw new InvalidDataException("stored column of unknown type"),
            };
            Fill(a, from);
            side.arrays.Add(a);
        }

        return side;
    }

    /// <summary>How many arrays are held.</summary>
    public int Count => arrays.Count;

    private static void Fill(Array a, Stream from)
    {
        switch (a)
        {
            case byte[] b: from.ReadExactly(b); break;
            case int[] v: FillAs(v, from); break;
            case long[] v: FillAs(v, from); break;
            case float[] v: FillAs(v, from); break;
            case double[] v: FillAs(v, from); break;
        }
    }

    private static void FillAs<T>(T[] values, Stream from)
        where T : unmanaged
    {
        const int step = 1 << 24;   // bytes of a span must fit an int: 2 M values of 8 bytes at a time
        for (int i = 0; i < values.Length; i += step) from.ReadExactly(MemoryMarshal.AsBytes(values.AsSpan(i, Math.Min(step, values.Length - i))));
    }

    private static IEnumerable<ReadOnlyMemory<byte>> Parts(Array a)
    {
        const int step = 1 << 20;
        byte[] buffer = new byte[step];
        int size = Buffer.ByteLength(new[] { 0 }) / 4 * Marshal.SizeOf(a.GetType().GetElementType()!);
        for (long from = 0; from < a.LongLength; from += step / 8)
        {
            int count = (int)Math.Min(step / 8, a.LongLength - from);
            CopyBytes(a, (int)from, count, buffer);
            yield return buffer.AsMemory(0, count * size);
        }
    }

    private static void CopyBytes(Array a, int from, int count, byte[] to)
    {
        switch (a)
        {
            case byte[] v: v.AsSpan(from, count).CopyTo(to); break;
            case int[] v: MemoryMarshal.AsBytes(v.AsSpan(from, count)).CopyTo(to); break;
            case long[] v: MemoryMarshal.AsBytes(v.AsSpan(from, count)).CopyTo(to); break;
            case float[] v: MemoryMarshal.AsBytes(v.AsSpan(from, count)).CopyTo(to); break;
            case double[] v: MemoryMarshal.AsBytes(v.AsSpan(from, count)).CopyTo(to); break;
        }
    }
}
