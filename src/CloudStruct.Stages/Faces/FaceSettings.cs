using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Faces;

/// <summary>Settings of the search for planar faces.</summary>
public sealed record FaceSettings : IStageSettings
{
    /// <summary>Smallest face that is reported [m²]. Smaller faces have attitudes too uncertain to be worth a row.</summary>
    public double SmallestFaceM2 { get; init; } = 0.05;

    /// <summary>Farthest a point may lie from its face while the face is being found [m]. Automatic: twice the scatter of the
    /// cloud about its large faces.</summary>
    public double? ToleranceM { get; init; }

    /// <summary>Most degrees by which the surface around a point may turn away from its face [deg]. Lower keeps curved and
    /// weathered rock out, higher keeps rough faces whole.</summary>
    public double BendDeg { get; init; } = 20;

    /// <summary>Widest gap (shadow, lichen, a plant) across which two pieces of one plane still count as one face [m].
    /// Automatic: five spacings of the cloud.</summary>
    public double? GapM { get; init; }

    /// <inheritdoc/>
    public IEnumerable<SettingComplaint> Check()
    {
        if (!(SmallestFaceM2 > 0)) yield return new("faces.smallest_face_m2", Invariant($"{SmallestFaceM2}"), "must be above 0");
        if (ToleranceM is { } t && !(t > 0)) yield return new("faces.tolerance_m", Invariant($"{t}"), "must be above 0, or left out");
        if (!(BendDeg is > 0 and <= 45)) yield return new("faces.bend_deg", Invariant($"{BendDeg}"), "must be above 0 and at most 45");
        if (GapM is { } g && !(g > 0)) yield return new("faces.gap_m", Invariant($"{g}"), "must be above 0, or left out");
    }
}
