using System.Runtime.InteropServices;
using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Classify;

/// <summary>Draws the outline of one dike: log odds of the rock's look, drawn toward the sheet, smoothed by a graph cut.</summary>
internal sealed class DikeCut
{
    private readonly Patches patches;
    private readonly Features features;
    private readonly ClassifySettings settings;
    private readonly StageContext context;

    public DikeCut(Patches patches, Features features, ClassifySettings settings, StageContext context)
    {
        this.patches = patches;
        this.features = features;
        this.settings = settings;
        this.context = context;
    }

    /// <summary>Chooses the patches of a dike.</summary>
    /// <param name="dike">The dike.</param>
    /// <param name="free">Rock that no other dike has taken.</param>
    /// <param name="labels">Hand labels; train labels join what is learnt.</param>
    /// <returns>Per patch whether it is dike, and the log odds with the pull of the margins (0 far away); the looks; the margins in detail.</returns>
    public (bool[] Inside, float[] Odds, Looks[] Looks, MarginFit Margins) Run(FoundDike dike, bool[] free, PatchLabels labels)
    {
        Sheet sheet = dike.Sheet;
        double width = sheet.WidthM, reach = (0.2 * width) + 0.1;
        var active = new bool[patches.Count];
        var inside = new bool[patches.Count];
        var depth = new float[patches.Count];
        var train = new List<int>(dike.Train);
        var side = new List<byte>(dike.Side);
        BlockParallel.For(patches.Count, context.Threads, context.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                depth[i] = (float)sheet.Depth(patches.X[i], patches.Y[i], patches.Z[i]);
                active[i] = free[i] && depth[i] > -reach;
                inside[i] = free[i] && depth[i] > 0;
            }
        });
        for (int i = 0; i < labels.Train.Length; i++)
        {
            if (labels.Train[i] is not ((byte)RockClass.Dike or (byte)RockClass.Host)) continue;
            train.Add(i);
            side.Add((byte)(labels.Train[i] == (byte)RockClass.Dike ? 1 : 0));
        }

        Looks[] looks = Learn(dike, train, side);
        var odds = new float[patches.Count];
        BlockParallel.For(patches.Count, context.Threads, context.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                if (active[i]) odds[i] = (float)(LookOdds(looks, i) + Pull(depth[i], width, dike.ByColour));
            }
        });
        Cut();
        // The outline's own edge, freed of its bulges, says where the margins run; then once more.
        MarginFit fit = MarginFit.Of(sheet, Edges(inside, free), 0.3 * patches.SizeM, context.Threads);
        double most = dike.ByColour ? PointCut.Most : 3;
        BlockParallel.For(patches.Count, context.Threads, context.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                if (active[i]) odds[i] = (float)(LookOdds(looks, i) + fit.Pull(patches.X[i], patches.Y[i], patches.Z[i], most));
            }
        });
        Cut();
        return (inside, odds, looks, fit);

        void Cut()
        {
            PatchCut.Run(patches, odds, active, inside, free, settings.SmoothingPerM);
            for (int i = 0; i < inside.Length; i++) inside[i] &= active[i];
            Fill(inside, free, active);
        }
    }

    /// <summary>Log odds that follow from the place alone: sure rock deep inside, none well outside.</summary>
    /// <param name="depthM">Depth inside the sheet [m].</param>
    /// <param name="widthM">Width of the sheet [m].</param>
    /// <param name="byColour">Colour sees the margin sharper than the sheet does; texture does not.</param>
    internal static double Pull(double depthM, double widthM, bool byColour)
    {
        double soft = byColour ? (0.12 * widthM) + 0.04 : (0.05 * widthM) + 0.03;
        return Math.Clamp(depthM / soft, -3.5, byColour ? 0.6 : 1.6);
    }

    /// <summary>Places midway between patches of the dike and free ones beside them.</summary>
    private List<(float X, float Y, float Z)> Edges(bool[] inside, bool[] free)
    {
        var places = new List<(float, float, float)>();
        for (int i = 0; i < inside.Length; i++)
        {
            if (!inside[i]) continue;
            foreach (int j in patches.Around(i))
            {
                if (inside[j] || !free[j]) continue;
                places.Add(((patches.X[i] + patches.X[j]) / 2, (patches.Y[i] + patches.Y[j]) / 2, (patches.Z[i] + patches.Z[j]) / 2));
            }
        }

        return places;
    }

    internal float LookOdds(Looks[] looks, int patch)
    {
        float sum = 0;
        foreach (Looks look in looks) sum += look.LogOdds(features, patch, Appearance.Clip);
        return Math.Clamp(sum, -Appearance.Clip, Appearance.Clip);
    }

    private Looks[] Learn(FoundDike dike, List<int> train, List<byte> side)
    {
        int c = features.ColourColumns;
        var looks = new List<Looks>();
        if (c > 0 && Looks.Learn(features, [.. Enumerable.Range(0, c)], CollectionsMarshal.AsSpan(train), CollectionsMarshal.AsSpan(side), [], -1, curved: true, context.Threads) is { } colour) looks.Add(colour);
        if (!dike.ByColour && Looks.Learn(features, [.. Enumerable.Range(c, features.Columns - c)], CollectionsMarshal.AsSpan(train), CollectionsMarshal.AsSpan(side), [], -1, curved: false, context.Threads) is { } texture) looks.Add(texture);
        return [.. looks];
    }

    /// <summary>Turns islands that are smaller than the limit over to what encloses them: clasts and lichen inside, specks outside.</summary>
    private void Fill(bool[] inside, bool[] free, bool[] active)
    {
        var seen = new bool[inside.Length];
        var stack = new Stack<int>();
        var island = new List<int>();
        for (int start = 0; start < inside.Length; start++)
        {
            if (seen[start] || !active[start]) continue;
            island.Clear();
            double area = 0;
            bool touchesFar = false, kind = inside[start];
            stack.Push(start);
            seen[start] = true;
            while (stack.Count > 0)
            {
                int i = stack.Pop();
                island.Add(i);
                area += patches.AreaM2[i];
                foreach (int j in patches.Around(i))
                {
                    if (!free[j]) continue;
                    touchesFar |= !active[j];
                    if (seen[j] || !active[j] || inside[j] != kind) continue;
                    seen[j] = true;
                    stack.Push(j);
                }
            }

            if (area >= settings.FillIslandsM2 || (touchesFar && !kind)) continue;
            foreach (int i in island) inside[i] = !kind;
        }
    }
}
