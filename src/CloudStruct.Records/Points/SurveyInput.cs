using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Points;

/// <summary>A survey as found on disk, before anything is computed: what the intake takes.</summary>
public sealed record SurveyInput
{
    /// <summary>Name of the survey.</summary>
    public string Name { get; init; } = "";

    /// <summary>The clouds, sorted by name.</summary>
    public IPointSource[] Sources { get; init; } = [];

    /// <summary>Coordinate system that rules (survey.yaml before the files).</summary>
    public CrsInfo Crs { get; init; } = CrsInfo.None;

    /// <summary>Meridian convergence at a place in map coordinates (CRS units), in degrees; null when it cannot be computed.</summary>
    public Func<double, double, double?> Convergence { get; init; } = (_, _) => null;

    /// <summary>North wanted for the tables; the intake falls back to grid and says so.</summary>
    public North North { get; init; } = North.True;

    /// <summary>Metres per file unit given by hand; null: from the CRS, else 1.</summary>
    public double? UnitM { get; init; }

    /// <summary>Offset added to file coordinates [m], from survey.yaml.</summary>
    public Vec3 OffsetM { get; init; }

    /// <summary>Order and sign of axes in the files: "x y z" (default), "x -z y" for y-up models, ...</summary>
    public string Axes { get; init; } = "x y z";

    /// <summary>What ties the model to the ground.</summary>
    public ModelReference Reference { get; init; } = new();

    /// <summary>Control points; empty when none.</summary>
    public ControlPoint[] Control { get; init; } = [];
}
