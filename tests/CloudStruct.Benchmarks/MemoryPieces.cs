using CloudStruct.Records.Points;

namespace CloudStruct.Benchmarks;

/// <summary>Blocks that lie in memory already, handed out as copies: the receiver disposes of what it gets.</summary>
internal sealed class MemoryPieces(IntakeRecord record, List<PointBlock> blocks) : IPieces
{
    public IntakeRecord Record => record;

    public IEnumerable<PointBlock> Read(CancellationToken stop)
    {
        foreach (PointBlock block in blocks)
        {
            var copy = new PointBlock { Count = block.Count, Tile = block.Tile };
            block.X[..block.Count].CopyTo(copy.X);
            block.Y[..block.Count].CopyTo(copy.Y);
            block.Z[..block.Count].CopyTo(copy.Z);
            block.Red[..block.Count].CopyTo(copy.Red);
            block.Green[..block.Count].CopyTo(copy.Green);
            block.Blue[..block.Count].CopyTo(copy.Blue);
            block.Class[..block.Count].CopyTo(copy.Class);
            block.Index[..block.Count].CopyTo(copy.Index);
            yield return copy;
        }
    }
}
