using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Contacts;

namespace CloudStruct.Stages.Contacts;

/// <summary>How trace cells scatter about plane margins: errors of the cells, and undulation of the margins themselves.</summary>
/// <param name="Noise">Errors: a white part and one that neighbours on the same margin share.</param>
/// <param name="Shared">Correlation of the undulation between facing places of the two margins, 0 to 1.</param>
/// <param name="Wave">Variance of the undulation as a multiple of that of the errors.</param>
/// <param name="WaveRangeM">Length of its Matérn law of smoothness 3/2: about a fifth of a wavelength [m].</param>
/// <remarks>A margin seen along one line does not show its mean plane but one section through its waves. Cones that leave that
/// out held the truth in half of the windows. The waves are smooth (a Matérn law; an exponential one takes them for errors of
/// neighbouring cells and thinks that averaging removes them) and partly common to both margins, so that the second margin adds
/// less than its number of cells says. Cells on an exposed contact surface are means of a face's points and hardly err; with the
/// errors of the traces taken for theirs, and theirs for those of the traces, contact errors were 1.0 instead of 0.8 deg and
/// cones too narrow where traces alone stand for the margin.</remarks>
internal sealed record TraceNoise(CorrelatedNoise Noise, double Shared, double Wave, double WaveRangeM)
{
    // Variance of the error of a cell on a surface over that of a cell of a trace.
    private const double SurfaceShare = 0.06;

    private double WaveVariance => Noise.Sigma * Noise.Sigma * Wave;

    /// <summary>Standard deviation of the undulation [m].</summary>
    public double WaveM => Math.Sqrt(WaveVariance);

    /// <summary>Covariance matrix of cells, row-major, lower triangle.</summary>
    public double[] Covariance(IReadOnlyList<TraceCell> cells)
    {
        int n = cells.Count;
        var k = new double[n * n];
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < i; j++)
            {
                double d = Distance(cells[i].At.S - cells[j].At.S, cells[i].At.T - cells[j].At.T);
                double errors = cells[i].Margin != cells[j].Margin || cells[i].Surface || cells[j].Surface ? 0 : Noise.Covariance(d);
                k[(i * n) + j] = errors + (cells[i].Margin == cells[j].Margin ? WaveAt(d) : Shared * WaveAt(d));
            }

            k[(i * n) + i] = ((cells[i].Surface ? SurfaceShare : 1) * Noise.Variance()) + WaveVariance;
        }

        return k;
    }

    /// <summary>Covariance of the undulation of one margin between two places [m²].</summary>
    public double WaveAt(double distance) => WaveVariance * Correlation.At(CorrelationShape.Matern32, distance, WaveRangeM);

    internal static double Distance(double ds, double dt) => Math.Sqrt((ds * ds) + (dt * dt));
}
