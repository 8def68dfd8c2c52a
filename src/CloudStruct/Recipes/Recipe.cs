using CloudStruct.Records.Frame;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Classify;
using CloudStruct.Stages.Contacts;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Drawings;
using CloudStruct.Stages.Faces;
using CloudStruct.Stages.Intake;
using CloudStruct.Stages.Sets;
using CloudStruct.Stages.Thin;
using CloudStruct.Stages.Width;

namespace CloudStruct.Recipes;

/// <summary>All settings of a run. Keys in a recipe file are these names in snake case; what a file leaves out keeps its default.</summary>
internal sealed record Recipe
{
    /// <summary>What the recipe is for, in one sentence.</summary>
    public string Description { get; init; } = "";

    /// <summary>North of all azimuths: true (convergence of the map grid applied) or grid.</summary>
    public NorthWanted North { get; init; } = NorthWanted.True;

    /// <summary>Leave damaged cloud files out instead of refusing the survey (exit code 4 then, and the report says which).</summary>
    public bool SkipBadFiles { get; init; }

    /// <summary>The classified cloud that is written: las (every input point), laz (the same, compressed), thinned (working points only), none.</summary>
    public CloudsWanted Clouds { get; init; } = CloudsWanted.Las;

    /// <summary>Whether the layers of the map are also written as GeoJSON, in the coordinates of the survey.</summary>
    public bool Geojson { get; init; }

    /// <summary>Settings of the stage intake.</summary>
    public IntakeSettings Intake { get; init; } = new();

    /// <summary>Settings of the stage thin.</summary>
    public ThinSettings Thin { get; init; } = new();

    /// <summary>Settings of the stage describe.</summary>
    public DescribeSettings Describe { get; init; } = new();

    /// <summary>Settings of the stage classify.</summary>
    public ClassifySettings Classify { get; init; } = new();

    /// <summary>Settings of the stage faces.</summary>
    public FaceSettings Faces { get; init; } = new();

    /// <summary>Settings of the stage contacts.</summary>
    public ContactSettings Contacts { get; init; } = new();

    /// <summary>Settings of the stage width.</summary>
    public WidthSettings Width { get; init; } = new();

    /// <summary>Settings of the stage sets.</summary>
    public SetSettings Sets { get; init; } = new();

    /// <summary>Settings of the stage drawings.</summary>
    public DrawingSettings Drawings { get; init; } = new();

    /// <summary>Every fault of every stage's settings.</summary>
    public IEnumerable<SettingComplaint> Check() =>
        new IStageSettings[] { Intake, Thin, Describe, Classify, Faces, Contacts, Width, Sets, Drawings }.SelectMany(s => s.Check());
}
