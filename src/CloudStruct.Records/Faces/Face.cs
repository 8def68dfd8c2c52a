using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Faces;

/// <summary>One exposed planar piece of rock surface.</summary>
public sealed record Face
{
    /// <summary>Number above 0 that follows from place and attitude, so that it outlives changed settings; no two faces of a
    /// survey share one. Not the position in <see cref="FaceSet.Faces"/>.</summary>
    public int FaceId { get; init; }

    /// <summary>Middle of the covered surface, local [m].</summary>
    public Vec3 Middle { get; init; }

    /// <summary>Upward unit normal, grid frame.</summary>
    public Vec3 Normal { get; init; }

    /// <summary>Strike and dip about the stated north.</summary>
    public Attitude Attitude { get; init; }

    /// <summary>Region of the pole.</summary>
    public PoleRegion Region { get; init; } = new();

    /// <summary>Covered surface [m²].</summary>
    public double AreaM2 { get; init; }

    /// <summary>Extent along strike [m].</summary>
    public double LengthM { get; init; }

    /// <summary>Extent along dip [m].</summary>
    public double HeightM { get; init; }

    /// <summary>Rms distance of its points from the plane [m].</summary>
    public double RmsM { get; init; }

    /// <summary>White and short-range part of the scatter [m].</summary>
    public double NoiseM { get; init; }

    /// <summary>Long-range part of the scatter: geology, not error [m].</summary>
    public double WavinessM { get; init; }

    /// <summary>Working points.</summary>
    public int Points { get; init; }

    /// <summary>Whether the rock is in place.</summary>
    public InPlace InPlace { get; init; } = InPlace.Unknown;

    /// <summary>Number of its two ends along strike that run out of sight (0, 1 or 2): no rock or ground goes on from the face there.
    /// Null when not determined.</summary>
    public int? EndsHidden { get; init; }

    /// <summary>Outline on the plane, local [m], closed (first equals last), counter-clockwise seen against the normal.</summary>
    public Vec3[] Outline { get; init; } = [];
}
