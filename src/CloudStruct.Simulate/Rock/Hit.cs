using CloudStruct.Records.Frame;

namespace CloudStruct.Simulate.Rock;

/// <summary>What a ray meets first.</summary>
internal readonly record struct Hit
{
    /// <summary>Kinds of surface.</summary>
    public enum Kinds : byte
    {
        /// <summary>A joint plane of host or dike.</summary>
        Plane,

        /// <summary>A margin of a dike.</summary>
        Margin,

        /// <summary>Soil, scree or a planed surface.</summary>
        Sheet,

        /// <summary>A loose block.</summary>
        Loose,
    }

    /// <summary>Distance along the ray [m].</summary>
    public double T { get; init; }

    /// <summary>Kind of surface.</summary>
    public Kinds Kind { get; init; }

    /// <summary>Rock behind the surface: 0 host, else number of the dike.</summary>
    public int Rock { get; init; }

    /// <summary>Plane in the tree of its rock; for a margin 2 · (dike - 1) + side; for a loose block 8 · block + side.</summary>
    public int Surface { get; init; }

    /// <summary>Unit normal out of the rock, toward the ray's start.</summary>
    public Vec3 Normal { get; init; }
}
