namespace CloudStruct.Stages.Classify;

/// <summary>Patches of rock about a sheet, sorted by s, in the sheet's own coordinates.</summary>
/// <param name="Patch">The patches.</param>
/// <param name="Fold">Fold of each, by stretches along strike.</param>
/// <param name="S">Along strike [m].</param>
/// <param name="V">In the plane, square to strike [m].</param>
/// <param name="T">Along the normal [m].</param>
internal sealed record Corridor(int[] Patch, int[] Fold, double[] S, double[] V, double[] T)
{
    public SheetFitter Fitter(Patches patches, float[] odds, int threads)
    {
        var area = new float[Patch.Length];
        for (int i = 0; i < area.Length; i++) area[i] = patches.AreaM2[Patch[i]];
        return new SheetFitter(patches.SizeM, S, V, T, odds, area, threads);
    }
}
