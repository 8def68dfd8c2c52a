using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Maths.Kernels;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Describe;

/// <summary>Describes the surface at each working point: normal, roughness, planarity, the area it stands for, and its colour.</summary>
public sealed class DescribeStage : IStage<WorkingCloud, DescribeSettings, DescribedCloud>
{
    private const double NormalSpacings = 5;

    // Photogrammetric noise hangs together over 5 to 10 cm; a smaller patch is tilted by it as a whole. A model of a hand
    // specimen has neither such noise nor the room.
    private const double NoisePatchM = 0.125;
    private const double NoisePatchMostSpacings = 12;

    // Planes are found in a smaller radius than they are fitted in: of 4, 5 and 6 spacings tried, 4 left the fewest points
    // near edges with the plane of the wrong side (6 % against 9 % and 12 % beyond 20 degrees), while refitting what lies
    // near the plane within 5 spacings brought the median error down from 2.1 to 1.4 degrees.
    private const double FindShare = 0.8;

    // A plane passes close to a point when it lies within this many times the noise; planes are handed on so many times.
    private const double CloseNoises = 2.2;
    private const int EdgeRounds = 3;
    private const double CutNoises = 3.5;

    // Small patches follow the noise: the smoothest tenth scatters by this much less than the noise. From simulated rock.
    private const double NoiseOfSmoothestTenth = 1.45;

    // A cloud without noise (a mesh, a drawing) would leave no room for rounding and gentle curves.
    private const double LeastNoiseSpacings = 0.02;

    private const double RoughnessSpacings = 8;
    private const double LeastRoughnessRadiusM = 0.15;
    private static readonly double[] LadderDigits = [1, 1.5, 2, 3, 5, 7.5];

    /// <inheritdoc/>
    public string Name => "describe";

    /// <inheritdoc/>
    public DescribedCloud Run(WorkingCloud input, DescribeSettings settings, StageContext context)
    {
        double spacing = input.SpacingM;
        double normalRadius = settings.NormalRadiusM
            ?? Math.Max(NormalSpacings * spacing, Math.Min(NoisePatchM, NoisePatchMostSpacings * spacing));
        double roughnessRadius = settings.RoughnessRadiusM ?? RoughnessRadius(input);
        double[] radii = [FindShare * normalRadius, 2 * normalRadius, 4 * normalRadius];

        var found = LocalPlanes.Fit(input, FindShare * normalRadius, context.Threads, context.Stop);
        double noise = Math.Max(LeastNoiseSpacings * spacing, NoiseOfSmoothestTenth * Quantile(found.Scatter, 0.1));
        context.Progress(0.3);
        int[] best = found.Best(input, CloseNoises * noise, EdgeRounds, context.Threads, context.Stop);
        LocalPlanes planes = found.Refit(input, best, normalRadius, CutNoises * noise, context.Threads, context.Stop);
        context.Progress(0.6);

        var wide = new WideScatter(input, context);
        float[] planarity = new float[3 * input.Count], roughness = new float[input.Count];
        BlockParallel.For(input.Count, context.Threads, context.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++) planarity[3 * i] = found.Planarity[i];
        });
        wide.ToPoints(wide.Within(roughnessRadius, out _).RmsM, roughness, 1, 0);
        (_, float[] flat) = wide.Within(radii[1], out _);
        wide.ToPoints(flat, planarity, 3, 1);
        (_, flat) = wide.Within(radii[2], out (float East, float North)[] fall);
        wide.ToPoints(flat, planarity, 3, 2);
        context.Progress(0.8);

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
                        float sign = Outward(planes.NormalX[i], planes.NormalY[i], planes.NormalZ[i], fall[c]);
                        (nx[i], ny[i], nz[i]) = (sign * planes.NormalX[i], sign * planes.NormalY[i], sign * planes.NormalZ[i]);
                    }
                }
            },
            512);
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

    /// <summary>Eight spacings and 0.15 m at least, rounded up to 1, 1.5, 2, 3, 5, 7.5 so that surveys of like density get
    /// the same; for a model smaller than three metres no more than a twentieth of its size is asked for.</summary>
    private static double RoughnessRadius(WorkingCloud cloud)
    {
        SortedGrid g = cloud.Grid;
        double size = g.CellM * Math.Sqrt(((double)g.NX * g.NX) + ((double)g.NY * g.NY) + ((double)g.NZ * g.NZ));
        double least = Math.Max(RoughnessSpacings * cloud.SpacingM, Math.Min(LeastRoughnessRadiusM, size / 20));
        double decade = Math.Pow(10, Math.Floor(Math.Log10(least)));
        foreach (double digit in LadderDigits)
        {
            if (digit * decade >= least * (1 - 1e-9)) return Math.Round(digit * decade, 9);   // 0.3, not 3 times 0.1
        }

        return 10 * decade;
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

    private static double Quantile(float[] values, double share)
    {
        var finite = new float[values.Length];
        int n = 0;
        foreach (float v in values)
        {
            if (float.IsFinite(v)) finite[n++] = v;
        }

        return n == 0 ? 0 : OrderStatistic.Nth(finite.AsSpan(0, n), (int)(share * (n - 1)));
    }
}
