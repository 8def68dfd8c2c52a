using CloudStruct.Records.Frame;

namespace CloudStruct.Simulate;

/// <summary>One connected, seen piece of a plane of the rock, as sampled.</summary>
public sealed record SimulatedFace
{
    /// <summary>1, 2, ... as in TrueFace.</summary>
    public int Id { get; init; }

    /// <summary>What it is.</summary>
    public FaceKind Kind { get; init; }

    /// <summary>Number of its dike (1, 2, ...); 0 in the host.</summary>
    public int Dike { get; init; }

    /// <summary>Unit normal out of the rock, grid frame: exact for planes, mean of the piece for a contact.</summary>
    public Vec3 Normal { get; init; }

    /// <summary>The plane: Normal · (place - origin) = OffsetM, in local coordinates.</summary>
    public double OffsetM { get; init; }

    /// <summary>Mean of its points, map coordinates.</summary>
    public Vec3 Middle { get; init; }

    /// <summary>Seen, connected area [m²].</summary>
    public double AreaM2 { get; init; }

    /// <summary>Points that carry its number.</summary>
    public int Points { get; init; }

    /// <summary>Rms of the noise-free surface about the plane [m]: 0 but for contacts.</summary>
    public double WaveRmsM { get; init; }

    /// <summary>Whether the rock is in place.</summary>
    public bool InPlace => Kind != FaceKind.LooseSide;
}
