using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Intake;

/// <summary>Joins files that overlap: removes their height offsets and gives each shared column to one file.</summary>
/// <remarks>One file per place rather than both: two photogrammetric models of one face differ by centimetres that hang
/// together over decimetres, so both together look like rough rock with two surfaces. The price is a seam of that height
/// where ownership changes.</remarks>
internal static class TileJoin
{
    private const double CellSpacings = 12;
    private const double WorthSayingM = 0.002;
    private const double DoubtfulM = 0.1;

    /// <summary>The record with shifts and owners filled in; the files are read once more for the heights.</summary>
    /// <param name="input">The survey.</param>
    /// <param name="record">What is known so far.</param>
    /// <param name="ground">Shared ground.</param>
    /// <param name="middles">Middle of each file, local [m].</param>
    /// <param name="context">Takes remarks.</param>
    public static IntakeRecord Join(SurveyInput input, IntakeRecord record, SharedGround ground, Vec3[] middles, StageContext context)
    {
        List<(long Column, int[] Tiles)> shared = ground.Shared();
        if (shared.Count == 0) return record;
        var heights = new TileHeights(CellSpacings * record.InputSpacingM, shared.Select(s => s.Column), ground.EdgeM);
        foreach (PointBlock block in new Pieces(input, record).Read(context.Stop))
        {
            using (block) heights.Add(block);
        }

        List<TileOffset> offsets = heights.Offsets();
        double[] shifts = TileShifts.Of([.. offsets.Where(IsReal)], input.Sources.Length);
        foreach (TileOffset o in offsets.Where(IsReal)) Say(o, o.OffsetM + shifts[o.B] - shifts[o.A], record, context);
        (long[] keys, int[] owners) = ground.Owners(middles);
        context.Say(new Remark(
            "intake",
            Invariant($"Files overlap on about {shared.Count * ground.EdgeM * ground.EdgeM:0.#} m2 of ground; each place was taken from one file only."),
            false));
        return record with
        {
            Tiles = [.. record.Tiles.Select((t, i) => t with { ShiftZM = shifts[i] })],
            OwnerKeys = keys,
            OwnerTiles = owners,
            OwnerCellM = ground.EdgeM,
        };
    }

    // An offset within its own error is none: files that fit are left as they are.
    private static bool IsReal(TileOffset o) => Math.Abs(o.OffsetM) > Math.Max(WorthSayingM, 2.5 * o.SigmaM);

    private static void Say(TileOffset o, double leftM, IntakeRecord record, StageContext context)
    {
        bool contradicted = Math.Abs(leftM) > Math.Max(WorthSayingM, 3 * o.SigmaM);
        string but = contradicted ? Invariant($", but for {leftM:0.000} m that the other files contradict") : "";
        context.Say(new Remark(
            "intake",
            Invariant($"{record.Tiles[o.B].Name} shows the ground {Math.Abs(o.OffsetM):0.000} m {(o.OffsetM > 0 ? "higher" : "lower")} than {record.Tiles[o.A].Name} (± {1.96 * o.SigmaM:0.000} m, from {o.Cells} cells). The offset was removed{but}."),
            contradicted || Math.Abs(o.OffsetM) > DoubtfulM));
    }
}
