using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Comparing;

/// <summary>What a results folder says, read back from its tables: enough to hold it against something else.</summary>
public sealed record MeasuredResults
{
    /// <summary>Name for messages and figures: the survey's.</summary>
    public string Survey { get; init; } = "";

    /// <summary>Id of the run.</summary>
    public string RunId { get; init; } = "";

    /// <summary>North of the tables.</summary>
    public North North { get; init; }

    /// <summary>True azimuth minus grid azimuth [deg]; null when it is not known.</summary>
    public double? ConvergenceDeg { get; init; }

    /// <summary>Name of the coordinate system; empty when there is none.</summary>
    public string Crs { get; init; } = "";

    /// <summary>Faces in place, with normals in the grid frame.</summary>
    public MeasuredPlane[] Faces { get; init; } = [];

    /// <summary>Contact rows that state a plane.</summary>
    public MeasuredPlane[] Contacts { get; init; } = [];

    /// <summary>Stations with a measured width.</summary>
    public MeasuredWidth[] Widths { get; init; } = [];

    /// <summary>Degrees from grid to the north of the tables.</summary>
    public double TurnDeg => North == North.True ? ConvergenceDeg ?? 0 : 0;
}
