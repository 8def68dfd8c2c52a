using System.Buffers.Binary;

namespace CloudStruct.Formats.Laz;

/// <summary>The GPS time of point formats 1, 3, 4 and 5, version 1: one sequence.</summary>
internal sealed class GpsTimeFirst : PointwiseItem
{
    private readonly SymbolModel zero = new(3), multi = new(512);
    private readonly IntegerCoder gps = new(32, 6);
    private long last;
    private int step, extreme;

    /// <inheritdoc/>
    public override void Start(ReadOnlySpan<byte> raw) => last = BinaryPrimitives.ReadInt64LittleEndian(raw);

    /// <inheritdoc/>
    public override void Next(ArithmeticDecoder stream, Span<byte> to)
    {
        unchecked
        {
            if (step == 0)
            {
                switch (stream.Symbol(zero))
                {
                    case 1: last += step = gps.Decode(stream, 0, 0); break;
                    case 2: last = (long)stream.Raw64(); break;
                }
            }
            else
            {
                int s = stream.Symbol(multi);
                switch (s)
                {
                    case 0: Bump(gps.Decode(stream, step / 4, 2)); break;
                    case 1:
                        last += step = gps.Decode(stream, step, 1);
                        extreme = 0;
                        break;
                    case < 10: last += gps.Decode(stream, s * step, 3); break;
                    case < 50: last += gps.Decode(stream, s * step, 4); break;
                    case < 509: last += gps.Decode(stream, s * step, 5); break;
                    case 509: Bump(gps.Decode(stream, s * step, 5)); break;
                    case 510: last = (long)stream.Raw64(); break;
                }
            }

            BinaryPrimitives.WriteInt64LittleEndian(to, last);
        }
    }

    private void Bump(int d)
    {
        unchecked
        {
            last += d;
            if (++extreme <= 3) return;
            step = d;
            extreme = 0;
        }
    }
}
