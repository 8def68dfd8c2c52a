namespace CloudStruct.Formats.Laz;

/// <summary>Adaptive probabilities of a symbol out of 2 to 2048, 15 bits fine.</summary>
internal sealed class SymbolModel
{
    // Below this a linear search over the sums is as fast as a table and needs no memory.
    private const int LargestSearched = 16;

    private readonly uint[] count;
    private uint total, cycle;

    /// <summary>All symbols equally likely.</summary>
    public SymbolModel(int symbols)
    {
        Symbols = symbols;
        count = new uint[symbols];
        Array.Fill(count, 1u);
        Sums = new uint[symbols];
        total = (uint)symbols;
        if (symbols > LargestSearched)
        {
            int bits = 3;
            while (symbols > 1 << (bits + 2)) bits++;
            Shift = 15 - bits;
            Slots = new ushort[(1 << bits) + 2];
        }

        Build();
        cycle = UntilUpdate = (uint)(symbols + 6) >> 1;
    }

    /// <summary>Size of the alphabet.</summary>
    public int Symbols { get; }

    /// <summary>Sums[k]: probability of all symbols before k, in 2^-15.</summary>
    public uint[] Sums { get; }

    /// <summary>Where to start looking: symbol that holds slot &lt;&lt; <see cref="Shift"/>; null for small alphabets.</summary>
    public ushort[]? Slots { get; }

    /// <summary>Bits of a probability below a slot.</summary>
    public int Shift { get; }

    /// <summary>Symbols until the probabilities are taken anew.</summary>
    public uint UntilUpdate;

    /// <summary>Counts a symbol; takes the probabilities anew when it is time.</summary>
    public void Count(int symbol)
    {
        count[symbol]++;
        if (--UntilUpdate == 0) Update();
    }

    private void Update()
    {
        total += cycle;
        if (total > 32768)
        {
            total = 0;
            for (int k = 0; k < count.Length; k++)
            {
                count[k] = (count[k] + 1) >> 1;
                total += count[k];
            }
        }

        Build();
        cycle = Math.Min((5 * cycle) >> 2, (uint)(Symbols + 6) << 3);
        UntilUpdate = cycle;
    }

    private void Build()
    {
        uint scale = 0x80000000u / total, sum = 0;
        for (int k = 0; k < count.Length; k++)
        {
            Sums[k] = (scale * sum) >> 16;
            sum += count[k];
        }

        if (Slots is null) return;
        int symbol = 0, slot = 0;
        for (; slot < Slots.Length - 1; slot++)
        {
            uint at = (uint)slot << Shift;
            while (symbol + 1 < Symbols && Sums[symbol + 1] <= at) symbol++;
            Slots[slot] = (ushort)symbol;
        }

        Slots[slot] = (ushort)(Symbols - 1);
    }
}
