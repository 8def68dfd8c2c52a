using System.Buffers.Binary;

namespace CloudStruct.Tests.Formats.Las;

/// <summary>LAS files put together byte by byte from the tables of the standard (LAS 1.4 R16), not by the writer under test.</summary>
internal sealed class LasBytes
{
    public required int Minor { get; init; }
    public required int Format { get; init; }
    public required int RecordBytes { get; init; }
    public int Points { get; init; } = 1;
    public int Encoding { get; init; }
    public byte[] Variable { get; init; } = [];
    public int VariableCount { get; init; }
    public byte[] AfterPoints { get; init; } = [];
    public Action<int, byte[]> Fill { get; init; } = (_, _) => { };

    public int HeaderBytes => Minor switch { <= 2 => 227, 3 => 235, _ => 375 };

    public int PointsAt => HeaderBytes + Variable.Length;

    public byte[] Make(Action<byte[]>? spoil = null)
    {
        byte[] f = new byte[PointsAt + (Points * RecordBytes) + AfterPoints.Length];
        "LASF"u8.CopyTo(f);
        U16(f, 6, Encoding);
        f[24] = 1;
        f[25] = (byte)Minor;
        U16(f, 94, HeaderBytes);
        U32(f, 96, (uint)PointsAt);
        U32(f, 100, (uint)VariableCount);
        f[104] = (byte)Format;
        U16(f, 105, RecordBytes);
        if (Minor < 4 || Format < 6) U32(f, 107, (uint)Points);
        if (Minor >= 4) BinaryPrimitives.WriteUInt64LittleEndian(f.AsSpan(247), (ulong)Points);
        foreach (int at in (int[])[131, 139, 147]) F64(f, at, 0.01);
        F64(f, 155, 1000);
        foreach (int at in (int[])[179, 195, 211]) F64(f, at, 2000);
        Variable.CopyTo(f, HeaderBytes);
        byte[] record = new byte[RecordBytes];
        for (int i = 0; i < Points; i++)
        {
            Array.Clear(record);
            Fill(i, record);
            record.CopyTo(f, PointsAt + (i * RecordBytes));
        }
        AfterPoints.CopyTo(f, f.Length - AfterPoints.Length);
        spoil?.Invoke(f);
        return f;
    }

    public static void U16(byte[] f, int at, int v) => BinaryPrimitives.WriteUInt16LittleEndian(f.AsSpan(at), (ushort)v);
    public static void U32(byte[] f, int at, uint v) => BinaryPrimitives.WriteUInt32LittleEndian(f.AsSpan(at), v);
    public static void U64(byte[] f, int at, ulong v) => BinaryPrimitives.WriteUInt64LittleEndian(f.AsSpan(at), v);
    public static void I32(byte[] f, int at, int v) => BinaryPrimitives.WriteInt32LittleEndian(f.AsSpan(at), v);
    public static void F64(byte[] f, int at, double v) => BinaryPrimitives.WriteDoubleLittleEndian(f.AsSpan(at), v);
}
