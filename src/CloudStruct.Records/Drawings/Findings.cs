using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Points;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using CloudStruct.Records.Width;

namespace CloudStruct.Records.Drawings;

/// <summary>Every stage's record of one run, side by side: what drawings and products take.</summary>
public sealed record Findings
{
    /// <summary>Name of the survey.</summary>
    public string SurveyName { get; init; } = "";

    /// <summary>Of the stage intake.</summary>
    public IntakeRecord Intake { get; init; } = new();

    /// <summary>Of the stages thin and describe.</summary>
    public DescribedCloud Described { get; init; } = new();

    /// <summary>Of the stage classify.</summary>
    public ClassifiedCloud Classes { get; init; } = new();

    /// <summary>Of the stage faces.</summary>
    public FaceSet Faces { get; init; } = new();

    /// <summary>Of the stage contacts.</summary>
    public ContactsRecord Contacts { get; init; } = new();

    /// <summary>Of the stage width.</summary>
    public WidthRecord Width { get; init; } = new();

    /// <summary>Of the stage sets.</summary>
    public SetsRecord Sets { get; init; } = new();

    /// <summary>What a geologist decided by hand.</summary>
    public DecisionsRecord Decisions { get; init; } = new();

    /// <summary>All remarks so far, in order of stages.</summary>
    public Remark[] Remarks { get; init; } = [];
}
