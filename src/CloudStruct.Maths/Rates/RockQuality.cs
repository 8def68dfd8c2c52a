namespace CloudStruct.Maths.Rates;

/// <summary>Rock quality designation (RQD): the share of a line in pieces of 0.1 m or longer [%].</summary>
public static class RockQuality
{
    /// <summary>From the frequency of fractures whose gaps follow an exponential law: 100 exp(-0.1 λ)(0.1 λ + 1).</summary>
    /// <param name="perMetre">Fractures per metre of line.</param>
    /// <remarks>Priest and Hudson 1976, Int. J. Rock Mech. Min. Sci. 13, 135-148.</remarks>
    public static double FromFrequency(double perMetre) => 100 * Math.Exp(-0.1 * perMetre) * ((0.1 * perMetre) + 1);

    /// <summary>From the volumetric joint count: 110 - 2.5 Jv, within 0 and 100.</summary>
    /// <param name="jointsPerM3">Joints per cubic metre.</param>
    /// <remarks>Palmstrom 2005, Tunn. Undergr. Space Technol. 20, 362-377 (coefficients from memory).</remarks>
    public static double FromJointCount(double jointsPerM3) => Math.Clamp(110 - (2.5 * jointsPerM3), 0, 100);
}
