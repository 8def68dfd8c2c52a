namespace CloudStruct.Formats.Laz;

/// <summary>Which layers of a chunk say something: one in which every record is like the raw one is left out.</summary>
internal static class LayerNeed
{
    /// <summary>Whether some record differs from the first in a run of bytes.</summary>
    /// <param name="records">All records of a chunk.</param>
    /// <param name="recordBytes">Size of a record.</param>
    /// <param name="at">First byte of the run in a record.</param>
    /// <param name="count">Bytes of the run.</param>
    /// <param name="mask">Bits that count, in each byte.</param>
    public static bool Differs(ReadOnlySpan<byte> records, int recordBytes, int at, int count, int mask = 255)
    {
        for (int k = at; k < at + count; k++)
        {
            byte first = records[k];
            for (int i = k + recordBytes; i < records.Length; i += recordBytes)
            {
                if (((records[i] ^ first) & mask) != 0) return true;
            }
        }

        return false;
    }
}
