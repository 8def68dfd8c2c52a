using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Intake;

/// <summary>Which files show the same ground: points of each file counted in upright columns.</summary>
internal sealed class SharedGround(double edgeM)
{
    // A file with fewer points than this share of the densest one does not show the column, it grazes it.
    private const double LeastShare = 0.5;
    private const int LeastPoints = 3;

    private readonly Dictionary<(long Column, int Tile), int> counts = [];

    /// <summary>Edge of a column [m].</summary>
    public double EdgeM { get; } = edgeM;

    /// <summary>Takes in a block of one file.</summary>
    public void Add(PointBlock block)
    {
        Span<float> x = block.X, y = block.Y;
        long last = 0;
        int run = 0;
        for (int i = 0; i < block.Count; i++)
        {
            long column = Columns.Key(new Vec3(x[i], y[i], 0), EdgeM);
            if (column != last)
            {
                Count(last, block.Tile, run);
                (last, run) = (column, 0);
            }

            run++;
        }

        Count(last, block.Tile, run);
    }

    /// <summary>Columns that two or more files show, each with the files, in order of the columns.</summary>
    public List<(long Column, int[] Tiles)> Shared()
    {
        var shared = new List<(long Column, int[] Tiles)>();
        foreach (var column in counts.Where(c => c.Value >= LeastPoints).GroupBy(c => c.Key.Column).OrderBy(g => g.Key))
        {
            int[] tiles = [.. column.Select(c => c.Key.Tile).Order()];
            if (tiles.Length > 1) shared.Add((column.Key, tiles));
        }

        return shared;
    }

    /// <summary>The file that keeps each shared column: of those that show it well the one whose middle is nearest, so that
    /// seams run half way between the middles and each file gives what it saw best.</summary>
    /// <param name="middles">Middle of each file, local [m].</param>
    public (long[] Keys, int[] Tiles) Owners(Vec3[] middles)
    {
        var keys = new List<long>();
        var owners = new List<int>();
        foreach ((long column, int[] tiles) in Shared())
        {
            int densest = tiles.Max(t => counts[(column, t)]);
            Vec3 here = Columns.Middle(column, EdgeM);
            int owner = -1;
            double nearest = double.MaxValue;
            foreach (int t in tiles)
            {
                if (counts[(column, t)] < LeastShare * densest) continue;
                double dx = middles[t].X - here.X, dy = middles[t].Y - here.Y, d = (dx * dx) + (dy * dy);
                if (d >= nearest) continue;
                nearest = d;
                owner = t;
            }

            keys.Add(column);
            owners.Add(owner);
        }

        return ([.. keys], [.. owners]);
    }

    private void Count(long column, int tile, int points)
    {
        if (points > 0) counts[(column, tile)] = counts.GetValueOrDefault((column, tile)) + points;
    }
}
