using System.Numerics;
using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Classify;

/// <summary>What patches are compared by: standardised numbers, with the share that follows from the surface's direction taken out.</summary>
internal sealed class Features
{
    /// <summary>Colour comes first (3 columns, or none), texture after it.</summary>
    public int ColourColumns { get; private init; }

    public int Columns { get; private init; }

    /// <summary>Row-major, a row a patch, standardised by median and scaled median deviation of the rock, within ±6.</summary>
    public float[] Rows { get; private init; } = [];

    /// <summary>|z| of the normal of the surface over about 0.6 m: 1 level, 0 upright; NaN where unknown.</summary>
    public float[] Level06 { get; private init; } = [];

    /// <summary>Coarser lattices, the finest first.</summary>
    public Level[] Levels { get; private init; } = [];

    // How raw numbers became rows: per column the fit to direction, the middle and the scale.
    private double[][] directionFits = [];
    private float[] middles = [], scales = [];

    /// <summary>Columns of the texture: point roughness, then (rms, planarity, spread) per window.</summary>
    public const int Windows = 3;

    /// <summary>Computes them.</summary>
    /// <param name="patches">The patches.</param>
    /// <param name="context">Context.</param>
    public static Features Of(Patches patches, StageContext context)
    {
        int n = patches.Count;
        // Windows of about 0.3, 0.6 and 1.1 m: smaller ones see the noise of the cloud, larger ones blur a dike's margins away.
        var levels = new List<Level> { Level.Above(patches) };
        while (levels[^1].SizeM < 8 && levels[^1].Count > 64) levels.Add(levels[^1].Above());
        int start = 0;
        while (start + 1 < levels.Count && levels[start].SizeM < 0.085) start++;
        int windows = Math.Min(Windows, levels.Count - start);
        int colour = patches.Colour.Length > 0 ? 3 : 0, columns = colour + 1 + (3 * windows);
        var rows = new float[(long)n * columns];
        float[] level06 = [];
        for (int w = 0; w < windows; w++)
        {
            Level level = levels[start + w];
            float[] shape = level.ToPatches(level.Shape(context), 4, patches, context);
            int at = colour + 1 + (3 * w);
            BlockParallel.For(n, context.Threads, context.Stop, (from, to) =>
            {
                for (int i = from; i < to; i++)
                {
                    for (int c = 0; c < 3; c++) rows[(i * columns) + at + c] = c == 2 ? MathF.Sqrt(shape[(4 * i) + c]) : shape[(4 * i) + c];
                }
            });

            if (w <= 1)
            {
                level06 = new float[n];
                for (int i = 0; i < n; i++) level06[i] = shape[(4 * i) + 3];
            }
        }

        for (int i = 0; i < n; i++)
        {
            for (int c = 0; c < colour; c++) rows[(i * columns) + c] = patches.Colour[(3 * i) + c];
            rows[(i * columns) + colour] = patches.LogRoughness[i];
        }

        return new Features { ColourColumns = colour, Columns = columns, Rows = rows, Level06 = level06, Levels = [.. levels] };
    }

    /// <summary>Standardises the rows over the rock, after taking out what follows from the direction of the surface
    /// (sun, sky and view act through it): a least-squares quadratic form of the normal.</summary>
    /// <param name="patches">The patches.</param>
    /// <param name="rock">Patches that count as rock.</param>
    /// <param name="context">Context.</param>
    public void Standardise(Patches patches, bool[] rock, StageContext context)
    {
        int n = patches.Count, stride = Math.Max(1, n / 12_000);
        directionFits = new double[Columns][];
        (middles, scales) = (new float[Columns], new float[Columns]);
        BlockParallel.For(Columns, context.Threads, context.Stop, (column, _) =>
        {
            double[] coefficients = directionFits[column] = DirectionFit(patches, rock, column, stride);
            var sample = new List<float>();
            for (int i = 0; i < n; i += stride)
            {
                float v = Rows[(i * Columns) + column];
                if (rock[i] && float.IsFinite(v)) sample.Add(v - (float)Predict(coefficients, patches.Normal[i], SlopeFor(column, i)));
            }

            (float middle, float scale) = MedianAndScale(sample);
            (middles[column], scales[column]) = (middle, scale);
        }, length: 1);
        BlockParallel.For(n, context.Threads, context.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                for (int c = 0; c < Columns; c++)
                {
                    ref float v = ref Rows[(i * Columns) + c];
                    v = Standard(c, v, patches.Normal[i], i);
                }
            }
        });
    }

    /// <summary>A raw number of a place as <see cref="Rows"/> would have it.</summary>
    /// <param name="column">Column.</param>
    /// <param name="raw">The number before standardising.</param>
    /// <param name="normal">Direction of the surface there.</param>
    /// <param name="patch">Patch of the place.</param>
    public float Standard(int column, float raw, Vector3 normal, int patch)
    {
        float t = (raw - (float)Predict(directionFits[column], normal, SlopeFor(column, patch)) - middles[column]) / scales[column];
        return float.IsFinite(t) ? Math.Clamp(t, -6, 6) : 0;
    }

    // Light sees the direction of a patch only; texture feels the walls and edges about it.
    private double SlopeFor(int column, int patch) =>
        column < ColourColumns ? 0 : Level06.Length > 0 && float.IsFinite(Level06[patch]) ? Level06[patch] : 0.7;

    /// <summary>Median, and 1.4826 times the median distance from it (the standard deviation of a normal law), never 0.</summary>
    internal static (float Median, float Scale) MedianAndScale(List<float> sample)
    {
        if (sample.Count == 0) return (0, 1);
        sample.Sort();
        float median = sample[sample.Count / 2];
        var distance = new List<float>(sample.Count);
        foreach (float v in sample) distance.Add(Math.Abs(v - median));
        distance.Sort();
        return (median, Math.Max(1.4826f * distance[distance.Count / 2], 1e-4f));
    }

    // Normals are axes here: the quadratic form keeps its value when the sign of the normal flips, apart from the three
    // linear terms, which carry the light and need the outward sign.
    // The slope of the surface over half a metre goes in too: walls and edges of benches look rough everywhere.
    private const int Terms = 12;

    private static void Basis(Vector3 n, double slope, Span<double> b)
    {
        b[0] = 1;
        (b[1], b[2], b[3]) = (n.X, n.Y, n.Z);
        (b[4], b[5], b[6], b[7], b[8]) = (n.X * n.X, n.Y * n.Y, n.X * n.Y, n.X * n.Z, n.Y * n.Z);
        (b[9], b[10], b[11]) = (slope, slope * slope, slope * slope * slope);
    }

    private static double Predict(double[] coefficients, Vector3 normal, double slope)
    {
        Span<double> b = stackalloc double[Terms];
        Basis(normal, slope, b);
        double sum = 0;
        for (int k = 0; k < Terms; k++) sum += coefficients[k] * b[k];
        return sum;
    }

    private double[] DirectionFit(Patches patches, bool[] rock, int column, int stride)
    {
        // A dike is far from the rest in colour: in a plain fit it bends the curve for the host that faces the same way, and
        // a ghost of it appears there. So what lies far off the fit is left out of the next one.
        var fit = new double[Terms];
        float limit = float.PositiveInfinity;
        for (int round = 0; round < 4; round++)
        {
            double[] next = DirectionFit(patches, rock, column, stride, fit, limit);
            var off = new List<float>();
            for (int i = 0; i < patches.Count; i += stride)
            {
                float v = Rows[(i * Columns) + column];
                if (rock[i] && float.IsFinite(v)) off.Add(v - (float)Predict(next, patches.Normal[i], SlopeFor(column, i)));
            }

            limit = 2 * MedianAndScale(off).Scale;
            fit = next;
        }

        return fit;
    }

    private double[] DirectionFit(Patches patches, bool[] rock, int column, int stride, double[] before, float limit)
    {
        var a = new double[Terms, Terms];
        var y = new double[Terms];
        Span<double> b = stackalloc double[Terms];
        double weight = 0;
        for (int i = 0; i < patches.Count; i += stride)
        {
            float v = Rows[(i * Columns) + column];
            double slope = SlopeFor(column, i);
            if (!rock[i] || !float.IsFinite(v) || Math.Abs(v - Predict(before, patches.Normal[i], slope)) > limit) continue;
            Basis(patches.Normal[i], slope, b);
            weight++;
            for (int r = 0; r < Terms; r++)
            {
                y[r] += b[r] * v;
                for (int s = 0; s < Terms; s++) a[r, s] += b[r] * b[s];
            }
        }

        if (weight < 50) return new double[Terms];
        // A ridge keeps terms out that the scene cannot tell apart (a pavement has one direction only).
        for (int r = 1; r < Terms; r++) a[r, r] += (0.001 * weight) + 1e-9;
        for (int r = 0; r < Terms; r++)
        {
            for (int s = r + 1; s < Terms; s++)
            {
                double f = a[s, r] / a[r, r];
                for (int k = r; k < Terms; k++) a[s, k] -= f * a[r, k];
                y[s] -= f * y[r];
            }
        }

        for (int r = Terms - 1; r >= 0; r--)
        {
            for (int s = r + 1; s < Terms; s++) y[r] -= a[r, s] * y[s];
            y[r] /= a[r, r];
        }

        return y;
    }
}
