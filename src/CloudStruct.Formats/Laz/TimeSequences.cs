namespace CloudStruct.Formats.Laz;

/// <summary>GPS times as up to four sequences of even steps, on the 64 bits of the number. Shared by the pointwise and the layered form.</summary>
/// <param name="layered">The layered form tells elsewhere that a time is unchanged, so that its symbols move down by one.</param>
internal sealed partial class TimeSequences(bool layered)
{
    // A valid stream changes to another sequence at most once a point.
    private const int MostSwitches = 4;

    private readonly SymbolModel zero = new(layered ? 5 : 6), multi = new(layered ? 515 : 516);
    private readonly IntegerCoder gps = new(32, 9);
    private readonly long[] last = new long[4];
    private readonly int[] step = new int[4], extreme = new int[4];
    private int current, newest;

    /// <summary>Takes the time of the first record.</summary>
    public void Start(long bits) => last[0] = bits;

    /// <summary>The next time.</summary>
    public long Next(ArithmeticDecoder stream)
    {
        unchecked
        {
            int move = layered ? 1 : 0;
            for (int turn = 0; turn <= MostSwitches; turn++)
            {
                if (step[current] == 0)
                {
                    int s = stream.Symbol(zero) + move;
                    if (s == 0) return last[current];
                    if (s == 1)
                    {
                        step[current] = gps.Decode(stream, 0, 0);
                        last[current] += step[current];
                        extreme[current] = 0;
                        return last[current];
                    }

                    if (s == 2) return New(stream);
                    current = (current + s - 2) & 3;
                }
                else
                {
                    // Above 510 the layered form lacks the symbol "unchanged".
                    int s = stream.Symbol(multi);
                    if (layered && s > 510) s++;
                    if (s == 511) return last[current];
                    if (s == 512) return New(stream);
                    if (s < 511) return Step(stream, s);
                    current = (current + s - 512) & 3;
                }
            }

            throw new LazDamageException("a time changes its sequence without end");
        }
    }

    private long Step(ArithmeticDecoder stream, int s)
    {
        unchecked
        {
            int d = step[current];
            switch (s)
            {
                case 0:
                    return Bump(gps.Decode(stream, 0, 7));
                case 1:
                    extreme[current] = 0;
                    return last[current] += gps.Decode(stream, d, 1);
                case < 10:
                    return last[current] += gps.Decode(stream, s * d, 2);
                case < 500:
                    return last[current] += gps.Decode(stream, s * d, 3);
                case 500:
                    return Bump(gps.Decode(stream, 500 * d, 4));
                case < 510:
                    return last[current] += gps.Decode(stream, (500 - s) * d, 5);
                default:
                    return Bump(gps.Decode(stream, -10 * d, 6));
            }
        }
    }

    private long Bump(int d)
    {
        unchecked
        {
            if (++extreme[current] > 3)
            {
                step[current] = d;
                extreme[current] = 0;
            }

            return last[current] += d;
        }
    }

    private long New(ArithmeticDecoder stream)
    {
        unchecked
        {
            newest = (newest + 1) & 3;
            int high = gps.Decode(stream, (int)(last[current] >> 32), 8);
            last[newest] = ((long)high << 32) | stream.Raw(32);
            current = newest;
            step[current] = extreme[current] = 0;
            return last[current];
        }
    }
}
