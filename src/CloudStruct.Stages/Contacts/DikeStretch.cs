namespace CloudStruct.Stages.Contacts;

/// <summary>What was found at one vertex of a dike's centre line.</summary>
/// <param name="S">Along the sheet [m].</param>
/// <param name="Fits">Fits of A alone, B alone, and both with a common normal; null where there was too little.</param>
/// <param name="Best">Index of the fit with the smallest cone.</param>
/// <param name="Passes">Whether that fit passes the gates by itself.</param>
internal sealed record DikeStretch(double S, StretchFit?[] Fits, int Best, bool Passes)
{
    /// <summary>The best fit; null when there is none.</summary>
    public StretchFit? Chosen => Best < 0 ? null : Fits[Best];
}
