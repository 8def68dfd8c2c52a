namespace CloudStruct.Maths.Fitting;

/// <summary>How well each law of error explains one patch, and what it says about the patch's slopes. One entry per law.</summary>
public sealed class NoiseLikelihood
{
    /// <summary>Room for so many laws.</summary>
    public NoiseLikelihood(int laws)
    {
        Log = new double[laws];
        Freedom = new double[laws];
        Variance = new double[laws];
        SlopeU = new double[laws];
        SlopeV = new double[laws];
        SlopeUv = new double[laws];
    }

    /// <summary>Log likelihood, the variance integrated out.</summary>
    public double[] Log { get; }

    /// <summary>Degrees of freedom of the variance.</summary>
    public double[] Freedom { get; }

    /// <summary>Variance of the errors [m²].</summary>
    public double[] Variance { get; }

    /// <summary>Variance of the slope along the first axis [rad²].</summary>
    public double[] SlopeU { get; }

    /// <summary>Variance of the slope along the second axis [rad²].</summary>
    public double[] SlopeV { get; }

    /// <summary>Covariance of the two slopes [rad²].</summary>
    public double[] SlopeUv { get; }

    /// <summary>Probabilities of the laws under a prior; they sum to 1.</summary>
    /// <param name="logPrior">Log probability of each law.</param>
    public double[] Posterior(double[] logPrior)
    {
        var p = new double[Log.Length];
        double most = double.NegativeInfinity, sum = 0;
        for (int c = 0; c < p.Length; c++) most = Math.Max(most, p[c] = Log[c] + logPrior[c]);
        for (int c = 0; c < p.Length; c++) sum += p[c] = Math.Exp(p[c] - most);
        for (int c = 0; c < p.Length; c++) p[c] /= sum;
        return p;
    }
}
