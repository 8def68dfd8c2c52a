namespace CloudStruct.Records.Stages;

/// <summary>What a stage is given beside its input and settings.</summary>
/// <param name="Seed">Seed of the run; draw from (seed, stage, item), never from a shared stream.</param>
/// <param name="Threads">Number of workers; never changes a result.</param>
/// <param name="Say">Takes remarks.</param>
/// <param name="Progress">Takes the share done, 0 to 1; may be called from any worker; never affects the result.</param>
/// <param name="Stop">Cancelled on Ctrl-C; long loops check it.</param>
public sealed record StageContext(ulong Seed, int Threads, Action<Remark> Say, Action<double> Progress, CancellationToken Stop)
{
    /// <summary>A context for tests and tools: two threads, remarks dropped.</summary>
    public static StageContext Plain(ulong seed = 1, int threads = 2, Action<Remark>? say = null) =>
        new(seed, threads, say ?? (_ => { }), _ => { }, CancellationToken.None);
}
