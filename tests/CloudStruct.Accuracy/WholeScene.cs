using System.Diagnostics;
using CloudStruct.Accuracy.Scores;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using CloudStruct.Records.Width;
using CloudStruct.Simulate;
using CloudStruct.Stages.Classify;
using CloudStruct.Stages.Contacts;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Faces;
using CloudStruct.Stages.Intake;
using CloudStruct.Stages.Sets;
using CloudStruct.Stages.Thin;
using CloudStruct.Stages.Width;

namespace CloudStruct.Accuracy;

/// <summary>One simulated outcrop through every stage as a run does it, scored against its truth.</summary>
public sealed class WholeScene
{
    /// <summary>Makes, measures and scores.</summary>
    public WholeScene(OutcropPlan plan, ulong seed, int? points = null, int threads = 0)
    {
        threads = threads > 0 ? threads : Environment.ProcessorCount;
        Outcrop = Simulate.Outcrop.Make(plan, seed, points, threads);
        var clock = Stopwatch.StartNew();
        StageContext context = StageContext.Plain(seed, threads);
        // One file, or tiles as two flights give them; a model that is out of true comes with its true sigmas.
        IPointSource[] sources = plan.Tiles > 1 ? [.. DemoSurvey.Of(Outcrop).Tiles.Select(t => t.Source)] : [Outcrop.AsSource()];
        bool turned = plan.ModelTiltSigmaDeg > 0 || plan.ModelTurnSigmaDeg > 0;
        var reference = new ModelReference { Kind = turned ? ReferenceKind.Rtk : ReferenceKind.NotStated, TiltSigmaDeg = plan.ModelTiltSigmaDeg, AzimuthSigmaDeg = plan.ModelTurnSigmaDeg };
        var survey = new SurveyInput { Name = Outcrop.Name, Sources = sources, Crs = Outcrop.Crs, Reference = reference };
        IPieces pieces = new IntakeStage().Run(survey, new IntakeSettings(), context);
        WorkingCloud cloud = new ThinStage().Run(pieces, new ThinSettings(), context);
        DescribedCloud described = new DescribeStage().Run(cloud, new DescribeSettings(), context);
        ClassifiedCloud classes = new ClassifyStage().Run(new ClassifyInput(described, HandLabels.None), new ClassifySettings(), context);
        FaceSet faces = new FacesStage().Run(described, new FaceSettings(), context);
        ContactsRecord contacts = new ContactsStage().Run(new ContactsInput(described, classes, faces, []), new ContactSettings(), context);
        (faces, Contacts) = CoverFaces.Drop(faces, contacts, classes, out _);
        WidthRecord = new WidthStage().Run(new WidthInput(described, classes, Contacts), new WidthSettings(), context);
        var forSets = new SetsInput(cloud.Frame, faces, Contacts, described);
        Sets = new SetsStage().Run(forSets, new SetSettings(), context);
        Seconds = clock.Elapsed.TotalSeconds;
        int[] nearest = TruthOfPoints.Nearest(cloud, Outcrop);
        Faces.Add(Outcrop, cloud, faces, nearest);
        Classes = ClassScore.Of(Outcrop, nearest, classes);
        Width.Add(Outcrop with { Origin = cloud.Frame.Origin }, Contacts, WidthRecord);   // records count from the survey's own origin
        SetScore = SetsStudy.Score(Outcrop, forSets, Sets);
        ContactFloorsDeg = [.. ContactFloor.ErrorsDeg(Outcrop, cloud.Frame.Origin, Contacts)];
    }

    /// <summary>The outcrop.</summary>
    public SimulatedOutcrop Outcrop { get; }

    /// <summary>Faces against truth.</summary>
    public FaceScore Faces { get; } = new();

    /// <summary>Classes against truth.</summary>
    public ClassScore Classes { get; }

    /// <summary>Contacts and widths against truth.</summary>
    public WidthScore Width { get; } = new();

    /// <summary>Contacts as measured.</summary>
    public ContactsRecord Contacts { get; }

    /// <summary>Widths as measured.</summary>
    public WidthRecord WidthRecord { get; }

    /// <summary>Sets as measured.</summary>
    public SetsRecord Sets { get; }

    /// <summary>Sets against truth.</summary>
    public SetScore SetScore { get; }

    /// <summary>Contact errors that remain with the true margins [deg].</summary>
    public double[] ContactFloorsDeg { get; }

    /// <summary>Wall time of the stages [s].</summary>
    public double Seconds { get; }
}
