using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Intake;

/// <summary>What one look through a file tells.</summary>
internal sealed class TileFacts(IPointSource source, int sampleCapacity)
{
    /// <summary>The file's header.</summary>
    public CloudHeader Header { get; } = source.Header;

    /// <summary>Points read.</summary>
    public long Read { get; private set; }

    /// <summary>Points that the file marks as deleted and the reader left out.</summary>
    public long Withheld { get; private set; }

    /// <summary>Points with a coordinate that is no number.</summary>
    public long NotANumber { get; private set; }

    /// <summary>Largest colour value of any channel; 0 without colour.</summary>
    public int LargestColour { get; private set; }

    /// <summary>Sum of the fingerprints: equal for the same points in any order.</summary>
    public ulong Content { get; private set; }

    /// <summary>A random sample of the finite points, map coordinates [m].</summary>
    public TileSample Sample { get; } = new(sampleCapacity);

    /// <summary>Whether the file holds colour that says something.</summary>
    public bool HasColour => LargestColour > 0;

    /// <summary>Whether both files hold the same points, in any order.</summary>
    public bool IsCopyOf(TileFacts other) =>
        Content == other.Content && Read - NotANumber == other.Read - other.NotANumber && Read > NotANumber;

    /// <summary>Reads the file once.</summary>
    /// <param name="map">To map coordinates.</param>
    /// <param name="seen">Takes the fingerprint of every finite point; null when nobody asks.</param>
    /// <param name="progress">Takes the number of points of each block.</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Checked per block.</param>
    public void Look(PointMap map, MaybeSeen? seen, Action<int> progress, int threads, CancellationToken stop)
    {
        // Three steps at once: a block is read while the one before is mapped and the one before that is counted.
        foreach (MappedBlock block in ReadAhead.Of(Mapped(map, threads, stop), threads))
        {
            using (block)
            {
                stop.ThrowIfCancellationRequested();
                for (int i = 0; i < block.Count; i++)
                {
                    Vec3 place = block.Places[i];
                    if (double.IsNaN(place.X))
                    {
                        NotANumber++;
                        continue;
                    }

                    ulong print = block.Prints[i];
                    Content = unchecked(Content + print);
                    seen?.Add(print);
                    Sample.Offer(Read + i, place);
                }

                LargestColour = Math.Max(LargestColour, block.LargestColour);
                Read += block.Count;
                Withheld += block.Withheld;
                progress(block.Count);
            }
        }
    }

    private IEnumerable<MappedBlock> Mapped(PointMap map, int threads, CancellationToken stop)
    {
        foreach (SourceBlock block in ReadAhead.Of(source.Read(stop), threads))
        {
            using (block) yield return new MappedBlock(block, map, threads, stop);
        }
    }
}
