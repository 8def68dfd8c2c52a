namespace CloudStruct.Formats.Laz;

/// <summary>A piece that goes with the point item of formats 6 to 10 and follows its scanner channel.</summary>
/// <param name="bytes">Size of the piece.</param>
/// <param name="version4">From version 4 on a change back to a known channel predicts from that channel's own last value; version 3
/// goes on with the value of the channel that was left, and must be read so.</param>
internal abstract class Companion(int bytes, bool version4)
{
    private readonly byte[]?[] last = new byte[]?[4];
    private int current;

    /// <summary>Size of the piece.</summary>
    public int Bytes => bytes;

    /// <summary>Layers of its own.</summary>
    public abstract int LayerCount { get; }

    /// <summary>Starts with the raw piece of a chunk.</summary>
    public void Start(ReadOnlySpan<byte> raw, int channel)
    {
        current = channel;
        last[channel] = raw[..bytes].ToArray();
    }

    /// <summary>Decodes the next piece.</summary>
    /// <param name="point">Channel of the point, and whether it changed.</param>
    /// <param name="layers">Streams of its layers; null keeps the value of the raw record.</param>
    /// <param name="to">Takes the piece.</param>
    public void Next((int Channel, bool Changed) point, ReadOnlySpan<ArithmeticDecoder?> layers, Span<byte> to)
    {
        byte[] value = Follow(point);
        Decode(current, layers, value);
        value.CopyTo(to);
    }

    /// <summary>Encodes the next piece.</summary>
    /// <param name="point">Channel of the point, and whether it changed.</param>
    /// <param name="layers">Streams of its layers; null for one in which the whole chunk has the value of the raw record.</param>
    /// <param name="now">The piece.</param>
    public void Put((int Channel, bool Changed) point, ReadOnlySpan<ArithmeticEncoder?> layers, ReadOnlySpan<byte> now)
    {
        byte[] value = Follow(point);
        Encode(current, layers, value, now);
        now[..bytes].CopyTo(value);
    }

    /// <summary>Whether a layer must be written: whether in some record of a chunk it says something that the raw record does not.</summary>
    /// <param name="layer">Of its own layers, from 0.</param>
    /// <param name="records">All records of the chunk.</param>
    /// <param name="recordBytes">Size of a record.</param>
    /// <param name="at">Where the piece stands in a record.</param>
    public abstract bool Needs(int layer, ReadOnlySpan<byte> records, int recordBytes, int at);

    /// <summary>Decodes by the models of a channel.</summary>
    /// <param name="channel">0 to 3.</param>
    /// <param name="layers">Streams.</param>
    /// <param name="value">The piece before, then after.</param>
    protected abstract void Decode(int channel, ReadOnlySpan<ArithmeticDecoder?> layers, Span<byte> value);

    /// <summary>Encodes by the models of a channel.</summary>
    /// <param name="channel">0 to 3.</param>
    /// <param name="layers">Streams.</param>
    /// <param name="previous">The piece before.</param>
    /// <param name="now">The piece.</param>
    protected abstract void Encode(int channel, ReadOnlySpan<ArithmeticEncoder?> layers, ReadOnlySpan<byte> previous, ReadOnlySpan<byte> now);

    // The value that is predicted from, and replaced.
    private byte[] Follow((int Channel, bool Changed) point)
    {
        int asked = version4 || point.Changed ? point.Channel : 0, from = current;
        if (asked != current)
        {
            current = asked;
            if (last[asked] is null)
            {
                last[asked] = (byte[])last[from]!.Clone();
                from = asked;
            }
            else if (version4)
            {
                from = asked;
            }
        }

        return last[from]!;
    }
}
