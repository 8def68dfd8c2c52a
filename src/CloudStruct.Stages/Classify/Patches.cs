using System.Numerics;
using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Classify;

/// <summary>Small pieces of surface: the points of one cell of a cubic lattice, described by their means.</summary>
/// <remarks>A patch holds some ten points, which cuts the noise of their colours by three and the work by ten.</remarks>
internal sealed class Patches
{
    /// <summary>Edge of a cell [m].</summary>
    public double SizeM { get; private init; }

    public int Count => X.Length;

    /// <summary>Patch of every working point.</summary>
    public int[] OfPoint { get; private init; } = [];

    /// <summary>Lattice place, three integers a patch.</summary>
    public int[] Cell { get; private init; } = [];

    /// <summary>Centroid [m].</summary>
    public float[] X { get; private init; } = [];
    public float[] Y { get; private init; } = [];
    public float[] Z { get; private init; } = [];

    /// <summary>Surface [m²].</summary>
    public float[] AreaM2 { get; private init; } = [];

    /// <summary>Mean unit normal.</summary>
    public Vector3[] Normal { get; private init; } = [];

    /// <summary>Mean colour, three numbers a patch: L*, and ln(R/G) and ln(B/G) of linear light in hundredths; empty without
    /// colour. A shadow moves all three by about the same step everywhere, which a*, b* do not do.</summary>
    public float[] Colour { get; private init; } = [];

    /// <summary>Mean of ln roughness [ln m].</summary>
    public float[] LogRoughness { get; private init; } = [];

    /// <summary>Mean planarity at the largest radius.</summary>
    public float[] Planarity { get; private init; } = [];

    /// <summary>Cells of the lattice to patches.</summary>
    public required CellMap Map { get; init; }

    // Looked up once: the odds of each candidate are averaged over them three times, and every cut asks again.
    private int[] starts = [], around = [];

    /// <summary>Patches whose cells touch each patch's, itself among them, in the order of the lattice.</summary>
    public ReadOnlySpan<int> Around(int i) => around.AsSpan(starts[i], starts[i + 1] - starts[i]);

    public Vector3 Place(int i) => new(X[i], Y[i], Z[i]);

    /// <summary>Cuts the cells of the shared grid into 1 to 4 parts a side, so that no point has to be sorted again.</summary>
    public static Patches Build(DescribedCloud described, double sizeM, StageContext context)
    {
        WorkingCloud cloud = described.Cloud;
        SortedGrid grid = cloud.Grid;
        int cells = grid.Keys.Length, m = Math.Clamp((int)Math.Floor((grid.CellM / sizeM) + 0.01), 1, 4);
        float part = grid.CellM / m;
        var used = new ulong[cells];
        int SubCell(int i, int gx, int gy, int gz)
        {
            int sx = Math.Clamp((int)((cloud.X[i] - grid.MinX - (gx * grid.CellM)) / part), 0, m - 1);
            int sy = Math.Clamp((int)((cloud.Y[i] - grid.MinY - (gy * grid.CellM)) / part), 0, m - 1);
            int sz = Math.Clamp((int)((cloud.Z[i] - grid.MinZ - (gz * grid.CellM)) / part), 0, m - 1);
            return (((sz * m) + sy) * m) + sx;
        }

        (int X, int Y, int Z) CellOf(int c)
        {
            long key = grid.Keys[c], row = key / grid.NX;
            return ((int)(key % grid.NX), (int)(row % grid.NY), (int)(row / grid.NY));
        }

        BlockParallel.For(cells, context.Threads, context.Stop, (from, to) =>
        {
            for (int c = from; c < to; c++)
            {
                (int gx, int gy, int gz) = CellOf(c);
                for (int i = grid.Starts[c]; i < grid.Starts[c + 1]; i++) used[c] |= 1UL << SubCell(i, gx, gy, gz);
            }
        });

        var first = new int[cells + 1];
        for (int c = 0; c < cells; c++) first[c + 1] = first[c] + BitOperations.PopCount(used[c]);
        int n = first[cells];
        var ofPoint = new int[cloud.Count];
        var at = new int[3 * n];
        float[] x = new float[n], y = new float[n], z = new float[n], area = new float[n], rough = new float[n], planar = new float[n];
        float[] colour = described.LStar.Length > 0 ? new float[3 * n] : [];
        var normal = new Vector3[n];
        int radii = described.PlanarityRadiiM.Length;
        BlockParallel.For(cells, context.Threads, context.Stop, (from, to) =>
        {
            var points = new int[64];
            var roughPoints = new int[64];
            for (int c = from; c < to; c++)
            {
                (int gx, int gy, int gz) = CellOf(c);
                int parts = first[c + 1] - first[c];
                Array.Clear(points, 0, parts);
                Array.Clear(roughPoints, 0, parts);
                for (int i = grid.Starts[c]; i < grid.Starts[c + 1]; i++)
                {
                    int sub = SubCell(i, gx, gy, gz), k = BitOperations.PopCount(used[c] & ((1UL << sub) - 1)), p = first[c] + k;
                    ofPoint[i] = p;
                    if (points[k]++ == 0)
                    {
                        at[3 * p] = (gx * m) + (sub % m);
                        at[(3 * p) + 1] = (gy * m) + (sub / m % m);
                        at[(3 * p) + 2] = (gz * m) + (sub / m / m);
                    }

                    x[p] += cloud.X[i];
                    y[p] += cloud.Y[i];
                    z[p] += cloud.Z[i];
                    area[p] += described.AreaM2[i];
                    normal[p] += new Vector3(described.NormalX[i], described.NormalY[i], described.NormalZ[i]);
                    float flat = radii > 0 ? described.Planarity[(i * radii) + radii - 1] : 0;
                    planar[p] += float.IsFinite(flat) ? flat : 0;
                    if (described.RoughnessM[i] > 0)
                    {
                        rough[p] += MathF.Log(described.RoughnessM[i] + 1e-4f);
                        roughPoints[k]++;
                    }

                    if (colour.Length == 0) continue;
                    colour[3 * p] += described.LStar[i];
                    colour[(3 * p) + 1] += 100 * described.LogRedGreen[i];
                    colour[(3 * p) + 2] += 100 * described.LogBlueGreen[i];
                }

                for (int k = 0; k < parts; k++)
                {
                    int p = first[c] + k, count = points[k];
                    x[p] /= count;
                    y[p] /= count;
                    z[p] /= count;
                    planar[p] /= count;
                    float length = normal[p].Length();
                    normal[p] = length > 1e-6f ? normal[p] / length : Vector3.UnitZ;
                    rough[p] = roughPoints[k] > 0 ? rough[p] / roughPoints[k] : float.NaN;
                    for (int j = 0; j < 3 && colour.Length > 0; j++) colour[(3 * p) + j] /= count;
                }
            }
        }, length: 256);

        var map = new CellMap(n);
        for (int p = 0; p < n; p++) map.FindOrAdd(at[3 * p], at[(3 * p) + 1], at[(3 * p) + 2]);
        var patches = new Patches
        {
            SizeM = part, OfPoint = ofPoint, Cell = at, X = x, Y = y, Z = z, AreaM2 = area, Normal = normal, Colour = colour,
            LogRoughness = rough, Planarity = planar, Map = map,
        };
        patches.Touch(context);
        return patches;
    }

    private void Touch(StageContext context)
    {
        starts = new int[Count + 1];
        int[][] lists = BlockParallel.Map(Count, context.Threads, context.Stop, (from, to) =>
        {
            var own = new List<int>(12 * (to - from));
            for (int i = from; i < to; i++)
            {
                int before = own.Count;
                for (int k = 0; k < 27; k++)
                {
                    int j = Map.Find(Cell[3 * i] + (k % 3) - 1, Cell[(3 * i) + 1] + (k / 3 % 3) - 1, Cell[(3 * i) + 2] + (k / 9) - 1);
                    if (j >= 0) own.Add(j);
                }

                starts[i + 1] = own.Count - before;
            }

            return own.ToArray();
        });
        for (int i = 0; i < Count; i++) starts[i + 1] += starts[i];
        around = new int[starts[Count]];
        int at = 0;
        foreach (int[] list in lists)
        {
            list.CopyTo(around, at);
            at += list.Length;
        }
    }
}
