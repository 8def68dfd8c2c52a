using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using CloudStruct.Maths.Blocks;
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
    /// <param name="fold">Fold of each; empty for none.</param>
    /// <param name="leaveOut">Fold left out; -1 for none.</param>
    /// <param name="curved">Mixtures instead of one normal law a side.</param>
    /// <param name="threads">Workers.</param>
    /// <returns>Null when a side has too few patches.</returns>
    public static Looks? Learn(
        Features features, int[] columns, ReadOnlySpan<int> train, ReadOnlySpan<byte> side, ReadOnlySpan<int> fold, int leaveOut, bool curved, int threads)
    {
        int d = columns.Length;
        var count = new int[2];
        bool all = leaveOut < 0;
        for (int i = 0; i < train.Length; i++)
        {
            if (all || fold[i] != leaveOut) count[side[i]]++;
        }

        if (Math.Min(count[0], count[1]) < 40) return null;
        int most = curved ? MostMixed : MostItems;
        double[] stride = [Math.Max(1.0, (double)count[0] / most), Math.Max(1.0, (double)count[1] / most)], due = [0, 0];
        var items = new[] { new List<double>(), new List<double>() };
        for (int i = 0; i < train.Length; i++)
        {
            int s = side[i];
            if ((!all && fold[i] == leaveOut) || (due[s] += 1) < stride[s]) continue;
            due[s] -= stride[s];
            for (int c = 0; c < d; c++) items[s].Add(features.Rows[(train[i] * features.Columns) + columns[c]]);
        }

        if (curved)
        {
            var mixed = new GaussianMixture?[2];
            BlockParallel.For(2, threads, CancellationToken.None, (from, _) => mixed[from] = Mixed(items[from], d), length: 1);
            if (mixed[1] is { } inner && mixed[0] is { } outer) return new Looks(columns, null, inner, outer) { IsColour = columns[0] < features.ColourColumns };
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

    /// <summary>Adds the log odds inside : outside, each within ±clip, of the patches asked about.</summary>
    /// <param name="features">Rows.</param>
    /// <param name="patches">Patches asked about.</param>
    /// <param name="picked">Which of them; empty for all.</param>
    /// <param name="to">[in, out] Log odds per patch asked about.</param>
    /// <param name="clip">Largest log odds.</param>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public void Add(Features features, ReadOnlySpan<int> patches, ReadOnlySpan<int> picked, Span<float> to, float clip)
    {
        unchecked
        {
            int d = columns.Length, width = features.Columns, n = picked.IsEmpty ? patches.Length : picked.Length;
            ReadOnlySpan<float> rows = features.Rows;
            Span<Vector256<double>> item = stackalloc Vector256<double>[d], logs = stackalloc Vector256<double>[RowKinds];
            for (int i = 0; i < n; i += 4)
            {
                int last = n - 1, i0 = i, i1 = Math.Min(i + 1, last), i2 = Math.Min(i + 2, last), i3 = Math.Min(i + 3, last);
                if (!picked.IsEmpty) (i0, i1, i2, i3) = (picked[i0], picked[i1], picked[i2], picked[i3]);
                int p0 = patches[i0] * width, p1 = patches[i1] * width, p2 = patches[i2] * width, p3 = patches[i3] * width;
                for (int c = 0; c < d; c++)
                {
                    int at = columns[c];
                    item[c] = Vector256.Create((double)rows[p0 + at], rows[p1 + at], rows[p2 + at], rows[p3 + at]);
                }

                Vector256<double> odds;
                if (plain != null)
                {
                    plain.Logs(item, logs);
                    odds = logs[1] - logs[0];
                }
                else
                {
                    odds = inside!.LogDensities(item, logs) - outside!.LogDensities(item, logs);
                }

                odds = Vector256.Min(Vector256.Max(odds, Vector256.Create((double)-clip)), Vector256.Create((double)clip));
                to[i0] += (float)odds[0];
                if (i + 1 < n) to[i1] += (float)odds[1];
                if (i + 2 < n) to[i2] += (float)odds[2];
                if (i + 3 < n) to[i3] += (float)odds[3];
            }
        }
    }

    private static GaussianMixture? Mixed(List<double> items, int d) =>
        GaussianMixture.Fit(CollectionsMarshal.AsSpan(items), d, Kinds, CovarianceModel.Own, seed: 1, starts: 1, rounds: 10);
}
