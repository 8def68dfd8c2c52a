using CloudStruct.Records.Classes;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Classify;

/// <summary>What the stage classify takes.</summary>
/// <param name="Described">The described working cloud.</param>
/// <param name="Labels">Hand labels; <see cref="HandLabels.None"/> when there are none.</param>
public sealed record ClassifyInput(DescribedCloud Described, HandLabels Labels);
