namespace CloudStruct.Maths.Fitting;

/// <summary>Distances at which a covariance is tabulated: 0, then growing by a constant factor.</summary>
/// <remarks>A pair at any distance is shared between the two nearest entries, so that sums over pairs times the tabulated
/// covariance equal the sum over pairs of the piecewise linear covariance.</remarks>
public sealed class LagBins
{
    private const double Factor = 1.25;
    private static readonly double LogFactor = Math.Log(Factor);

    /// <summary>Entries from 0 over the first distance to beyond the last.</summary>
    /// <param name="firstM">Smallest distance that matters, above 0 [m].</param>
    /// <param name="lastM">Largest distance [m].</param>
    public LagBins(double firstM, double lastM)
    {
        int count = 2 + Math.Max(1, (int)Math.Ceiling(Math.Log(Math.Max(1.01, lastM / firstM)) / LogFactor));
        DistanceM = new double[count];
        for (int i = 1; i < count; i++) DistanceM[i] = firstM * Math.Pow(Factor, i - 1);
    }

    /// <summary>The tabulated distances, ascending from 0 [m].</summary>
    public double[] DistanceM { get; }

    /// <summary>Number of entries.</summary>
    public int Count => DistanceM.Length;

    /// <summary>Entry below a distance, and the share that belongs to the entry above it.</summary>
    public (int Bin, double UpperShare) Place(double distanceM)
    {
        if (distanceM < DistanceM[1]) return (0, distanceM / DistanceM[1]);
        int bin = Math.Min(Count - 2, 1 + (int)(Math.Log(distanceM / DistanceM[1]) / LogFactor));
        double share = (distanceM - DistanceM[bin]) / (DistanceM[bin + 1] - DistanceM[bin]);
        return (bin, Math.Clamp(share, 0, 1));
    }
}
