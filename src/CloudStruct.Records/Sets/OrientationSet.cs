using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Width;

namespace CloudStruct.Records.Sets;

/// <summary>One row of sets.csv: a group of faces of like attitude.</summary>
public sealed record OrientationSet
{
    /// <summary>Domain and number in order of exposed area: "host-1".</summary>
    public string Set { get; init; } = "";

    /// <summary>Domain.</summary>
    public FaceDomain Domain { get; init; }

    /// <summary>Faces.</summary>
    public int Count { get; init; }

    /// <summary>Mean attitude: first eigenvector of the weighted orientation tensor of the poles.</summary>
    public Attitude Mean { get; init; }

    /// <summary>Upward normal of the mean, grid frame.</summary>
    public Vec3 Normal { get; init; }

    /// <summary>Fisher concentration about the mean axis.</summary>
    public double Kappa { get; init; }

    /// <summary>Half-angle of the 95 % cone of the mean [deg].</summary>
    public double Cone95Deg { get; init; }

    /// <summary>Largest normalised eigenvalue.</summary>
    public double S1 { get; init; }

    /// <summary>Middle normalised eigenvalue.</summary>
    public double S2 { get; init; }

    /// <summary>Smallest normalised eigenvalue.</summary>
    public double S3 { get; init; }

    /// <summary>Woodcock 1977: ln(S1/S2)/ln(S2/S3).</summary>
    public double Shape { get; init; }

    /// <summary>Woodcock 1977: ln(S1/S3).</summary>
    public double Strength { get; init; }

    /// <summary>Mean spacing along the set's normal [m]; null when it cannot be told.</summary>
    public Estimate? SpacingM { get; init; }

    /// <summary>Area per volume [1/m]; null when not computed.</summary>
    public Estimate? P32PerM { get; init; }

    /// <summary>Mean exposed length along strike [m].</summary>
    public double? ExposedLengthMeanM { get; init; }

    /// <summary>Persistence [m], censored estimate; null when not computed.</summary>
    public Estimate? PersistenceM { get; init; }

    /// <summary>How faces were weighted: "count", "area".</summary>
    public string Weighting { get; init; } = "";

    /// <summary>Number of equally weighted faces they are worth.</summary>
    public double NEffective { get; init; }

    /// <summary>Share of orientations within the blind angle of the exposure; null when not computed.</summary>
    public double? BlindShare { get; init; }

    /// <summary>User zone; empty for the whole survey.</summary>
    public string Zone { get; init; } = "";

    /// <summary>The cone with the common errors of the whole model added [deg].</summary>
    public double? Cone95TotalDeg { get; init; }

    /// <summary>Share of redrawn outcrops in which the set came back, 0 to 1; null in zones.</summary>
    public double? Stability { get; init; }

    /// <summary>ISRM 1978 word for the spacing; empty when it is not known.</summary>
    public string SpacingClass { get; init; } = "";

    /// <summary>Dike whose faces alone were looked at; 0 in other domains, and where all dikes were looked at together.</summary>
    public int Dike { get; init; }

    /// <summary>ISRM 1978 word for the persistence; empty when it is not known.</summary>
    public string PersistenceClass { get; init; } = "";

    /// <summary>"joined" or "split" where a geologist made it so, "note" where one was written; empty otherwise.</summary>
    public string Decided { get; init; } = "";
}
