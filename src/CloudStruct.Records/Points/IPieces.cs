namespace CloudStruct.Records.Points;

/// <summary>Cloud pieces in the survey frame: a stream that can be started again, with the intake's findings.</summary>
public interface IPieces
{
    /// <summary>What the intake found.</summary>
    IntakeRecord Record { get; }

    /// <summary>Kept points in file order, tile after tile. The caller disposes of each block.</summary>
    IEnumerable<PointBlock> Read(CancellationToken stop);
}
