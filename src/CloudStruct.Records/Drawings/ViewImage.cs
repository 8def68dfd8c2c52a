namespace CloudStruct.Records.Drawings;

/// <summary>A picture of the cloud made by projecting its points, as raw pixels.</summary>
/// <param name="Name">File stem: "view-colour-plan", "view-classes-front".</param>
/// <param name="Title">Title.</param>
/// <param name="Width">Pixels.</param>
/// <param name="Height">Pixels.</param>
/// <param name="PixelM">Metres per pixel.</param>
/// <param name="Rgba">Row-major from the top, 4 bytes a pixel; alpha 0 where nothing was seen.</param>
/// <param name="Sentence">Plain sentence beneath: what is shown, looking which way.</param>
/// <param name="UpAzimuthDeg">Azimuth (stated north) that points up the sheet in a plan view; null in a front view.</param>
public sealed record ViewImage(
    string Name, string Title, int Width, int Height, double PixelM, byte[] Rgba, string Sentence, double? UpAzimuthDeg)
{
    /// <summary>What the colours stand for; empty for natural colour.</summary>
    public ViewKey[] Key { get; init; } = [];
}
