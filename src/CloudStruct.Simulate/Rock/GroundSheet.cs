using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;

namespace CloudStruct.Simulate.Rock;

/// <summary>What lies on the rock as one height per place: soil, turf, scree, or the planed surface of a pavement.</summary>
internal sealed class GroundSheet
{
    private const int Tile = 16;
    private const float Nothing = -1000;
    private readonly Terrain terrain;
    private readonly double cellM, fromA, fromB, topM, bottomM;
    private readonly int rows, columns, tileRows, tileColumns;
    private readonly float[] heights, tileTops;

    /// <summary>Samples a sheet on a grid.</summary>
    /// <param name="terrain">Gives the site coordinates.</param>
    /// <param name="kind">Class of what lies there; Unknown for the rock itself.</param>
    /// <param name="box">Site coordinates between which it lies.</param>
    /// <param name="cellM">Grid step [m].</param>
    /// <param name="threads">Workers.</param>
    /// <param name="sample">Height at site coordinates; NaN where there is none.</param>
    public GroundSheet(Terrain terrain, RockClass kind, SiteBox box, double cellM, int threads, Func<double, double, double> sample)
    {
        this.terrain = terrain;
        this.cellM = cellM;
        Kind = kind;
        (fromA, fromB) = (Math.Max(0, box.FromA), Math.Max(0, box.FromB));
        rows = Math.Max(2, (int)((Math.Min(terrain.LengthM, box.ToA) - fromA) / cellM) + 2);
        columns = Math.Max(2, (int)((Math.Min(terrain.BreadthM, box.ToB) - fromB) / cellM) + 2);
        heights = new float[rows * columns];
        Chance.Workers.For(rows, threads, 16, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                for (int j = 0; j < columns; j++)
                {
                    double z = sample(fromA + (i * cellM), fromB + (j * cellM));
                    heights[(i * columns) + j] = double.IsNaN(z) ? Nothing : (float)z;
                }
            }
        });
        tileRows = (rows / Tile) + 1;
        tileColumns = (columns / Tile) + 1;
        tileTops = TileTops();
        topM = heights.Max();
        bottomM = heights.Where(h => h > Nothing).DefaultIfEmpty(Nothing).Min() - 0.1;
    }

    /// <summary>Class of what lies there; Unknown for the rock itself.</summary>
    public RockClass Kind { get; }

    /// <summary>Height at site coordinates, bilinear [m].</summary>
    public double Height(double a, double b)
    {
        double x = Math.Clamp((a - fromA) / cellM, 0, rows - 1.001), y = Math.Clamp((b - fromB) / cellM, 0, columns - 1.001);
        int i = (int)x, j = (int)y, k = (i * columns) + j;
        double u = x - i, v = y - j;
        return ((1 - u) * (((1 - v) * heights[k]) + (v * heights[k + 1])))
            + (u * (((1 - v) * heights[k + columns]) + (v * heights[k + columns + 1])));
    }

    /// <summary>Upward unit normal at a local place, over one grid step.</summary>
    public Vec3 Normal(Vec3 p)
    {
        (double a, double b) = terrain.Site(p);
        double da = (Height(a + cellM, b) - Height(a - cellM, b)) / (2 * cellM);
        double db = (Height(a, b + cellM) - Height(a, b - cellM)) / (2 * cellM);
        return (new Vec3(0, 0, 1) - (terrain.Uphill * da) - (terrain.Right * db)).Unit();
    }

    /// <summary>First place where a ray goes below the sheet.</summary>
    public bool Cast(Vec3 from, Vec3 toward, double start, double end, out double t)
    {
        t = end;
        (double a0, double b0) = terrain.Site(from);
        double da = toward.Dot(terrain.Uphill), db = toward.Dot(terrain.Right), level = Math.Sqrt((da * da) + (db * db));
        if (!SiteBox.Clip(a0, da, fromA, fromA + ((rows - 1) * cellM), ref start, ref end)
            || !SiteBox.Clip(b0, db, fromB, fromB + ((columns - 1) * cellM), ref start, ref end)
            || !SiteBox.Clip(from.Z, toward.Z, bottomM, topM, ref start, ref end))
        {
            return false;
        }

        double coarse = Tile * cellM / Math.Max(level, 0.5), fine = 0.6 * cellM / Math.Max(level, 0.5);
        for (double at = start; at < end; at += coarse)
        {
            double to = Math.Min(end, at + coarse), low = from.Z + (toward.Z * (toward.Z < 0 ? to : at));
            if (low > TopNear(a0 + (da * (at + to) / 2), b0 + (db * (at + to) / 2))) continue;
            for (double s = at; s < to; s += fine)
            {
                double next = Math.Min(to, s + fine);
                if (from.Z + (toward.Z * next) >= Height(a0 + (da * next), b0 + (db * next))) continue;
                double lo = s, hi = next;
                for (int k = 0; k < 14; k++)
                {
                    double mid = (lo + hi) / 2;
                    if (from.Z + (toward.Z * mid) < Height(a0 + (da * mid), b0 + (db * mid))) hi = mid;
                    else lo = mid;
                }

                t = hi;
                return true;
            }
        }

        return false;
    }

    private float TopNear(double a, double b)
    {
        int i = Math.Clamp((int)((a - fromA) / (cellM * Tile)), 0, tileRows - 1), j = Math.Clamp((int)((b - fromB) / (cellM * Tile)), 0, tileColumns - 1);
        return tileTops[(i * tileColumns) + j];
    }

    /// <summary>Highest place of each tile and the eight about it.</summary>
    private float[] TileTops()
    {
        var own = new float[tileRows * tileColumns];
        Array.Fill(own, Nothing);
        for (int k = 0; k < heights.Length; k++)
        {
            int tile = (k / columns / Tile * tileColumns) + (k % columns / Tile);
            own[tile] = Math.Max(own[tile], heights[k]);
        }

        var tops = new float[own.Length];
        for (int i = 0; i < tileRows; i++)
        {
            for (int j = 0; j < tileColumns; j++)
            {
                float top = Nothing;
                for (int di = -1; di <= 1; di++)
                {
                    for (int dj = -1; dj <= 1; dj++)
                    {
                        int r = i + di, c = j + dj;
                        if (r >= 0 && r < tileRows && c >= 0 && c < tileColumns) top = Math.Max(top, own[(r * tileColumns) + c]);
                    }
                }

                tops[(i * tileColumns) + j] = top;
            }
        }

        return tops;
    }
}
