using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <content>How clusters are added, dropped and given a shape.</content>
/// <remarks>Clusters are added one by one where the axes that none explains lie densest, so no random start decides
/// (greedy learning, after Verbeek, Vlassis and Kröse 2003, Neural Comput. 15, 469-485).</remarks>
public sealed partial record AxisMixture
{
    // A start is improved by so many rounds before the best of them goes on.
    private const int FirstRounds = 12;
    private const double NarrowStartDeg = 7, BroadStartDeg = 14;

    private static readonly Vec3[] Places = NetPlaces(14);

    /// <summary>The best mixture with one cluster more, from the densest places of what is not explained yet, seen narrowly and
    /// broadly; null when no such cluster survives.</summary>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">As long as the axes.</param>
    /// <param name="round">The law of the new cluster.</param>
    /// <param name="stop">Cancels.</param>
    public AxisMixture? WithOneMore(Vec3[] axes, double[] weights, bool round, CancellationToken stop)
    {
        AxisMixture? best = null;
        double[] rest = Rest(axes, weights);
        foreach (double spread in new[] { NarrowStartDeg, BroadStartDeg })
        {
            foreach (Vec3 start in Densest(axes, rest, spread, 2))
            {
                var fresh = AxisComponent.FromTensor(BackgroundShare / 2, Blob(start, spread), round, NarrowestDeg);
                AxisMixture? m = (this with { Components = [.. Components, fresh], BackgroundShare = BackgroundShare / 2 }).Fit(axes, weights, stop, FirstRounds);
                if (m is not null && (best is null || m.LogLikelihood > best.LogLikelihood + 1e-9)) best = m;
            }
        }

        return best?.Fit(axes, weights, stop);
    }

    /// <summary>The mixture without one cluster, improved.</summary>
    /// <param name="index">The cluster.</param>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">As long as the axes.</param>
    /// <param name="stop">Cancels.</param>
    public AxisMixture? Without(int index, Vec3[] axes, double[] weights, CancellationToken stop)
    {
        AxisComponent[] left = [.. Components.Where((_, c) => c != index)];
        return left.Length == 0
            ? Uniform(Weight)
            : (this with { Components = left, BackgroundShare = BackgroundShare + Components[index].Share }).Fit(axes, weights, stop);
    }

    /// <summary>The mixture with the law of one cluster changed from Watson's to Bingham's or back, improved.</summary>
    /// <param name="index">The cluster.</param>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">As long as the axes.</param>
    /// <param name="stop">Cancels.</param>
    public AxisMixture? WithOtherLaw(int index, Vec3[] axes, double[] weights, CancellationToken stop) =>
        (this with { Components = [.. Components.Select((c, i) => i == index ? c with { Round = !c.Round } : c)] }).Fit(axes, weights, stop);

    private double[] Rest(Vec3[] axes, double[] weights)
    {
        double[] share = new double[Components.Length + 1], rest = new double[axes.Length];
        for (int i = 0; i < axes.Length; i++)
        {
            Shares(axes[i], share);
            rest[i] = weights[i] * share[^1];
        }

        return rest;
    }

    /// <summary>The places on the net with most unexplained weight within a start's spread, none near another.</summary>
    private static List<Vec3> Densest(Vec3[] axes, double[] rest, double spreadDeg, int count)
    {
        double k = 0.5 / Math.Pow(spreadDeg * Math.PI / 180, 2), near = Math.Cos(2 * spreadDeg * Math.PI / 180);
        double[] sums = new double[Places.Length];
        double least = 1 - (8 / k);
        for (int p = 0; p < Places.Length; p++)
        {
            Vec3 place = Places[p];
            for (int i = 0; i < axes.Length; i++)
            {
                double c = axes[i].Dot(place), c2 = c * c;
                if (c2 > least) sums[p] += rest[i] * Math.Exp(k * (c2 - 1));
            }
        }

        var found = new List<Vec3>();
        while (found.Count < count)
        {
            int best = -1;
            for (int p = 0; p < sums.Length; p++)
            {
                if (found.Exists(f => Math.Abs(f.Dot(Places[p])) > near)) continue;
                if (best < 0 || sums[p] > sums[best]) best = p;
            }

            if (best < 0 || sums[best] <= 0) break;
            found.Add(Places[best]);
        }

        return found;
    }

    private static Eigen3 Blob(Vec3 mean, double spreadDeg)
    {
        double s = Math.Pow(Math.Sin(spreadDeg * Math.PI / 180), 2);
        (Vec3 e1, Vec3 e2) = Tangent.Axes(mean);
        return new Eigen3(1 - (2 * s), s, s, mean, e1, e2);
    }

    private static Vec3[] NetPlaces(int steps)
    {
        var places = new List<Vec3>();
        for (int j = -steps; j <= steps; j++)
        {
            for (int i = -steps; i <= steps; i++)
            {
                var p = new Point2((double)i / steps, (double)j / steps);
                if ((p.X * p.X) + (p.Y * p.Y) <= 1) places.Add(EqualAreaNet.Direction(p));
            }
        }

        return [.. places];
    }
}
