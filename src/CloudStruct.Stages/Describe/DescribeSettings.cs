using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Describe;

/// <summary>At which sizes the surface around each point is described.</summary>
public sealed record DescribeSettings : IStageSettings
{
    /// <summary>Radius around a point within which its surface normal is fitted [m]. Wider is steadier against noise but
    /// blurs small faces. Default: five spacings, more when the noise of the cloud calls for it.</summary>
    public double? NormalRadiusM { get; init; }

    /// <summary>Radius for the roughness, the rms of the neighbours about their own plane [m]. To compare surveys give
    /// the same value to each. Default: the first of 0.15, 0.2, 0.3, 0.5, 0.75, 1, 1.5, ... that is eight spacings or more; less for small models.</summary>
    public double? RoughnessRadiusM { get; init; }

    /// <inheritdoc/>
    public IEnumerable<SettingComplaint> Check()
    {
        if (NormalRadiusM is { } n && !(n > 0 && n <= 50)) yield return new("describe.normal_radius_m", Invariant($"{n}"), "must be above 0 and at most 50");
        if (RoughnessRadiusM is { } r && !(r > 0 && r <= 50)) yield return new("describe.roughness_radius_m", Invariant($"{r}"), "must be above 0 and at most 50");
    }
}
