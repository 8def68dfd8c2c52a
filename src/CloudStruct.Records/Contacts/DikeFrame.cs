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
}
