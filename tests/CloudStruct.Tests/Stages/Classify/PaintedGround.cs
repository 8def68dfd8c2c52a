using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Thin;

namespace CloudStruct.Tests.Stages.Classify;

/// <summary>A stepped ground with two rocks painted on it, far simpler than the simulator and nothing like it: what is found
/// here does not depend on how the simulator sees a dike.</summary>
internal sealed class PaintedGround : IPieces
{
    private readonly float[] x, y, z;
    private readonly byte[] red, green, blue;
    private readonly bool[] dike;
    private readonly bool coloured;

    /// <param name="seed">Seed.</param>
    /// <param name="azimuthDeg">Trend of the dike.</param>
    /// <param name="dipDeg">Dip of the dike, to the right of its trend.</param>
    /// <param name="widthM">True width; 0 for no dike.</param>
    /// <param name="darker">Dike darker than the host, or lighter.</param>
    /// <param name="coloured">Whether points carry colour.</param>
    public PaintedGround(ulong seed, double azimuthDeg, double dipDeg, double widthM, bool darker = true, bool coloured = true)
    {
        this.coloured = coloured;
        const double side = 16, step = 0.05;
        int n = (int)(side / step);
        (x, y, z) = (new float[n * n], new float[n * n], new float[n * n]);
        (red, green, blue, dike) = (new byte[n * n], new byte[n * n], new byte[n * n], new bool[n * n]);
        double a = azimuthDeg * Math.PI / 180, d = dipDeg * Math.PI / 180;
        Normal = new Vec3(Math.Cos(a) * Math.Sin(d), -Math.Sin(a) * Math.Sin(d), Math.Cos(d));
        for (int i = 0; i < n * n; i++)
        {
            var draws = new Draws(seed, 11, (ulong)i);
            double px = (i % n * step) - (side / 2) + (0.01 * draws.NextNormal()), py = (i / n * step) - (side / 2) + (0.01 * draws.NextNormal());
            // Ramps between terraces, steep enough to give relief, none parallel to the dike.
            double pz = (1.2 * Math.Sin(0.9 * px)) + (0.9 * Math.Cos((0.7 * py) + (0.3 * px))) + (0.004 * draws.NextNormal());
            (x[i], y[i], z[i]) = ((float)px, (float)py, (float)pz);
            dike[i] = widthM > 0 && Math.Abs(Normal.Dot(new Vec3(px, py, pz))) < widthM / 2;
            bool dark = dike[i] == darker;
            double light = 1 + (0.12 * draws.NextNormal()) + (0.2 * Math.Sin(2.1 * px) * Math.Sin(1.7 * py));
            (red[i], green[i], blue[i]) = (Code((dark ? 92 : 168) * light), Code((dark ? 98 : 158) * light), Code((dark ? 97 : 146) * light));
        }
    }

    /// <summary>Normal of the dike.</summary>
    public Vec3 Normal { get; }

    /// <inheritdoc/>
    public IntakeRecord Record => new()
    {
        HasColour = coloured, Points = x.Length, InputSpacingM = 0.05, BoxMin = new(x.Min(), y.Min(), z.Min()), BoxMax = new(x.Max(), y.Max(), z.Max()),
    };

    /// <summary>Described cloud, and the truth per working point.</summary>
    public (DescribedCloud Described, bool[] Dike) Describe(int threads = 2)
    {
        StageContext context = StageContext.Plain(threads: threads);
        DescribedCloud described = new DescribeStage().Run(new ThinStage().Run(this, new ThinSettings { SpacingM = 0.05 }, context), new DescribeSettings(), context);
        var truth = new Dictionary<(float, float, float), bool>();
        for (int i = 0; i < x.Length; i++) truth[(x[i], y[i], z[i])] = dike[i];
        WorkingCloud c = described.Cloud;
        return (described, [.. Enumerable.Range(0, c.Count).Select(i => truth[(c.X[i], c.Y[i], c.Z[i])])]);
    }

    /// <summary>Intersection over union of found and true dike.</summary>
    public static double Iou(ClassifiedCloud classes, bool[] truth)
    {
        int both = 0, either = 0;
        for (int i = 0; i < truth.Length; i++)
        {
            bool found = classes.Class[i] == (byte)RockClass.Dike;
            both += found && truth[i] ? 1 : 0;
            either += found || truth[i] ? 1 : 0;
        }

        return (double)both / either;
    }

    /// <inheritdoc/>
    public IEnumerable<PointBlock> Read(CancellationToken stop)
    {
        for (int from = 0; from < x.Length; from += PointBlock.Capacity)
        {
            var block = new PointBlock { Count = Math.Min(PointBlock.Capacity, x.Length - from) };
            for (int i = 0; i < block.Count; i++)
            {
                (block.X[i], block.Y[i], block.Z[i]) = (x[from + i], y[from + i], z[from + i]);
                (block.Red[i], block.Green[i], block.Blue[i]) = coloured ? (red[from + i], green[from + i], blue[from + i]) : default;
                block.Index[i] = from + i;
            }

            yield return block;
        }
    }

    private static byte Code(double v) => (byte)Math.Clamp(Math.Round(v), 5, 250);
}
