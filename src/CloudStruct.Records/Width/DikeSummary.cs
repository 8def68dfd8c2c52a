using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Width;

/// <summary>One row of dikes.csv: what goes into a paper.</summary>
public sealed record DikeSummary
{
    /// <summary>Number of the dike.</summary>
    public int Dike { get; init; }

    /// <summary>Mean attitude over the constrained part; null when nothing fixes the dip.</summary>
    public Attitude? Mean { get; init; }

    /// <summary>Upward normal of the mean attitude, grid frame.</summary>
    public Vec3? Normal { get; init; }

    /// <summary>Region of the mean pole.</summary>
    public PoleRegion? Region { get; init; }

    /// <summary>Mean trend of the centre line, 0 to 180, always known [deg].</summary>
    public double TrendDeg { get; init; }

    /// <summary>Length where both margins show [m].</summary>
    public double SeenLengthM { get; init; }

    /// <summary>Length between the ends where a margin is hidden [m].</summary>
    public double HiddenLengthM { get; init; }

    /// <summary>Mean true width; null when nothing was measured.</summary>
    public Estimate? WidthMeanM { get; init; }

    /// <summary>Median true width.</summary>
    public Estimate? WidthMedianM { get; init; }

    /// <summary>Smallest true width of a station.</summary>
    public Estimate? WidthMinM { get; init; }

    /// <summary>Largest true width of a station.</summary>
    public Estimate? WidthMaxM { get; init; }

    /// <summary>Stations measured.</summary>
    public int Measured { get; init; }

    /// <summary>Number of independent stations they are worth.</summary>
    public double? NEffective { get; init; }

    /// <summary>Window along strike [m].</summary>
    public double WindowM { get; init; }

    /// <summary>Seen and hidden length over mean width: a lower bound.</summary>
    public double? AspectRatioMin { get; init; }

    /// <summary>Thinnest dike that would have been seen [m].</summary>
    public double ThinnestDikeM { get; init; }

    /// <summary>Laws fitted to the widths of the stations, in the order of their kinds; empty with too few stations.</summary>
    public ThicknessLaw[] Laws { get; init; } = [];

    /// <summary>Steps of the width; null when there were too few stations to look for any.</summary>
    public int? Steps { get; init; }

    /// <summary>Even change of the true width per metre of chainage; null when there were too few stations.</summary>
    public Estimate? Trend { get; init; }
}
