using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Faces;

/// <summary>The covered part of a face's plane as a raster: area, extents, outline.</summary>
/// <remarks>Cells about twice the spacing, so that even thinned points leave few holes; a closing by one cell fills those.</remarks>
internal sealed class Coverage
{
    private readonly int[] count;
    private readonly bool[] covered;
    private readonly int nx, ny;
    private readonly double cellM, lowU, lowV;

    /// <summary>Rasterises points given in plane coordinates.</summary>
    /// <param name="u">First coordinate [m].</param>
    /// <param name="v">Second coordinate [m].</param>
    /// <param name="spacingM">Distance between neighbouring points [m].</param>
    public Coverage(ReadOnlySpan<double> u, ReadOnlySpan<double> v, double spacingM)
    {
        double highU = double.MinValue, highV = double.MinValue;
        (lowU, lowV) = (double.MaxValue, double.MaxValue);
        for (int i = 0; i < u.Length; i++)
        {
            (lowU, highU) = (Math.Min(lowU, u[i]), Math.Max(highU, u[i]));
            (lowV, highV) = (Math.Min(lowV, v[i]), Math.Max(highV, v[i]));
        }

        // A margin of two cells around, so that the closing and the outline never meet the edge of the raster.
        cellM = Math.Max(2 * spacingM, Math.Sqrt((highU - lowU) * (highV - lowV) / 4e6));
        (lowU, lowV) = (lowU - (2 * cellM), lowV - (2 * cellM));
        nx = (int)((highU - lowU) / cellM) + 3;
        ny = (int)((highV - lowV) / cellM) + 3;
        count = new int[nx * ny];
        for (int i = 0; i < u.Length; i++) count[Index(u[i], v[i])]++;
        covered = Close();
    }

    /// <summary>Edge of a cell [m].</summary>
    public double CellM => cellM;

    /// <summary>Whether a place lies on the covered part.</summary>
    public bool Holds(double u, double v)
    {
        double x = (u - lowU) / cellM, y = (v - lowV) / cellM;
        return x >= 0 && y >= 0 && x < nx && y < ny && covered[((int)y * nx) + (int)x];
    }

    /// <summary>Covered surface [m²]. Cells inside count in full, cells on the rim by the share of points they hold.</summary>
    public double AreaM2()
    {
        long inside = 0, points = 0;
        for (int c = 0; c < covered.Length; c++)
        {
            if (!Inside(c)) continue;
            inside++;
            points += count[c];
        }

        double full = inside > 0 ? Math.Max(1, (double)points / inside) : 4, area = inside;
        for (int c = 0; c < covered.Length; c++)
        {
            if (covered[c] && !Inside(c)) area += Math.Min(1, count[c] / full);
        }

        return area * cellM * cellM;
    }

    /// <summary>Outer ring of the largest covered part, counter-clockwise in (u, v), not closed; holes are ignored.</summary>
    public List<(double U, double V)> Outline()
    {
        bool[] part = LargestPart();
        int start = Array.IndexOf(part, true);
        var ring = new List<(double, double)>();
        if (start < 0) return ring;

        // Walks cell corners with the covered cell on the left, from the lower left corner of the first cell of its row
        // eastward. The first covered cell in index order has nothing below it, so that edge is on the outer ring.
        int x = start % nx, y = start / nx, dx = 1, dy = 0, x0 = x, y0 = y;
        do
        {
            ring.Add((lowU + (x * cellM), lowV + (y * cellM)));
            (x, y) = (x + dx, y + dy);
            bool left = At(part, x, y, dx, dy, true), right = At(part, x, y, dx, dy, false);
            if (right) (dx, dy) = (dy, -dx);            // turn right: keeps diagonal cells in one ring
            else if (!left) (dx, dy) = (-dy, dx);       // turn left around a convex corner
        }
        while ((x, y) != (x0, y0) || (dx, dy) != (1, 0));
        return ring;
    }

    // The cell ahead of a corner, on the left or on the right of the direction of walk.
    private bool At(bool[] part, int x, int y, int dx, int dy, bool left)
    {
        int side = left ? 1 : -1;
        int cx = x + ((dx - (side * dy) - 1) / 2), cy = y + ((dy + (side * dx) - 1) / 2);
        return part[(cy * nx) + cx];
    }

    private bool[] LargestPart()
    {
        var part = new int[covered.Length];
        int best = 0, bestSize = 0, number = 0;
        var stack = new Stack<int>();
        for (int s = 0; s < covered.Length; s++)
        {
            if (!covered[s] || part[s] != 0) continue;
            part[s] = ++number;
            int size = 0;
            stack.Push(s);
            while (stack.Count > 0)
            {
                int c = stack.Pop();
                size++;
                for (int dy = -1; dy <= 1; dy++)
                {
                    for (int dx = -1; dx <= 1; dx++)
                    {
                        int o = c + (dy * nx) + dx;
                        if (!covered[o] || part[o] != 0) continue;
                        part[o] = number;
                        stack.Push(o);
                    }
                }
            }

            if (size > bestSize) (best, bestSize) = (number, size);
        }

        return [.. part.Select(p => p == best && best != 0)];
    }

    private int Index(double u, double v) => ((int)((v - lowV) / cellM) * nx) + (int)((u - lowU) / cellM);

    private bool Inside(int c)
    {
        if (!covered[c]) return false;
        for (int dy = -1; dy <= 1; dy++)
        {
            for (int dx = -1; dx <= 1; dx++)
            {
                if (!covered[c + (dy * nx) + dx]) return false;
            }
        }

        return true;
    }

    // Closing by one cell: grown, then shrunk; nothing beyond one cell from a point is added.
    private bool[] Close()
    {
        var grown = new bool[count.Length];
        for (int y = 1; y < ny - 1; y++)
        {
            for (int x = 1; x < nx - 1; x++)
            {
                if (count[(y * nx) + x] == 0) continue;
                for (int dy = -1; dy <= 1; dy++) grown.AsSpan(((y + dy) * nx) + x - 1, 3).Fill(true);
            }
        }

        var closed = new bool[count.Length];
        for (int y = 1; y < ny - 1; y++)
        {
            for (int x = 1; x < nx - 1; x++)
            {
                bool all = true;
                for (int dy = -1; dy <= 1 && all; dy++) all = grown.AsSpan(((y + dy) * nx) + x - 1, 3).IndexOf(false) < 0;
                closed[(y * nx) + x] = all;
            }
        }

        return closed;
    }
}
