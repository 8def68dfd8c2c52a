using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Intake;

/// <summary>Lowest and highest coordinates of a stream.</summary>
internal sealed class Extent
{
    private float x0 = float.MaxValue, y0 = float.MaxValue, z0 = float.MaxValue;
    private float x1 = float.MinValue, y1 = float.MinValue, z1 = float.MinValue;

    /// <summary>Lowest corner, rounded down so that no point of the stream falls out by rounding.</summary>
    public Vec3 Min => new(MathF.BitDecrement(x0), MathF.BitDecrement(y0), MathF.BitDecrement(z0));

    /// <summary>Highest corner, rounded up.</summary>
    public Vec3 Max => new(MathF.BitIncrement(x1), MathF.BitIncrement(y1), MathF.BitIncrement(z1));

    /// <summary>Takes in a block.</summary>
    public void Add(PointBlock block)
    {
        Span<float> xs = block.X, ys = block.Y, zs = block.Z;
        for (int i = 0; i < block.Count; i++)
        {
            x0 = Math.Min(x0, xs[i]);
            y0 = Math.Min(y0, ys[i]);
            z0 = Math.Min(z0, zs[i]);
            x1 = Math.Max(x1, xs[i]);
            y1 = Math.Max(y1, ys[i]);
            z1 = Math.Max(z1, zs[i]);
        }
    }
}
