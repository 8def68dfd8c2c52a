using CloudStruct.Records.Drawings;

namespace CloudStruct.Runs;

/// <summary>What a run ended with.</summary>
/// <param name="ExitCode">0 done, 4 done in part.</param>
/// <param name="Folder">The results, full path.</param>
/// <param name="RunId">Id of the run.</param>
/// <param name="Findings">What was found.</param>
/// <param name="Files">Files written, relative to the folder.</param>
/// <param name="LeftOut">Files that were left out as damaged, with the reason.</param>
/// <param name="Times">Times per stage.</param>
/// <param name="NotKept">Why stage results were not kept; null when they were.</param>
/// <param name="PeakGib">Peak working set, native parts included [GiB].</param>
internal sealed record MeasureOutcome(
    int ExitCode, string Folder, string RunId, Findings Findings, string[] Files, string[] LeftOut, StageTime[] Times, double PeakGib, string? NotKept);
