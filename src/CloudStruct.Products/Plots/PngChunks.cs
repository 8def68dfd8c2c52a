using System.Buffers.Binary;
using System.Text;

namespace CloudStruct.Products.Plots;

/// <summary>Adds to a PNG what the encoder leaves out: its size on paper and what it is (PNG specification, third edition: pHYs, iTXt).</summary>
internal static class PngChunks
{
    // Signature (8 bytes) and IHDR (4 length, 4 type, 13 data, 4 check).
    private const int AfterHeader = 33;

    private static readonly uint[] Table = [.. Enumerable.Range(0, 256).Select(n =>
    {
        uint c = (uint)n;
        for (int k = 0; k < 8; k++) c = (c & 1) != 0 ? 0xEDB88320 ^ (c >> 1) : c >> 1;
        return c;
    })];

    /// <summary>The picture with dots per inch, title and run id written after its header.</summary>
    public static byte[] WithFacts(byte[] png, float dpi, string title, string runId)
    {
        Span<byte> physical = stackalloc byte[9];
        uint perMetre = (uint)MathF.Round(dpi / 0.0254f);
        BinaryPrimitives.WriteUInt32BigEndian(physical, perMetre);
        BinaryPrimitives.WriteUInt32BigEndian(physical[4..], perMetre);
        physical[8] = 1;   // unit: metre
        return [.. png[..AfterHeader], .. Chunk("pHYs", physical), .. Text("Title", title), .. Text("Comment", "Run " + runId), .. png[AfterHeader..]];
    }

    // Keyword, 0, not compressed, method 0, no language, no translated keyword, UTF-8 text.
    private static byte[] Text(string keyword, string text) =>
        Chunk("iTXt", [.. Encoding.ASCII.GetBytes(keyword), 0, 0, 0, 0, 0, .. Encoding.UTF8.GetBytes(text)]);

    private static byte[] Chunk(string type, ReadOnlySpan<byte> data)
    {
        byte[] chunk = new byte[data.Length + 12];
        BinaryPrimitives.WriteInt32BigEndian(chunk, data.Length);
        Encoding.ASCII.GetBytes(type, chunk.AsSpan(4));
        data.CopyTo(chunk.AsSpan(8));
        uint check = uint.MaxValue;
        foreach (byte b in chunk.AsSpan(4, data.Length + 4)) check = Table[(check ^ b) & 0xFF] ^ (check >> 8);
        BinaryPrimitives.WriteUInt32BigEndian(chunk.AsSpan(8 + data.Length), ~check);
        return chunk;
    }
}
