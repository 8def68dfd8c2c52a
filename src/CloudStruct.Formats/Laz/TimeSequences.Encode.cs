namespace CloudStruct.Formats.Laz;

internal sealed partial class TimeSequences
{
    /// <summary>Writes a time.</summary>
    /// <remarks>A decoder follows any choice of sequence and multiple; this one is that of the reference encoder, so that files are the same to the byte.</remarks>
    public void Put(ArithmeticEncoder stream, long bits)
    {
        unchecked
        {
            // The second turn follows a change to a sequence whose difference fits.
            for (; ; )
            {
                long e = bits - last[current];
                if (!layered && e == 0)
                {
                    Tell(stream, 0, 511);
                    return;
                }

                if (e == (int)e)
                {
                    PutStep(stream, (int)e);
                    last[current] = bits;
                    return;
                }

                int other = 1;
                while (other < 4 && !Fits(bits - last[(current + other) & 3])) other++;
                if (other == 4) break;
                Tell(stream, 2 + other, 512 + other);
                current = (current + other) & 3;
            }

            Tell(stream, 2, 512);
            gps.Encode(stream, (int)(last[current] >> 32), (int)(bits >> 32), 8);
            stream.Raw((uint)bits, 32);
            current = newest = (newest + 1) & 3;
            last[current] = bits;
            step[current] = extreme[current] = 0;
        }
    }

    private static bool Fits(long e) => e is >= int.MinValue and <= int.MaxValue;

    // Symbols as the pointwise form numbers them, for a sequence without and with a step.
    private void Tell(ArithmeticEncoder stream, int withoutStep, int withStep)
    {
        if (step[current] == 0) stream.Symbol(zero, layered ? withoutStep - 1 : withoutStep);
        else stream.Symbol(multi, layered && withStep > 511 ? withStep - 1 : withStep);
    }

    private void PutStep(ArithmeticEncoder stream, int e)
    {
        unchecked
        {
            int d = step[current];
            if (d == 0)
            {
                Tell(stream, 1, 0);
                gps.Encode(stream, 0, e, 0);
                step[current] = e;
                extreme[current] = 0;
                return;
            }

            // Single precision as the reference encoder has it: a double would choose another multiple here and there.
            float ratio = (float)e / d;
            int f = (int)(ratio >= 0 ? ratio + 0.5f : ratio - 0.5f);
            (int symbol, int predicted, int context) = f switch
            {
                1 => (1, d, 1),
                0 => (0, 0, 7),
                >= 500 => (500, 500 * d, 4),
                >= 10 => (f, f * d, 3),
                > 0 => (f, f * d, 2),
                > -10 => (500 - f, f * d, 5),
                _ => (510, -10 * d, 6),
            };
            stream.Symbol(multi, symbol);
            gps.Encode(stream, predicted, e, context);
            if (f == 1)
            {
                extreme[current] = 0;
            }
            else if (context is 4 or 6 or 7 && ++extreme[current] > 3)
            {
                step[current] = e;
                extreme[current] = 0;
            }
        }
    }
}
