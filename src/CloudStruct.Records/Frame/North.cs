namespace CloudStruct.Records.Frame;

/// <summary>Which north the azimuths of a table refer to.</summary>
public enum North
{
    /// <summary>True north: grid azimuth plus meridian convergence.</summary>
    True,

    /// <summary>The y axis of the map grid.</summary>
    Grid,

    /// <summary>The y axis of a model that nothing ties to the ground.</summary>
    Model,
}
