using CloudStruct.Accuracy.Scores;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Records.Width;
using CloudStruct.Simulate;
using CloudStruct.Stages.Classify;
using CloudStruct.Stages.Contacts;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Faces;
using CloudStruct.Stages.Intake;
using CloudStruct.Stages.Thin;
using CloudStruct.Stages.Width;
using static System.FormattableString;

namespace CloudStruct.Accuracy;

/// <summary>Contacts and widths behind the real stages before them: intake, thin, describe, classify without labels, faces.</summary>
public sealed class ContactsStudy : IStudy
{
    /// <inheritdoc/>
    public void Run(StudyOptions options)
    {
        string[] plans = options.Plans.Length > 0 ? options.Plans : ["demo", "tilted", "two-dikes", "long", "pavement"];
        foreach (string plan in plans)
        {
            var all = new WidthScore();
            foreach (ulong seed in options.Seeds)
            {
                SimulatedOutcrop outcrop = Outcrop.Make(OutcropPlan.ByName(plan), seed, options.Points);
                StageContext context = StageContext.Plain(seed);
                IPieces pieces = new IntakeStage().Run(
                    new SurveyInput { Name = outcrop.Name, Sources = [outcrop.AsSource()], Crs = outcrop.Crs }, new IntakeSettings(), context);
                WorkingCloud cloud = new ThinStage().Run(pieces, new ThinSettings(), context);
                DescribedCloud described = new DescribeStage().Run(cloud, new DescribeSettings(), context);
                ClassifiedCloud classes = new ClassifyStage().Run(new ClassifyInput(described, new HandLabels()), new ClassifySettings(), context);
                FaceSet faces = new FacesStage().Run(described, new FaceSettings(), context);
                ContactsRecord contacts = new ContactsStage().Run(new ContactsInput(described, classes, faces, []), new ContactSettings(), context);
                WidthRecord width = new WidthStage().Run(new WidthInput(described, classes, contacts), new WidthSettings(), context);
                SimulatedOutcrop local = outcrop with { Origin = cloud.Frame.Origin };   // places of the records count from the survey's origin
                var one = new WidthScore();
                one.Add(local, contacts, width);
                all.Add(local, contacts, width);
                if (Environment.GetEnvironmentVariable("WIDTH_ROWS") is not null) WidthStudy.Details(contacts, width, local);
                Console.WriteLine(Invariant($"{plan,-10} {seed,4} dikes {contacts.Dikes.Length} of {outcrop.Dikes.Length}; {WidthStudy.Line(one)}"));
            }

            Console.WriteLine(Invariant($"{plan,-10}  all {WidthStudy.Line(all)}"));
        }
    }
}
