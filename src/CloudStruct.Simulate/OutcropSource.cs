using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Simulate;

/// <summary>A made outcrop, or part of it, read like a file: 16-bit colour, map coordinates, no classification.</summary>
internal sealed class OutcropSource : IPointSource
{
    private readonly SimulatedOutcrop outcrop;
    private readonly int[]? chosen;
    private readonly double shiftZM;

    /// <summary>All points, or those chosen, moved in height.</summary>
    public OutcropSource(SimulatedOutcrop outcrop, string name, int[]? chosen, double shiftZM)
    {
        this.outcrop = outcrop;
        this.chosen = chosen;
        this.shiftZM = shiftZM;
        Vec3 min = new(double.PositiveInfinity, double.PositiveInfinity, double.PositiveInfinity), max = min * -1;
        for (int i = 0; i < Count; i++)
        {
            Vec3 p = Place(i);
            min = new(Math.Min(min.X, p.X), Math.Min(min.Y, p.Y), Math.Min(min.Z, p.Z));
            max = new(Math.Max(max.X, p.X), Math.Max(max.Y, p.Y), Math.Max(max.Z, p.Z));
        }

        Header = new CloudHeader
        {
            Name = name,
            Format = "simulated outcrop",
            Points = Count,
            HasColour = outcrop.Red.Length > 0,
            Min = Count > 0 ? min : null,
            Max = Count > 0 ? max : null,
            Crs = outcrop.Crs,
        };
    }

    /// <inheritdoc/>
    public CloudHeader Header { get; }

    private int Count => chosen?.Length ?? outcrop.Count;

    /// <inheritdoc/>
    public IEnumerable<SourceBlock> Read(CancellationToken stop)
    {
        for (int from = 0; from < Count; from += SourceBlock.Capacity)
        {
            stop.ThrowIfCancellationRequested();
            var block = new SourceBlock(Header.HasColour) { Count = Math.Min(SourceBlock.Capacity, Count - from) };
            for (int k = 0; k < block.Count; k++)
            {
                int i = Index(from + k);
                Vec3 p = Place(from + k);
                (block.X[k], block.Y[k], block.Z[k], block.Class[k]) = (p.X, p.Y, p.Z, 0);
                if (!Header.HasColour) continue;
                // 257 takes 0-255 to 0-65535 exactly.
                block.Red[k] = (ushort)(outcrop.Red[i] * 257);
                block.Green[k] = (ushort)(outcrop.Green[i] * 257);
                block.Blue[k] = (ushort)(outcrop.Blue[i] * 257);
            }

            yield return block;
        }
    }

    private int Index(int k) => chosen is null ? k : chosen[k];

    private Vec3 Place(int k) => outcrop.Place(Index(k)) + new Vec3(0, 0, shiftZM);
}
