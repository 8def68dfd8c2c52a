using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;

namespace CloudStruct.Stages.Faces;

/// <summary>What the faces of a scene say together about the errors of its points.</summary>
internal sealed class SceneNoise
{
    /// <summary>How firmly a single face keeps to the variance of the scene.</summary>
    private const double Freedom = 6;

    private const int Rounds = 3;

    private const double LargeM2 = 0.5;
    private const double SoundSpread = 1.35;
    private const int FewestLarge = 5;

    private SceneNoise(double scatterM, double lengthM, LagBins bins, NoiseLaws laws, NoisePrior prior)
    {
        ScatterM = scatterM;
        LengthM = lengthM;
        Bins = bins;
        Laws = laws;
        Prior = prior;
    }

    /// <summary>Scatter of the points about large faces [m].</summary>
    public double ScatterM { get; }

    /// <summary>Standard deviation of the points' errors, the part that the planes have taken included [m].</summary>
    public double ErrorM => Math.Sqrt(Prior.Variance);

    /// <summary>Length over which it is correlated [m].</summary>
    public double LengthM { get; }

    /// <summary>Distances of the pair sums.</summary>
    public LagBins Bins { get; }

    /// <summary>Laws of error considered.</summary>
    public NoiseLaws Laws { get; }

    /// <summary>Their shares in this scene.</summary>
    public NoisePrior Prior { get; }

    /// <summary>Scatter about large faces: the area-weighted median of their own [m].</summary>
    /// <param name="surface">The points.</param>
    /// <param name="pieces">Labels, sorted.</param>
    /// <param name="spread">Spread of the normals per label over the usual (see <see cref="Refusing"/>).</param>
    /// <param name="scatterM">The value so far [m].</param>
    public static double Scatter(Surface surface, Pieces pieces, double[] spread, double scatterM)
    {
        int[] chosen = Largest(pieces, spread, 200);
        int large = chosen.Count(k => pieces.Of(k).Length * surface.PointAreaM2 >= LargeM2);
        if (large >= FewestLarge) chosen = chosen[..large];
        if (chosen.Length == 0) return scatterM;
        double s = scatterM;
        for (int round = 0; round < 3; round++)
        {
            var own = new (double Scale, double Points)[chosen.Length];
            double now = s;
            BlockParallel.For(
                chosen.Length,
                surface.Threads,
                surface.Stop,
                (from, to) =>
                {
                    for (int c = from; c < to; c++)
                    {
                        WidePatch patch = WidePatch.Of(surface, pieces, chosen[c], now);
                        own[c] = (patch.ScaleM, patch.Points.Length);
                    }
                },
                length: 1);
            s = Math.Max(surface.LeastScatterM, Middle(own));
            if (Math.Abs(s - now) < 0.02 * now) break;
        }

        return s;
    }

    /// <summary>Scatter, length and the shares of the laws.</summary>
    /// <param name="surface">The points.</param>
    /// <param name="pieces">Labels, sorted.</param>
    /// <param name="spread">Spread of the normals per label over the usual.</param>
    /// <param name="scatterM">Scatter about large faces [m].</param>
    /// <param name="most">Most faces looked at.</param>
    public static SceneNoise Learn(Surface surface, Pieces pieces, double[] spread, double scatterM, int most)
    {
        double h = surface.SpacingM;
        var bins = new LagBins(h / 4, 4000 * h);
        var laws = new NoiseLaws(bins, h, Math.Max(1.0, 20 * h));
        int[] chosen = Largest(pieces, spread, most);
        var records = new PatchRecord?[chosen.Length];
        BlockParallel.For(
            chosen.Length,
            surface.Threads,
            surface.Stop,
            () => new PatchModes(bins, h),
            (from, to, modes) =>
            {
                for (int c = from; c < to; c++)
                {
                    (double[] u, double[] v, _, double[] pseudo, double[] w) = WidePatch.Of(surface, pieces, chosen[c], scatterM).Columns(surface);
                    records[c] = modes.Record(u, v, pseudo, w);
                }
            },
            length: 1);

        // Residuals scatter less than errors: the plane takes the long waves. The variance that patches are held to starts at that
        // of the residuals and is moved to that of the errors that the laws make of them.
        NoisePrior prior = laws.Flat(scatterM * scatterM, Freedom);
        double length = 3 * h;
        for (int round = 0; round < Rounds; round++)
        {
            var told = new NoiseLikelihood?[chosen.Length];
            double variance = prior.Variance;
            BlockParallel.For(
                chosen.Length,
                surface.Threads,
                surface.Stop,
                (from, to) =>
                {
                    for (int c = from; c < to; c++) told[c] = records[c] is { } record ? laws.Weigh(record, variance, Freedom) : null;
                },
                length: 1);
            NoiseLikelihood[] all = [.. told.OfType<NoiseLikelihood>()];
            if (all.Length == 0) break;
            prior = laws.Learn(all, laws.Flat(variance, Freedom));
            length = Length(laws, all, prior);
            if (round < Rounds - 1) prior = prior with { Variance = ErrorVariance(pieces, chosen, told, laws, prior) };
        }

        return new SceneNoise(scatterM, length, bins, laws, prior);
    }

    // Median over the faces, each weighing as much as it has points: some undulate, and must not speak for the rest.
    private static double ErrorVariance(Pieces pieces, int[] chosen, NoiseLikelihood?[] told, NoiseLaws laws, NoisePrior prior)
    {
        // By the shares as learnt: the half of the prior that prefers no law would let long waves in that the scene does not show.
        NoisePrior learnt = prior with { LogShare = [.. prior.Share.Select(s => Math.Log(Math.Max(s, 1e-300)))] };
        var own = new List<(double Variance, double Points)>();
        for (int c = 0; c < chosen.Length; c++)
        {
            if (told[c] is { } l) own.Add((laws.Slopes(l, learnt).ErrorVariance, pieces.Of(chosen[c]).Length));
        }

        return Math.Max(prior.Variance, Middle([.. own]));
    }

    private static double Length(NoiseLaws laws, NoiseLikelihood[] told, NoisePrior prior)
    {
        double sum = 0;
        foreach (NoiseLikelihood l in told) sum += Math.Log(laws.Slopes(l, prior).LengthM);
        return Math.Exp(sum / told.Length);
    }

    // The largest labels among those that look like sound rock.
    private static int[] Largest(Pieces pieces, double[] spread, int most)
    {
        int[] all = [.. Enumerable.Range(1, pieces.Count - 1).Where(k => spread[k] < SoundSpread)];
        Array.Sort(all, (a, b) =>
        {
            int byPoints = pieces.Of(b).Length.CompareTo(pieces.Of(a).Length);
            return byPoints != 0 ? byPoints : a.CompareTo(b);
        });
        return all.Length > most ? all[..most] : all;
    }

    private static double Middle((double Scale, double Points)[] own)
    {
        Array.Sort(own);
        double total = own.Sum(o => o.Points), sum = 0;
        foreach ((double scale, double points) in own)
        {
            sum += points;
            if (sum >= total / 2) return scale;
        }

        return own[^1].Scale;
    }
}
