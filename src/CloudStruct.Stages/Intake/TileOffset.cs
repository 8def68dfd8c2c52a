namespace CloudStruct.Stages.Intake;

/// <summary>How much higher one file shows the ground than another.</summary>
/// <param name="A">Number of the first file.</param>
/// <param name="B">Number of the second file.</param>
/// <param name="OffsetM">Height in B minus height in A [m].</param>
/// <param name="SigmaM">Its standard error [m].</param>
/// <param name="Cells">Cells compared.</param>
internal sealed record TileOffset(int A, int B, double OffsetM, double SigmaM, int Cells);
