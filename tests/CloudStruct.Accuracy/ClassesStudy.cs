using System.Diagnostics;
using CloudStruct.Accuracy.Scores;
using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Simulate;
using CloudStruct.Stages.Classify;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Intake;
using CloudStruct.Stages.Thin;
using static System.FormattableString;

namespace CloudStruct.Accuracy;

/// <summary>Classes found against true classes: dikes found, overlap with the true dike, cover, kappa, time.</summary>
/// <remarks>--points thins the outcrop: fewer points on the same rock. A plan named with +labels (demo+labels) is also given
/// 200 hand labels drawn from the truth, for training only; the score is over the points that carry none.</remarks>
public sealed class ClassesStudy : IStudy
{
    private static readonly string[] Plans =
        ["demo", "two-dikes", "tilted", "pavement", "long", "low-contrast", "texture-only", "no-colour", "no-dike", "gully", "low-contrast+labels", "texture-only+labels"];

    private const string WithLabels = "+labels";
    private const int Labels = 200;

    /// <inheritdoc/>
    public void Run(StudyOptions options)
    {
        foreach (string plan in options.Plans.Length > 0 ? options.Plans : Plans)
        {
            var iou = new List<double>();
            var calibration = new (double Stated, double True, double Points)[5];
            int right = 0;
            foreach (ulong seed in options.Seeds)
            {
                bool labelled = plan.EndsWith(WithLabels, StringComparison.Ordinal);
                ClassScore score = One(OutcropPlan.ByName(labelled ? plan[..^WithLabels.Length] : plan), seed, options.Points, labelled);
                for (int b = 0; b < calibration.Length; b++)
                {
                    (double stated, double share, long points) = score.Calibration[b];
                    if (points > 0) calibration[b] = (calibration[b].Stated + (stated * points), calibration[b].True + (share * points), calibration[b].Points + points);
                }

                if (score.True > 0) iou.Add(score.DikeIou);
                if (score.Found == score.True) right++;
            }

            string overlap = iou.Count > 0 ? Invariant($", dike IoU mean {iou.Average():0.000}, least {iou.Min():0.000}") : "";
            Console.WriteLine(Invariant($"{plan}: right number of dikes on {right} of {options.Seeds.Length} seeds{overlap}"));
            string table = string.Join(", ", calibration.Where(c => c.Points > 0).Select(c => Invariant($"{c.Stated / c.Points:0.00} is {c.True / c.Points:0.00} ({c.Points:0} points)")));
            Console.WriteLine($"{plan}: probability stated is share of dike: {table}");
        }
    }

    private static ClassScore One(OutcropPlan plan, ulong seed, int? points, bool labelled)
    {
        SimulatedOutcrop outcrop = Outcrop.Make(plan, seed, points);
        StageContext context = StageContext.Plain(seed, Environment.ProcessorCount, r => Console.WriteLine("    " + r.Text));
        IPieces pieces = new IntakeStage().Run(
            new SurveyInput { Name = outcrop.Name, Sources = [outcrop.AsSource()], Crs = outcrop.Crs }, new IntakeSettings(), context);
        DescribedCloud described = new DescribeStage().Run(new ThinStage().Run(pieces, new ThinSettings(), context), new DescribeSettings(), context);
        int[] nearest = TruthOfPoints.Nearest(described.Cloud, outcrop);
        HandLabels labels = labelled ? Draw(described.Cloud, outcrop, nearest, seed) : HandLabels.None;
        var process = Process.GetCurrentProcess();
        TimeSpan before = process.TotalProcessorTime;
        ClassifiedCloud classes = new ClassifyStage().Run(new ClassifyInput(described, labels), new ClassifySettings(), context);
        process.Refresh();
        double seconds = (process.TotalProcessorTime - before).TotalSeconds;
        ClassScore score = ClassScore.Of(outcrop, nearest, classes);
        Console.WriteLine(Invariant(
            $"{plan.Name} {seed}: {described.Cloud.Count} points at {described.Cloud.SpacingM * 100:0.0} cm; dikes {score.Found} of {score.True}; IoU {score.DikeIou:0.000} (recall {score.DikeRecall:0.000}, precision {score.DikePrecision:0.000}); cover recall {score.CoverRecall:0.000}, precision {score.CoverPrecision:0.000}; kappa {score.Kappa:0.000}; {seconds:0.0} s of processor"));
        Console.WriteLine(Invariant($"    truly host, dike, cover, loose of what is called dike: {score.CalledDike[0]}, {score.CalledDike[1]}, {score.CalledDike[2]}, {score.CalledDike[3]}"));
        foreach (DikeBody dike in classes.Dikes)
        {
            Console.WriteLine(Invariant(
                $"    dike {dike.Dike}: {dike.Windows.Length} windows, median width {dike.Windows.Select(w => w.WidthM).Order().ElementAt(dike.Windows.Length / 2):0.00} m, margins wander {dike.MarginWanderM:0.000} m, separation {dike.Separation:0.000}, by {(dike.ByColour ? "colour" : "texture")}"));
        }

        return score;
    }

    /// <summary>Labels as a careful hand would set them: the true class at places spread by chance; points that get one are
    /// taken out of the score.</summary>
    private static HandLabels Draw(WorkingCloud cloud, SimulatedOutcrop outcrop, int[] nearest, ulong seed)
    {
        var draws = new Draws(seed, 0x6C61_6265, 0);
        var labels = new List<LabelPoint>();
        while (labels.Count < Labels)
        {
            int i = draws.NextBelow(cloud.Count);
            if (nearest[i] < 0) continue;
            var truth = (RockClass)outcrop.TrueClass[nearest[i]];
            if (truth == RockClass.Unknown) continue;
            labels.Add(new LabelPoint(cloud.Place(i) + cloud.Frame.Origin, truth == RockClass.Inclusion ? RockClass.Dike : truth, LabelUse.Train));
            nearest[i] = -1;
        }

        return new HandLabels { Points = [.. labels] };
    }
}
