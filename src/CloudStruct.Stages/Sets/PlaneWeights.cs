namespace CloudStruct.Stages.Sets;

/// <summary>How much each plane counts.</summary>
internal static class PlaneWeights
{
    // The scatter of a common joint set. A plane known worse than that tells less about its set.
    private const double ScatterRad = 5 * Math.PI / 180;

    /// <summary>Weights, all above 0.</summary>
    /// <param name="planes">The planes.</param>
    /// <param name="weighting">The rule.</param>
    /// <param name="surface">The rock that was seen.</param>
    public static double[] Of(JointPlane[] planes, SetWeighting weighting, SurfaceCells surface) => weighting switch
    {
        SetWeighting.Area => [.. planes.Select(p => p.AreaM2)],
        SetWeighting.Count => [.. planes.Select(Certainty)],
        _ => [.. planes.Select(p => Certainty(p) * surface.Weight(p.Normal))],
    };

    private static double Certainty(JointPlane p) => ScatterRad * ScatterRad / ((ScatterRad * ScatterRad) + (p.ErrorRad * p.ErrorRad));
}
