using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Points;

/// <summary>What the intake found, and what it does to every point that streams into the survey frame. Small: it holds no points.</summary>
public sealed record IntakeRecord
{
    /// <summary>The survey frame.</summary>
    public SurveyFrame Frame { get; init; } = new();

    /// <summary>One per source, in their order.</summary>
    public TileFix[] Tiles { get; init; } = [];

    /// <summary>Metres per file unit, x and y.</summary>
    public double HorizontalUnitM { get; init; } = 1;

    /// <summary>Metres per file unit, z.</summary>
    public double VerticalUnitM { get; init; } = 1;

    /// <summary>Axes as in <see cref="SurveyInput.Axes"/>.</summary>
    public string Axes { get; init; } = "x y z";

    /// <summary>Offset added after axes and units [m].</summary>
    public Vec3 OffsetM { get; init; }

    /// <summary>Points outside this box (local metres) are dropped as far outliers.</summary>
    public Vec3 BoxMin { get; init; }

    /// <summary>See <see cref="BoxMin"/>.</summary>
    public Vec3 BoxMax { get; init; }

    /// <summary>True when every file that is kept holds colour.</summary>
    public bool HasColour { get; init; }

    /// <summary>Points kept.</summary>
    public long Points { get; init; }

    /// <summary>Typical distance between neighbouring input points on the surface [m].</summary>
    public double InputSpacingM { get; init; }

    /// <summary>Overlap cells that go to one tile only: sorted keys of <see cref="OwnerCellM"/> columns and the tile that
    /// keeps its points there; columns not listed keep all.</summary>
    public long[] OwnerKeys { get; init; } = [];

    /// <summary>Tile numbers beside <see cref="OwnerKeys"/>.</summary>
    public int[] OwnerTiles { get; init; } = [];

    /// <summary>Edge of an overlap column [m].</summary>
    public double OwnerCellM { get; init; }

    /// <summary>Numbers of places at which more than one point lies, sorted: only the first point at each is kept.</summary>
    public long[] DoubledKeys { get; init; } = [];

    /// <summary>Residuals at control points.</summary>
    public ControlResidual[] Control { get; init; } = [];
}
