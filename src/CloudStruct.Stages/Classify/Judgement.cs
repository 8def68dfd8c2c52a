using CloudStruct.Maths.Mixtures;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Classify;

/// <summary>Classes counted, and held against check labels.</summary>
internal static class Judgement
{
    /// <summary>Table of check labels against classes found, over the classes that occur in either.</summary>
    /// <param name="check">Check label per point, 0 for none.</param>
    /// <param name="found">Class per point.</param>
    public static ConfusionMatrix Confusion(byte[] check, byte[] found)
    {
        var counts = new SortedDictionary<(byte Truth, byte Found), long>();
        var classes = new SortedSet<byte>();
        for (int i = 0; i < check.Length; i++)
        {
            if (check[i] == 0) continue;
            // A clast belongs to its dike until the stage inclusions tells it apart.
            byte truth = check[i] == (byte)RockClass.Inclusion ? (byte)RockClass.Dike : check[i];
            classes.Add(truth);
            classes.Add(found[i]);
            counts[(truth, found[i])] = counts.GetValueOrDefault((truth, found[i])) + 1;
        }

        RockClass[] order = [.. classes.Select(c => (RockClass)c)];
        long[] table = [.. from t in order from f in order select counts.GetValueOrDefault(((byte)t, (byte)f))];
        return new ConfusionMatrix(order, table, Agreement.Kappa(table, order.Length));
    }

    /// <summary>One row per class present in result or labels.</summary>
    public static ClassSummary[] Summary(DescribedCloud described, byte[] found, ConfusionMatrix? check)
    {
        var points = new long[256];
        var area = new double[256];
        for (int i = 0; i < found.Length; i++)
        {
            points[found[i]]++;
            area[found[i]] += described.AreaM2[i];
        }

        var rows = new List<ClassSummary>();
        for (int c = 0; c < 256; c++)
        {
            int at = check == null ? -1 : Array.IndexOf(check.Classes, (RockClass)c), k = check?.Classes.Length ?? 0;
            if (points[c] == 0 && at < 0) continue;
            rows.Add(new ClassSummary
            {
                Class = (RockClass)c,
                Points = points[c],
                AreaM2 = area[c],
                Precision = at < 0 ? null : Defined(Agreement.Precision(check!.Counts, k, at)),
                Recall = at < 0 ? null : Defined(Agreement.Recall(check!.Counts, k, at)),
                Iou = at < 0 ? null : Defined(Agreement.Iou(check!.Counts, k, at)),
            });
        }

        return [.. rows];
    }

    private static double? Defined(double v) => double.IsFinite(v) ? v : null;
}
