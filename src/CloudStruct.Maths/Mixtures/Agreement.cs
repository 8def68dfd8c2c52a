namespace CloudStruct.Maths.Mixtures;

/// <summary>How well two labellings agree, from their table of counts: rows the truth, columns the answer.</summary>
public static class Agreement
{
    /// <summary>Share of equal labels; NaN for an empty table.</summary>
    public static double Accuracy(ReadOnlySpan<long> counts, int classes)
    {
        double same = 0, all = 0;
        for (int i = 0; i < classes; i++) same += counts[(i * classes) + i];
        foreach (long c in counts) all += c;
        return same / all;
    }

    /// <summary>Cohen's kappa: agreement beyond chance, 1 when perfect, NaN when chance alone agrees fully.</summary>
    /// <remarks>Cohen 1960, A coefficient of agreement for nominal scales, Educ. Psychol. Meas. 20, 37-46.</remarks>
    public static double Kappa(ReadOnlySpan<long> counts, int classes)
    {
        double all = 0, chance = 0;
        foreach (long c in counts) all += c;
        for (int i = 0; i < classes; i++) chance += Row(counts, classes, i) * Column(counts, classes, i) / (all * all);
        return (Accuracy(counts, classes) - chance) / (1 - chance);
    }

    /// <summary>Share of the answers of a class that are right; NaN without answers.</summary>
    public static double Precision(ReadOnlySpan<long> counts, int classes, int i) => counts[(i * classes) + i] / Column(counts, classes, i);

    /// <summary>Share of a class that is found; NaN when the class is absent.</summary>
    public static double Recall(ReadOnlySpan<long> counts, int classes, int i) => counts[(i * classes) + i] / Row(counts, classes, i);

    /// <summary>Intersection over union of a class (Jaccard index).</summary>
    public static double Iou(ReadOnlySpan<long> counts, int classes, int i)
    {
        double both = counts[(i * classes) + i];
        return both / (Row(counts, classes, i) + Column(counts, classes, i) - both);
    }

    private static double Row(ReadOnlySpan<long> counts, int classes, int i)
    {
        double s = 0;
        for (int j = 0; j < classes; j++) s += counts[(i * classes) + j];
        return s;
    }

    private static double Column(ReadOnlySpan<long> counts, int classes, int j)
    {
        double s = 0;
        for (int i = 0; i < classes; i++) s += counts[(i * classes) + j];
        return s;
    }
}
