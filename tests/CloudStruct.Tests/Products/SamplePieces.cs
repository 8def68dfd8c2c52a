using CloudStruct.Records.Points;

namespace CloudStruct.Tests.Products;

/// <summary>Input points from memory, in blocks of a given length.</summary>
internal sealed class SamplePieces(float[][] points, IntakeRecord record, int blockLength = 3) : IPieces
{
    /// <summary>Seven points about the working points of <see cref="Samples.Dike"/>; the last two lie far from them all.</summary>
    public static SamplePieces AboutTheDike() => new(
        [[0.5f, 0.5f, 0.5f], [0.6f, 0.5f, 0.5f], [1.4f, 0.6f, 0.5f], [2.5f, 0.5f, 0.75f], [3.25f, 0.5f, 0.5f], [3.5f, 40, 0.5f], [-30, 0.5f, 0.5f]],
        Samples.Dike().Intake with { Points = 7 });

    public IntakeRecord Record => record;

    public IEnumerable<PointBlock> Read(CancellationToken stop)
    {
        for (int from = 0; from < points.Length; from += blockLength)
        {
            var block = new PointBlock { Count = Math.Min(blockLength, points.Length - from) };
            for (int i = 0; i < block.Count; i++)
            {
                (block.X[i], block.Y[i], block.Z[i]) = (points[from + i][0], points[from + i][1], points[from + i][2]);
                (block.Red[i], block.Green[i], block.Blue[i], block.Class[i]) = unchecked(((byte)(from + i), (byte)128, (byte)255, (byte)(2 + from + i)));
                block.Index[i] = from + i;
            }
            yield return block;
        }
    }
}
