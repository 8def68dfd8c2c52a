using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Intake;

/// <summary>What the intake mends by itself.</summary>
public sealed record IntakeSettings : IStageSettings
{
    /// <summary>Whether points far outside the body of the cloud are dropped (and counted).</summary>
    public bool DropFarOutliers { get; init; } = true;

    /// <summary>Whether points that occur twice, in one file or in overlapping files, are kept once only.</summary>
    public bool DropDoubled { get; init; } = true;

    /// <summary>Whether overlapping files are brought to one height and each place of the overlap is taken from one file
    /// only. Switch it off when the files are layers that belong together and cover the same ground on purpose.</summary>
    public bool JoinTiles { get; init; } = true;

    /// <inheritdoc/>
    public IEnumerable<SettingComplaint> Check() => [];
}
