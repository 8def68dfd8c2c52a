using System.Numerics;
using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Classify;

/// <summary>A coarser lattice over the patches with sums per cell, for windows that would hold too many patches.</summary>
internal sealed class Level
{
    private const int Sums = 16;   // weight, 3 first moments, 6 second, 6 of the normals' tensor

    private readonly double[] sums;

    private Level(double sizeM, int[] ofFiner, int[] cell, CellMap map, double[] sums)
    {
        SizeM = sizeM;
        OfFiner = ofFiner;
        Cell = cell;
        Map = map;
        this.sums = sums;
    }

    /// <summary>Edge of a cell [m].</summary>
    public double SizeM { get; }

    /// <summary>Cell of every item of the next finer level (patches below the first).</summary>
    public int[] OfFiner { get; }

    /// <summary>Lattice place, three integers a cell.</summary>
    public int[] Cell { get; }

    public CellMap Map { get; }

    public int Count => Cell.Length / 3;

    /// <summary>Twice as coarse as the patches.</summary>
    public static Level Above(Patches patches)
    {
        var sums = new double[(long)patches.Count * Sums];
        for (int i = 0; i < patches.Count; i++)
        {
            Span<double> s = sums.AsSpan(i * Sums, Sums);
            double w = patches.AreaM2[i], x = patches.X[i], y = patches.Y[i], z = patches.Z[i];
            Vector3 n = patches.Normal[i];
            s[0] = w;
            (s[1], s[2], s[3]) = (w * x, w * y, w * z);
            (s[4], s[5], s[6], s[7], s[8], s[9]) = (w * x * x, w * x * y, w * x * z, w * y * y, w * y * z, w * z * z);
            (s[10], s[11], s[12], s[13], s[14], s[15]) = (w * n.X * n.X, w * n.X * n.Y, w * n.X * n.Z, w * n.Y * n.Y, w * n.Y * n.Z, w * n.Z * n.Z);
        }

        return Above(patches.SizeM, patches.Cell, sums);
    }

    /// <summary>Twice as coarse as this.</summary>
    public Level Above() => Above(SizeM, Cell, sums);

    private static Level Above(double sizeM, int[] cell, double[] sums)
    {
        int n = cell.Length / 3;
        var map = new CellMap(Math.Max(16, n / 2));
        var parent = new int[n];
        var cells = new List<int>();
        for (int i = 0; i < n; i++)
        {
            int x = cell[3 * i] >> 1, y = cell[(3 * i) + 1] >> 1, z = cell[(3 * i) + 2] >> 1, before = map.Count;
            parent[i] = map.FindOrAdd(x, y, z);
            if (map.Count > before) cells.AddRange([x, y, z]);
        }

        var total = new double[map.Count * Sums];
        for (int i = 0; i < n; i++)
        {
            Span<double> to = total.AsSpan(parent[i] * Sums, Sums);
            ReadOnlySpan<double> from = sums.AsSpan(i * Sums, Sums);
            for (int k = 0; k < Sums; k++) to[k] += from[k];
        }

        return new Level(2 * sizeM, parent, [.. cells], map, total);
    }

    /// <summary>Shape of the surface in the window of 3 by 3 by 3 cells about each cell, four numbers a cell: ln of the
    /// rms about the window's plane [ln m], planarity, and the spread of normals (1 minus the first eigenvalue of their
    /// tensor: 0 when all are parallel), and |z| of the plane's normal. NaN where the window holds hardly more than a line.</summary>
    public float[] Shape(StageContext context)
    {
        var shape = new float[4 * Count];
        BlockParallel.For(Count, context.Threads, context.Stop, (from, to) =>
        {
            Span<double> s = stackalloc double[Sums];
            for (int i = from; i < to; i++)
            {
                s.Clear();
                int occupied = 0;
                for (int k = 0; k < 27; k++)
                {
                    int j = Map.Find(Cell[3 * i] + (k % 3) - 1, Cell[(3 * i) + 1] + (k / 3 % 3) - 1, Cell[(3 * i) + 2] + (k / 9) - 1);
                    if (j < 0) continue;
                    occupied++;
                    for (int e = 0; e < Sums; e++) s[e] += sums[(j * Sums) + e];
                }

                double w = s[0], mx = s[1] / w, my = s[2] / w, mz = s[3] / w;
                Eigen3 scatter = new Symmetric3(
                    (s[4] / w) - (mx * mx), (s[5] / w) - (mx * my), (s[6] / w) - (mx * mz), (s[7] / w) - (my * my), (s[8] / w) - (my * mz), (s[9] / w) - (mz * mz)).Eigen();
                if (occupied < 4 || !(scatter.L2 > 0.01 * SizeM * SizeM))
                {
                    shape.AsSpan(4 * i, 4).Fill(float.NaN);
                    continue;
                }

                double s1 = Math.Sqrt(scatter.L1), s2 = Math.Sqrt(scatter.L2), s3 = Math.Sqrt(Math.Max(0, scatter.L3));
                shape[4 * i] = (float)Math.Log(s3 + 1e-3);
                shape[(4 * i) + 1] = (float)((s2 - s3) / s1);
                Eigen3 normals = new Symmetric3(s[10] / w, s[11] / w, s[12] / w, s[13] / w, s[14] / w, s[15] / w).Eigen();
                shape[(4 * i) + 3] = (float)Math.Abs(scatter.V3.Z);
                shape[(4 * i) + 2] = (float)(1 - (normals.L1 / Math.Max(1e-12, normals.L1 + normals.L2 + normals.L3)));
            }
        });
        return shape;
    }

    /// <summary>Values of the cells carried to patches by weights that fall linearly with distance, so that no step shows
    /// where one cell ends.</summary>
    /// <param name="values">Row-major, <paramref name="columns"/> a cell; NaN cells do not take part.</param>
    /// <param name="columns">Numbers a cell.</param>
    /// <param name="patches">The patches.</param>
    /// <param name="context">Context.</param>
    /// <returns>Row-major, a row a patch; NaN where no cell about it has a value.</returns>
    public float[] ToPatches(float[] values, int columns, Patches patches, StageContext context)
    {
        var result = new float[(long)patches.Count * columns];
        double ratio = patches.SizeM / SizeM;
        BlockParallel.For(patches.Count, context.Threads, context.Stop, (from, to) =>
        {
            Span<double> sum = stackalloc double[columns];
            for (int i = from; i < to; i++)
            {
                double fx = ((patches.Cell[3 * i] + 0.5) * ratio) - 0.5, fy = ((patches.Cell[(3 * i) + 1] + 0.5) * ratio) - 0.5, fz = ((patches.Cell[(3 * i) + 2] + 0.5) * ratio) - 0.5;
                int ix = (int)Math.Floor(fx), iy = (int)Math.Floor(fy), iz = (int)Math.Floor(fz);
                fx -= ix;
                fy -= iy;
                fz -= iz;
                sum.Clear();
                double weight = 0;
                for (int k = 0; k < 8; k++)
                {
                    double w = ((k & 1) == 0 ? 1 - fx : fx) * ((k & 2) == 0 ? 1 - fy : fy) * ((k & 4) == 0 ? 1 - fz : fz);
                    if (w <= 0) continue;
                    int j = Map.Find(ix + (k & 1), iy + ((k >> 1) & 1), iz + (k >> 2));
                    if (j < 0 || float.IsNaN(values[j * columns])) continue;
                    weight += w;
                    for (int c = 0; c < columns; c++) sum[c] += w * values[(j * columns) + c];
                }

                for (int c = 0; c < columns; c++) result[(i * columns) + c] = weight > 0 ? (float)(sum[c] / weight) : float.NaN;
            }
        });
        return result;
    }

    /// <summary>Weighted means of rows over the cells of this level.</summary>
    /// <param name="of">Cell of every row's item, through all finer levels.</param>
    /// <param name="rows">Row-major values of the items.</param>
    /// <param name="columns">Numbers a row.</param>
    /// <param name="weights">Weight per item; 0 leaves it out.</param>
    /// <returns>Means, row-major, and the sum of weights per cell.</returns>
    public (float[] Means, float[] Weights) Means(int[] of, float[] rows, int columns, float[] weights)
    {
        var mean = new float[Count * columns];
        var weight = new float[Count];
        for (int i = 0; i < of.Length; i++)
        {
            float w = weights[i];
            if (w == 0) continue;
            weight[of[i]] += w;
            for (int c = 0; c < columns; c++) mean[(of[i] * columns) + c] += w * rows[(i * columns) + c];
        }

        for (int i = 0; i < Count; i++)
        {
            if (weight[i] == 0) continue;
            for (int c = 0; c < columns; c++) mean[(i * columns) + c] /= weight[i];
        }

        return (mean, weight);
    }
}
