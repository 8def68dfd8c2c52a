using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Intake;

/// <summary>Streams the files of a survey into the survey frame, corrected as an <see cref="IntakeRecord"/> says.</summary>
/// <remarks>Holds no points: each reading goes to the files again, so a record from the cache revives it.</remarks>
public sealed class Pieces : IPieces
{
    private readonly SurveyInput input;
    private readonly PointMap map;

    /// <summary>Pieces of a survey.</summary>
    /// <param name="input">The survey the record was made from.</param>
    /// <param name="record">What the intake found.</param>
    public Pieces(SurveyInput input, IntakeRecord record)
    {
        this.input = input;
        Record = record;
        map = new PointMap(record.Axes, record.HorizontalUnitM, record.VerticalUnitM, record.OffsetM);
    }

    /// <inheritdoc/>
    public IntakeRecord Record { get; }

    /// <inheritdoc/>
    public IEnumerable<PointBlock> Read(CancellationToken stop) =>
        Read(new TileCounts[input.Sources.Length], new DoubledPlaces(Array.ConvertAll(Record.DoubledKeys, k => unchecked((ulong)k))), [], stop);

    /// <summary>The same, counting what is dropped in each file.</summary>
    /// <param name="counts">[out] One per file.</param>
    /// <param name="doubled">Places at which only the first point is kept.</param>
    /// <param name="dropped">[out] Fingerprints of the points dropped for that, with repetitions.</param>
    /// <param name="stop">Checked per block.</param>
    internal IEnumerable<PointBlock> Read(TileCounts[] counts, DoubledPlaces doubled, List<ulong> dropped, CancellationToken stop)
    {
        for (int tile = 0; tile < input.Sources.Length; tile++)
        {
            if (Record.Tiles[tile].IsCopy) continue;
            long index = 0;
            foreach (SourceBlock block in input.Sources[tile].Read(stop))
            {
                using (block)
                {
                    stop.ThrowIfCancellationRequested();
                    PointBlock local = Convert(block, tile, index, doubled, dropped, ref counts[tile]);
                    index += block.Count;
                    if (local.Count > 0) yield return local;
                    else local.Dispose();
                }
            }
        }
    }

    private PointBlock Convert(
        SourceBlock block, int tile, long index, DoubledPlaces doubled, List<ulong> dropped, ref TileCounts counts)
    {
        TileFix fix = Record.Tiles[tile];
        Vec3 origin = Record.Frame.Origin;
        var local = new PointBlock { Tile = tile };
        Span<float> xs = local.X, ys = local.Y, zs = local.Z;
        bool coloured = block.HasColour && Record.HasColour;
        int n = 0;
        for (int i = 0; i < block.Count; i++)
        {
            double x = block.X[i], y = block.Y[i], z = block.Z[i];
            if (!(double.IsFinite(x) && double.IsFinite(y) && double.IsFinite(z)))
            {
                counts.NotANumber++;
                continue;
            }

            Vec3 place = map[x, y, z];
            Vec3 p = place - origin;
            if (!RobustBox.Inside(p, Record.BoxMin, Record.BoxMax))
            {
                counts.FarOutliers++;
                continue;
            }

            ulong print = doubled.IsEmpty ? 0 : Fingerprint.Of(place);
            bool? first = doubled.MeetFirst(print);
            if (first == false)
            {
                counts.Doubled++;
                dropped.Add(print);
                continue;
            }

            // The first point at a doubled place stays whoever owns the ground: its twin in the owner's file is dropped.
            if (first is null && Record.OwnerKeys.Length > 0 && !Owns(tile, p))
            {
                counts.Overlapped++;
                continue;
            }

            xs[n] = (float)p.X;
            ys[n] = (float)p.Y;
            zs[n] = (float)(p.Z + fix.ShiftZM);
            if (coloured)
            {
                local.Red[n] = (byte)Math.Min(255, block.Red[i] >> fix.ColourShift);
                local.Green[n] = (byte)Math.Min(255, block.Green[i] >> fix.ColourShift);
                local.Blue[n] = (byte)Math.Min(255, block.Blue[i] >> fix.ColourShift);
            }
            else
            {
                local.Red[n] = local.Green[n] = local.Blue[n] = 0;
            }

            local.Class[n] = block.Class[i];
            local.Index[n] = index + i;
            n++;
        }

        local.Count = n;
        counts.Kept += n;
        return local;
    }

    private bool Owns(int tile, Vec3 p)
    {
        long key = Columns.Key(p, Record.OwnerCellM);
        int at = Array.BinarySearch(Record.OwnerKeys, key);
        return at < 0 || Record.OwnerTiles[at] == tile;
    }
}
