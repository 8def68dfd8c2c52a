using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Classify;

/// <summary>How dike, host, cover and loose rock are told apart.</summary>
public sealed record ClassifySettings : IStageSettings
{
    /// <summary>Edge of the patches on which colour and texture are compared [m]. Empty: 4.5 cm or twice the point
    /// spacing, whichever is larger.</summary>
    public double? PatchM { get; init; }

    /// <summary>Price of one metre of boundary between classes, in units of evidence. Higher gives smoother outlines and
    /// loses thinner dikes: a dike thinner than twice this price over the evidence per square metre disappears.</summary>
    public double SmoothingPerM { get; init; } = 60;

    /// <summary>Narrowest dike looked for [m]. Empty: six patches or 25 cm, whichever is larger.</summary>
    public double? NarrowestDikeM { get; init; }

    /// <summary>Widest dike looked for [m]. Empty: a third of the scene.</summary>
    public double? WidestDikeM { get; init; }

    /// <summary>Most dikes to look for; 0 looks for none.</summary>
    public int MostDikes { get; init; } = 6;

    /// <summary>Whether hand labels for training are used. Without them rock is told apart by what the cloud shows alone.</summary>
    public bool UseLabels { get; init; } = true;

    /// <summary>Islands smaller than this that a dike or the host encloses (lichen, clasts) are counted to it [m²].</summary>
    public double FillIslandsM2 { get; init; } = 0.3;

    /// <summary>Whether soil and plants are marked as cover. Turn off where bare rock is green or smooth.</summary>
    public bool FindCover { get; init; } = true;

    /// <inheritdoc/>
    public IEnumerable<SettingComplaint> Check()
    {
        if (PatchM is { } p && !(p > 0)) yield return new("classify.patch_m", Invariant($"{p}"), "must be above 0, or left out");
        if (!(SmoothingPerM >= 0 && SmoothingPerM <= 1e6)) yield return new("classify.smoothing_per_m", Invariant($"{SmoothingPerM}"), "must be between 0 and 1000000");
        if (NarrowestDikeM is { } n && !(n > 0)) yield return new("classify.narrowest_dike_m", Invariant($"{n}"), "must be above 0, or left out");
        if (WidestDikeM is { } w && !(w > (NarrowestDikeM ?? 0)))
        {
            yield return new("classify.widest_dike_m", Invariant($"{w}"), "must be above narrowest_dike_m, or left out");
        }

        if (MostDikes is < 0 or > 200) yield return new("classify.most_dikes", Invariant($"{MostDikes}"), "must be between 0 and 200");
        if (!(FillIslandsM2 >= 0)) yield return new("classify.fill_islands_m2", Invariant($"{FillIslandsM2}"), "must be 0 or above");
    }
}
