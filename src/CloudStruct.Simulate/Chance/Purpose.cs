namespace CloudStruct.Simulate.Chance;

/// <summary>What random numbers are drawn for: each use has its own streams, so that one more draw here moves nothing there.</summary>
internal enum Purpose
{
    Plan,
    Terrain,
    HostJoints,
    DikeJoints,
    Samples,
    Blocks,
    Dike,
    Cover,
    Loose,
    Cameras,
    Pixels,
    Noise,
    White,
    Stray,
    Colour,
    Keep,
    Inclusions,
    Labels,
    Scanlines,
    Model,
}
