namespace CloudStruct.Stages.Contacts;

/// <summary>What the stretches of one dike say together about its dip: their mean and how much it really varies.</summary>
/// <param name="Mean">Mean tilt against the sheet.</param>
/// <param name="MeanVariance">Variance of the error of the mean.</param>
/// <param name="Variation">Variance of the tilt from stretch to stretch, errors taken out.</param>
/// <remarks>Moment estimate of the variance between groups: DerSimonian and Laird 1986, Meta-analysis in clinical trials (from
/// memory).</remarks>
internal readonly record struct TiltPool(double Mean, double MeanVariance, double Variation)
{
    // No dike is flatter than this: half a degree from stretch to stretch is assumed even when the fits agree better.
    private const double LeastVariation = 0.0087 * 0.0087;

    /// <summary>Pools fits of stretches that do not overlap; null with fewer than two.</summary>
    public static TiltPool? Of(IReadOnlyList<StretchFit> fits)
    {
        if (fits.Count < 2) return null;
        double w = 0, ww = 0, mean = 0;
        foreach (StretchFit f in fits)
        {
            w += 1 / f.TiltVariance;
            ww += 1 / (f.TiltVariance * f.TiltVariance);
            mean += f.Tilt / f.TiltVariance;
        }

        mean /= w;
        double q = fits.Sum(f => (f.Tilt - mean) * (f.Tilt - mean) / f.TiltVariance);
        double variation = Math.Max(LeastVariation, (q - (fits.Count - 1)) / (w - (ww / w)));
        double precision = fits.Sum(f => 1 / (f.TiltVariance + variation));
        return new TiltPool(fits.Sum(f => f.Tilt / (f.TiltVariance + variation)) / precision, 1 / precision, variation);
    }

    /// <summary>A fit drawn toward the mean as far as the variation allows.</summary>
    public StretchFit Steady(StretchFit fit)
    {
        // Weight k of the stretch's own tilt. The stretch is part of the mean; taking the mean as independent of it would
        // count it twice, so the mean's error enters with the full share (1 - k).
        double prior = Variation + MeanVariance, k = prior / (prior + fit.TiltVariance);
        double variance = 1 / ((1 / fit.TiltVariance) + (1 / prior));
        return fit with { Tilt = Mean + (k * (fit.Tilt - Mean)), TiltVariance = variance, SlopeTilt = fit.SlopeTilt * k };
    }
}
