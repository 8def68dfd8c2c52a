using CloudStruct.Records.Width;

namespace CloudStruct.Records.Drawings;

/// <summary>The rock in a thin vertical slice square to the dike at a station, seen along increasing chainage: A left, B right.</summary>
public sealed record CrossSection
{
    /// <summary>Number of the dike.</summary>
    public int Dike { get; init; }

    /// <summary>Number of the station.</summary>
    public int Station { get; init; }

    /// <summary>Whether this section is also drawn as a sheet of its own.</summary>
    public bool OnSheet { get; init; }

    /// <summary>Chainage [m].</summary>
    public double ChainageM { get; init; }

    /// <summary>Status of the station.</summary>
    public StationStatus Status { get; init; }

    /// <summary>Azimuth of the looking direction, about the stated north [deg].</summary>
    public double LookingDeg { get; init; }

    /// <summary>Thickness of the slice along the dike [m].</summary>
    public double SliceM { get; init; }

    /// <summary>Across the dike, level, positive toward B, from the station's place [m]; one a point.</summary>
    public float[] Across { get; init; } = [];

    /// <summary>Height in the survey's own heights [m] is this plus <see cref="HeightAtM"/>; one a point.</summary>
    public float[] Up { get; init; } = [];

    /// <summary>Class of each point.</summary>
    public byte[] Class { get; init; } = [];

    /// <summary>Colour of each point, three bytes; empty without colour.</summary>
    public byte[] Rgb { get; init; } = [];

    /// <summary>Height of the station's place, map heights [m].</summary>
    public double HeightAtM { get; init; }

    /// <summary>Where margin A was seen, as across and up; null when hidden.</summary>
    public Point2? AtA { get; init; }

    /// <summary>Where margin B was seen; null when hidden.</summary>
    public Point2? AtB { get; init; }

    /// <summary>Lean of the dike at the station [deg], positive when the top leans toward B; null when nothing fixes it.</summary>
    public double? LeanToBDeg { get; init; }

    /// <summary>Plain sentence beneath.</summary>
    public string Sentence { get; init; } = "";
}
