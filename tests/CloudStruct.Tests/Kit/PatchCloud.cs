using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Thin;

namespace CloudStruct.Tests.Kit;

/// <summary>A made-up cloud of planar patches on a jittered lattice, with smooth noise along the normal, for tests of single stages.</summary>
internal sealed class PatchCloud(double spacingM = 0.02, ulong seed = 1) : IPieces
{
    private readonly List<Vec3> places = [];

    /// <inheritdoc/>
    public IntakeRecord Record => new()
    {
        Points = places.Count,
        InputSpacingM = spacingM,
        BoxMin = new Vec3(-500, -500, -500),
        BoxMax = new Vec3(500, 500, 500),
    };

    /// <summary>Adds a rectangle; along strike by up the dip.</summary>
    /// <param name="middle">Its middle.</param>
    /// <param name="attitude">Strike and dip.</param>
    /// <param name="lengthM">Along strike [m].</param>
    /// <param name="heightM">Up the dip [m].</param>
    /// <param name="noiseM">Standard deviation of the smooth noise [m].</param>
    /// <param name="waveM">About the wavelength of that noise [m].</param>
    /// <param name="keep">Which places (along, up) to keep; all when null.</param>
    public PatchCloud Add(
        Vec3 middle, Attitude attitude, double lengthM, double heightM, double noiseM = 0, double waveM = 0.3, Func<double, double, bool>? keep = null)
    {
        Vec3 n = attitude.UpwardNormal();
        (Vec3 along, Vec3 down) = PoleRegions.StrikeAndDip(n);
        var draws = new Draws(seed, 1, (ulong)places.Count);
        int nu = (int)Math.Round(lengthM / spacingM), nv = (int)Math.Round(heightM / spacingM);
        (double K, double L, double Phase)[] waves = [.. Enumerable.Range(0, 40).Select(_ =>
            (2 * Math.PI / waveM * draws.NextNormal(), 2 * Math.PI / waveM * draws.NextNormal(), 2 * Math.PI * draws.NextUnit()))];
        for (int i = 0; i < nu * nv; i++)
        {
            double u = ((i % nu) + draws.NextUnit() - (nu / 2.0)) * spacingM, v = ((i / nu) + draws.NextUnit() - (nv / 2.0)) * spacingM;
            if (keep is not null && !keep(u, v)) continue;
            double z = noiseM * Math.Sqrt(2.0 / waves.Length) * waves.Sum(w => Math.Cos((w.K * u) + (w.L * v) + w.Phase));
            places.Add(middle + (along * u) - (down * v) + (n * (z + (0.001 * draws.NextNormal()))));
        }

        return this;
    }

    /// <summary>Adds loose places.</summary>
    public PatchCloud Add(IEnumerable<Vec3> more)
    {
        places.AddRange(more);
        return this;
    }

    /// <summary>Thinned and described with automatic settings.</summary>
    public DescribedCloud Describe()
    {
        WorkingCloud cloud = new ThinStage().Run(this, new ThinSettings { SpacingM = spacingM }, StageContext.Plain());
        return new DescribeStage().Run(cloud, new DescribeSettings(), StageContext.Plain());
    }

    /// <inheritdoc/>
    public IEnumerable<PointBlock> Read(CancellationToken stop)
    {
        for (int from = 0; from < places.Count; from += PointBlock.Capacity)
        {
            var block = new PointBlock { Count = Math.Min(PointBlock.Capacity, places.Count - from) };
            for (int i = 0; i < block.Count; i++)
            {
                Vec3 p = places[from + i];
                (block.X[i], block.Y[i], block.Z[i], block.Index[i]) = ((float)p.X, (float)p.Y, (float)p.Z, from + i);
                block.Red[i] = block.Green[i] = block.Blue[i] = block.Class[i] = 0;
            }

            yield return block;
        }
    }
}
