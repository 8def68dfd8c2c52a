using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Drawings;

/// <summary>Which point is seen at each pixel: discs as wide as the spacing, nearest to the eye first, small gaps closed.</summary>
internal static class PicturePoints
{
    // Rows that one worker paints: each point is handed to the one or two bands that its disc touches.
    private const int Band = 32;

    // A disc this much wider than the spacing closes the gaps of an even cloud.
    private const double DiscInSpacing = 0.9;

    // Gaps are closed up to about the spacing from each side: more would bridge what the flight did not see.
    private const int FewestNeighbours = 4;

    /// <summary>Index of the point per pixel, row-major from the top; -1 where nothing was seen.</summary>
    public static int[] Seen(WorkingCloud cloud, PictureFrame frame, int threads, CancellationToken stop)
    {
        double radius = Math.Clamp(DiscInSpacing * cloud.SpacingM / frame.PixelM, 0.5, 12);
        var column = new float[cloud.Count];
        var row = new float[cloud.Count];
        var near = new float[cloud.Count];
        BlockParallel.For(cloud.Count, threads, stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                Records.Frame.Vec3 p = cloud.Place(i);
                column[i] = (float)((p.Dot(frame.Right) - frame.Left) / frame.PixelM);
                row[i] = (float)((frame.Top - p.Dot(frame.Up)) / frame.PixelM);
                near[i] = (float)p.Dot(frame.Toward);
            }
        });

        (int[] starts, int[] points) = Bands(row, radius, frame.Height);
        int[] seen = new int[frame.Width * frame.Height];
        Array.Fill(seen, -1);
        float[] depth = new float[seen.Length];
        Array.Fill(depth, float.NegativeInfinity);
        BlockParallel.For(starts.Length - 1, threads, stop, (from, to) =>
        {
            for (int b = from; b < to; b++)
            {
                for (int k = starts[b]; k < starts[b + 1]; k++)
                {
                    int i = points[k];
                    Paint(i, column[i], row[i], near[i], radius, cloud.SpacingM, b * Band, Math.Min(frame.Height, (b + 1) * Band), frame, seen, depth);
                }
            }
        }, 1);
        int rounds = 1 + (int)Math.Ceiling(radius);
        for (int round = 0; round < rounds; round++) seen = Closed(seen, frame, threads, stop);
        return seen;
    }

    private static (int[] Starts, int[] Points) Bands(float[] row, double radius, int height)
    {
        int bands = (height + Band - 1) / Band;
        int[] starts = new int[bands + 1];
        for (int i = 0; i < row.Length; i++)
        {
            (int first, int last) = Touched(row[i], radius, bands);
            for (int b = first; b <= last; b++) starts[b + 1]++;
        }

        for (int b = 0; b < bands; b++) starts[b + 1] += starts[b];
        int[] next = starts[..^1], points = new int[starts[^1]];
        for (int i = 0; i < row.Length; i++)
        {
            (int first, int last) = Touched(row[i], radius, bands);
            for (int b = first; b <= last; b++) points[next[b]++] = i;
        }

        return (starts, points);
    }

    private static (int First, int Last) Touched(float row, double radius, int bands) =>
        (Math.Max(0, (int)Math.Floor((row - radius) / Band)), Math.Min(bands - 1, (int)Math.Floor((row + radius) / Band)));

    private static void Paint(
        int point, double column, double row, double near, double radius, double spacingM, int fromRow, int toRow, PictureFrame frame, int[] seen, float[] depth)
    {
        int y0 = Math.Max(fromRow, (int)Math.Floor(row - radius)), y1 = Math.Min(toRow - 1, (int)Math.Floor(row + radius));
        int x0 = Math.Max(0, (int)Math.Floor(column - radius)), x1 = Math.Min(frame.Width - 1, (int)Math.Floor(column + radius));
        double r2 = Math.Max(0.5, radius * radius);
        for (int y = y0; y <= y1; y++)
        {
            for (int x = x0; x <= x1; x++)
            {
                double dx = x + 0.5 - column, dy = y + 0.5 - row, d2 = (dx * dx) + (dy * dy);
                if (d2 > r2) continue;

                // A disc bends away from the eye by its own breadth, so that of two neighbours each keeps its own half.
                float z = (float)(near - (spacingM * d2 / r2));
                int at = (y * frame.Width) + x;
                if (z < depth[at] || (z == depth[at] && seen[at] >= 0 && seen[at] < point)) continue;
                depth[at] = z;
                seen[at] = point;
            }
        }
    }

    /// <summary>Fills a pixel with the point of a neighbour when most of its neighbours are filled.</summary>
    private static int[] Closed(int[] seen, PictureFrame frame, int threads, CancellationToken stop)
    {
        int[] closed = (int[])seen.Clone();
        BlockParallel.For(frame.Height - 2, threads, stop, (from, to) =>
        {
            for (int y = from + 1; y <= to; y++)
            {
                for (int x = 1; x < frame.Width - 1; x++)
                {
                    int at = (y * frame.Width) + x;
                    if (seen[at] >= 0) continue;
                    int filled = 0, lowest = int.MaxValue;
                    for (int dy = -frame.Width; dy <= frame.Width; dy += frame.Width)
                    {
                        for (int dx = -1; dx <= 1; dx++)
                        {
                            int other = seen[at + dy + dx];
                            if (other < 0) continue;
                            filled++;
                            lowest = Math.Min(lowest, other);
                        }
                    }

                    if (filled >= FewestNeighbours) closed[at] = lowest;
                }
            }
        }, Band);
        return closed;
    }
}
