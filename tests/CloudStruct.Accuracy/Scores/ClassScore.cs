using CloudStruct.Maths.Mixtures;
using CloudStruct.Records.Classes;
using CloudStruct.Simulate;

namespace CloudStruct.Accuracy.Scores;

/// <summary>Classes found against true classes, over the working points that lie next to a true point.</summary>
public sealed record ClassScore
{
    private static readonly RockClass[] Order = [RockClass.Host, RockClass.Dike, RockClass.Cover, RockClass.Loose, RockClass.Unknown];

    /// <summary>Row-major table over host, dike, cover, loose, unknown: rows the truth.</summary>
    public long[] Counts { get; } = new long[Order.Length * Order.Length];

    /// <summary>Dikes found.</summary>
    public int Found { get; private init; }

    /// <summary>True dikes.</summary>
    public int True { get; private init; }

    /// <summary>Mean stated probability and true share of dike, in five classes of the stated probability.</summary>
    public (double Stated, double Share, long Points)[] Calibration { get; private init; } = [];

    /// <summary>Intersection over union of the dikes.</summary>
    public double DikeIou => Agreement.Iou(Counts, Order.Length, 1);

    /// <summary>Share of the dikes found.</summary>
    public double DikeRecall => Agreement.Recall(Counts, Order.Length, 1);

    /// <summary>Share of what is called dike that is.</summary>
    public double DikePrecision => Agreement.Precision(Counts, Order.Length, 1);

    /// <summary>Points called dike by their true class: host, dike, cover, loose.</summary>
    public long[] CalledDike => [.. Enumerable.Range(0, 4).Select(row => Counts[(row * Order.Length) + 1])];

    /// <summary>Share of the cover found.</summary>
    public double CoverRecall => Agreement.Recall(Counts, Order.Length, 2);

    /// <summary>Share of what is called cover that is.</summary>
    public double CoverPrecision => Agreement.Precision(Counts, Order.Length, 2);

    /// <summary>Cohen's kappa over all classes.</summary>
    public double Kappa => Agreement.Kappa(Counts, Order.Length);

    /// <summary>Scores one result.</summary>
    /// <param name="outcrop">Truth. Clasts count as dike, for that is what the stage is asked for.</param>
    /// <param name="nearest">True point next to each working point, -1 for none.</param>
    /// <param name="classes">Result.</param>
    public static ClassScore Of(SimulatedOutcrop outcrop, int[] nearest, ClassifiedCloud classes)
    {
        var bins = new (double Stated, double True, long Points)[5];
        var score = new ClassScore { Found = classes.Dikes.Length, True = outcrop.Dikes.Length, Calibration = new (double, double, long)[5] };
        for (int i = 0; i < nearest.Length; i++)
        {
            if (nearest[i] < 0) continue;
            byte truth = outcrop.TrueClass[nearest[i]];
            if (truth == (byte)RockClass.Unknown) continue;   // a stray point has no class
            if (truth == (byte)RockClass.Inclusion) truth = (byte)RockClass.Dike;
            score.Counts[(Place(truth) * Order.Length) + Place(classes.Class[i])]++;
            if (truth == (byte)RockClass.Cover || classes.Class[i] == (byte)RockClass.Cover) continue;
            double p = classes.DikeProbability[i] / 255.0;
            int bin = Math.Min(4, (int)(5 * p));
            bins[bin] = (bins[bin].Stated + p, bins[bin].True + (truth == (byte)RockClass.Dike ? 1 : 0), bins[bin].Points + 1);
        }

        for (int b = 0; b < 5; b++) score.Calibration[b] = (bins[b].Stated / bins[b].Points, bins[b].True / bins[b].Points, bins[b].Points);
        return score;
    }

    private static int Place(byte c) => Array.IndexOf(Order, (RockClass)c) is var k and >= 0 ? k : Order.Length - 1;
}
