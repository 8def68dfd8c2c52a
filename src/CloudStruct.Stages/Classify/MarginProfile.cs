using System.Numerics;
using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Mixtures;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Classify;

/// <summary>How fast colour changes across the margins of an outline.</summary>
/// <remarks>A contact is where one rock ends and another begins: within a centimetre or two. Stains, shade and weathering
/// fade over decimetres. Width, straightness and contrast do not tell these apart; the profile across does.</remarks>
internal static class MarginProfile
{
    // The fitted margins are off by some centimetres whatever the spacing, and contacts are blurred by as much: nearer than this a
    // true contact looks soft on fine clouds (a clear dike was lost at 3 cm spacing that was found at 4.5 cm, with 5 cm here).
    private const double NearM = 0.09;

    /// <summary>How many times wider than usual the strip beside the margins is on a coarse cloud: a soft edge shows that much more of its
    /// step in it, a contact hardly more.</summary>
    public static double Widening(double spacingM) => Math.Max(NearM, 2 * spacingM) / NearM;

    /// <summary>Share of the step that lies near the fitted margins, over both margins.</summary>
    /// <param name="described">The cloud.</param>
    /// <param name="patches">Patches.</param>
    /// <param name="features">Features.</param>
    /// <param name="margins">Margins fitted to the outline at the points' spacing.</param>
    /// <param name="free">Rock that no other dike has.</param>
    /// <param name="threads">Workers.</param>
    /// <returns>NaN when too little rock shows beside the margins.</returns>
    public static double Sharpness(DescribedCloud described, Patches patches, Features features, MarginFit margins, bool[] free, int threads)
    {
        WorkingCloud cloud = described.Cloud;
        double h = cloud.SpacingM, near = Math.Max(NearM, 2 * h), far = Math.Clamp(0.25 * margins.WidthM, 2 * near, 0.6), farthest = 2 * far;
        // Four places: far outside, just outside, just inside, far inside.
        List<double>[][] parts = BlockParallel.Map(cloud.Count, threads, CancellationToken.None, (from, to) =>
        {
            List<double>[] own = [[], [], [], []];
            for (int i = from; i < to; i++)
            {
                int p = patches.OfPoint[i];
                if (!free[p] || margins.Off(cloud.X[i], cloud.Y[i], cloud.Z[i]) > farthest) continue;
                double sigmas = margins.DepthInSigmas(cloud.X[i], cloud.Y[i], cloud.Z[i], out double depth), off = Math.Abs(depth);
                if (off > farthest || double.IsNaN(sigmas)) continue;
                int at = off > far ? depth < 0 ? 0 : 3 : off < near ? depth < 0 ? 1 : 2 : -1;
                if (at < 0) continue;
                var normal = new Vector3(described.NormalX[i], described.NormalY[i], described.NormalZ[i]);
                own[at].Add(features.Standard(0, described.LStar[i], normal, p));
                own[at].Add(features.Standard(1, 100 * described.LogRedGreen[i], normal, p));
                own[at].Add(features.Standard(2, 100 * described.LogBlueGreen[i], normal, p));
            }

            return own;
        });
        List<double>[] rows = [.. Enumerable.Range(0, 4).Select(k => parts.SelectMany(p => p[k]).ToList())];
        if (rows.Min(r => r.Count) < 300) return double.NaN;
        double[][] mean = [.. rows.Select(Mean)];
        // Fisher's direction between far outside and far inside.
        var scatter = new double[9];
        foreach (int k in (int[])[0, 3])
        {
            for (int i = 0; i < rows[k].Count; i += 3)
            {
                for (int a = 0; a < 3; a++)
                {
                    for (int b = 0; b <= a; b++) scatter[(a * 3) + b] += (rows[k][i + a] - mean[k][a]) * (rows[k][i + b] - mean[k][b]) / rows[k].Count;
                }
            }
        }

        for (int a = 0; a < 3; a++) scatter[(a * 3) + a] += 1e-3;
        if (!Cholesky.Factor(scatter, 3)) return double.NaN;
        double[] whole = Whitened(mean[3], mean[0]), step = Whitened(mean[2], mean[1]);
        double size = 0, along = 0;
        for (int a = 0; a < 3; a++)
        {
            size += whole[a] * whole[a];
            along += whole[a] * step[a];
        }

        return along / Math.Max(size, 1e-9);

        double[] Whitened(double[] to, double[] from)
        {
            double[] v = [to[0] - from[0], to[1] - from[1], to[2] - from[2]];
            Cholesky.Whiten(scatter, 3, v);
            return v;
        }
    }

    private static double[] Mean(List<double> rows)
    {
        var mean = new double[3];
        for (int i = 0; i < rows.Count; i++) mean[i % 3] += rows[i] * 3 / rows.Count;
        return mean;
    }
}
