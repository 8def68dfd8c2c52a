using System.Runtime.InteropServices;
using CloudStruct.Maths.Mixtures;

namespace CloudStruct.Stages.Classify;

/// <summary>What inside and outside look like, over some columns of the features.</summary>
/// <remarks>Colour falls into clusters (sun and shade, bare and lichened), so each side gets a mixture; texture has too many
/// columns for that and gets one normal law a side.</remarks>
internal sealed class Looks
{
    private const int MostItems = 3000, MostMixed = 1000, Kinds = 4, RowKinds = 5;

    private readonly int[] columns;
    private readonly Discriminant? plain;
    private readonly GaussianMixture? inside, outside;

    private Looks(int[] columns, Discriminant? plain, GaussianMixture? inside, GaussianMixture? outside)
    {
        this.columns = columns;
        this.plain = plain;
        this.inside = inside;
        this.outside = outside;
    }

    /// <summary>Learns from the patches of all folds but one.</summary>
    /// <param name="features">Rows.</param>
    /// <param name="columns">Columns used, one after the other.</param>
    /// <param name="train">Patches with a side.</param>
    /// <param name="side">Side of each: 1 inside, 0 outside.</param>
    /// <param name="fold">Fold of each.</param>
    /// <param name="leaveOut">Fold left out; -1 for none.</param>
    /// <param name="curved">Mixtures instead of one normal law a side.</param>
    /// <returns>Null when a side has too few patches.</returns>
    public static Looks? Learn(Features features, int[] columns, List<int> train, List<byte> side, List<int> fold, int leaveOut, bool curved)
    {
        int d = columns.Length;
        var count = new int[2];
        for (int i = 0; i < train.Count; i++)
        {
            if (fold[i] != leaveOut) count[side[i]]++;
        }

        if (Math.Min(count[0], count[1]) < 40) return null;
        int most = curved ? MostMixed : MostItems;
        double[] stride = [Math.Max(1.0, (double)count[0] / most), Math.Max(1.0, (double)count[1] / most)], due = [0, 0];
        var items = new[] { new List<double>(), new List<double>() };
        for (int i = 0; i < train.Count; i++)
        {
            int s = side[i];
            if (fold[i] == leaveOut || (due[s] += 1) < stride[s]) continue;
            due[s] -= stride[s];
            for (int c = 0; c < d; c++) items[s].Add(features.Rows[(train[i] * features.Columns) + columns[c]]);
        }

        if (curved)
        {
            GaussianMixture? inner = Mixed(items[1], d), outer = Mixed(items[0], d);
            if (inner != null && outer != null) return new Looks(columns, null, inner, outer) { IsColour = columns[0] < features.ColourColumns };
        }

        double[] both = [.. items[0], .. items[1]];
        int[] classes = [.. Enumerable.Repeat(0, items[0].Count / d), .. Enumerable.Repeat(1, items[1].Count / d)];
        Discriminant? plain = Discriminant.Learn(both, d, classes, [], 2, toPooled: 0.3, toDiagonal: 0.05);
        return plain == null ? null : new Looks(columns, plain, null, null) { IsColour = columns[0] < features.ColourColumns };
    }

    /// <summary>Learns colour from single rows: mixtures that may take the time to settle.</summary>
    /// <param name="inside">Row-major rows of the inside, three numbers each.</param>
    /// <param name="outside">Rows of the outside.</param>
    /// <param name="dimensions">Length of a row.</param>
    /// <returns>Null when a side has too few rows or no mixture fits.</returns>
    public static Looks? OfRows(List<double> inside, List<double> outside, int dimensions)
    {
        if (Math.Min(inside.Count, outside.Count) < 40 * dimensions) return null;
        GaussianMixture? inner = Settled(inside), outer = Settled(outside);
        return inner == null || outer == null ? null : new Looks([.. Enumerable.Range(0, dimensions)], null, inner, outer) { IsColour = true };

        GaussianMixture? Settled(List<double> items) =>
            GaussianMixture.Fit(CollectionsMarshal.AsSpan(items), dimensions, RowKinds, CovarianceModel.Own, seed: 1, starts: 1, rounds: 25);
    }

    /// <summary>Whether the columns are colour, of which single points know more than their patch.</summary>
    public bool IsColour { get; private init; }

    /// <summary>Log odds inside : outside of one patch, within ±clip.</summary>
    public float LogOdds(Features features, int patch, float clip) =>
        LogOdds(features.Rows.AsSpan((patch * features.Columns) + columns[0], columns.Length), clip);

    /// <summary>Log odds of a row, given in the order of the columns learnt.</summary>
    public float LogOdds(ReadOnlySpan<float> row, float clip)
    {
        Span<double> item = stackalloc double[row.Length], logs = stackalloc double[RowKinds];
        for (int c = 0; c < row.Length; c++) item[c] = row[c];
        if (plain != null)
        {
            plain.Logs(item, logs);
            return (float)Math.Clamp(logs[1] - logs[0], -clip, clip);
        }

        return (float)Math.Clamp(inside!.LogDensities(item, logs) - outside!.LogDensities(item, logs), -clip, clip);
    }

    private static GaussianMixture? Mixed(List<double> items, int d) =>
        GaussianMixture.Fit(CollectionsMarshal.AsSpan(items), d, Kinds, CovarianceModel.Own, seed: 1, starts: 1, rounds: 10);
}
