namespace CloudStruct.Maths.Rates;

/// <summary>Traces seen through a circular window: estimates that need no law of lengths and no correction for ends cut off.</summary>
/// <remarks>Mauldon 1998, Int. J. Rock Mech. Min. Sci. 35, 201-216; Mauldon, Dunne and Rohrbaugh 2001, J. Struct. Geol. 23, 247-258
/// (both from memory). Expected values: m counts ends inside, n meetings of traces with the circle.</remarks>
/// <param name="RadiusM">Radius of the window [m].</param>
/// <param name="Crossings">n.</param>
/// <param name="Ends">m; with 0 the mean length cannot be told (+∞).</param>
public readonly record struct CircularWindow(double RadiusM, double Crossings, double Ends)
{
    /// <summary>Traces per area [1/m²].</summary>
    public double Density => Ends / (2 * Math.PI * RadiusM * RadiusM);

    /// <summary>Trace length per area, P21 [1/m].</summary>
    public double Intensity => Crossings / (4 * RadiusM);

    /// <summary>Mean length of the traces [m].</summary>
    public double MeanLengthM => Ends > 0 ? Math.PI * RadiusM / 2 * (Crossings / Ends) : double.PositiveInfinity;
}
