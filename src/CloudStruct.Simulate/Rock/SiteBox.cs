namespace CloudStruct.Simulate.Rock;

/// <summary>A rectangle of site coordinates.</summary>
internal readonly record struct SiteBox(double FromA, double ToA, double FromB, double ToB)
{
    /// <summary>Shortens a ray to where one of its coordinates lies between two limits; false when nothing is left.</summary>
    /// <param name="at">Coordinate at the ray's start.</param>
    /// <param name="speed">Its change per metre of ray.</param>
    /// <param name="low">Lower limit.</param>
    /// <param name="high">Upper limit.</param>
    /// <param name="start">Start along the ray.</param>
    /// <param name="end">End along the ray.</param>
    public static bool Clip(double at, double speed, double low, double high, ref double start, ref double end)
    {
        if (Math.Abs(speed) < 1e-12) return at >= low && at <= high;
        double t0 = (low - at) / speed, t1 = (high - at) / speed;
        if (t0 > t1) (t0, t1) = (t1, t0);
        start = Math.Max(start, t0);
        end = Math.Min(end, t1);
        return start < end;
    }
}
