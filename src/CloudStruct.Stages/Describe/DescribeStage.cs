using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Kernels;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Describe;

/// <summary>Describes the surface at each working point: normal, roughness, planarity, the area it stands for, and its colour.</summary>
public sealed class DescribeStage : IStage<WorkingCloud, DescribeSettings, DescribedCloud>
{
    private const double NormalSpacings = 5;

    // A plane passes close to a point when it lies within this many times the noise.
    private const double CloseNoises = 1.2;
    private const int EdgeRounds = 2;

    private static readonly double[] RoughnessLadderM = [0.15, 0.2, 0.3, 0.5, 0.75, 1, 1.5, 2, 3, 5, 7.5, 10, 15, 20, 30, 50];

    /// <inheritdoc/>
    public string Name => "describe";

    /// <inheritdoc/>
    public DescribedCloud Run(WorkingCloud input, DescribeSettings settings, StageContext context)
    {
        double spacing = input.SpacingM;
        double normalRadius = settings.NormalRadiusM ?? NormalSpacings * spacing;
        double roughnessRadius = settings.RoughnessRadiusM
            ?? RoughnessLadderM.FirstOrDefault(r => r >= 8 * spacing, 8 * spacing);
        double[] radii = [normalRadius, 2 * normalRadius, 4 * normalRadius];

        var planes = LocalPlanes.Fit(input, normalRadius, context.Threads, context.Stop);
        context.Progress(0.4);
        var wide = new WideScatter(input, context);
        float[] planarity = new float[3 * input.Count], roughness = new float[input.Count];
        for (int i = 0; i < input.Count; i++) planarity[3 * i] = planes.Planarity[i];
        wide.ToPoints(wide.Within(roughnessRadius, out _).RmsM, roughness, 1, 0);
        (float[] rms, float[] flat) = wide.Within(radii[1], out _);
        wide.ToPoints(flat, planarity, 3, 1);
        (_, flat) = wide.Within(radii[2], out (float East, float North)[] fall);
        wide.ToPoints(flat, planarity, 3, 2);
        double noise = Noise(rms, input.Grid);
        context.Progress(0.6);

        int[] best = planes.Best(input, CloseNoises * noise, EdgeRounds, context.Threads, context.Stop);
        float[] nx = new float[input.Count], ny = new float[input.Count], nz = new float[input.Count];
        BlockParallel.For(
            input.Grid.Keys.Length,
            context.Threads,
            context.Stop,
            (from, to) =>
            {
                for (int c = from; c < to; c++)
                {
                    for (int i = input.Grid.Starts[c]; i < input.Grid.Starts[c + 1]; i++)
                    {
                        int b = best[i];
                        float sign = Outward(planes.NormalX[b], planes.NormalY[b], planes.NormalZ[b], fall[c]);
                        (nx[i], ny[i], nz[i]) = (sign * planes.NormalX[b], sign * planes.NormalY[b], sign * planes.NormalZ[b]);
                    }
                }
            },
            512);
        context.Progress(0.8);
        float[] area = SurfaceShare.Of(input, nx, ny, nz, context.Threads, context.Stop);
        DescribedCloud described = RockColour.Describe(
            new DescribedCloud
            {
                Cloud = input,
                NormalX = nx,
                NormalY = ny,
                NormalZ = nz,
                NormalRadiusM = normalRadius,
                RoughnessM = roughness,
                RoughnessRadiusM = roughnessRadius,
                Planarity = planarity,
                PlanarityRadiiM = radii,
                AreaM2 = area,
                NoiseM = noise,
            },
            context);
        context.Progress(1);
        return described;
    }

    /// <summary>+1 or -1. Up, unless the surface is so steep that up says little: then toward the side where the ground
    /// around falls. Cosmetic: no attitude depends on it.</summary>
    private static float Outward(float nx, float ny, float nz, (float East, float North) fall)
    {
        if (Math.Abs(nz) > 0.35f) return nz < 0 ? -1 : 1;
        float along = (nx * fall.East) + (ny * fall.North);
        if (along != 0) return along < 0 ? -1 : 1;
        return nz < 0 || (nz == 0 && (nx < 0 || (nx == 0 && ny < 0))) ? -1 : 1;
    }

    /// <summary>Rms about planes on the smoothest tenth of the cells (its middle) [m].</summary>
    private static double Noise(float[] rmsOfCell, SortedGrid grid)
    {
        float[] sorted = [.. rmsOfCell.Where(float.IsFinite)];
        if (sorted.Length == 0) return 0.1 * grid.CellM / 3;
        Array.Sort(sorted);
        return Math.Max(1e-5, sorted[sorted.Length / 20]);
    }
}
