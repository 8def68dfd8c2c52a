using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Drawings;

/// <summary>Settings of the stage drawings.</summary>
public sealed record DrawingSettings : IStageSettings
{
    /// <summary>Whether stereonets carry density contours.</summary>
    public bool Contours { get; init; } = true;

    /// <summary>Projection of the nets: equal_area (densities can be judged) or equal_angle (circles stay circles).</summary>
    public NetForm Net { get; init; } = NetForm.EqualArea;

    /// <summary>Whether each domain also has a net weighted for the exposure: planes that lie along the ground are seen rarely.</summary>
    public bool WeightedNets { get; init; } = true;

    /// <summary>Station whose cross-section is drawn as a sheet; 0 takes the measured station nearest the middle of each dike.</summary>
    public int SectionStation { get; init; }

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
        if (!Enum.IsDefined(Net)) yield return new("drawings.net", Invariant($"{(int)Net}"), "must be equal_area or equal_angle");
        if (SectionStation < 0) yield return new("drawings.section_station", Invariant($"{SectionStation}"), "must be 0 or the number of a station");
        if (ViewPoints is < 0 or > 5_000_000) yield return new("drawings.view_points", Invariant($"{ViewPoints}"), "must be 0 to 5000000");
    }
}
