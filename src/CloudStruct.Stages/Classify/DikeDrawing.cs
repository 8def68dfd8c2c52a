using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Classify;

/// <summary>Draws dikes one after the other, each on the rock that the earlier ones left.</summary>
internal sealed class DikeDrawing
{
    private const int Near = 8;

    private readonly DescribedCloud described;
    private readonly Patches patches;
    private readonly Features features;
    private readonly ClassifySettings settings;
    private readonly PatchLabels labels;
    private readonly StageContext context;
    private readonly bool[] free;

    public DikeDrawing(DescribedCloud described, Patches patches, Features features, bool[] rock, ClassifySettings settings, PatchLabels labels, StageContext context)
    {
        this.described = described;
        this.patches = patches;
        this.features = features;
        this.settings = settings;
        this.labels = labels;
        this.context = context;
        free = (bool[])rock.Clone();
    }

    /// <summary>What was kept so far, in order.</summary>
    public List<Drawn> Kept { get; } = [];

    /// <summary>Draws a dike without keeping it.</summary>
    public Drawn Draw(FoundDike dike)
    {
        int n = described.Cloud.Count;
        (bool[] inside, float[] odds, Looks[] looks, MarginFit margins) = new DikeCut(patches, features, settings, context).Run(dike, free, labels);
        var say = new bool[n];
        for (int i = 0; i < n; i++) say[i] = inside[patches.OfPoint[i]];
        PointCut.Run(described, patches, features, dike, margins, looks, inside, free, settings.SmoothingPerM, say, context);
        MarginFit fine = MarginFit.Of(dike.Sheet, Edges(say), 0.3 * described.Cloud.SpacingM, context.Threads);
        double sharpness = described.LStar.Length == n ? MarginProfile.Sharpness(described, patches, features, fine, free, context.Threads) : double.NaN;
        return new Drawn(dike, inside, say, odds, fine.ScatterM, sharpness, MarginProfile.Widening(described.Cloud.SpacingM));
    }

    /// <summary>Keeps a drawn dike: its rock is no other's.</summary>
    public void Keep(Drawn drawn)
    {
        Kept.Add(drawn);
        for (int p = 0; p < free.Length; p++) free[p] &= !drawn.Inside[p];
    }

    /// <summary>Places midway between points of the dike and neighbours that are none.</summary>
    private List<(float X, float Y, float Z)> Edges(bool[] say)
    {
        WorkingCloud cloud = described.Cloud;
        return [.. BlockParallel.Map(say.Length, context.Threads, context.Stop, (from, to) =>
        {
            var places = new List<(float, float, float)>();
            for (int i = from; i < to; i++)
            {
                if (!say[i]) continue;
                for (int k = 0; k < Near; k++)
                {
                    int j = cloud.Neighbours[(i * WorkingCloud.K) + k];
                    if (j < 0) break;
                    if (say[j] || !free[patches.OfPoint[j]]) continue;
                    places.Add(((cloud.X[i] + cloud.X[j]) / 2, (cloud.Y[i] + cloud.Y[j]) / 2, (cloud.Z[i] + cloud.Z[j]) / 2));
                }
            }

            return places;
        }).SelectMany(p => p)];
    }
}
