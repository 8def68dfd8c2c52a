using System.Numerics;

namespace CloudStruct.Stages.Intake;

/// <summary>Finds the fingerprints that may occur more than once, in 16 bits a point: what it does not name occurs once.</summary>
/// <remarks>A blocked filter (B. H. Bloom 1970, Space/time trade-offs in hash coding with allowable errors, Commun. ACM
/// 13, 422-426): six bits in one 64-byte line per point, so one cache miss each. About 1 % of single points are named
/// too; the second look settles those few exactly (<see cref="DoubledPlaces"/>).</remarks>
internal sealed class MaybeSeen
{
    private const int WordsPerLine = 8;
    private const int BitsSet = 6;

    private readonly ulong[] words;
    private readonly int lineMask;

    /// <summary>A filter for about so many points.</summary>
    public MaybeSeen(long points)
    {
        long lines = Math.Max(16, points / 32);   // 512 bits for 32 points
        int size = (int)Math.Min(1 << 24, BitOperations.RoundUpToPowerOf2((ulong)lines));
        lineMask = size - 1;
        words = new ulong[size * WordsPerLine];
    }

    /// <summary>Fingerprints that came up again, most of them truly, with repetitions.</summary>
    public List<ulong> Again { get; } = [];

    /// <summary>Takes a fingerprint.</summary>
    public void Add(ulong print)
    {
        int line = ((int)(print >> 40) & lineMask) * WordsPerLine;
        ulong bits = Fingerprint.Mix(print);
        bool all = true;
        for (int k = 0; k < BitsSet; k++)
        {
            int bit = (int)(bits & 511);
            bits >>= 9;
            ref ulong word = ref words[line + (bit >> 6)];
            ulong one = 1UL << (bit & 63);
            all &= (word & one) != 0;
            word |= one;
        }

        if (all) Again.Add(print);
    }
}
