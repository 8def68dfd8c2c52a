namespace CloudStruct.Runs;

/// <summary>The cautions that go with every result.</summary>
internal static class Cautions
{
    /// <summary>One sentence each.</summary>
    public static string[] Sentences { get; } =
    [
        "Measurements from a model do not replace inspection by a competent person.",
        "Steep and broken ground can fall: keep away from the foot and the edge of rock faces.",
        "Drone flights, access to sites, heritage and drilling need the permissions of local law.",
        "Nothing here is a stability assessment or an engineering design; for these local codes and a licensed practitioner decide.",
        "Intervals are calibrated in simulation; two flights of one outcrop have not been compared.",
    ];
}
