using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Drawings;

/// <summary>Settings of the stage drawings.</summary>
public sealed record DrawingSettings : IStageSettings
{
    /// <summary>Whether stereonets carry density contours.</summary>
    public bool Contours { get; init; } = true;

    /// <summary>Whether pictures of the cloud are made.</summary>
    public bool Pictures { get; init; } = true;

    /// <summary>Longer side of a picture of the cloud [pixels]. Clouds with few points give smaller pictures.</summary>
    public int PictureSizePx { get; init; } = 1600;

    /// <summary>Points at most in views in three dimensions: the model and the report.</summary>
    public int ViewPoints { get; init; } = 250_000;

    /// <inheritdoc/>
    public IEnumerable<SettingComplaint> Check()
    {
        if (PictureSizePx is < 200 or > 8000) yield return new("drawings.picture_size_px", Invariant($"{PictureSizePx}"), "must be 200 to 8000");
        if (ViewPoints is < 0 or > 5_000_000) yield return new("drawings.view_points", Invariant($"{ViewPoints}"), "must be 0 to 5000000");
    }
}
