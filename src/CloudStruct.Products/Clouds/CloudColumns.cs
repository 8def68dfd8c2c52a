using CloudStruct.Formats.Las;

namespace CloudStruct.Products.Clouds;

/// <summary>The columns of one block on their way into a LAS file, used again and again.</summary>
internal sealed class CloudColumns(int capacity)
{
    private readonly double[] x = new double[capacity], y = new double[capacity], z = new double[capacity];
    private readonly ushort[] red = new ushort[capacity], green = new ushort[capacity], blue = new ushort[capacity];

    public byte[] Class { get; } = new byte[capacity];

    public uint[] FaceId { get; } = new uint[capacity];

    public float[] RoughnessM { get; } = new float[capacity];

    public byte[] DikeProbability { get; } = new byte[capacity];

    public byte[] SourceClass { get; } = new byte[capacity];

    public void Place(int i, double mapX, double mapY, double mapZ) => (x[i], y[i], z[i]) = (mapX, mapY, mapZ);

    /// <summary>Eight bits become sixteen times 256, as LAS 1.4 says of sources with 8 bits a channel.</summary>
    public void Colour(int i, byte r, byte g, byte b) => (red[i], green[i], blue[i]) = ((ushort)(r << 8), (ushort)(g << 8), (ushort)(b << 8));

    public LasBatch Batch(int count) => new()
    {
        Count = count, X = x, Y = y, Z = z, Red = red, Green = green, Blue = blue, Class = Class,
        Extra = [FaceId, RoughnessM, DikeProbability, SourceClass],
    };
}
