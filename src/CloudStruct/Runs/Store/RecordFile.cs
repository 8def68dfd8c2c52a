using System.Buffers.Binary;
using MessagePack;

namespace CloudStruct.Runs.Store;

/// <summary>One record in one file: a mark, the record's text as MessagePack, its columns behind.</summary>
internal static class RecordFile
{
    private static ReadOnlySpan<byte> Mark => "CSREC001"u8;

    /// <summary>Writes a record.</summary>
    public static void Write<T>(string path, T record)
    {
        var side = new SideArrays();
        byte[] text = MessagePackSerializer.Serialize(record, Options(side));
        using var file = new FileStream(path, FileMode.Create, FileAccess.Write, FileShare.None, 1 << 20);
        Span<byte> head = stackalloc byte[8];
        file.Write(Mark);
        BinaryPrimitives.WriteInt32LittleEndian(head, text.Length);
        BinaryPrimitives.WriteInt32LittleEndian(head[4..], side.Count);
        file.Write(head);
        file.Write(text);
        side.Write(file);
    }

    /// <summary>Reads a record; null when the file is not whole or not of this form.</summary>
    public static T? Read<T>(string path)
        where T : class
    {
        try
        {
            using var file = new FileStream(path, FileMode.Open, FileAccess.Read, FileShare.Read, 1 << 20);
            Span<byte> head = stackalloc byte[16];
            file.ReadExactly(head);
            int length = BinaryPrimitives.ReadInt32LittleEndian(head[8..]), count = BinaryPrimitives.ReadInt32LittleEndian(head[12..]);
            if (!head[..8].SequenceEqual(Mark) || length < 0 || length > file.Length || count < 0) return null;
            byte[] text = new byte[length];
            file.ReadExactly(text);
            SideArrays side = SideArrays.Read(file, count);
            return MessagePackSerializer.Deserialize<T>(text, Options(side));
        }
        catch (Exception e) when (e is IOException or MessagePackSerializationException or InvalidDataException or OutOfMemoryException)
        {
            return null;
        }
    }

    private static MessagePackSerializerOptions Options(SideArrays side) =>
        MessagePackSerializerOptions.Standard.WithResolver(new SideResolver(side));
}
