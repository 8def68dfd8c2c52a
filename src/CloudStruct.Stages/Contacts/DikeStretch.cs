namespace CloudStruct.Stages.Contacts;

/// <summary>What was found at one vertex of a dike's centre line.</summary>
/// <param name="S">Along the sheet [m].</param>
/// <param name="Fits">Plane of A, of B, and midway between; null where there was too little.</param>
/// <param name="Both">Whether both margins took part.</param>
/// <param name="Passes">Whether the traces about this place pass the gates of a dip by themselves.</param>
internal sealed record DikeStretch(double S, StretchFit?[] Fits, bool Both, bool Passes)
{
    /// <summary>The plane midway; null when there is none.</summary>
    public StretchFit? Chosen => Fits[2];
}
