using CloudStruct.Maths.Fitting;
using MathNet.Numerics.Distributions;

namespace CloudStruct.Maths.Series;

/// <summary>Finds sudden changes of level in a series whose scatter is correlated.</summary>
/// <remarks>Every place between two observations is tried as a step, on top of an even trend and of the steps already found. The
/// likelihood ratio against no step there, with range and white share of the scatter at their best under each of the two, is
/// referred to chi-square with one degree of freedom and multiplied by the number of places tried (Bonferroni). Without the
/// correlation a slow wave of a series passes for a step. Limits of the place: where twice the log likelihood is within 3.84 of
/// its maximum. Likelihood-ratio tests for a change of level go back to Quandt 1958 (from memory).</remarks>
public static class StepSearch
{
    private const int LeastBeside = 3;   // observations on either side of a step
    private const int MostSteps = 5;
    private static readonly double[] WhiteShares = [0.1, 0.5, 0.9];
    private static readonly double[] RangeSpacings = [0.6, 1.5, 4];

    /// <summary>Looks for steps and an even trend.</summary>
    /// <param name="x">Abscissae, rising.</param>
    /// <param name="y">Values.</param>
    /// <param name="floor">Standard deviation below which the scatter is not believed.</param>
    /// <param name="level">A step is kept when its probability under chance is below this.</param>
    /// <returns>Null with fewer than eight observations or a singular fit.</returns>
    public static StepModel? Of(double[] x, double[] y, double floor, double level = 0.01)
    {
        int n = x.Length;
        if (n < 2 * (LeastBeside + 1)) return null;
        double[] gaps = [.. Enumerable.Range(1, n - 1).Select(i => x[i] - x[i - 1]).Order()];
        double spacing = gaps[gaps.Length / 2];
        if (!(spacing > 0)) return null;
        var places = new List<double>();
        var found = new List<(double At, double Low, double High, double P)>();
        if (Best(x, y, floor, spacing, places) is not { } model) return null;
        while (places.Count < MostSteps)
        {
            var tried = new List<(double At, double Deviance, CorrelatedFit Fit)>();
            for (int i = LeastBeside; i <= n - LeastBeside; i++)
            {
                double at = (x[i - 1] + x[i]) / 2;
                if (places.Any(p => x.Count(v => v > Math.Min(p, at) && v < Math.Max(p, at)) < LeastBeside)) continue;
                if (Best(x, y, floor, spacing, [.. places, at]) is { } with) tried.Add((at, with.Deviance, with.Fit));
            }

            if (tried.Count == 0) break;
            (double At, double Deviance, CorrelatedFit Fit) best = tried.MinBy(t => t.Deviance);

            // Few observations make the ratio too large (Bartlett): by about the share of the observations that parameters take.
            double shrink = Math.Max(0.2, (double)(n - 5 - places.Count) / n), ratio = Math.Max(0, model.Deviance - best.Deviance) * shrink;
            double p = Math.Min(1, tried.Count * (1 - ChiSquared.CDF(1, ratio)));
            if (!(p < level)) break;
            double[] near = [.. tried.Where(t => (t.Deviance - best.Deviance) * shrink <= 3.84).Select(t => t.At)];
            found.Add((best.At, x.Last(v => v < near.Min()), x.First(v => v > near.Max()), p));
            places.Add(best.At);
            model = (best.Deviance, best.Fit);
        }

        int freedom = n - 2 - places.Count;
        StepFound[] steps = [.. found.Select((f, k) => new StepFound(f.At, f.Low, f.High, model.Fit.Beta[2 + k], Sigma(model.Fit, 2 + k), f.P)).OrderBy(s => s.At)];
        double slope = model.Fit.Beta[1], sigma = Sigma(model.Fit, 1);
        return new StepModel(steps, slope, sigma, 2 * (1 - StudentT.CDF(0, 1, freedom, Math.Abs(slope) / sigma)), freedom);
    }

    private static double Sigma(CorrelatedFit fit, int parameter)
    {
        var one = new double[fit.Beta.Length];
        one[parameter] = 1;
        return Math.Sqrt(fit.VarianceOf(one));
    }

    // Range and white share of greatest likelihood; the variance at its best, never below the floor.
    private static (double Deviance, CorrelatedFit Fit)? Best(double[] x, double[] y, double floor, double spacing, IReadOnlyList<double> places)
    {
        double least = Math.Max(floor * floor, 1e-18), deviance = double.PositiveInfinity;
        (double Range, double White, double Variance)? best = null;
        foreach (double range in RangeSpacings)
        {
            foreach (double white in WhiteShares)
            {
                if (Fit(x, y, range * spacing, white, 1, places) is not { } unit) continue;
                double variance = Math.Max(least, unit.SquareSum / x.Length);
                double own = unit.NoiseLogDeterminant + (x.Length * Math.Log(variance)) + (unit.SquareSum / variance);
                if (!(own < deviance)) continue;
                deviance = own;
                best = (range * spacing, white, Math.Max(least, unit.SquareSum / Math.Max(1, x.Length - 2 - places.Count)));
            }
        }

        return best is { } b && Fit(x, y, b.Range, b.White, b.Variance, places) is { } fit ? (deviance, fit) : null;
    }

    private static CorrelatedFit? Fit(double[] x, double[] y, double range, double white, double variance, IReadOnlyList<double> places)
    {
        int n = x.Length, p = 2 + places.Count;
        var design = new double[n * p];
        double middle = x.Average();
        for (int i = 0; i < n; i++)
        {
            design[i * p] = 1;
            design[(i * p) + 1] = x[i] - middle;
            for (int k = 0; k < places.Count; k++) design[(i * p) + 2 + k] = x[i] > places[k] ? 0.5 : -0.5;
        }

        var covariance = new double[n * n];
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < i; j++) covariance[(i * n) + j] = variance * (1 - white) * Math.Exp(-Math.Abs(x[i] - x[j]) / range);
            covariance[(i * n) + i] = variance;
        }

        return CorrelatedFit.Solve(design, y, covariance, new double[p]);
    }
}
