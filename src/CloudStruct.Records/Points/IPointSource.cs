namespace CloudStruct.Records.Points;

/// <summary>A cloud that can be read from its start as often as needed, block by block. Implemented by Formats and by tests.</summary>
public interface IPointSource
{
    /// <summary>What the file says of itself; no point is read for it.</summary>
    CloudHeader Header { get; }

    /// <summary>Points in file order. The caller disposes of each block. Damage found on the way is an
    /// <see cref="Complaints.InputException"/>.</summary>
    IEnumerable<SourceBlock> Read(CancellationToken stop);
}
