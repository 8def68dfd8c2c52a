namespace CloudStruct.Runs;

/// <summary>How long a stage took.</summary>
/// <param name="Stage">Name.</param>
/// <param name="Seconds">Wall time [s].</param>
/// <param name="Cached">True when its result came from the store.</param>
internal sealed record StageTime(string Stage, double Seconds, bool Cached);
