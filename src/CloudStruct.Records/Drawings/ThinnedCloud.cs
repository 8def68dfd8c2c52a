namespace CloudStruct.Records.Drawings;

/// <summary>So many of the working points, evenly over the surface, as a view in three dimensions can carry.</summary>
public sealed record ThinnedCloud
{
    /// <summary>East, local [m].</summary>
    public float[] X { get; init; } = [];

    /// <summary>North, local [m].</summary>
    public float[] Y { get; init; } = [];

    /// <summary>Up, local [m].</summary>
    public float[] Z { get; init; } = [];

    /// <summary>Red, green, blue, three bytes a point; light greys by relief where the cloud has no colour.</summary>
    public byte[] Rgb { get; init; } = [];

    /// <summary>Class (values of RockClass); empty when points have none.</summary>
    public byte[] Class { get; init; } = [];

    /// <summary>Place of the face of each point in its list, counted from 1; 0 none; empty without faces.</summary>
    public int[] Face { get; init; } = [];

    /// <summary>Distance of neighbouring points [m].</summary>
    public double SpacingM { get; init; }
}
