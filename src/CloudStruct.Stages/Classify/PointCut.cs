using System.Numerics;
using CloudStruct.Maths.Mixtures;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Classify;

/// <summary>Draws the outline anew at the full spacing of the points, in the band where patches of both kinds meet.</summary>
internal static class PointCut
{
    private const int Near = 8, MostRows = 2500, Averaged = 4;

    internal const double Most = 0.4;

    /// <summary>Chooses for the points of the band.</summary>
    /// <param name="described">The cloud.</param>
    /// <param name="patches">Patches.</param>
    /// <param name="features">Features.</param>
    /// <param name="dike">The dike.</param>
    /// <param name="margins">Where its margins run.</param>
    /// <param name="looks">What it looks like.</param>
    /// <param name="inside">Patches of the dike.</param>
    /// <param name="free">Rock that no other dike has.</param>
    /// <param name="perM">Price of a metre of boundary.</param>
    /// <param name="say">[in, out] Whether each point is dike; given as its patch has it.</param>
    /// <param name="context">Context.</param>
    public static void Run(
        DescribedCloud described, Patches patches, Features features, FoundDike dike, MarginFit margins, Looks[] looks, bool[] inside, bool[] free, double perM, bool[] say, StageContext context)
    {
        WorkingCloud cloud = described.Cloud;
        bool[] band = Band(patches, inside, free);
        var node = new int[cloud.Count];
        int n = 0;
        for (int i = 0; i < node.Length; i++) node[i] = band[patches.OfPoint[i]] ? n++ : -1;
        if (n == 0) return;
        Looks[] sharper = Sharper(described, patches, features, margins, looks, inside, free);
        var odds = new float[n];
        Maths.Blocks.BlockParallel.For(cloud.Count, context.Threads, context.Stop, (from, to) =>
        {
            Span<float> row = stackalloc float[3];
            for (int i = from; i < to; i++)
            {
                if (node[i] < 0) continue;
                float sum = 0;
                foreach (Looks look in sharper)
                {
                    if (!look.IsColour)
                    {
                        sum += look.LogOdds(features, patches.OfPoint[i], Appearance.Clip);
                        continue;
                    }

                    Colour(described, features, patches.OfPoint[i], i, row);
                    sum += look.LogOdds(row, Appearance.Clip);
                }

                double pull = margins.Pull(cloud.X[i], cloud.Y[i], cloud.Z[i], dike.ByColour ? Most : 3);
                odds[node[i]] = (float)(Math.Clamp(sum, -Appearance.Clip, Appearance.Clip) + pull);
            }
        });

        // Points of density 1/h² with their eight nearest: a metre of line crosses 2.7/h edges.
        double price = perM * cloud.SpacingM / 2.7;
        var flow = new MaxFlow(n, Near * n);
        for (int i = 0; i < cloud.Count; i++)
        {
            if (node[i] < 0) continue;
            double evidence = odds[node[i]] * described.AreaM2[i] / SheetFitter.IndependentM2, source = Math.Max(0, evidence), sink = Math.Max(0, -evidence);
            for (int k = 0; k < Near; k++)
            {
                int j = cloud.Neighbours[(i * WorkingCloud.K) + k];
                if (j < 0) break;
                if (node[j] >= 0) flow.AddEdge(node[i], node[j], price / 2, price / 2);
                else if (free[patches.OfPoint[j]] && inside[patches.OfPoint[j]]) source += price;
                else if (free[patches.OfPoint[j]]) sink += price;
            }

            flow.AddTerminal(node[i], source, sink);
        }

        flow.Solve();
        for (int i = 0; i < cloud.Count; i++)
        {
            if (node[i] >= 0) say[i] = flow.WithSource(node[i]);
        }
    }

    /// <summary>The looks with colour learnt anew from the points themselves, well inside and well outside the margins.</summary>
    /// <remarks>The first looks are learnt from patches on either side of a sheet that is still some decimetres off here and
    /// there: each side holds some of the other, and the darker rock wins the points on the edge.</remarks>
    private static Looks[] Sharper(DescribedCloud described, Patches patches, Features features, MarginFit margins, Looks[] looks, bool[] inside, bool[] free)
    {
        if (!Array.Exists(looks, l => l.IsColour)) return looks;
        WorkingCloud cloud = described.Cloud;
        var side = new sbyte[patches.Count];
        var count = new int[2];
        for (int p = 0; p < side.Length; p++)
        {
            double depth = margins.DepthInSigmas(patches.X[p], patches.Y[p], patches.Z[p], out double depthM);
            side[p] = (sbyte)(inside[p] && depth > 2.5 && depthM > patches.SizeM ? 1
                : !inside[p] && depth < -2.5 && depthM < -patches.SizeM && depthM > -Math.Max(0.8 * margins.WidthM, 0.5) ? 0 : -1);
        }

        for (int i = 0; i < cloud.Count; i++)
        {
            int s = side[patches.OfPoint[i]];
            if (s >= 0) count[s]++;
        }

        var rows = new[] { new List<double>(), new List<double>() };
        double[] stride = [Math.Max(1, count[0] / (double)MostRows), Math.Max(1, count[1] / (double)MostRows)], due = [0, 0];
        Span<float> row = stackalloc float[3];
        for (int i = 0; i < cloud.Count; i++)
        {
            int s = side[patches.OfPoint[i]];
            if (s < 0 || (due[s] += 1) < stride[s]) continue;
            due[s] -= stride[s];
            Colour(described, features, patches.OfPoint[i], i, row);
            foreach (float v in row) rows[s].Add(v);
        }

        return Looks.OfRows(rows[1], rows[0], 3) is { } sharp ? [.. looks.Select(l => l.IsColour ? sharp : l)] : looks;
    }

    /// <summary>Colour of a point as the features have it, averaged over the point and its nearest neighbours.</summary>
    private static void Colour(DescribedCloud described, Features features, int patch, int i, Span<float> row)
    {
        float l = described.LStar[i], red = described.LogRedGreen[i], blue = described.LogBlueGreen[i];
        int count = 1;
        for (int k = 0; k < Averaged; k++)
        {
            int j = described.Cloud.Neighbours[(i * WorkingCloud.K) + k];
            if (j < 0) break;
            l += described.LStar[j];
            red += described.LogRedGreen[j];
            blue += described.LogBlueGreen[j];
            count++;
        }

        var normal = new Vector3(described.NormalX[i], described.NormalY[i], described.NormalZ[i]);
        row[0] = features.Standard(0, l / count, normal, patch);
        row[1] = features.Standard(1, 100 * red / count, normal, patch);
        row[2] = features.Standard(2, 100 * blue / count, normal, patch);
    }

    private static bool[] Band(Patches patches, bool[] inside, bool[] free)
    {
        var edge = new bool[inside.Length];
        for (int i = 0; i < inside.Length; i++)
        {
            if (!inside[i]) continue;
            foreach (int j in patches.Around(i))
            {
                if (free[j] && !inside[j]) edge[i] = edge[j] = true;
            }
        }

        bool[] grown = PatchCut.Grown(patches, edge, 1);
        for (int i = 0; i < grown.Length; i++) grown[i] &= free[i];
        return grown;
    }
}
