namespace CloudStruct.Runs;

/// <summary>What the command line asks of a run.</summary>
internal sealed record MeasureRequest
{
    /// <summary>Survey folder, bare folder or file.</summary>
    public required string Survey { get; init; }

    /// <summary>Where results go; null: the survey's usual place.</summary>
    public string? Out { get; init; }

    /// <summary>Recipe by name or file; null: the survey's, else the usual one.</summary>
    public string? Recipe { get; init; }

    /// <summary>Workers.</summary>
    public int Threads { get; init; } = Environment.ProcessorCount;

    /// <summary>Memory budget [GiB]; null: 60 % of the machine.</summary>
    public double? MemoryGib { get; init; }

    /// <summary>Seed.</summary>
    public ulong Seed { get; init; } = 1;

    /// <summary>Folder of the stage store; null: beside the results.</summary>
    public string? Cache { get; init; }

    /// <summary>Compute everything anew.</summary>
    public bool Fresh { get; init; }
}
