namespace CloudStruct.Records.Frame;

/// <summary>How local floats relate to the survey's map coordinates, and which north its azimuths use.</summary>
public sealed record SurveyFrame
{
    /// <summary>Place of the local origin in the survey's coordinates, in metres (x and y times the unit factor).</summary>
    public Vec3 Origin { get; init; }

    /// <summary>The coordinate system.</summary>
    public CrsInfo Crs { get; init; } = CrsInfo.None;

    /// <summary>North of every azimuth that is written.</summary>
    public North North { get; init; } = North.Grid;

    /// <summary>Meridian convergence at the survey's middle [deg], positive east of the central meridian in the north;
    /// null when it cannot be computed.</summary>
    public double? ConvergenceDeg { get; init; }

    /// <summary>Degrees added to a grid azimuth to get an azimuth of the stated north: the convergence for true north, else 0.</summary>
    public double TurnDeg => North == North.True ? ConvergenceDeg ?? 0 : 0;

    /// <summary>Common errors of the model.</summary>
    public ModelReference Reference { get; init; } = new();

    /// <summary>Local place to map coordinates [m].</summary>
    public Vec3 ToMap(Vec3 local) => local + Origin;
}
