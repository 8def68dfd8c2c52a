using CloudStruct.Accuracy.Scores;

namespace CloudStruct.Accuracy.Deep;

/// <summary>One figure of the accuracy page: samples scene by scene, the statistic over all of them, and what is asked of it.</summary>
/// <param name="name">What it is, as the page says it.</param>
/// <param name="statistic">Of all samples together.</param>
/// <param name="decimals">Digits behind the point.</param>
/// <param name="least">It should be at least this.</param>
/// <param name="most">It should be at most this.</param>
public sealed class Figure(string name, Func<List<Sample>, double> statistic, int decimals, double? least = null, double? most = null)
{
    private const int Draws = 400;
    private readonly List<Sample[]> scenes = [];

    private bool CountsThings => Unit.Length == 0;

    /// <summary>What it is.</summary>
    public string Name => name;

    /// <summary>Digits behind the point.</summary>
    public int Decimals => decimals;

    /// <summary>What is asked; null for nothing.</summary>
    public (double? Least, double? Most) Wanted => (least, most);

    /// <summary>What plain least squares reaches with the true segmentation; null where there is no such thing.</summary>
    public Figure? Floor { get; init; }

    /// <summary>Unit of the weights: m² for areas, m for lengths, nothing for numbers.</summary>
    public string Unit { get; init; } = "";

    /// <summary>All weights together: how much was judged.</summary>
    public double Judged => scenes.Sum(s => s.Sum(x => x.Weight));

    /// <summary>Samples in all.</summary>
    public int Count => scenes.Sum(s => s.Length);

    /// <summary>Over all scenes; NaN without samples.</summary>
    public double Value => Count == 0 ? double.NaN : statistic([.. scenes.SelectMany(s => s)]);

    /// <summary>Takes in one scene.</summary>
    public void Add(IEnumerable<Sample> scene) => scenes.Add([.. scene]);

    /// <summary>95 % interval by drawing whole scenes anew (things of one outcrop share its noise, light and joints).</summary>
    public (double Low, double High) Interval()
    {
        Sample[][] filled = [.. scenes.Where(s => s.Length > 0)];
        if (filled.Length < 3) return (double.NaN, double.NaN);
        var random = new Random(20_260_731);
        var values = new double[Draws];
        for (int d = 0; d < Draws; d++)
        {
            var drawn = new List<Sample>();
            for (int i = 0; i < filled.Length; i++) drawn.AddRange(filled[random.Next(filled.Length)]);
            values[d] = statistic(drawn);
        }

        Array.Sort(values);
        return (values[(int)(0.025 * Draws)], values[(int)(0.975 * Draws) - 1]);
    }

    /// <summary>By how much the figure may miss what is asked by chance, on these few outcrops: twice its standard error.</summary>
    /// <remarks>A share of many judged things that is asked to be p: binomial at p, half as wide again because things of one outcrop go
    /// together. Anything else: from its scatter between outcrops, with Student's factor for so few (4.3 for three of them).</remarks>
    public double ChanceOf(double asked)
    {
        if (statistic == Mean && CountsThings && asked is > 0 and < 1 && Judged >= 50) return 1.5 * 2 * Math.Sqrt(asked * (1 - asked) / Judged);
        double[] each = [.. scenes.Where(s => s.Length > 0).Select(s => statistic([.. s]))];
        if (each.Length < 2) return 0;
        double mean = each.Average(), error = Math.Sqrt(each.Sum(v => (v - mean) * (v - mean)) / (each.Length - 1) / each.Length);
        return error * (each.Length switch { 2 => 12.7, 3 => 4.3, 4 => 3.2, _ => 2.8 });
    }

    /// <summary>Whether it is as asked, or misses it by no more than chance allows.</summary>
    public bool HoldsWithinChance =>
        (least is not { } low || Value >= low - ChanceOf(low) - 1e-9) && (most is not { } high || Value <= high + ChanceOf(high) + 1e-9);

    /// <summary>Mean by weight; a share when values are 1 and 0.</summary>
    public static double Mean(List<Sample> samples) => samples.Sum(s => s.Value * s.Weight) / samples.Sum(s => s.Weight);

    /// <summary>Middle value.</summary>
    public static double Median(List<Sample> samples) => WholeStudy.Median(samples.Select(s => s.Value));

    /// <summary>95th percentile.</summary>
    public static double P95(List<Sample> samples) => Quantiles.Of(samples.Select(s => s.Value), 0.95);

    /// <summary>One over the median: stated over real where samples are real over stated.</summary>
    public static double OneOverMedian(List<Sample> samples) => 1 / Median(samples);
}
