namespace CloudStruct.Formats.Laz;

/// <summary>Adaptive probability of one bit, 13 bits fine.</summary>
internal sealed class BitModel
{
    private uint all = 2;
    private uint cycle = 4;

    /// <summary>Probability of a zero, in 2^-13.</summary>
    public uint P0 = 4096;

    /// <summary>Zeros coded so far, scaled with the rest.</summary>
    public uint Zeros = 1;

    /// <summary>Bits until the probability is taken anew.</summary>
    public uint UntilUpdate = 4;

    /// <summary>Takes the probability anew from what was counted.</summary>
    public void Update()
    {
        all += cycle;
        if (all > 8192)
        {
            all = (all + 1) >> 1;
            Zeros = (Zeros + 1) >> 1;
            if (Zeros == all) all++;
        }

        P0 = (Zeros * (0x80000000u / all)) >> 18;
        cycle = Math.Min((5 * cycle) >> 2, 64);
        UntilUpdate = cycle;
    }
}
