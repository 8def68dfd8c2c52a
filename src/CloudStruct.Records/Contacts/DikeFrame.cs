using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Contacts;

/// <summary>A dike's own coordinates: the centre line on which chainage counts, and the normal along it.</summary>
public sealed record DikeFrame
{
    /// <summary>Number of the dike.</summary>
    public int Dike { get; init; }

    /// <summary>Centre line, local [m]; increasing chainage runs toward azimuths 0 ≤ a &lt; 180.</summary>
    public Vec3[] CentreLine { get; init; } = [];

    /// <summary>Chainage of each vertex [m].</summary>
    public double[] ChainageM { get; init; } = [];

    /// <summary>Unit normal of the dike at each vertex, pointing from A to B; for a line-only dike horizontal across the trace.</summary>
    public Vec3[] Normal { get; init; } = [];

    /// <summary>One-sigma of the normal at each vertex about the dike's trend (tilt of the dip) [deg]; 90 where unconstrained.</summary>
    public double[] DipSigmaDeg { get; init; } = [];

    /// <summary>Whether strike and dip are fixed at each vertex.</summary>
    public Constraint[] Constraint { get; init; } = [];

    /// <summary>True when A is the lower side (dip below 30 deg).</summary>
    public bool AIsLower { get; init; }

    /// <summary>Length along strike over which attitudes were fitted [m].</summary>
    public double WindowM { get; init; }

    /// <summary>Scatter of trace points about smooth margins, one standard deviation [m].</summary>
    public double TraceScatterM { get; init; }

    /// <summary>Distance along the margin over which that scatter is alike (to 1/e) [m].</summary>
    public double TraceRangeM { get; init; }

    /// <summary>Share of the variance of the scatter that neighbouring trace points do not share.</summary>
    public double TraceWhiteShare { get; init; }

    /// <summary>Correlation of the undulation between facing places of the two margins.</summary>
    public double TraceShared { get; init; }

    /// <summary>Undulation of a margin about its mean plane, one standard deviation [m].</summary>
    public double WaveM { get; init; }

    /// <summary>Length of its Matérn law of smoothness 3/2: about a fifth of a wavelength [m].</summary>
    public double WaveRangeM { get; init; }
}
