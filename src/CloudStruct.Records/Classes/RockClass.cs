namespace CloudStruct.Records.Classes;

/// <summary>What a point is; the numbers are those of classified.las (user range of LAS 1.4).</summary>
public enum RockClass : byte
{
    /// <summary>Not decided (stray points, too few neighbours).</summary>
    Unknown = 1,

    /// <summary>Host rock in place.</summary>
    Host = 64,

    /// <summary>Dike rock in place.</summary>
    Dike = 65,

    /// <summary>Vegetation, soil, water, snow: what hides the rock.</summary>
    Cover = 66,

    /// <summary>A clast in the dike.</summary>
    Inclusion = 67,

    /// <summary>Rock out of place: scree, moved blocks.</summary>
    Loose = 68,
}
