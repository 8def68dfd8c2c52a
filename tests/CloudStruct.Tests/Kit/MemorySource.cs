using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Tests.Kit;

/// <summary>A cloud in memory that looks like a file to the stages.</summary>
internal sealed class MemorySource(Vec3[] places, (ushort R, ushort G, ushort B)[]? colours = null) : IPointSource
{
    public string Name { get; init; } = "cloud.las";

    public CrsInfo Crs { get; init; } = CrsInfo.None;

    public bool FloatCoordinates { get; init; }

    public byte Class { get; init; }

    /// <summary>How often the cloud was read from its start.</summary>
    public int Readings { get; private set; }

    public CloudHeader Header => new()
    {
        Name = Name, Points = places.Length, HasColour = colours is not null, Crs = Crs, FloatCoordinates = FloatCoordinates,
    };

    public IEnumerable<SourceBlock> Read(CancellationToken stop)
    {
        Readings++;
        const int length = 1000;   // several blocks even for small clouds
        for (int from = 0; from < places.Length; from += length)
        {
            var block = new SourceBlock(colours is not null) { Count = Math.Min(length, places.Length - from) };
            for (int i = 0; i < block.Count; i++)
            {
                (block.X[i], block.Y[i], block.Z[i]) = (places[from + i].X, places[from + i].Y, places[from + i].Z);
                block.Class[i] = Class;
                if (colours is not null) (block.Red[i], block.Green[i], block.Blue[i]) = colours[from + i];
            }

            yield return block;
        }
    }
}
