using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Contacts;

/// <summary>Finds where dike meets host in the neighbour graph.</summary>
internal static class EdgeScan
{
    /// <summary>Edges between a point of the dike (or a clast in it) and a point of the host, in order of the dike's points.</summary>
    /// <param name="cloud">Working cloud.</param>
    /// <param name="classes">Its classes.</param>
    /// <param name="dike">Number of the dike.</param>
    /// <param name="longestM">Longer edges bridge an occlusion and are left out [m].</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Cancellation.</param>
    /// <remarks>The change is put where the probability passes one half between the two points, and midway when both lie on
    /// the same side of one half (the smoothing of labels overruled one of them).</remarks>
    public static MarginEdge[] Of(WorkingCloud cloud, ClassifiedCloud classes, int dike, double longestM, int threads, CancellationToken stop)
    {
        List<MarginEdge>[] parts = BlockParallel.Map(cloud.Count, threads, stop, (from, to) =>
        {
            var found = new List<MarginEdge>();
            for (int i = from; i < to; i++)
            {
                if (classes.DikeOfPoint[i] != dike || classes.Class[i] is not ((byte)RockClass.Dike or (byte)RockClass.Inclusion)) continue;
                for (int k = i * WorkingCloud.K; k < (i + 1) * WorkingCloud.K && cloud.Neighbours[k] >= 0; k++)
                {
                    int j = cloud.Neighbours[k];
                    if (classes.Class[j] != (byte)RockClass.Host) continue;
                    Vec3 inside = cloud.Place(i), step = cloud.Place(j) - inside;
                    double length = step.Length;
                    if (!(length > 0) || length > longestM) continue;
                    double pi = classes.DikeProbability[i] / 255.0, pj = classes.DikeProbability[j] / 255.0;
                    double at = pi > 0.5 && pj < 0.5 ? (pi - 0.5) / (pi - pj) : 0.5;
                    found.Add(new MarginEdge(inside + (step * at), step / length, 0.1 + (0.9 * Math.Max(0, pi - pj))));
                }
            }

            return found;
        });
        return [.. parts.SelectMany(p => p)];
    }
}
