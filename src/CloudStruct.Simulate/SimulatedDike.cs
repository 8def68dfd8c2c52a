using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Rock;

namespace CloudStruct.Simulate;

/// <summary>The truth about one dike. Places are map coordinates; directions are in the grid frame.</summary>
/// <remarks>Chainage increases toward azimuths 0 ≤ a &lt; 180; A is on the left, B on the right. Positive distances point from A to B.</remarks>
public sealed class SimulatedDike
{
    private readonly DikeSheet sheet;
    private readonly Vec3 origin;

    internal SimulatedDike(DikeSheet sheet, Vec3 origin)
    {
        this.sheet = sheet;
        this.origin = origin;
    }

    /// <summary>1, 2, ...</summary>
    public int Number => sheet.Number;

    /// <summary>Level unit vector along the mean strike, toward increasing chainage.</summary>
    public Vec3 Along => sheet.Along;

    /// <summary>Unit normal of the mean plane, from A to B.</summary>
    public Vec3 Normal => sheet.Across;

    /// <summary>Stretches along strike where one margin or both cannot be seen, in order of chainage.</summary>
    public HiddenStretch[] Hidden { get; internal init; } = [];

    /// <summary>Stretch of chainage over which the outcrop shows the dike or its cover [m].</summary>
    public (double FromM, double ToM) Extent { get; internal init; }

    /// <summary>Centre line on the surface every quarter metre of chainage, where points lie: map coordinates.</summary>
    public Vec3[] CentreLine { get; internal init; } = [];

    /// <summary>Distance along the mean strike from the middle of the outcrop [m].</summary>
    public double ChainageAt(Vec3 place) => sheet.Inside(place - origin).S;

    /// <summary>Signed distance from margin A, positive toward B [m]: positive inside the dike.</summary>
    public double SignedFromA(Vec3 place) => sheet.SignedDistance(0, place - origin);

    /// <summary>Signed distance from margin B, positive away from the dike [m]: negative inside.</summary>
    public double SignedFromB(Vec3 place) => sheet.SignedDistance(1, place - origin);

    /// <summary>Whether a place lies between the margins.</summary>
    public bool Contains(Vec3 place) => sheet.Contains(place - origin);

    /// <summary>True width along the local mean normal [m].</summary>
    public double WidthAt(Vec3 place) => sheet.WidthAt(place - origin);

    /// <summary>Unit normal from A to B, mean of the two margins beside a place, waves and bend included.</summary>
    public Vec3 NormalAt(Vec3 place) => sheet.MeanNormal(place - origin);

    /// <summary>Unit normal of margin A (0) or B (1) beside a place, from A to B.</summary>
    public Vec3 MarginNormalAt(int side, Vec3 place)
    {
        (double s, double v, _) = sheet.Inside(place - origin);
        return sheet.MarginNormal(side, s, v);
    }

    /// <summary>Whether either margin is hidden at a chainage.</summary>
    public bool IsHidden(double chainageM) => Array.Exists(Hidden, h => chainageM >= h.FromM && chainageM <= h.ToM);
}
