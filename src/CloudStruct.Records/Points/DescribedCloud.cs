using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Points;

/// <summary>The working cloud with what describes the surface at each point.</summary>
public sealed record DescribedCloud
{
    /// <summary>The points.</summary>
    public WorkingCloud Cloud { get; init; } = new();

    /// <summary>Unit normal, edge-aware, pointing outward where that can be told, else upward. Only its axis may be used for attitudes.</summary>
    public float[] NormalX { get; init; } = [];

    /// <summary>See <see cref="NormalX"/>.</summary>
    public float[] NormalY { get; init; } = [];

    /// <summary>See <see cref="NormalX"/>.</summary>
    public float[] NormalZ { get; init; } = [];

    /// <summary>Radius of the normals [m].</summary>
    public double NormalRadiusM { get; init; }

    /// <summary>Rms of the neighbours about their own plane within <see cref="RoughnessRadiusM"/> [m]; NaN with too few.</summary>
    public float[] RoughnessM { get; init; } = [];

    /// <summary>Radius of the roughness [m].</summary>
    public double RoughnessRadiusM { get; init; }

    /// <summary>(s2 - s3) / s1 from the roots of the covariance eigenvalues at <see cref="PlanarityRadiiM"/>; row-major, one per radius.</summary>
    public float[] Planarity { get; init; } = [];

    /// <summary>Radii of the planarity, ascending [m].</summary>
    public double[] PlanarityRadiiM { get; init; } = [];

    /// <summary>Surface that a point stands for [m²].</summary>
    public float[] AreaM2 { get; init; } = [];

    /// <summary>CIE L* of the point's colour, D65; empty without colour.</summary>
    public float[] LStar { get; init; } = [];

    /// <summary>CIE a*.</summary>
    public float[] AStar { get; init; } = [];

    /// <summary>CIE b*.</summary>
    public float[] BStar { get; init; } = [];

    /// <summary>ln(R/G) of linear light, which survives shade; empty without colour.</summary>
    public float[] LogRedGreen { get; init; } = [];

    /// <summary>ln(B/G) of linear light.</summary>
    public float[] LogBlueGreen { get; init; } = [];

    /// <summary>Scatter of the cloud about smooth rock, from the smoothest tenth of the surface [m].</summary>
    public double NoiseM { get; init; }

    /// <summary>Normal of point i.</summary>
    public Vec3 Normal(int i) => new(NormalX[i], NormalY[i], NormalZ[i]);
}
