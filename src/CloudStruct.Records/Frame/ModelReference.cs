namespace CloudStruct.Records.Frame;

/// <summary>Common errors of the whole model: they never shrink by averaging. Sigmas are one standard deviation.</summary>
public sealed record ModelReference
{
    /// <summary>What ties the model to the ground.</summary>
    public ReferenceKind Kind { get; init; }

    /// <summary>Tilt about each horizontal axis [deg].</summary>
    public double TiltSigmaDeg { get; init; }

    /// <summary>Turn about the vertical [deg].</summary>
    public double AzimuthSigmaDeg { get; init; }

    /// <summary>Relative error of all lengths (0.001 is a tenth of a per cent).</summary>
    public double ScaleSigma { get; init; }

    /// <summary>Where the sigmas come from: "survey.yaml", "control points", "not stated".</summary>
    public string Source { get; init; } = "not stated";
}
