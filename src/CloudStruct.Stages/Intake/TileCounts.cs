namespace CloudStruct.Stages.Intake;

/// <summary>What became of the points of one file.</summary>
internal struct TileCounts
{
    public long Kept, NotANumber, FarOutliers, Doubled, Overlapped;
}
