namespace CloudStruct.Simulate;

/// <summary>A stretch along strike where a margin cannot be seen in the cloud.</summary>
/// <param name="FromM">Chainage where it begins [m].</param>
/// <param name="ToM">Chainage where it ends [m].</param>
/// <param name="A">Margin A is hidden.</param>
/// <param name="B">Margin B is hidden.</param>
public sealed record HiddenStretch(double FromM, double ToM, bool A, bool B);
