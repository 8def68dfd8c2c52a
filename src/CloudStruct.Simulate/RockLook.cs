namespace CloudStruct.Simulate;

/// <summary>Colour and grain of a rock, as linear reflectance (0 to 1) and texture strengths.</summary>
/// <param name="Red">Reflectance in red.</param>
/// <param name="Green">Reflectance in green.</param>
/// <param name="Blue">Reflectance in blue.</param>
/// <param name="Grain">Relative change of brightness from grain to grain.</param>
/// <param name="Mottle">Relative change of brightness and hue over decimetres.</param>
/// <param name="Banding">Relative change of brightness from band to band; 0 for a massive rock.</param>
/// <param name="RoughnessM">Relief of the joint faces themselves, one standard deviation over 3 cm [m].</param>
public sealed record RockLook(double Red, double Green, double Blue, double Grain, double Mottle, double Banding, double RoughnessM)
{
    /// <summary>Distance over which bands change [m].</summary>
    public double BandM { get; init; } = 0.11;

    /// <summary>Light grey to pinkish banded gneiss.</summary>
    public static RockLook Gneiss { get; } = new(0.36, 0.32, 0.28, 0.16, 0.13, 0.10, 0.003);

    /// <summary>Dark grey-green dolerite.</summary>
    public static RockLook Dolerite { get; } = new(0.15, 0.155, 0.145, 0.10, 0.11, 0, 0.0012);

    /// <summary>A dike rock hardly darker than the gneiss.</summary>
    public static RockLook PaleDolerite { get; } = new(0.275, 0.262, 0.238, 0.12, 0.12, 0, 0.0012);

    /// <summary>Colour of the gneiss, grain of the dolerite: only texture tells them apart.</summary>
    public static RockLook GneissColouredDolerite { get; } = Gneiss with { Banding = 0, RoughnessM = 0.0008 };
}
