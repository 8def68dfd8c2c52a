using CloudStruct.Records.Frame;
using YamlDotNet.RepresentationModel;

namespace CloudStruct.Runs;

/// <summary>What survey.yaml says.</summary>
internal sealed record SurveyNotes
{
    /// <summary>Name of the survey; the folder's name when not given.</summary>
    public string? Name { get; init; }

    /// <summary>EPSG code or WKT text that rules over the files.</summary>
    public string? Crs { get; init; }

    /// <summary>Ties to the ground.</summary>
    public ModelReference Reference { get; init; } = new();

    /// <summary>Magnetic declination [deg], east positive; for compass readings.</summary>
    public string? Declination { get; init; }

    /// <summary>How attitudes are written in sheets.</summary>
    public string? Notation { get; init; }

    /// <summary>Who flew.</summary>
    public string? Operator { get; init; }

    /// <summary>Day of the flight, yyyy-MM-dd.</summary>
    public string? FlightDate { get; init; }

    /// <summary>Licence of the data.</summary>
    public string? Licence { get; init; }

    /// <summary>How to cite the data.</summary>
    public string? Citation { get; init; }

    /// <summary>Recipe by name or file.</summary>
    public string? Recipe { get; init; }

    /// <summary>Settings over the recipe.</summary>
    public YamlMappingNode? Settings { get; init; }

    /// <summary>Offset added to file coordinates [m].</summary>
    public Vec3 OffsetM { get; init; }

    /// <summary>Order and sign of axes.</summary>
    public string Axes { get; init; } = "x y z";

    /// <summary>Metres per file unit; null when not given.</summary>
    public double? UnitM { get; init; }
}
