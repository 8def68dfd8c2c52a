using System.Globalization;

namespace CloudStruct.Products.Plots;

/// <summary>An axis with ticks at 1, 2 or 5 times a power of ten.</summary>
/// <param name="From">First value shown.</param>
/// <param name="To">Last value shown.</param>
/// <param name="Step">Distance of ticks.</param>
internal sealed record NiceScale(double From, double To, double Step)
{
    /// <summary>A scale that holds a range with at most about <paramref name="ticks"/> steps.</summary>
    /// <param name="from">Lowest value.</param>
    /// <param name="to">Highest value.</param>
    /// <param name="ticks">Steps wanted at most.</param>
    /// <param name="whole">Whether the ends are moved out to ticks.</param>
    public static NiceScale Over(double from, double to, int ticks, bool whole)
    {
        if (!(to > from)) to = from + 1;
        double step = StepFor((to - from) / ticks);
        return whole ? new(Math.Floor((from / step) + 1e-9) * step, Math.Ceiling((to / step) - 1e-9) * step, step) : new(from, to, step);
    }

    /// <summary>The smallest of 1, 2, 5 times a power of ten that is not below <paramref name="least"/>.</summary>
    public static double StepFor(double least)
    {
        double power = Math.Pow(10, Math.Floor(Math.Log10(least)));
        foreach (int k in (ReadOnlySpan<int>)[1, 2, 5, 10])
        {
            if (k * power >= least * (1 - 1e-9)) return k * power;
        }
        return 10 * power;
    }

    /// <summary>Values of the ticks, ascending.</summary>
    public IEnumerable<double> Ticks()
    {
        long first = (long)Math.Ceiling((From / Step) - 1e-9), last = (long)Math.Floor((To / Step) + 1e-9);
        for (long i = first; i <= last; i++) yield return i * Step;
    }

    /// <summary>A tick's value with as many decimals as the step needs.</summary>
    public string Label(double tick)
    {
        int decimals = Math.Max(0, -(int)Math.Floor(Math.Log10(Step) + 1e-9));
        double rounded = Math.Round(tick, decimals);
        return (rounded == 0 ? 0 : rounded).ToString("F" + decimals.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);
    }

    /// <summary>Place of a value between 0 (From) and 1 (To).</summary>
    public double At(double value) => (value - From) / (To - From);
}
